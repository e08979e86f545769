import { choleskyFactor, choleskyInverse, choleskySolve } from './cholesky.ts';

export interface LinearModel {
  readonly values: Float64Array;
  /** Of the values, row-major. */
  readonly covariance: Float64Array;
  readonly chiSquare: number;
  readonly degreesOfFreedom: number;
  readonly residuals: Float64Array;
}

/**
 * Generalised least squares for y = X b with a full covariance matrix V of y.
 *
 * b = (X^T V^-1 X)^-1 X^T V^-1 y, Cov(b) = (X^T V^-1 X)^-1, chi2 = r^T V^-1 r with n - p degrees of freedom.
 *
 * @param columns     p columns of X, each of length n >= p
 * @param y           length n
 * @param covariance  row-major n x n, symmetric positive definite
 * @returns null when V is not positive definite or the columns are not independent
 * @source [Aitken1936]
 * @check  test/reference/boltzmann-fit.test.ts
 */
export function fitLinearModel(
  columns: readonly Float64Array[],
  y: Float64Array,
  covariance: Float64Array,
): LinearModel | null {
  const n = y.length;
  const p = columns.length;
  const factor = covariance.slice();
  if (n < p || !choleskyFactor(factor, n)) return null;
  const weighted = columns.map((column) => {
    const copy = column.slice();
    choleskySolve(factor, n, copy);
    return copy;
  });
  // Columns to unit size, so that their units do not decide whether they count as independent.
  const normal = new Float64Array(p * p);
  const scale = columns.map((column, i) => 1 / Math.sqrt(dot(column, weighted[i]!)));
  if (scale.some((value) => !Number.isFinite(value))) return null;
  for (let i = 0; i < p; i++) {
    for (let j = 0; j < p; j++) normal[i * p + j] = dot(columns[i]!, weighted[j]!) * scale[i]! * scale[j]!;
  }
  if (!choleskyFactor(normal, p)) return null;
  for (let i = 0; i < p; i++) if (normal[i * p + i]! < 1e-7) return null;
  const inverse = choleskyInverse(normal, p).map(
    (value, at) => value * scale[Math.floor(at / p)]! * scale[at % p]!,
  );
  const values = new Float64Array(p);
  for (let i = 0; i < p; i++) {
    for (let j = 0; j < p; j++) values[i] = values[i]! + inverse[i * p + j]! * dot(weighted[j]!, y);
  }
  const residuals = y.slice();
  for (const [j, column] of columns.entries()) {
    for (let i = 0; i < n; i++) residuals[i] = residuals[i]! - values[j]! * column[i]!;
  }
  const solved = residuals.slice();
  choleskySolve(factor, n, solved);
  return {
    values,
    covariance: inverse,
    chiSquare: dot(residuals, solved),
    degreesOfFreedom: n - p,
    residuals,
  };
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i]! * b[i]!;
  return sum;
}
