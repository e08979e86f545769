import { describe, expect, test } from 'vitest';
import { chiSquareUpperTail, normalCdf } from '../../shared-core/numeric/distributions.ts';
import { createRandom } from '../../shared-core/numeric/random.ts';

const count = 200_000;

/** p-value of counts against equal expectation. */
function evenness(bins: readonly number[], expected: readonly number[]): number {
  const chiSquare = bins.reduce((sum, seen, i) => sum + (seen - expected[i]!) ** 2 / expected[i]!, 0);
  return chiSquareUpperTail(chiSquare, bins.length - 1);
}

/** Mean, variance, skewness and excess kurtosis. */
function moments(values: readonly number[]): readonly [number, number, number, number] {
  const mean = values.reduce((a, b) => a + b, 0) / values.length;
  const central = (power: number): number =>
    values.reduce((a, b) => a + (b - mean) ** power, 0) / values.length;
  const variance = central(2);
  return [mean, variance, central(3) / variance ** 1.5, central(4) / variance ** 2 - 3];
}

test('the same seed gives the same numbers, neighbouring seeds others', () => {
  const draw = (seed: number): number[] => {
    const random = createRandom(seed);
    return [random.uniform(), random.normal(), random.poisson(3), random.poisson(300), random.normal()];
  };
  expect(draw(1)).toEqual(draw(1));
  expect(draw(1)).not.toEqual(draw(2));
});

// The published generator written a second time, in another language; the demo and every simulation depend on it.
test.each([
  [1, [0.09156953175513294, 0.8881928137485323, 0.43427017709149285]],
  [20260, [0.36491233258222, 0.9678656982617905, 0.15273667068327723]],
  [4294967295, [0.9555830018603452, 0.2682696548492096, 0.8580147783595625]],
])('seed %d starts as it always did', (seed, expected) => {
  const random = createRandom(seed);
  expect(expected.map(() => random.uniform())).toEqual(expected);
});

describe('uniform', () => {
  const random = createRandom(101);
  const values = Array.from({ length: count }, () => random.uniform());

  test('lies in [0, 1) and fills it evenly', () => {
    expect(values.every((value) => value >= 0 && value < 1)).toBe(true);
    const bins = new Array<number>(100).fill(0);
    for (const value of values) bins[Math.floor(value * 100)]!++;
    const p = evenness(
      bins,
      bins.map(() => count / 100),
    );
    expect(p).toBeGreaterThan(1e-4);
    expect(p).toBeLessThan(1 - 1e-4);
  });

  test('neighbours are independent', () => {
    const bins = new Array<number>(100).fill(0);
    for (let i = 0; i + 1 < count; i += 2) {
      bins[Math.floor(values[i]! * 10) * 10 + Math.floor(values[i + 1]! * 10)]!++;
    }
    expect(
      evenness(
        bins,
        bins.map(() => count / 200),
      ),
    ).toBeGreaterThan(1e-4);
  });

  test('its last bits move too', () => {
    const odd = values.filter((value) => (value * 2 ** 53) % 2 === 1).length;
    expect(Math.abs(odd - count / 2)).toBeLessThan(4 * Math.sqrt(count / 4));
  });
});

describe('normal', () => {
  const random = createRandom(102);
  const values = Array.from({ length: count }, () => random.normal());

  test('has the moments 0, 1, 0, 0', () => {
    const [mean, variance, skewness, kurtosis] = moments(values);
    // Standard errors sqrt(1/n), sqrt(2/n), sqrt(6/n), sqrt(24/n); four of them.
    expect(Math.abs(mean)).toBeLessThan(4 * Math.sqrt(1 / count));
    expect(Math.abs(variance - 1)).toBeLessThan(4 * Math.sqrt(2 / count));
    expect(Math.abs(skewness)).toBeLessThan(4 * Math.sqrt(6 / count));
    expect(Math.abs(kurtosis)).toBeLessThan(4 * Math.sqrt(24 / count));
  });

  test('has the right share in every bin, tails included', () => {
    const edges = [-Infinity, -3, -2, -1.5, -1, -0.5, 0, 0.5, 1, 1.5, 2, 3, Infinity];
    const expected = edges.slice(1).map((edge, i) => {
      const upTo = (x: number): number => (Math.abs(x) === Infinity ? (x > 0 ? 1 : 0) : normalCdf(x));
      return count * (upTo(edge) - upTo(edges[i]!));
    });
    const bins = expected.map((_, i) => values.filter((v) => v >= edges[i]! && v < edges[i + 1]!).length);
    expect(evenness(bins, expected)).toBeGreaterThan(1e-4);
  });
});

describe('Poisson', () => {
  test.each([0.05, 1, 9.9, 10.1, 40, 1000, 1e6, 1e7])('mean %d has that mean and variance', (mean) => {
    const random = createRandom(103);
    const draws = 50_000;
    const values = Array.from({ length: draws }, () => random.poisson(mean));
    const [found, variance] = moments(values);
    expect(values.every((value) => Number.isInteger(value) && value >= 0)).toBe(true);
    expect(Math.abs(found - mean)).toBeLessThan(4 * Math.sqrt(mean / draws));
    // Variance of the sample variance of a Poisson variable: (mean + 2 mean^2)/n.
    expect(Math.abs(variance - mean)).toBeLessThan(4 * Math.sqrt((mean + 2 * mean * mean) / draws));
  });

  // Just above 10 the shape of the hat counts most.
  test.each([4, 11, 25])('mean %d has the right share of every count', (mean) => {
    const random = createRandom(104);
    const draws = 1_000_000;
    const top = mean * 2 + 5;
    const bins = new Array<number>(top + 1).fill(0);
    for (let i = 0; i < draws; i++) bins[Math.min(top, random.poisson(mean))]!++;
    const expected = new Array<number>(top + 1).fill(0);
    let term = Math.exp(-mean);
    let rest = 1;
    for (let k = 0; k < top; k++) {
      expected[k] = draws * term;
      rest -= term;
      term *= mean / (k + 1);
    }
    expected[top] = draws * rest;
    // Bins with fewer than five expected are joined to the next.
    const joined: [number, number][] = [[0, 0]];
    for (const [k, wanted] of expected.entries()) {
      const last = joined.at(-1)!;
      last[0] += bins[k]!;
      last[1] += wanted;
      if (last[1] >= 5) joined.push([0, 0]);
    }
    const left = joined.pop()!;
    joined.at(-1)![0] += left[0];
    joined.at(-1)![1] += left[1];
    expect(
      evenness(
        joined.map(([seen]) => seen),
        joined.map(([, wanted]) => wanted),
      ),
    ).toBeGreaterThan(1e-4);
  });

  test('of nothing is nothing', () => {
    const random = createRandom(1);
    expect([random.poisson(0), random.poisson(-1), random.poisson(NaN)]).toEqual([0, 0, 0]);
  });
});
