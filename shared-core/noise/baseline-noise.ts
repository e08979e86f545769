import { median } from '../numeric/robust.ts';

/** Median of |x| for a standard normal x, inverted. */
const normalPerMad = 1.482602218505602;

/** A median of this many differences is good to 3.5 %; more would only take time. */
const enoughDifferences = 1200;
/** Normal differences beyond this are one in 150,000; lines are far beyond. */
const trimAt = 4.5;

/**
 * Standard deviation of the pixel noise where there is little light, in the unit of `signal`.
 *
 * Second differences y[i-k] - 2 y[i] + y[i+k] cancel any local straight baseline and have variance 6 s^2 for
 * white noise; the median of their size ignores the few that straddle lines. Lags k = 1 and 2 are tried and the
 * larger kept: a smoothed export has noise that is correlated from pixel to pixel and looks too quiet at lag 1.
 *
 * @param signal  length n >= 8
 * @returns sigma >= 0, and the ratio of the two lags (1 for white noise, above about 1.3 for smoothed data)
 * @source differencing estimator: [vonNeumann1941], with the median in place of the mean
 * @check  test/unit/noise/baseline-noise.test.ts
 */
export function baselineNoise(signal: Float64Array): { sigma: number; lagRatio: number } {
  const first = secondDifferences(signal, 1, enoughDifferences);
  const second = secondDifferences(signal, 2, enoughDifferences);
  const step = quantisationStep(signal);
  // Medians of coarsely digitised values come in steps, down to none at all; the trimmed mean square does not.
  const rough = Math.max(medianSigma(first), medianSigma(second));
  const quiet = trimmedSigma(first, Math.max(rough, 0.5 * step));
  const wide = trimmedSigma(second, Math.max(rough, 0.5 * step));
  const robust = rough < step ? Math.max(quiet, wide) : rough;
  return { sigma: Math.max(robust, step / Math.sqrt(12)), lagRatio: quiet > 0 ? wide / quiet : 1 };
}

/** Sizes of second differences at one lag, at most about `wantedCount` of them, spread over the signal. */
export function secondDifferences(signal: Float64Array, lag: number, wantedCount: number): Float64Array {
  const available = Math.max(0, signal.length - 2 * lag);
  const stride = Math.max(1, Math.ceil(available / wantedCount));
  const count = Math.floor(available / stride);
  const sizes = new Float64Array(count);
  for (let k = 0, i = 0; k < count; k++, i += stride) {
    sizes[k] = Math.abs(signal[i]! - 2 * signal[i + lag]! + signal[i + 2 * lag]!);
  }
  return sizes;
}

/** Sigma of white noise that makes second differences of these sizes, by their median. */
function medianSigma(sizes: Float64Array): number {
  return sizes.length > 0 ? (normalPerMad * median(sizes)) / Math.sqrt(6) : 0;
}

/** The same by the mean square of those within four and a half sigma: sharper, and free of the steps of whole counts. */
export function trimmedSigma(sizes: Float64Array, roughSigma = medianSigma(sizes)): number {
  const limit = trimAt * Math.sqrt(6) * roughSigma;
  let sum = 0;
  let count = 0;
  for (let i = 0; i < sizes.length; i++) {
    const size = sizes[i]!;
    if (size > limit) continue;
    sum += size * size;
    count++;
  }
  return count > 0 ? Math.sqrt(sum / count / 6) : 0;
}

/**
 * Digitising step of the values, unit of `signal`: 1 for whole counts; otherwise the smallest difference between
 * any two values when values repeat (at least one in fifty does), and 0 when they do not, as in exports that were
 * scaled or averaged to many digits.
 * @check test/unit/noise/baseline-noise.test.ts
 */
export function quantisationStep(signal: Float64Array): number {
  if (isWhole(signal)) return 1;
  const sorted = signal.slice().sort();
  let step = Infinity;
  let repeatCount = 0;
  for (let i = 1; i < sorted.length; i++) {
    const difference = sorted[i]! - sorted[i - 1]!;
    if (difference > 0) step = Math.min(step, difference);
    else repeatCount++;
  }
  return repeatCount * 50 >= sorted.length && Number.isFinite(step) ? step : 0;
}

/** True when every value is a whole number, as counts are. */
export function isWhole(signal: Float64Array): boolean {
  for (let i = 0; i < signal.length; i++) if (!Number.isInteger(signal[i]!)) return false;
  return true;
}
