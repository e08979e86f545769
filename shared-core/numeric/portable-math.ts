/**
 * Elementary functions by IEEE 754 basic operations alone, so that the same input gives the same last digit in every
 * browser, Node version and processor. The engine's own functions differ between versions in the last place.
 *
 * @source argument reduction and minimax polynomials of the freely distributable mathematical library by Sun
 *         Microsystems (1993), rewritten; each stays within 1 unit in the last place, erf and erfc within 2.
 */

const bits = new Float64Array(1);
const words = new Uint32Array(bits.buffer);
/** Which 32-bit half holds sign and exponent depends on the machine's byte order. */
const high = (() => {
  bits[0] = 1;
  return words[1] === 0x3ff00000 ? 1 : 0;
})();
const low = 1 - high;

const ln2High = 6.9314718036912381649e-1;
const ln2Low = 1.90821492927058770002e-10;

/** 2^k for -1022 <= k <= 1023, exactly. */
function powerOfTwo(k: number): number {
  words[high] = (k + 1023) << 20;
  words[low] = 0;
  return bits[0]!;
}

/** e^x; 0 below -745.13, Infinity above 709.78. */
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
  if (k === 1024) return y * 2 * powerOfTwo(1023);
  return k >= -1021 ? y * powerOfTwo(k) : y * powerOfTwo(k + 1000) * 9.3326361850321887899e-302;
}

/** ln x; NaN below 0, -Infinity at 0. */
export function log(x: number): number {
  if (!(x > 0)) return x === 0 ? -Infinity : NaN;
  if (x === Infinity) return Infinity;
  let k = 0;
  let value = x;
  if (value < 2.2250738585072014e-308) {
    value *= 18014398509481984;
    k = -54;
  }
  bits[0] = value;
  const word = words[high]!;
  // Brings the mantissa into [sqrt(2)/2, sqrt(2)).
  const mantissa = word & 0xfffff;
  const above = (mantissa + 0x95f64) & 0x100000;
  words[high] = mantissa | (above ^ 0x3ff00000);
  k += (word >>> 20) - 1023 + (above >>> 20);
  const f = bits[0] - 1;
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

/** log to base 10, within 2 units in the last place. */
export function log10(x: number): number {
  return log(x) * 0.4342944819032518;
}

/** x^y for x > 0, as exp(y ln x); relative error up to about |y ln x| times 2e-16. 0^y is 0 for y > 0. */
export function pow(x: number, y: number): number {
  if (y === 0) return 1;
  if (x === 0) return y > 0 ? 0 : Infinity;
  return exp(y * log(x));
}
