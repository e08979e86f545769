import { describe, expect, test } from 'vitest';
import {
  chanceOfPlace,
  lnTruncatedProductChance,
  normalTail,
  type StrayPeaks,
} from '../../../shared-core/identify/chance.ts';
import { chiSquareUpperTail } from '../../../shared-core/numeric/distributions.ts';
import { createRandom } from '../../../shared-core/numeric/random.ts';

describe('truncated product of p-values', () => {
  test('with nothing truncated it is the combination of R. A. Fisher: -2 ln w is chi-square with 2 n degrees of freedom', () => {
    for (const count of [1, 2, 5, 9])
      for (const lnProduct of [-0.5, -4, -20, -60])
        expect(Math.exp(lnTruncatedProductChance(count, lnProduct, 1 - 1e-13))).toBeCloseTo(
          chiSquareUpperTail(-2 * lnProduct, 2 * count),
          9,
        );
  });

  test('one place: its own probability, and nothing says less than the limit', () => {
    expect(Math.exp(lnTruncatedProductChance(1, Math.log(0.01), 0.05))).toBeCloseTo(0.01, 14);
    expect(Math.exp(lnTruncatedProductChance(1, Math.log(0.04), 0.02))).toBeCloseTo(0.02, 14);
  });

  test('two places by hand: 2 (1 - t) w + w (1 + 2 ln t - ln w) for w <= t^2', () => {
    const [w, t] = [0.0004, 0.05];
    const expected = 2 * (1 - t) * w + w * (1 + 2 * Math.log(t) - Math.log(w));
    expect(Math.exp(lnTruncatedProductChance(2, Math.log(w), t))).toBeCloseTo(expected, 14);
  });

  test('the share of random places that do as well', () => {
    const random = createRandom(3);
    const [count, limit, drawCount] = [6, 0.1, 40_000];
    const lnFound = Math.log(2e-4);
    let asGood = 0;
    for (let draw = 0; draw < drawCount; draw++) {
      let lnProduct = 0;
      for (let i = 0; i < count; i++) {
        const p = random.uniform();
        if (p <= limit) lnProduct += Math.log(p);
      }
      if (lnProduct <= lnFound) asGood++;
    }
    const expected = Math.exp(lnTruncatedProductChance(count, lnFound, limit));
    expect(Math.abs(asGood / drawCount - expected)).toBeLessThan(4 * Math.sqrt(expected / drawCount));
  });
});

describe('chance of a place', () => {
  const none: StrayPeaks = { places: [], spanNm: 300 };
  const place = { recordedNm: 500, signalToNoise: 6, widthNm: 0.2 };

  test('noise alone: the normal tail times the places in reach, and one line that was not there', () => {
    const trials = 2 + 0.2 / (0.7 * 0.2);
    expect(chanceOfPlace(place, none, 0.2)).toBeCloseTo(trials * normalTail(6) + 0.2 / 300, 12);
  });

  test('stray peaks at least as strong make it likelier, the more so where they crowd', () => {
    const strays = (nm: number, signalToNoise: number): StrayPeaks => ({
      places: Array.from({ length: 10 }, (_, i) => ({ recordedNm: nm + 2 * i, signalToNoise })),
      spanNm: 300,
    });
    const alone = chanceOfPlace(place, none, 0.2);
    const far = chanceOfPlace(place, strays(600, 10), 0.2);
    const near = chanceOfPlace(place, strays(490, 10), 0.2);
    expect(far).toBeCloseTo((0.2 * 11) / 300, 5);
    expect(near).toBeCloseTo((0.2 * 10) / 50, 5);
    expect(chanceOfPlace(place, strays(490, 5), 0.2)).toBeCloseTo(alone, 12);
  });
});
