import { describe, expect, test } from 'vitest';
import { findClipping } from '../../../shared-core/noise/clipping.ts';

const peak = [10, 12, 11, 200, 900, 1500, 900, 200, 11, 12, 10, 9, 11, 10, 12, 10];
const find = (signal: readonly number[], more: Partial<Parameters<typeof findClipping>[0]> = {}) =>
  findClipping({
    signal: Float64Array.from(signal),
    saturationCounts: null,
    quantisationStep: 1,
    baselineSigma: 1,
    variancePerSignal: 0.2,
    neighbourCorrelation: 0,
    ...more,
  });

describe('findClipping', () => {
  test('leaves an honest peak alone', () => {
    const { clipped, level } = find(peak);
    expect(level).toBeNull();
    expect([...clipped].every((flag) => flag === 0)).toBe(true);
  });

  test('takes the ceiling of the bench file at its word, a single pixel included', () => {
    const { clipped, level } = find(peak, { saturationCounts: 1500 });
    expect(level).toBe(1500);
    expect([...clipped].indexOf(1)).toBe(5);
  });

  test('finds three equal values on top of a peak, and marks every pixel at that level', () => {
    const flat = [
      ...peak.slice(0, 4),
      950,
      950,
      950,
      ...peak.slice(7),
      ...peak.slice(0, 4),
      950,
      ...peak.slice(5),
    ];
    const { clipped, level } = find(flat.map((value) => Math.min(950, value)));
    expect(level).toBe(950);
    expect([...clipped].filter((flag) => flag === 1).length).toBeGreaterThanOrEqual(4);
  });

  test('finds two equal values of a many-digit export, where chance cannot repeat one', () => {
    const scaled = peak.map((value) => value * 1.23456789e-4);
    scaled[4] = scaled[5]!;
    const { level } = find(scaled, { quantisationStep: 0, baselineSigma: 1e-4, variancePerSignal: 1e-6 });
    expect(level).toBe(scaled[5]);
  });

  test('does not take two equal values of a coarse converter for clipping', () => {
    const coarse = [1, 1, 2, 1, 20, 60, 60, 20, 1, 2, 1, 1, 2, 1, 1, 1];
    expect(find(coarse, { baselineSigma: 0.5, variancePerSignal: 0 }).level).toBeNull();
  });

  test('does not take equal values of a smoothed export for clipping: neighbours share their noise', () => {
    // Three in a row by chance: (0.2 / (2 * 4 * 1.77))^2 = 2e-4 for independent points, 1e-3 where they share four fifths.
    const smoothed = [0, 1, 0, 10, 55, 90, 90, 90, 55, 10, 0, 1, 0, 1, 0, 300];
    const noise = { quantisationStep: 0.2, baselineSigma: 2, variancePerSignal: 0.02 };
    expect(find(smoothed, { ...noise, neighbourCorrelation: 0.8 }).level).toBeNull();
    expect(find(smoothed, { ...noise, variancePerSignal: 1 }).level).toBe(90);
  });

  test('ignores equal values in the dark, and equal values on a flank', () => {
    expect(find([5, 5, 5, 5, 6, 5, 5, 5, 5, 4, 5, 5, 5, 5, 5, 5]).level).toBeNull();
    const flank = [...peak];
    flank[6] = 900;
    flank[7] = 900;
    expect(find(flank).level).toBeNull();
  });
});
