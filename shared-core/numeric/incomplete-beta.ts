import { logGamma } from './incomplete-gamma.ts';
import { exp, log } from './portable-math.ts';

/**
 * Regularised incomplete beta function I_x(a, b), a, b > 0, with y = 1 - x given apart so that it keeps its digits.
 *
 * Relative error below 1e-13 + 2e-15 (a + b), from the prefactor x^a y^b/(a B(a, b)).
 * @param x  0 to 1
 * @source Lentz continued fraction: [DLMF2024] 8.17.22
 * @check  test/reference/distributions.test.ts
 */
export function betaI(a: number, b: number, x: number, y: number): number {
  if (x === 0) return 0;
  if (y === 0) return 1;
  // The fraction converges fast on this side of the mean.
  if (x > (a + 1) / (a + b + 2)) return 1 - betaI(b, a, y, x);
  const front = exp(logGamma(a + b) - logGamma(a) - logGamma(b) + a * log(x) + b * log(y));
  return (front / a) * fraction(a, b, x);
}

function fraction(a: number, b: number, x: number): number {
  let c = 1;
  let d = 1 / floor(1 - ((a + b) * x) / (a + 1));
  let h = d;
  for (let m = 1; m < 10_000; m++) {
    const even = (m * (b - m) * x) / ((a + 2 * m - 1) * (a + 2 * m));
    d = 1 / floor(1 + even * d);
    c = floor(1 + even / c);
    h *= d * c;
    const odd = (-(a + m) * (a + b + m) * x) / ((a + 2 * m) * (a + 2 * m + 1));
    d = 1 / floor(1 + odd * d);
    c = floor(1 + odd / c);
    const factor = d * c;
    h *= factor;
    if (Math.abs(factor - 1) < 1e-16) break;
  }
  return h;
}

/** Keeps a denominator of the fraction off zero. */
function floor(value: number): number {
  return Math.abs(value) < 1e-300 ? 1e-300 : value;
}
