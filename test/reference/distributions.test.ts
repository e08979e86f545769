import { describe, expect, test } from 'vitest';
import {
  chiSquareQuantile,
  chiSquareUpperTail,
  gammaQ,
  logGamma,
  normalCdf,
  normalQuantile,
} from '../../shared-core/numeric/distributions.ts';
import { checkValue } from '../support/check-values.ts';
import { expectClose } from '../support/expect-close.ts';

const digits = 'computed with 40 digits';

describe('normal distribution', () => {
  test.each([
    [1e-300, -37.0470962993612],
    [1e-20, -9.2623400897984076],
    [1e-6, -4.753424308822899],
    [0.001, -3.0902323061678135],
    [0.024, -1.9773684281819467],
    [0.025, -1.9599639845400542],
    [0.3, -0.52440051270804082],
    [0.9, 1.2815515655446006],
    [0.999, 3.0902323061678133],
  ])('quantile of %d', (p, expected) => {
    expectClose(normalQuantile(p), { expected, abs: 1e-9, because: digits });
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
    expectClose(normalCdf(x), { expected, rel: 1e-12, because: digits });
  });

  test('ends', () => {
    expect(normalQuantile(0)).toBe(-Infinity);
    expect(normalQuantile(1)).toBe(Infinity);
    expect(normalQuantile(0.5)).toBeCloseTo(0, 15);
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

  test('p-value of the worked Boltzmann plot', () => {
    const { chi2, p_value } = checkValue('fit.WLS_example1').expected as { chi2: number; p_value: number };
    expectClose(chiSquareUpperTail(chi2, 2), {
      expected: p_value,
      rel: 1e-7,
      because: 'exp(-chi2/2) for two degrees',
    });
  });

  test('ends', () => {
    expect(chiSquareUpperTail(0, 3)).toBe(1);
    expect([chiSquareQuantile(0, 3), chiSquareQuantile(1, 3), chiSquareQuantile(0.5, 0)]).toEqual([
      NaN,
      NaN,
      NaN,
    ]);
  });
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
