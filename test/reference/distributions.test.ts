import { describe, expect, test } from 'vitest';
import {
  chiSquareCdf,
  chiSquareQuantile,
  chiSquareUpperTail,
  normalCdf,
  normalQuantile,
  studentTQuantile,
} from '../../shared-core/numeric/distributions.ts';
import { betaI } from '../../shared-core/numeric/incomplete-beta.ts';
import { gammaP, gammaQ, logGamma } from '../../shared-core/numeric/incomplete-gamma.ts';
import { checkValue } from '../support/check-values.ts';
import { expectClose } from '../support/expect-close.ts';

const digits = 'computed with 40 digits';

describe('normal distribution', () => {
  test.each([
    [1e-300, -37.0470962993611992],
    [1e-20, -9.26234008979840758],
    [1e-6, -4.75342430882289896],
    [0.001, -3.09023230616781354],
    [0.024, -1.9773684281819467],
    [0.025, -1.95996398454005421],
    [0.3, -0.524400512708040816],
    [0.499999999, -2.50662834288453267e-9],
    [0.9, 1.28155156554460059],
    [0.999, 3.09023230616781328],
    // Of the double next to it, 1 - 1.000088900582e-12.
    [1 - 1e-12, 7.03448691004783521],
  ])('quantile of %d', (p, expected) => {
    expectClose(normalQuantile(p), { expected, rel: 1e-13, abs: 1e-15, because: digits });
  });

  test.each([
    [-37, 5.7255712225245768e-300],
    [-10, 7.6198530241605261e-24],
    [-3, 0.0013498980316300945],
    [-1, 0.15865525393145705],
    [-0.1, 0.46017216272297102],
    [0.5, 0.6914624612740131],
    [2, 0.97724986805182079],
    [8.5, 1],
  ])('distribution function at %d', (x, expected) => {
    expectClose(normalCdf(x), { expected, rel: 5e-13, because: digits });
  });

  test('ends', () => {
    expect(normalQuantile(0)).toBe(-Infinity);
    expect(normalQuantile(1)).toBe(Infinity);
    expect(Math.abs(normalQuantile(0.5))).toBe(0);
    expect([normalQuantile(-0.1), normalQuantile(1.1), normalQuantile(NaN)]).toEqual([NaN, NaN, NaN]);
    expect(normalCdf(0)).toBe(0.5);
  });
});

describe('chi-square', () => {
  /** Percentage points of E. S. Pearson, H. O. Hartley, Biometrika Tables for Statisticians, table 8, recomputed. */
  const published: readonly (readonly [number, number, number, number, number])[] = [
    [1, 0.454936, 3.841459, 6.634897, 10.827566],
    [2, 1.386294, 5.991465, 9.21034, 13.815511],
    [3, 2.365974, 7.814728, 11.344867, 16.266236],
    [5, 4.35146, 11.070498, 15.086272, 20.515006],
    [10, 9.341818, 18.307038, 23.209251, 29.588298],
    [30, 29.336032, 43.772972, 50.892181, 59.703064],
    [100, 99.334129, 124.342113, 135.806723, 149.449253],
  ];

  test.each(published)('percentage points for %d degrees of freedom', (nu, ...points) => {
    for (const [i, p] of [0.5, 0.95, 0.99, 0.999].entries()) {
      expectClose(chiSquareQuantile(p, nu), {
        expected: points[i]!,
        abs: 1e-6,
        because: 'published percentage point',
      });
      expectClose(chiSquareUpperTail(points[i]!, nu), { expected: 1 - p, abs: 1e-6, because: 'the same' });
    }
  });

  test.each([
    [1e-50, 3, 1.12233057804547345e-33],
    [1e-12, 2, 2.00000000000099996e-12],
    [0.05, 0.5, 8.43715084052598397e-6],
    [0.001, 10, 1.47874346383566504],
    [1 - 1e-10, 2, 46.0517016944001785],
  ])('quantile far out, of %d for %d degrees of freedom', (p, nu, expected) => {
    expectClose(chiSquareQuantile(p, nu), { expected, rel: 1e-12, because: digits });
    const back = p > 0.5 ? 1 - chiSquareUpperTail(expected, nu) : chiSquareCdf(expected, nu);
    expectClose(back, { expected: p, rel: 1e-12, because: 'its own inverse' });
  });

  test('quantile for ten thousand degrees of freedom', () => {
    expectClose(chiSquareQuantile(0.95, 1e4), { expected: 10233.7488976779364, rel: 1e-10, because: digits });
  });

  test('p-value of the worked Boltzmann plot', () => {
    const { chi2, p_value } = checkValue('fit.WLS_example1').expected as { chi2: number; p_value: number };
    expectClose(chiSquareUpperTail(chi2, 2), {
      expected: p_value,
      rel: 1e-7,
      because: 'exp(-chi2/2) for two degrees',
    });
  });

  test('ends', () => {
    expect([chiSquareUpperTail(0, 3), chiSquareUpperTail(Infinity, 3)]).toEqual([1, 0]);
    expect([chiSquareCdf(0, 3), chiSquareCdf(Infinity, 3), chiSquareCdf(-1, 3)]).toEqual([0, 1, NaN]);
    expect([chiSquareQuantile(0, 3), chiSquareQuantile(1, 3), chiSquareQuantile(0.5, 0)]).toEqual([
      NaN,
      NaN,
      NaN,
    ]);
  });
});

describe("Student's t", () => {
  /** Percentage points of E. S. Pearson, H. O. Hartley, Biometrika Tables for Statisticians, table 12, recomputed. */
  const published: readonly (readonly [number, number, number, number])[] = [
    [1, 6.313752, 12.706205, 63.656741],
    [2, 2.919986, 4.302653, 9.924843],
    [5, 2.015048, 2.570582, 4.032143],
    [10, 1.812461, 2.228139, 3.169273],
    [30, 1.697261, 2.042272, 2.749996],
    [120, 1.657651, 1.97993, 2.617421],
  ];

  test.each(published)('percentage points for %d degrees of freedom', (nu, ...points) => {
    for (const [i, p] of [0.95, 0.975, 0.995].entries()) {
      expectClose(studentTQuantile(p, nu), { expected: points[i]!, abs: 6e-7, because: 'published' });
    }
  });

  test.each([
    [0.975, 1, 12.7062047361746933],
    [0.975, 2.5, 3.57465484200368176],
    [0.9, 30, 1.31041502539139571],
    [0.500001, 4, 2.66666666674729906e-6],
    [1e-20, 5, -15683.9254543657759],
    [0.999, 0.5, 102849.115630175371],
  ])('quantile of %d for %d degrees of freedom', (p, nu, expected) => {
    expectClose(studentTQuantile(p, nu), { expected, rel: 1e-12, abs: 1e-15, because: digits });
    expect(studentTQuantile(1 - p, nu) * studentTQuantile(p, nu)).toBeLessThan(0);
  });

  test('the 99 % factor of the end gauge in GUM H.1', () => {
    expectClose(studentTQuantile(0.995, 16), {
      expected: 2.92078162242509956,
      rel: 1e-12,
      because: `JCGM 100:2008, H.1.6: t_99(16) = 2.92; ${digits}`,
    });
  });

  test('tends to the normal distribution', () => {
    expectClose(studentTQuantile(0.975, 1e4), { expected: 1.96020123989062588, rel: 1e-10, because: digits });
  });

  test('ends', () => {
    expect([0, 0.5, 1].map((p) => studentTQuantile(p, 3))).toEqual([-Infinity, 0, Infinity]);
    expect([studentTQuantile(0.9, 0), studentTQuantile(2, 3), studentTQuantile(NaN, 3)]).toEqual([
      NaN,
      NaN,
      NaN,
    ]);
  });
});

test.each([
  [2.5, 0.5, 0.3, 0.0189271240719456517],
  [8, 0.5, 0.95, 0.372421728066847375],
  [5000, 0.5, 0.9996, 0.0454840646491611763],
  [0.25, 0.5, 1e-10, 0.0024120581602212208],
  [3, 4, 0.5, 0.65625],
  [3, 4, 0, 0],
  [3, 4, 1, 1],
])('incomplete beta function I(%d, %d; %d)', (a, b, x, expected) => {
  expectClose(betaI(a, b, x, 1 - x), { expected, rel: 1e-13 + 2e-15 * (a + b), because: digits });
});

test.each([
  [0.5, 1e-20, 1.12837916709551254e-10],
  [10, 3, 0.00110248813011547974],
  [100, 120, 0.972136260109479339],
  [3, 1e-8, 1.66666665416666682e-25],
])('lower incomplete gamma function P(%d, %d)', (a, x, expected) => {
  expectClose(gammaP(a, x), { expected, rel: 2e-13 + a * 2e-15, because: digits });
});

test.each([
  [0.5, 0.5, 0.3173105078629141],
  [1, 1, 0.36787944117144232],
  [2.5, 10, 0.0012497305630313754],
  [10, 3, 0.99889751186988452],
  [100, 120, 0.027863739890520661],
  [1000, 1000, 0.49579475581978449],
  [1e4, 1.02e4, 0.023287322133598804],
  [0.01, 5, 1.1753519412750849e-5],
  [3, 1e-8, 1],
])('incomplete gamma function Q(%d, %d)', (a, x, expected) => {
  // The prefactor exp(a ln x - x - ln Gamma(a)) loses digits in proportion to its largest term.
  expectClose(gammaQ(a, x), { expected, rel: 2e-13 + a * 2e-15, because: digits });
});

test.each([
  [1e-5, 11.512919692895826],
  [0.3, 1.0957979948180756],
  [0.5, 0.57236494292470009],
  [1, 0],
  [1.5, -0.12078223763524522],
  [3.7, 1.4280723266653881],
  [10, 12.80182748008147],
  [100.5, 361.43554046777762],
  [1e5, 1051287.7089736569],
])('ln Gamma(%d)', (x, expected) => {
  expectClose(logGamma(x), { expected, rel: 1e-14, abs: 2e-15, because: digits });
});
