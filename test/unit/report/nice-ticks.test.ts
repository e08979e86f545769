import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { niceTicks } from '../../../shared-core/report/nice-ticks.ts';

describe('niceTicks', () => {
  it('gives round positions, worked by hand', () => {
    expect(niceTicks(370, 700, 12)).toEqual({ values: [400, 450, 500, 550, 600, 650, 700], place: 1 });
    expect(niceTicks(-0.05, 0.35, 4).values).toEqual([0, 0.1, 0.2, 0.3]);
    expect(niceTicks(-3.5, 3.5, 4)).toEqual({ values: [-2, 0, 2], place: 0 });
    expect(niceTicks(0, 97, 10)).toMatchObject({ place: 1 });
  });

  it('stays inside the axis, keeps to the wanted number and steps evenly, over 60 decades', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -1e3, max: 1e3, noNaN: true }),
        fc.double({ min: 0.01, max: 1e3, noNaN: true }),
        fc.integer({ min: -30, max: 30 }),
        fc.integer({ min: 1, max: 15 }),
        (offset, length, exponent, wanted) => {
          const scale = Number(`1e${String(exponent)}`);
          const [low, high] = [offset * scale, (offset + length) * scale];
          fc.pre(high > low);
          const { values } = niceTicks(low, high, wanted);
          expect(values.length).toBeLessThanOrEqual(wanted + 1);
          const slack = 1e-8 * (high - low) + 1e-12 * Math.abs(high);
          for (const value of values) {
            expect(value).toBeGreaterThanOrEqual(low - slack);
            expect(value).toBeLessThanOrEqual(high + slack);
          }
          const steps = values.slice(1).map((value, index) => value - (values[index] ?? 0));
          for (const step of steps)
            expect(Math.abs(step - (steps[0] ?? 0))).toBeLessThanOrEqual(1e-6 * (high - low));
        },
      ),
    );
  });

  it('throws on an axis without length', () => {
    expect(() => niceTicks(1, 1, 5)).toThrow('has a length');
  });
});
