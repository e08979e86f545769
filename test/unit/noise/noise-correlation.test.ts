import { describe, expect, test } from 'vitest';
import { noiseCorrelation } from '../../../shared-core/noise/noise-correlation.ts';
import { noiseMemory } from '../../../shared-core/noise/noise-memory.ts';
import { createRandom } from '../../../shared-core/numeric/random.ts';

const pointCount = 3000;

function white(seed: number): Float64Array {
  const random = createRandom(seed);
  return Float64Array.from({ length: pointCount + 20 }, () => 40 + 3 * random.normal());
}

function smoothed(seed: number, weights: readonly number[]): Float64Array {
  const source = white(seed);
  return Float64Array.from({ length: pointCount }, (_, i) =>
    weights.reduce((sum, weight, k) => sum + weight * source[i + k]!, 0),
  );
}

describe('noise shared by neighbouring points', () => {
  test.each([3, 5, 7, 9])(
    'a running mean of %d points is named, and its noise is smaller by its root',
    (points) => {
      for (const seed of [1, 2, 3, 4, 5]) {
        const found = noiseCorrelation(smoothed(seed, Array<number>(points).fill(1 / points)));
        expect(found.runningMeanPoints).toBe(points);
        // r_k = 1 - k/N: the overlap of two means k apart.
        expect(found.correlation).toEqual(Array.from({ length: points - 1 }, (_, k) => 1 - (k + 1) / points));
        expect(Math.abs((found.sigma * Math.sqrt(points)) / 3 - 1)).toBeLessThan(0.12);
      }
    },
  );

  test('a binomial smoothing is measured: r_1 = 2/3, r_2 = 1/6 for weights 1, 2, 1', () => {
    // Autocorrelation of the weights: (1 2 1)*(1 2 1) = 1 4 6 4 1, over 6.
    const found = noiseCorrelation(smoothed(7, [0.25, 0.5, 0.25]));
    expect(found.runningMeanPoints).toBe(1);
    expect(Math.abs(found.correlation[0]! - 2 / 3)).toBeLessThan(0.1);
    expect(Math.abs(found.correlation[1]! - 1 / 6)).toBeLessThan(0.1);
  });

  test('white noise has none', () => {
    for (const seed of [11, 12, 13]) {
      expect(noiseCorrelation(white(seed))).toMatchObject({ correlation: [], runningMeanPoints: 1 });
    }
  });

  test('a signal without noise has none', () => {
    expect(noiseCorrelation(new Float64Array(500).fill(7))).toEqual({
      sigma: 0,
      correlation: [],
      runningMeanPoints: 1,
    });
  });
});

test('memory: the mean of many points of a running mean of N is N times less sure than they look', () => {
  expect(noiseMemory([])).toEqual({ varianceOfMean: 1, varianceOfChiSquare: 1 });
  const memory = noiseMemory([0.8, 0.6, 0.4, 0.2]);
  expect(memory.varianceOfMean).toBeCloseTo(5, 12);
  expect(memory.varianceOfChiSquare).toBeCloseTo(1 + 2 * (0.64 + 0.36 + 0.16 + 0.04), 12);
});
