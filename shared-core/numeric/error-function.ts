import { exp } from './portable-exponential.ts';

/**
 * Error function and its complement by IEEE 754 basic operations alone.
 *
 * @source rational approximations of [Sun1993], rewritten
 * @check  test/reference/portable-math.test.ts
 */

/** Rational function: numerator and denominator in ascending powers. */
interface Rational {
  readonly over: readonly number[];
  readonly under: readonly number[];
}

/** (erf(x) - x)/x as a function of x^2, |x| < 0.84375. */
const nearZero: Rational = {
  over: [
    1.28379167095512558561e-1, -3.2504210724700149937e-1, -2.84817495755985104766e-2,
    -5.77027029648944159157e-3, -2.37630166566501626084e-5,
  ],
  under: [
    1, 3.97917223959155352819e-1, 6.50222499887672944485e-2, 5.08130628187576562776e-3,
    1.32494738004321644526e-4, -3.9602282787753681232e-6,
  ],
};

/** erf(x) - erfOfOne as a function of |x| - 1, 0.84375 <= |x| < 1.25. */
const nearOne: Rational = {
  over: [
    -2.36211856075265944077e-3, 4.14856118683748331666e-1, -3.72207876035701323847e-1,
    3.18346619901161753674e-1, -1.10894694282396677476e-1, 3.54783043256182359371e-2,
    -2.166375594868790843e-3,
  ],
  under: [
    1, 1.06420880400844228286e-1, 5.40397917702171048937e-1, 7.18286544141962662868e-2,
    1.26171219808761642112e-1, 1.36370839120290507362e-2, 1.1984499846799107417e-2,
  ],
};
/** erf(1), cut to single precision so that sums with it are exact. */
const erfOfOne = 8.45062911510467529297e-1;

/** ln(x erfc(x)) + x^2 + 0.5625 as a function of 1/x^2, 1.25 <= x < 1/0.35. */
const inner: Rational = {
  over: [
    -9.86494403484714822705e-3, -6.93858572707181764372e-1, -10.5586262253232909814, -62.3753324503260060396,
    -162.396669462573470355, -184.605092906711035994, -81.2874355063065934246, -9.81432934416914548592,
  ],
  under: [
    1, 19.6512716674392571292, 137.6577541435190426, 434.565877475229228821, 645.387271733267880336,
    429.008140027567833386, 108.635005541779435134, 6.57024977031928170135, -6.04244152148580987438e-2,
  ],
};

/** The same for 1/0.35 <= x < 28. */
const outer: Rational = {
  over: [
    -9.86494292470009928597e-3, -7.99283237680523006574e-1, -17.7579549177547519889, -160.636384855821916062,
    -637.566443368389627722, -1025.09513161107724954, -483.519191608651397019,
  ],
  under: [
    1, 30.3380607434824582924, 325.792512996573918826, 1536.72958608443695994, 3199.85821950859553908,
    2553.05040643316442583, 474.528541206955367215, -22.4409524465858183362,
  ],
};

/**
 * Error function, 2/sqrt(pi) times the integral of exp(-t^2) from 0 to x; within 1 unit in the last place.
 * @check test/reference/portable-math.test.ts
 */
export function erf(x: number): number {
  const size = Math.abs(x);
  // Below 1e-9 the square does not count; x alone would round twice where the result is subnormal.
  if (size < 1e-9) return 0.125 * (8 * x + 1.02703333676410069053 * x);
  if (size < 0.84375) return x + x * ratio(nearZero, x * x);
  if (size >= 6) return x > 0 ? 1 : -1;
  if (!(size < 6)) return NaN;
  const value = size < 1.25 ? erfOfOne + ratio(nearOne, size - 1) : 1 - farTail(size);
  return x < 0 ? -value : value;
}

/**
 * Complementary error function 1 - erf(x), without loss of digits where it is small; within 2 units in the last place
 * where it is not subnormal. 0 above 27.3.
 * @check test/reference/portable-math.test.ts
 */
export function erfc(x: number): number {
  const size = Math.abs(x);
  if (size < 0.84375) {
    if (size < 1e-17) return 1 - x;
    const bend = x * ratio(nearZero, x * x);
    return x < 0.25 ? 1 - (x + bend) : 0.5 - (x - 0.5 + bend);
  }
  if (size < 1.25) {
    const step = ratio(nearOne, size - 1);
    return x > 0 ? 1 - erfOfOne - step : 1 + (erfOfOne + step);
  }
  if (size < 28) return x > 0 ? farTail(size) : 2 - farTail(size);
  if (Number.isNaN(x)) return NaN;
  return x > 0 ? 0 : 2;
}

/** erfc(x), 1.25 <= x < 28: exp(-z^2 - 0.5625) exp(z^2 - x^2 + ratio)/x, z being x in single precision, whose square is exact. */
function farTail(x: number): number {
  const z = Math.fround(x);
  const part = ratio(x < 1 / 0.35 ? inner : outer, 1 / (x * x));
  return (exp(-z * z - 0.5625) * exp((z - x) * (z + x) + part)) / x;
}

function ratio({ over, under }: Rational, t: number): number {
  return polynomial(over, t) / polynomial(under, t);
}

function polynomial(coefficients: readonly number[], t: number): number {
  let sum = 0;
  for (let i = coefficients.length - 1; i >= 0; i--) sum = sum * t + coefficients[i]!;
  return sum;
}
