import { exp, log, pow } from './portable-math.ts';

/**
 * Quantile of the standard normal distribution, 0 < p < 1; absolute error below 1e-9 after one Halley step.
 * @source P. J. Acklam's rational approximation (2003), refined by Halley's method on normalCdf
 * @check  test/reference/distributions.test.ts
 */
export function normalQuantile(p: number): number {
  if (!(p > 0 && p < 1)) return p === 0 ? -Infinity : p === 1 ? Infinity : NaN;
  const x = roughNormalQuantile(p);
  // Halley: e = (Phi(x) - p)/phi(x).
  const e = (normalCdf(x) - p) * 2.5066282746310002 * exp(0.5 * x * x);
  return x - e / (1 + 0.5 * x * e);
}

function roughNormalQuantile(p: number): number {
  const tail = Math.min(p, 1 - p);
  if (tail < 0.02425) {
    const q = Math.sqrt(-2 * log(tail));
    const value =
      (((((-7.784894002430293e-3 * q - 0.3223964580411365) * q - 2.400758277161838) * q - 2.549732539343734) *
        q +
        4.374664141464968) *
        q +
        2.938163982698783) /
      ((((7.784695709041462e-3 * q + 0.3224671290700398) * q + 2.445134137142996) * q + 3.754408661907416) *
        q +
        1);
    return p < 0.5 ? value : -value;
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
 * Standard normal distribution function, by the incomplete gamma function; relative error below 1e-13.
 * @check  test/reference/distributions.test.ts
 */
export function normalCdf(x: number): number {
  const half = 0.5 * gammaQ(0.5, 0.5 * x * x);
  return x < 0 ? half : 1 - half;
}

/**
 * Probability that chi-square with `degreesOfFreedom` (> 0) exceeds `chiSquare` (>= 0): Q(nu/2, chi2/2).
 * @check test/reference/distributions.test.ts
 */
export function chiSquareUpperTail(chiSquare: number, degreesOfFreedom: number): number {
  return gammaQ(0.5 * degreesOfFreedom, 0.5 * chiSquare);
}

/**
 * Regularised upper incomplete gamma function Q(a, x), a > 0, x >= 0; relative error about 1e-14 for a < 1e5.
 * @source series and Lentz continued fraction: NIST Digital Library of Mathematical Functions 8.7.1, 8.9.2
 */
export function gammaQ(a: number, x: number): number {
  if (!(a > 0) || !(x >= 0)) return NaN;
  if (x === 0) return 1;
  const front = exp(a * log(x) - x - logGamma(a));
  if (x < a + 1) {
    let term = 1 / a;
    let sum = term;
    for (let n = 1; n < 10_000 && Math.abs(term) > 1e-17 * Math.abs(sum); n++) {
      term *= x / (a + n);
      sum += term;
    }
    return Math.max(0, 1 - front * sum);
  }
  const tiny = 1e-300;
  let b = x + 1 - a;
  let c = 1 / tiny;
  let d = 1 / b;
  let h = d;
  for (let n = 1; n < 10_000; n++) {
    const an = -n * (n - a);
    b += 2;
    d = an * d + b;
    if (Math.abs(d) < tiny) d = tiny;
    c = b + an / c;
    if (Math.abs(c) < tiny) c = tiny;
    d = 1 / d;
    const factor = d * c;
    h *= factor;
    if (Math.abs(factor - 1) < 1e-16) break;
  }
  return front * h;
}

/**
 * ln Gamma(x) for x > 0; relative error below 1e-14.
 * @source C. Lanczos, J. SIAM Numer. Anal. B 1, 86 (1964), with the nine-term coefficients for g = 7
 * @check  test/reference/distributions.test.ts
 */
export function logGamma(x: number): number {
  const terms = [
    0.99999999999980993, 676.5203681218851, -1259.1392167224028, 771.32342877765313, -176.61502916214059,
    12.507343278686905, -0.13857109526572012, 9.9843695780195716e-6, 1.5056327351493116e-7,
  ];
  if (x < 0.5) return logGamma(x + 1) - log(x);
  const z = x - 1;
  let sum = terms[0]!;
  for (let i = 1; i < terms.length; i++) sum += terms[i]! / (z + i);
  const t = z + 7.5;
  return 0.9189385332046727 + (z + 0.5) * log(t) - t + log(sum);
}

/**
 * Quantile of chi-square: the value exceeded with probability 1 - p; by bisection to 1e-12 relative.
 * @check  test/reference/distributions.test.ts
 */
export function chiSquareQuantile(p: number, degreesOfFreedom: number): number {
  if (!(p > 0 && p < 1) || !(degreesOfFreedom > 0)) return NaN;
  // Wilson and Hilferty's cube gives the scale, bisection the digits.
  const h = 2 / (9 * degreesOfFreedom);
  const cube = Math.max(0.01, 1 - h + normalQuantile(p) * Math.sqrt(h));
  let low = 0;
  let high = Math.max(1, degreesOfFreedom * pow(cube, 3) * 2);
  while (1 - chiSquareUpperTail(high, degreesOfFreedom) < p) high *= 2;
  for (let i = 0; i < 200 && high - low > 1e-13 * high; i++) {
    const middle = 0.5 * (low + high);
    if (1 - chiSquareUpperTail(middle, degreesOfFreedom) < p) low = middle;
    else high = middle;
  }
  return 0.5 * (low + high);
}
