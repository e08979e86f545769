import { addToEquations, createSegmentSums } from './segment-sums.ts';
import type { SolvedFit } from './solved-fit.ts';

/**
 * Covariance of a weighted fit whose noise is shared by neighbouring pixels: C (J^T W S W J + P) C, with C the covariance
 * for white noise, J the derivatives, W the weights used, S the true covariance of the pixels (their variances with
 * correlation r_k at distance k) and P the precision of the beliefs.
 *
 * @param correlation  r_1, r_2, ...; 0 beyond
 * @returns full covariance over all parameters, row-major, in the layout of the problem
 * @source [White1980] for the sandwich form; [Newey1987] for noise with a finite memory
 * @check  test/property/correlated-noise.test.ts
 */
export function correlatedCovariance(fit: SolvedFit, correlation: readonly number[]): Float64Array {
  const { problem, model, solution } = fit;
  const { active, parameterCount } = model;
  const size = active.length;
  const position = new Int32Array(parameterCount).fill(-1);
  active.forEach((parameter, index) => (position[parameter] = index));
  const meat = model.newEvaluation();
  for (const basis of model.bases) {
    const { segment, columns, columnCount, pixelCount } = basis;
    const sums = createSegmentSums(basis);
    for (let i = 0; i < pixelCount; i++) {
      for (let lag = -correlation.length; lag <= correlation.length; lag++) {
        const j = i + lag;
        const a = segment.firstPx + i;
        const b = segment.firstPx + j;
        if (j < 0 || j >= pixelCount || problem.masked[a] === 1 || problem.masked[b] === 1) continue;
        const r = lag === 0 ? 1 : correlation[Math.abs(lag) - 1]!;
        const weight = r / Math.sqrt(model.variance[a]! * model.variance[b]!);
        for (let row = 0; row < columnCount; row++) {
          const scaled = weight * columns[row * pixelCount + i]!;
          for (let column = 0; column <= row; column++) {
            const at = row * columnCount + column;
            sums.normal[at] = sums.normal[at]! + scaled * columns[column * pixelCount + j]!;
          }
        }
      }
    }
    addToEquations(basis, sums, position, size, meat);
  }
  for (let i = 0; i < size; i++) {
    const { sigma } = model.beliefs[active[i]!]!;
    if (Number.isFinite(sigma)) meat.normal[i * size + i] = meat.normal[i * size + i]! + 1 / (sigma * sigma);
    for (let j = 0; j < i; j++) meat.normal[j * size + i] = meat.normal[i * size + j]!;
  }
  return sandwich(solution.covariance, active, parameterCount, meat.normal);
}

function sandwich(
  covariance: Float64Array,
  active: Int32Array,
  parameterCount: number,
  meat: Float64Array,
): Float64Array {
  const size = active.length;
  const bread = new Float64Array(size * size);
  for (let i = 0; i < size; i++) {
    for (let j = 0; j < size; j++)
      bread[i * size + j] = covariance[active[i]! * parameterCount + active[j]!]!;
  }
  const inner = product(bread, meat, size);
  const outer = product(inner, bread, size);
  const full = new Float64Array(covariance.length);
  for (let i = 0; i < size; i++) {
    for (let j = 0; j < size; j++) {
      full[active[i]! * parameterCount + active[j]!] = 0.5 * (outer[i * size + j]! + outer[j * size + i]!);
    }
  }
  return full;
}

function product(a: Float64Array, b: Float64Array, n: number): Float64Array {
  const out = new Float64Array(n * n);
  for (let i = 0; i < n; i++) {
    for (let k = 0; k < n; k++) {
      const scale = a[i * n + k]!;
      for (let j = 0; j < n; j++) out[i * n + j] = out[i * n + j]! + scale * b[k * n + j]!;
    }
  }
  return out;
}
