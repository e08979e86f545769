/**
 * Exponential function, logarithms and powers by IEEE 754 basic operations alone.
 *
 * @source argument reduction and minimax polynomials of exp and log: [Sun1993], rewritten
 * @check  test/reference/portable-math.test.ts
 */

const bits = new Float64Array(1);
const words = new Uint32Array(bits.buffer);
/** Which 32-bit half holds sign and exponent depends on the machine's byte order. */
const high = (() => {
  bits[0] = 1;
  return words[1] === 0x3ff00000 ? 1 : 0;
})();

const lowestPower = -1074;
/** 2^k from k = -1074, all exact. Looked up, for a double put together from two words is slow to read back. */
const powersOfTwo = (() => {
  const powers = new Float64Array(1023 - lowestPower + 1);
  let power = 5e-324;
  for (let i = 0; i < powers.length; i++) {
    powers[i] = power;
    power *= 2;
  }
  return powers;
})();

const ln2High = 6.9314718036912381649e-1;
const ln2Low = 1.90821492927058770002e-10;

/** e^x within 1 unit in the last place; 0 below -745.13, Infinity above 709.78. */
export function exp(x: number): number {
  if (!(x < 709.782712893384)) return x > 0 ? Infinity : NaN;
  if (x < -745.1332191019411) return 0;
  if (x < 2.8e-17 && x > -2.8e-17) return 1 + x;
  let hi = x;
  let lo = 0;
  let k = 0;
  if (x > 0.34657359027997264 || x < -0.34657359027997264) {
    k = Math.trunc(1.442695040888963387 * x + (x < 0 ? -0.5 : 0.5));
    hi = x - k * ln2High;
    lo = k * ln2Low;
  }
  const r = hi - lo;
  const t = r * r;
  const c =
    r -
    t *
      (1.66666666666666019037e-1 +
        t *
          (-2.77777777770155933842e-3 +
            t *
              (6.61375632143793436117e-5 + t * (-1.6533902205465251539e-6 + t * 4.13813679705723846039e-8))));
  if (k === 0) return 1 - ((r * c) / (c - 2) - r);
  const y = 1 - (lo - (r * c) / (2 - c) - hi);
  if (k === 1024) return y * 2 * powersOfTwo[1023 - lowestPower]!;
  return k >= -1021
    ? y * powersOfTwo[k - lowestPower]!
    : y * powersOfTwo[k + 1000 - lowestPower]! * 9.3326361850321887899e-302;
}

/** k of x = m 2^k with sqrt(2)/2 <= m < sqrt(2), for finite x > 0. */
function binaryExponent(x: number): number {
  const isSubnormal = x < 2.2250738585072014e-308;
  bits[0] = isSubnormal ? x * 18014398509481984 : x;
  return ((words[high]! + 0x95f64) >>> 20) - (isSubnormal ? 1077 : 1023);
}

/** m of x = m 2^k. */
function mantissa(x: number, k: number): number {
  return k > -1022
    ? x * powersOfTwo[-k - lowestPower]!
    : x * 18014398509481984 * powersOfTwo[-k - 54 - lowestPower]!;
}

/** ln x within 1 unit in the last place; NaN below 0, -Infinity at 0. */
export function log(x: number): number {
  if (!(x > 0)) return x === 0 ? -Infinity : NaN;
  if (x === Infinity) return Infinity;
  const k = binaryExponent(x);
  const f = mantissa(x, k) - 1;
  if (f === 0) return k * ln2High + k * ln2Low;
  const s = f / (2 + f);
  const z = s * s;
  const w = z * z;
  const r =
    w * (3.999999999940941908e-1 + w * (2.222219843214978396e-1 + w * 1.531383769920937332e-1)) +
    z *
      (6.66666666666673513e-1 +
        w * (2.857142874366239149e-1 + w * (1.818357216161805012e-1 + w * 1.479819860511658591e-1)));
  const half = 0.5 * f * f;
  return k * ln2High - (half - (s * (half + r) + k * ln2Low) - f);
}

/** log to base 10, within 2 units in the last place; exact at the powers of ten that are exact, 1 to 1e22. */
export function log10(x: number): number {
  if (!(x > 0) || x === Infinity) return log(x);
  let k = binaryExponent(x);
  let m = mantissa(x, k);
  // Both terms get the sign of the sum, so that they do not cancel.
  if (k > 0 && m < 1) {
    m *= 2;
    k -= 1;
  } else if (k < 0 && m > 1) {
    m *= 0.5;
    k += 1;
  }
  return k * 3.69423907715893078616e-13 + 0.434294481903251816668 * log(m) + k * 3.01029995663611771306e-1;
}

/** What the last exact sum or product has beyond its nearest double. */
let sumLow = 0;

/** a + b exactly, as returned value plus sumLow (Knuth). */
function exactSum(a: number, b: number): number {
  const sum = a + b;
  const part = sum - a;
  sumLow = a - (sum - part) + (b - part);
  return sum;
}

/** a b exactly, as returned value plus sumLow (Dekker and Veltkamp); |a|, |b| < 1e290. */
function exactProduct(a: number, b: number): number {
  const product = a * b;
  const aSplit = 134217729 * a;
  const aHigh = aSplit - (aSplit - a);
  const aLow = a - aHigh;
  const bSplit = 134217729 * b;
  const bHigh = bSplit - (bSplit - b);
  const bLow = b - bHigh;
  sumLow = aLow * bLow - (product - aHigh * bHigh - aLow * bHigh - aHigh * bLow);
  return product;
}

/**
 * x^y within 2 units in the last place, with the special cases of Math.pow.
 *
 * exp(y ln|x|) with ln|x| and the product in twice the precision, because y ln x multiplies its rounding error by up
 * to 745: ln m = s (2 + 2/3 s^2 + 2/5 s^4 + ...), s = (m - 1)/(m + 1).
 *
 * @source [Dekker1971] for arithmetic with pairs of doubles
 * @check  test/reference/portable-math.test.ts
 */
export function pow(x: number, y: number): number {
  if (y === 0) return 1;
  if (!(Math.abs(x) > 0 && Math.abs(x) < Infinity && Math.abs(y) < Infinity)) return specialPower(x, y);
  const isNegative = x < 0 && isOdd(y);
  if (x < 0 && Math.trunc(y) !== y) return NaN;
  const base = Math.abs(x);
  if (base === 1) return isNegative ? -1 : 1;
  // |ln x| is at least 2^-53, so every power this large is beyond the range of numbers.
  const largest = 18446744073709551616;
  const exponent = Math.max(-largest, Math.min(largest, y));
  const logHigh = pairLog(base);
  const logLow = sumLow;
  const whole = exactProduct(exponent, logHigh);
  const rest = sumLow + exponent * logLow;
  const power = exp(whole);
  const result = power === Infinity || power === 0 ? power : power + power * rest;
  return isNegative ? -result : result;
}

/** ln x, x > 0 and finite, as returned value plus sumLow; relative error below 2^-65. */
function pairLog(x: number): number {
  const k = binaryExponent(x);
  const m = mantissa(x, k);
  const above = exactSum(m, 1);
  const aboveLow = sumLow;
  const s = (m - 1) / above;
  const product = exactProduct(s, above);
  const sLow = (m - 1 - product - sumLow - s * aboveLow) / above;
  const square = exactProduct(s, s);
  const squareLow = sumLow + 2 * s * sLow;
  const tail =
    square *
    (2 / 5 +
      square *
        (2 / 7 +
          square *
            (2 / 9 +
              square *
                (2 / 11 + square * (2 / 13 + square * (2 / 15 + square * (2 / 17 + (square * 2) / 19)))))));
  const third = exactSum(2 / 3, tail);
  // 3.7e-17: what 2/3 loses when it is rounded to a double.
  const thirdLow = sumLow + 3.700743415417188e-17;
  const bend = exactProduct(square, third);
  const bendLow = sumLow + square * thirdLow + squareLow * third;
  const factor = exactSum(2, bend);
  const factorLow = sumLow + bendLow;
  const logM = exactProduct(s, factor);
  const logMLow = sumLow + s * factorLow + sLow * factor;
  // ln 2 in parts of 42 bits, whose products with k are exact.
  const large = exactSum(k * 0.6931471805598903, k * 5.49792301870721e-14);
  const largeLow = sumLow + k * 1.1612227229362532e-26;
  const sum = exactSum(large, logM);
  return exactSum(sum, sumLow + largeLow + logMLow);
}

/** x^y where x is 0, infinite or not a number, or y is not finite. */
function specialPower(x: number, y: number): number {
  const base = Math.abs(x);
  if (Number.isNaN(x) || Number.isNaN(y) || (base === 1 && Math.abs(y) === Infinity)) return NaN;
  const magnitude = base > 1 === y > 0 ? Infinity : 0;
  const isNegative = (x < 0 || Object.is(x, -0)) && isOdd(y);
  return isNegative ? -magnitude : magnitude;
}

function isOdd(y: number): boolean {
  return Math.abs(y % 2) === 1;
}
