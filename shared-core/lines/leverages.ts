import type { SegmentBasis } from './segment-basis.ts';
import { columnCovariance } from './segment-sums.ts';
import type { SolvedFit } from './solved-fit.ts';

/**
 * Share of each pixel's noise that the fit absorbs: 1 - E(residual^2)/variance, 0 to 1.
 *
 * For white noise the leverage h_ii. Where neighbours share their noise with correlation R the fit absorbs more of it:
 * 2 (H R)_ii - (H R H)_ii, which is h_ii again for R = 1.
 *
 * @returns length of the recording; zero outside the segments and on masked pixels
 * @source [Belsley1980] sec. 2.1 for h; the second form is the diagonal of (1 - H) R (1 - H)
 * @check  test/unit/lines/joint-model.test.ts
 */
export function leverages({ problem, model, solution }: SolvedFit): Float64Array {
  const out = new Float64Array(problem.recording.netSignal.length);
  const { correlation } = problem.recording.noise;
  for (const basis of model.bases) {
    const seen = columnCovariance(basis, solution.covariance, model.parameterCount);
    const { firstPx } = basis.segment;
    const isFitted = (i: number): boolean => problem.masked[firstPx + i] === 0;
    const hat = (i: number, j: number): number =>
      isFitted(i) && isFitted(j)
        ? bilinear(basis, seen, i, j) / Math.sqrt(model.variance[firstPx + i]! * model.variance[firstPx + j]!)
        : 0;
    for (let i = 0; i < basis.pixelCount; i++) {
      if (isFitted(i))
        out[firstPx + i] =
          correlation.length === 0 ? hat(i, i) : absorbed(hat, i, basis.pixelCount, correlation);
    }
  }
  return out;
}

function absorbed(
  hat: (i: number, j: number) => number,
  i: number,
  count: number,
  correlation: readonly number[],
): number {
  const row = Float64Array.from({ length: count }, (_, j) => hat(i, j));
  let sum = 0;
  for (let j = 0; j < count; j++) {
    if (row[j] === 0) continue;
    for (let lag = -correlation.length; lag <= correlation.length; lag++) {
      const k = j + lag;
      if (k < 0 || k >= count) continue;
      const r = lag === 0 ? 1 : correlation[Math.abs(lag) - 1]!;
      sum += row[j]! * r * ((k === i ? 2 : 0) - row[k]!);
    }
  }
  return sum;
}

function bilinear(
  { columns, columnCount, pixelCount }: SegmentBasis,
  seen: Float64Array,
  i: number,
  j: number,
): number {
  let sum = 0;
  for (let a = 0; a < columnCount; a++) {
    const left = columns[a * pixelCount + i]!;
    for (let b = 0; b < columnCount; b++)
      sum += left * columns[b * pixelCount + j]! * seen[a * columnCount + b]!;
  }
  return sum;
}
