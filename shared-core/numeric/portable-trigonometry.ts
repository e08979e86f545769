/**
 * Sine, cosine and arc tangent by IEEE 754 basic operations alone.
 *
 * @source minimax polynomials and argument reduction up to 2^20: [Sun1993], rewritten
 * @check  test/reference/portable-math.test.ts
 */

/** What is left of the last reduced argument beyond its nearest double. */
let tail = 0;

/** sin x, x in radians, within 1 unit in the last place; NaN where x is not finite. */
export function sin(x: number): number {
  const quadrant = reduce(x);
  const value = quadrant & 1 ? cosineNearZero(reduced, tail) : sineNearZero(reduced, tail);
  return quadrant & 2 ? -value : value;
}

/** cos x, x in radians, within 1 unit in the last place; NaN where x is not finite. */
export function cos(x: number): number {
  const quadrant = reduce(x);
  const value = quadrant & 1 ? sineNearZero(reduced, tail) : cosineNearZero(reduced, tail);
  return (quadrant + 1) & 2 ? -value : value;
}

/** Argument of the last reduction, within a little more than +-pi/4. */
let reduced = 0;

/** x = quadrant pi/2 + reduced + tail: returns the quadrant modulo 4. */
function reduce(x: number): number {
  reduced = x;
  tail = 0;
  const size = Math.abs(x);
  if (size <= 0.7853981633974483) return 0;
  if (!(size < Infinity)) {
    reduced = NaN;
    return 0;
  }
  if (size < 1048576) {
    const turns = Math.round(x * 0.636619772367581382433);
    // pi/2 in parts of 33 bits, whose products with fewer than 2^20 quarter turns are exact.
    const first = x - turns * 1.57079632673412561417;
    const second = turns * 6.0771005063039659766e-11;
    const left = first - second;
    const small = turns * 2.02226624879595063154e-21 - (first - left - second);
    reduced = left - small;
    tail = left - reduced - small;
    // Nearer to a multiple than this, the parts do not hold enough digits.
    if (Math.abs(reduced) > 1e-9) return turns & 3;
  }
  return reduceExactly(x);
}

/** 2/pi in units of 2^-1216, and pi/2 in units of 2^-256. */
const twoOverPi = BigInt(
  '0xa2f9836e4e441529fc2757d1f534ddc0db6295993c439041fe5163abdebbc561b7246e3a424dd2e006492eea09d1921c' +
    'fe1deb1cb129a73ee88235f52ebb4484e99c7026b45f7e413991d639835339f49c845f8bbdf9283b1ff897ffde05980fef2f' +
    '118b5a0a6d1f6d367ecf27cb09b74f463f669e5fea2d7527bac7ebe5f17b3d0739f78a5292ea6bfb5fb11f8d5d0856033046' +
    'fc7b6bab',
);
const halfPi = BigInt('0x1921fb54442d18469898cc51701b839a252049c1114cf98e804177d4c76273644');

/**
 * The same for any finite x, in whole numbers: x is a multiple of 2^-53 here, and 2/pi is known to more digits than the
 * largest x has before its point.
 */
function reduceExactly(x: number): number {
  const size = Math.abs(x);
  const scaled = size < 9007199254740992 ? BigInt(size * 9007199254740992) : BigInt(size) << 53n;
  const one = 1n << 1269n;
  const turns = scaled * twoOverPi;
  let quadrant = Number((turns / one) % 4n);
  let part = turns % one;
  if (2n * part > one) {
    part -= one;
    quadrant += 1;
  }
  const angle = (part * halfPi) >> 1269n;
  const unit = 8.636168555094445e-78;
  const nearest = Number(angle);
  reduced = nearest * unit;
  tail = Number(angle - BigInt(nearest)) * unit;
  if (x > 0) return quadrant & 3;
  reduced = -reduced;
  tail = -tail;
  return -quadrant & 3;
}

/** sin(x + rest) for |x| <= pi/4. */
function sineNearZero(x: number, rest: number): number {
  const z = x * x;
  const cube = z * x;
  const r =
    8.33333333332248946124e-3 +
    z *
      (-1.98412698298579493134e-4 +
        z * (2.75573137070700676789e-6 + z * (-2.50507602534068634195e-8 + z * 1.58969099521155010221e-10)));
  return x - (z * (0.5 * rest - cube * r) - rest - cube * -1.66666666666666324348e-1);
}

/** cos(x + rest) for |x| <= pi/4. */
function cosineNearZero(x: number, rest: number): number {
  const z = x * x;
  const w = z * z;
  const r =
    z * (4.16666666666666019037e-2 + z * (-1.38888888888741095749e-3 + z * 2.48015872894767294178e-5)) +
    w * w * (-2.75573143513906633035e-7 + z * (2.0875723212981748279e-9 + z * -1.13596475577881948265e-11));
  const half = 0.5 * z;
  const near = 1 - half;
  return near + (1 - near - half + (z * r - x * rest));
}

/** Where the arc tangent is expanded, and its value there as two doubles. */
const centres = [
  { high: 4.63647609000806093515e-1, low: 2.26987774529616870924e-17 },
  { high: 7.85398163397448278999e-1, low: 3.06161699786838301793e-17 },
  { high: 9.82793723247329054082e-1, low: 1.39033110312309984516e-17 },
  { high: 1.570796326794896558, low: 6.12323399573676603587e-17 },
] as const;

/** arctan x in radians, -pi/2 to pi/2, within 1 unit in the last place. */
export function atan(x: number): number {
  const size = Math.abs(x);
  if (!(size > 1e-9)) return x;
  if (size < 0.4375) return x - x * arcSeries(x);
  if (size < 0.6875) return around(centres[0], (2 * size - 1) / (2 + size), x);
  if (size < 1.1875) return around(centres[1], (size - 1) / (size + 1), x);
  if (size < 2.4375) return around(centres[2], (size - 1.5) / (1 + 1.5 * size), x);
  return around(centres[3], -1 / size, x);
}

function around(centre: (typeof centres)[number], t: number, x: number): number {
  const value = centre.high - (t * arcSeries(t) - centre.low - t);
  return x < 0 ? -value : value;
}

/** 1 - arctan(t)/t. */
function arcSeries(t: number): number {
  const z = t * t;
  const w = z * z;
  const odd =
    3.33333333333329318027e-1 +
    w *
      (1.42857142725034663711e-1 +
        w *
          (9.09088713343650656196e-2 +
            w *
              (6.66107313738753120669e-2 + w * (4.97687799461593236017e-2 + w * 1.62858201153657823623e-2))));
  const even =
    -1.99999999998764832476e-1 +
    w *
      (-1.1111110405462355788e-1 +
        w * (-7.69187620504482999495e-2 + w * (-5.83357013379057348645e-2 + w * -3.6531572744216915527e-2)));
  return z * odd + w * even;
}
