import { describe, expect, test } from 'vitest';
import { createRandom } from '../../../shared-core/numeric/random.ts';
import { median, quantile, scaledMad } from '../../../shared-core/numeric/robust.ts';

describe('median', () => {
  test.each([
    [[], NaN],
    [[7], 7],
    [[2, 1], 1.5],
    [[3, 1, 2], 2],
    [[5, 5, 5, 5], 5],
    [[4, -1, 10, 3], 3.5],
    [[1e300, -1e300, 0], 0],
  ])('of %j', (values, expected) => {
    expect(median(values)).toBe(expected);
  });

  test('agrees with sorting, repeated values included, and leaves its input alone', () => {
    const random = createRandom(11);
    for (let length = 1; length < 60; length++) {
      const values = Array.from({ length }, () => Math.floor(20 * random.uniform()));
      const copy = [...values];
      const sorted = [...values].sort((a, b) => a - b);
      const middle = length >> 1;
      expect(median(values)).toBe(
        length % 2 === 1 ? sorted[middle] : (sorted[middle - 1]! + sorted[middle]!) / 2,
      );
      expect(values).toEqual(copy);
    }
  });
});

describe('scaled median absolute deviation', () => {
  test('by hand', () => {
    // Median 3, deviations 2 1 0 1 97, median 1.
    expect(scaledMad([1, 2, 3, 4, 100])).toBeCloseTo(1.482602218505602, 14);
    expect(scaledMad([6, 6, 6])).toBe(0);
    expect(scaledMad([])).toBeNaN();
  });

  test('estimates the standard deviation of normal noise, a tenth of it spoilt', () => {
    const random = createRandom(12);
    const noise = Array.from({ length: 20_000 }, (_, i) => (i % 10 === 0 ? 1000 : 3 * random.normal()));
    // F. R. Hampel: a tenth of outliers on one side raises it by about a seventh; the plain deviation would be 300.
    expect(scaledMad(noise)).toBeGreaterThan(2.9);
    expect(scaledMad(noise)).toBeLessThan(3.6);
    const clean = Array.from({ length: 20_000 }, () => 3 * random.normal());
    // Its efficiency is 37 %: standard error 3 sqrt(1/(2 0.37 20000)) = 0.025.
    expect(Math.abs(scaledMad(clean) - 3)).toBeLessThan(4 * 0.025);
  });
});

describe('quantile', () => {
  test.each([
    [[3, 1, 2, 4], 0, 1],
    [[3, 1, 2, 4], 1, 4],
    [[3, 1, 2, 4], 0.5, 2.5],
    // Rank 3 0.1 = 0.3, between 1 and 2.
    [[3, 1, 2, 4], 0.1, 1.3],
    [[5], 0.7, 5],
    [[], 0.5, NaN],
    [[1, 2], -0.1, NaN],
    [[1, 2], NaN, NaN],
  ])('of %j at %d', (values, p, expected) => {
    if (Number.isNaN(expected)) expect(quantile(values, p)).toBeNaN();
    else expect(quantile(values, p)).toBeCloseTo(expected, 14);
  });

  test('agrees with sorting, and leaves its input alone', () => {
    const random = createRandom(13);
    for (let length = 1; length < 40; length++) {
      const values = Array.from({ length }, () => Math.floor(15 * random.uniform()));
      const copy = [...values];
      const sorted = [...values].sort((a, b) => a - b);
      for (const p of [0.05, 0.25, 0.5, 0.8, 0.99]) {
        const rank = (length - 1) * p;
        const [below, above] = [sorted[Math.floor(rank)]!, sorted[Math.ceil(rank)]!];
        expect(quantile(values, p)).toBeCloseTo(below + (rank - Math.floor(rank)) * (above - below), 12);
      }
      expect(quantile(values, 0.5)).toBeCloseTo(median(values), 12);
      expect(values).toEqual(copy);
    }
  });
});
