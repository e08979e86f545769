import { betaI } from './incomplete-beta.ts';
import { gammaP, gammaQ } from './incomplete-gamma.ts';
import { erfc, exp, log } from './portable-math.ts';

/**
 * Quantile of the standard normal distribution, 0 < p < 1; relative error below 1e-13, absolute below 1e-15
 * near p = 1/2, after one Halley step.
 * @source [Acklam2003], refined by Halley's method on normalCdf
 * @check  test/reference/distributions.test.ts
 */
export function normalQuantile(p: number): number {
  let quantile = knownQuantiles.get(p);
  if (quantile === undefined) {
    quantile = computeNormalQuantile(p);
    if (knownQuantiles.size < 64) knownQuantiles.set(p, quantile);
  }
  return quantile;
}

/** The same few coverages are asked for again and again. */
const knownQuantiles = new Map<number, number>();

function computeNormalQuantile(p: number): number {
  if (!(p > 0 && p < 1)) return p === 0 ? -Infinity : p === 1 ? Infinity : NaN;
  // The lower tail keeps its digits; 1 - p is exact for p >= 1/2.
  if (p > 0.5) return -computeNormalQuantile(1 - p);
  const x = roughNormalQuantile(p);
  // Halley: e = (Phi(x) - p)/phi(x).
  const e = (normalCdf(x) - p) * 2.5066282746310002 * exp(0.5 * x * x);
  return x - e / (1 + 0.5 * x * e);
}

/** Acklam's approximation for p <= 1/2, relative error 1.2e-9. */
function roughNormalQuantile(p: number): number {
  if (p < 0.02425) {
    const q = Math.sqrt(-2 * log(p));
    return (
      (((((-7.784894002430293e-3 * q - 0.3223964580411365) * q - 2.400758277161838) * q - 2.549732539343734) *
        q +
        4.374664141464968) *
        q +
        2.938163982698783) /
      ((((7.784695709041462e-3 * q + 0.3224671290700398) * q + 2.445134137142996) * q + 3.754408661907416) *
        q +
        1)
    );
  }
  const q = p - 0.5;
  const r = q * q;
  return (
    ((((((-39.69683028665376 * r + 220.9460984245205) * r - 275.9285104469687) * r + 138.357751867269) * r -
      30.66479806614716) *
      r +
      2.506628277459239) *
      q) /
    (((((-54.47609879822406 * r + 161.5858368580409) * r - 155.6989798598866) * r + 66.80131188771972) * r -
      13.28068155288572) *
      r +
      1)
  );
}

/**
 * Standard normal distribution function, erfc(-x/sqrt 2)/2; relative error below 5e-13 down to 1e-300.
 * @check  test/reference/distributions.test.ts
 */
export function normalCdf(x: number): number {
  return 0.5 * erfc(-0.7071067811865476 * x);
}

/**
 * Probability that chi-square with `degreesOfFreedom` (> 0) exceeds `chiSquare` (>= 0): Q(nu/2, chi2/2).
 * @check test/reference/distributions.test.ts
 */
export function chiSquareUpperTail(chiSquare: number, degreesOfFreedom: number): number {
  return gammaQ(0.5 * degreesOfFreedom, 0.5 * chiSquare);
}

/**
 * Probability that chi-square with `degreesOfFreedom` (> 0) stays at or below `chiSquare` (>= 0): P(nu/2, chi2/2).
 * @check test/reference/distributions.test.ts
 */
export function chiSquareCdf(chiSquare: number, degreesOfFreedom: number): number {
  return gammaP(0.5 * degreesOfFreedom, 0.5 * chiSquare);
}

/**
 * Quantile of chi-square: the value exceeded with probability 1 - p; relative error below 1e-12 for p above 1e-100 and
 * fewer than 100 degrees of freedom, below 1e-10 up to 10 000.
 * @check  test/reference/distributions.test.ts
 */
export function chiSquareQuantile(p: number, degreesOfFreedom: number): number {
  if (!(p > 0 && p < 1) || !(degreesOfFreedom > 0)) return NaN;
  // Of the two tails the smaller one keeps its digits.
  const isAbove =
    p > 0.5
      ? (value: number) => chiSquareUpperTail(value, degreesOfFreedom) <= 1 - p
      : (value: number) => chiSquareCdf(value, degreesOfFreedom) >= p;
  return bisect(isAbove, degreesOfFreedom);
}

/**
 * Quantile of Student's t with `degreesOfFreedom` (> 0, not necessarily whole), 0 < p < 1.
 *
 * P(T > t) = I_x(nu/2, 1/2)/2 with x = nu/(nu + t^2), solved for t. Relative error below 1e-12, absolute below 1e-15
 * near p = 1/2; for the smaller tail above 1e-100 and fewer than 100 degrees of freedom, below 1e-10 up to 10 000.
 * @source [DLMF2024] 8.17 for the distribution function
 * @check  test/reference/distributions.test.ts
 */
export function studentTQuantile(p: number, degreesOfFreedom: number): number {
  if (!(degreesOfFreedom > 0)) return NaN;
  if (!(p > 0 && p < 1)) return p === 0 ? -Infinity : p === 1 ? Infinity : NaN;
  if (p === 0.5) return 0;
  const tail = Math.min(p, 1 - p);
  const t = bisect((value) => {
    const square = value * value;
    const sum = degreesOfFreedom + square;
    return 0.5 * betaI(0.5 * degreesOfFreedom, 0.5, degreesOfFreedom / sum, square / sum) <= tail;
  }, 1);
  return p < 0.5 ? -t : t;
}

/** Where a condition that fails below some positive value and holds above it turns over. */
function bisect(isAbove: (value: number) => boolean, start: number): number {
  let high = start;
  while (!isAbove(high)) high *= 2;
  let low = 0.5 * high;
  while (low > 0 && isAbove(low)) {
    high = low;
    low *= 0.5;
  }
  for (let i = 0; i < 60 && high - low > 4e-16 * high; i++) {
    const middle = 0.5 * (low + high);
    if (isAbove(middle)) high = middle;
    else low = middle;
  }
  return 0.5 * (low + high);
}
