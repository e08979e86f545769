import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { envelopeIndices } from '../../../shared-core/report/envelope.ts';

describe('envelopeIndices', () => {
  it('keeps a peak one sample wide among a hundred thousand', () => {
    const positions = Float64Array.from({ length: 100_000 }, (_, k) => (k * 600) / 100_000);
    const signal = positions.map((_, k) => (k === 54_321 ? 1000 : k % 3));
    const kept = envelopeIndices(positions, signal, 0.5);
    expect(kept).toContain(54_321);
    expect(kept.length).toBeLessThanOrEqual(4 * 1200);
  });

  it('keeps lowest, highest, first and last of every column, in order, without repeats', () => {
    fc.assert(
      fc.property(
        fc.array(fc.tuple(fc.double({ min: 0, max: 20, noNaN: true }), fc.integer({ min: -50, max: 50 })), {
          minLength: 1,
          maxLength: 200,
        }),
        (samples) => {
          const sorted = [...samples].sort((a, b) => a[0] - b[0]);
          const positions = Float64Array.from(sorted, ([x]) => x);
          const signal = Float64Array.from(sorted, ([, y]) => y);
          const kept = envelopeIndices(positions, signal, 1);
          expect(kept).toEqual([...new Set(kept)].sort((a, b) => a - b));
          expect(kept[0]).toBe(0);
          expect(kept.at(-1)).toBe(sorted.length - 1);
          for (const column of new Set(sorted.map(([x]) => Math.floor(x)))) {
            const all = sorted.filter(([x]) => Math.floor(x) === column).map(([, y]) => y);
            const drawn = kept
              .filter((k) => Math.floor(positions[k] ?? 0) === column)
              .map((k) => signal[k] ?? 0);
            expect(Math.max(...drawn)).toBe(Math.max(...all));
            expect(Math.min(...drawn)).toBe(Math.min(...all));
          }
        },
      ),
    );
  });

  it('leaves a thin curve as it is and takes an empty one', () => {
    expect(envelopeIndices(Float64Array.of(0, 1, 2, 3), Float64Array.of(5, 1, 4, 2), 0.5)).toEqual([
      0, 1, 2, 3,
    ]);
    expect(envelopeIndices(new Float64Array(0), new Float64Array(0), 0.5)).toEqual([]);
  });
});
