import { choleskyFactor, choleskyInverse } from './cholesky.ts';

export interface StraightLine {
  readonly intercept: number;
  readonly slope: number;
  readonly interceptVariance: number;
  readonly slopeVariance: number;
  readonly covariance: number;
  readonly chiSquare: number;
  readonly degreesOfFreedom: number;
  /** y - intercept - slope x. */
  readonly residuals: Float64Array;
  /** d slope / d y_i: the slope is the sum of these times y. */
  readonly slopeGain: Float64Array;
}

/**
 * Generalised least squares for y = intercept + slope x with a full covariance matrix V of y.
 *
 * b = (X^T V^-1 X)^-1 X^T V^-1 y, Cov(b) = (X^T V^-1 X)^-1, chi2 = r^T V^-1 r with n - 2 degrees of freedom.
 *
 * @param x           length n >= 2, not all equal
 * @param y           length n
 * @param covariance  row-major n x n, symmetric positive definite; its square root has the unit of y
 * @returns null when V is not positive definite or the x do not span a line
 * @source [Aitken1936]
 * @check  test/reference/fit-straight-line.test.ts
 */
export function fitStraightLine(
  x: Float64Array,
  y: Float64Array,
  covariance: Float64Array,
): StraightLine | null {
  const n = x.length;
  const factor = covariance.slice();
  if (n < 2 || !choleskyFactor(factor, n)) return null;
  const weight = choleskyInverse(factor, n);
  // About the weighted mean of x, so that intercept and slope do not cancel each other's digits.
  let s = 0;
  let sx = 0;
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      s += weight[i * n + j]!;
      sx += weight[i * n + j]! * x[j]!;
    }
  }
  const meanX = sx / s;
  let sxx = 0;
  let sxy = 0;
  let sy = 0;
  let cross = 0;
  const rowWeight = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      const w = weight[i * n + j]!;
      const dx = x[i]! - meanX;
      rowWeight[j] = rowWeight[j]! + w * dx;
      sxx += w * dx * (x[j]! - meanX);
      cross += w * (x[j]! - meanX);
      sxy += w * dx * y[j]!;
      sy += w * y[j]!;
    }
  }
  if (!(sxx > 0)) return null;
  // cross vanishes by the choice of meanX up to rounding, so the two parameters are independent.
  const slope = (sxy - (cross * sy) / s) / (sxx - (cross * cross) / s);
  const centre = (sy - cross * slope) / s;
  const residuals = new Float64Array(n);
  for (let i = 0; i < n; i++) residuals[i] = y[i]! - centre - slope * (x[i]! - meanX);
  let chiSquare = 0;
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) chiSquare += residuals[i]! * weight[i * n + j]! * residuals[j]!;
  }
  const slopeVariance = 1 / sxx;
  return {
    intercept: centre - slope * meanX,
    slope,
    interceptVariance: 1 / s + meanX * meanX * slopeVariance,
    slopeVariance,
    covariance: -meanX * slopeVariance,
    chiSquare,
    degreesOfFreedom: n - 2,
    residuals,
    slopeGain: rowWeight.map((value) => value / sxx),
  };
}
