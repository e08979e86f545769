import { median } from '../numeric/robust.ts';
import { secondDifferences, trimmedSigma } from './baseline-noise.ts';

/** Longest memory looked for, pixels: wider smoothing would swallow the lines of any bench spectrometer. */
const longestLag = 12;
/** Correlations below this cannot be told from the scatter of their estimate. */
const leastCorrelation = 0.12;
/** Relative rms by which differences may miss those of a running mean and still be taken for one's. */
const runningMeanTolerance = 0.05;
/** Most by which lines swell the differences with every further lag, relative: wide lines bend the signal everywhere. */
const mostSwelling = 0.02;

export interface NoiseCorrelation {
  /** Standard deviation of one point, unit of the signal. */
  readonly sigma: number;
  /** r_1, r_2, ... up to the last that is seen; none for white noise. */
  readonly correlation: readonly number[];
  /** Points of a running mean that leaves these correlations, odd; 1 when none does. */
  readonly runningMeanPoints: number;
}

/**
 * Noise shared by neighbouring points, as smoothing or oversampling leaves it.
 *
 * Second differences at lag k have variance D_k = s^2 (6 - 8 r_k + 2 r_2k). Beyond the memory of the noise D = 6 s^2,
 * which gives s; going down from there each lag gives its r_k = (6 + 2 r_2k - D_k/s^2)/8. Medians make lines harmless.
 *
 * @param signal  length n >= 64
 * A running mean of N points, the commonest smoothing, leaves r_k = 1 - k/N: where that is what is seen it is named, so
 * that the line model can be smoothed the same way.
 *
 * @source variance of differences of a stationary series: [Box2015] sec. 2.1; robust scale: [vonNeumann1941] with medians
 * @check  test/unit/noise/noise-correlation.test.ts
 */
export function noiseCorrelation(signal: Float64Array): NoiseCorrelation {
  const sigmas = Array.from({ length: 2 * longestLag }, (_, i) =>
    trimmedSigma(secondDifferences(signal, i + 1, signal.length)),
  );
  const points = runningMeanPoints(sigmas);
  if (points > 1)
    return {
      sigma: sigmas[points - 1]!,
      correlation: runningMeanCorrelation(points),
      runningMeanPoints: points,
    };
  const sigma = median(Float64Array.from(sigmas.slice(longestLag)));
  if (!(sigma > 0)) return { sigma: 0, correlation: [], runningMeanPoints: 1 };
  const found = new Float64Array(2 * longestLag + 1);
  for (let lag = longestLag; lag >= 1; lag--) {
    const relative = sigmas[lag - 1]! / sigma;
    const value = (6 + 2 * found[2 * lag]! - 6 * relative * relative) / 8;
    found[lag] = Math.max(-1, Math.min(1, value));
  }
  let last = 0;
  while (last < longestLag && found[last + 1]! > leastCorrelation) last++;
  return { sigma, correlation: [...found.slice(1, last + 1)], runningMeanPoints: 1 };
}

const runningMeanCorrelation = (points: number): number[] =>
  Array.from({ length: points - 1 }, (_, i) => 1 - (i + 1) / points);

/**
 * The odd number of points whose triangle of correlations the differences follow best, or 1. Scaled by the difference at
 * the first lag beyond the memory, the shorter the lag, the fewer lines it straddles; what lines add is taken to grow in
 * proportion to the lag.
 */
function runningMeanPoints(sigmas: readonly number[]): number {
  let best = { points: 1, rms: runningMeanTolerance };
  for (let points = 3; points <= longestLag; points += 2) {
    const beyond = sigmas[points - 1]!;
    if (!(beyond > 0)) continue;
    const r = (lag: number): number => Math.max(0, 1 - lag / points);
    const misses = Array.from({ length: points }, (_, i) => {
      const lag = i + 1;
      const expected = Math.sqrt(1 - (4 * r(lag)) / 3 + r(2 * lag) / 3);
      return sigmas[i]! / beyond / expected - 1;
    });
    let together = 0;
    let lagSquares = 0;
    for (const [i, miss] of misses.entries()) {
      const toBeyond = points - 1 - i;
      together -= miss * toBeyond;
      lagSquares += toBeyond * toBeyond;
    }
    const swelling = Math.max(0, Math.min(mostSwelling, together / lagSquares));
    let squares = 0;
    for (const [i, miss] of misses.entries()) {
      const left = miss + swelling * (points - 1 - i);
      squares += left * left;
    }
    const rms = Math.sqrt(squares / points);
    if (rms < best.rms) best = { points, rms };
  }
  return best.points;
}
