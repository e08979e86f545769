import { describe, expect, test } from 'vitest';
import { baselineNoise, isWhole, quantisationStep } from '../../../shared-core/noise/baseline-noise.ts';
import { createRandom } from '../../../shared-core/numeric/random.ts';

const noisy = (count: number, sigma: number, shape: (i: number) => number, seed = 5): Float64Array => {
  const random = createRandom(seed);
  return Float64Array.from({ length: count }, (_, i) => shape(i) + sigma * random.normal());
};

describe('baselineNoise', () => {
  test.each([
    ['a flat baseline', () => 100],
    ['a steep slope', (i: number) => 100 + 3 * i],
    ['a slope under tall lines', (i: number) => i + (i % 400 < 6 ? 40_000 : 0)],
  ])('finds sigma to 6 %% on %s', (_, shape) => {
    const { sigma, lagRatio } = baselineNoise(noisy(3648, 7, shape));
    // The larger of two estimates, each good to 3.5 %.
    expect(sigma / 7).toBeGreaterThan(0.94);
    expect(sigma / 7).toBeLessThan(1.09);
    expect(lagRatio).toBeGreaterThan(0.9);
    expect(lagRatio).toBeLessThan(1.12);
  });

  test('is not fooled by smoothing: the second lag sees what the first misses', () => {
    const white = noisy(3648, 10, () => 0);
    const smooth = white.map((_, i) => ((white[i - 1] ?? 0) + white[i]! + (white[i + 1] ?? 0)) / 3);
    const { lagRatio } = baselineNoise(smooth);
    expect(lagRatio).toBeGreaterThan(1.3);
  });

  test('never falls below the digitising step over root twelve', () => {
    const stairs = Float64Array.from({ length: 200 }, (_, i) => (i < 100 ? 3 : 4));
    expect(baselineNoise(stairs).sigma).toBeCloseTo(1 / Math.sqrt(12), 12);
  });
});

describe('quantisationStep', () => {
  test('is one for whole counts, the step for coarse decimals, zero for full-precision exports', () => {
    expect(quantisationStep(Float64Array.from([3, 9, 27]))).toBe(1);
    expect(quantisationStep(Float64Array.from({ length: 100 }, (_, i) => (i % 7) * 0.25))).toBe(0.25);
    expect(quantisationStep(noisy(500, 1, () => 0))).toBe(0);
    expect(isWhole(Float64Array.from([1, 2.5]))).toBe(false);
  });
});
