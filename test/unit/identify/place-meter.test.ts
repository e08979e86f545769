import { describe, expect, test } from 'vitest';
import { meterOver } from '../../support/light-at-places.ts';

const rms = (values: readonly number[]): number =>
  Math.sqrt(values.reduce((sum, value) => sum + value * value, 0) / values.length);

describe('light at a place', () => {
  test('areas are those of the lines, and scatter as stated, wherever the line lies within its pixel', () => {
    const pulls: number[] = [];
    for (let seed = 0; seed < 300; seed++) {
      const nm = 540 + 0.011 * seed;
      const out = { area: 0, sigma: 1 };
      expect(meterOver([{ nm, area: 400 }], { seed }).measure(nm, 'line', out)).toBe(true);
      pulls.push((out.area - 400) / out.sigma);
    }
    // The kernel is 3 % too wide or too narrow at most: a percent of the area, here 0.1 sigma.
    expect(Math.abs(pulls.reduce((sum, pull) => sum + pull, 0) / 300)).toBeLessThan(0.3);
    expect(rms(pulls)).toBeGreaterThan(0.8);
    expect(rms(pulls)).toBeLessThan(1.15);
  });

  test('where there is none, it is none within its uncertainty, on a tilted continuum', () => {
    const meter = meterOver([], { seed: 7 });
    const out = { area: 0, sigma: 1 };
    const pulls = Array.from({ length: 400 }, (_, i) => {
      meter.measure(505 + 0.27 * i, 'line', out);
      return out.area / out.sigma;
    });
    expect(rms(pulls)).toBeGreaterThan(0.8);
    expect(rms(pulls)).toBeLessThan(1.15);
  });

  test('beside excluded pixels the rest is used, on them nothing is said', () => {
    const meter = meterOver([{ nm: 560, area: 2000 }], { excludedNm: [[560.2, 561]] });
    const out = { area: 0, sigma: 1 };
    expect(meter.measure(560.5, 'line', out)).toBe(false);
    expect(meter.measure(560, 'line', out)).toBe(true);
    expect(Math.abs(out.area - 2000)).toBeLessThan(4 * out.sigma);
  });

  test('where the recording scatters more than its noise model says, so do the areas', () => {
    const quiet = meterOver([], { seed: 3 });
    const grass = Array.from({ length: 400 }, (_, i) => ({ nm: 500.1 + 0.3 * i, area: 60 * ((i * 7) % 5) }));
    const rough = meterOver(grass, { seed: 3 });
    const [a, b] = [
      { area: 0, sigma: 1 },
      { area: 0, sigma: 1 },
    ];
    quiet.measure(560.02, 'line', a);
    rough.measure(560.02, 'line', b);
    expect(b.sigma).toBeGreaterThan(1.5 * a.sigma);
  });
});
