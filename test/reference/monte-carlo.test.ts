import { describe, expect, test } from 'vitest';
import type { Random } from '../../shared-core/numeric/random.ts';
import {
  confirmsFirstOrder,
  lastDigitTolerance,
  propagateByDrawing,
  type MonteCarloSummary,
} from '../../shared-core/uncertainty/monte-carlo.ts';
import { checkValue } from '../support/check-values.ts';
import { expectClose } from '../support/expect-close.ts';

const settings = { seed: 7, coverage: 0.95, digits: 2, maxTrials: 1_000_000 } as const;

function last(draw: (random: Random) => number, change: Partial<typeof settings> = {}): MonteCarloSummary {
  const steps = [...propagateByDrawing(draw, { ...settings, ...change })];
  return steps.at(-1)!;
}

/** Rectangular with standard deviation u. */
const rectangular = (random: Random, u: number): number => (2 * random.uniform() - 1) * u * Math.sqrt(3);

const expectedOf = (key: string) => checkValue(key).expected as Readonly<Record<string, number>>;

describe('the worked examples of the supplement', () => {
  test('9.2.3: four rectangular inputs, 95 % between -3.88 and 3.88', () => {
    const result = last((random) => [1, 1, 1, 1].reduce((sum, u) => sum + rectangular(random, u), 0));
    expect(result.isStable).toBe(true);
    const { u, half_width_95: half } = expectedOf('jcgm101.four_rectangles');
    expectClose(result.high, { expected: half!, abs: 0.03, because: 'analytic; published 3.88' });
    expectClose(result.low, { expected: -half!, abs: 0.03, because: 'analytic; published 3.88' });
    expectClose(result.standardUncertainty, { expected: u!, abs: 0.02, because: 'sum of four of 1' });
    // The first-order interval +-1.96 x 2 = 3.92 is not confirmed to two digits (tolerance 0.05), as published: it is.
    expect(confirmsFirstOrder({ low: -3.92, high: 3.92 }, result, result.tolerance)).toBe(true);
  });

  test('9.2.4: one input ten times wider: 17.0, where the first order says 19.9', () => {
    const result = last((random) => [1, 1, 1, 10].reduce((sum, u) => sum + rectangular(random, u), 0));
    const { u, half_width_95_MC: half, half_width_95_GUF: first } = expectedOf('jcgm101.three_unit_one_10');
    expectClose(result.standardUncertainty, { expected: u!, abs: 0.05, because: 'root of 103' });
    expectClose(result.high, { expected: half!, abs: 0.1, because: 'published 17.0' });
    expect(confirmsFirstOrder({ low: -first!, high: first! }, result, result.tolerance)).toBe(false);
  });
});

test('a normal quantity: mean, uncertainty, both intervals, and the same numbers for the same seed', () => {
  const draw = (random: Random): number => 5 + 3 * random.normal();
  const result = last(draw);
  expectClose(result.mean, { expected: 5, abs: 0.05, because: 'normal' });
  expectClose(result.standardUncertainty, { expected: 3, abs: 0.05, because: 'normal' });
  expectClose(result.low, { expected: 5 - 1.959964 * 3, abs: 0.08, because: 'normal' });
  expectClose(result.high, { expected: 5 + 1.959964 * 3, abs: 0.08, because: 'normal' });
  expectClose(result.median, { expected: 5, abs: 0.06, because: 'normal' });
  expectClose(result.skewness, { expected: 0, abs: 0.05, because: 'normal' });
  expect(result.shortest.high - result.shortest.low).toBeLessThanOrEqual(result.high - result.low);
  expect(last(draw)).toEqual(result);
  expect(last(draw, { seed: 8 as never }).mean).not.toBe(result.mean);
});

test('a skewed quantity: the exponential distribution of mean 1', () => {
  const result = last((random) => -Math.log(1 - random.uniform()));
  // Quantiles -ln(1 - p) at 0.025 and 0.975; the shortest interval begins at 0.
  expectClose(result.low, { expected: 0.025317808, abs: 0.004, because: 'quantile' });
  expectClose(result.high, { expected: 3.688879454, abs: 0.05, because: 'quantile' });
  expectClose(result.shortest.low, { expected: 0, abs: 0.002, because: 'mode at zero' });
  expectClose(result.shortest.high, { expected: 2.995732274, abs: 0.05, because: '-ln 0.05' });
  expectClose(result.median, { expected: Math.LN2, abs: 0.01, because: 'ln 2' });
  expectClose(result.skewness, { expected: 2, abs: 0.15, because: 'exponential' });
});

test('ends of the interval: the r-th and (r + q)-th of M values counted from 1, r = (M - q)/2', () => {
  // JCGM 101:2008 7.7.2 with M = 10 000, p = 0.95: q = 9500, r = 250. The draw counts up, so that values name their ranks.
  let rank = 0;
  const steps = [...propagateByDrawing(() => ++rank, { ...settings, maxTrials: 10_000 })];
  expect(steps[0]).toMatchObject({ trials: 10_000, low: 250, high: 9750, median: 5000.5 });
});

test('draws without an answer are counted and left out', () => {
  const result = last((random) => (random.uniform() < 0.1 ? NaN : 5 + 3 * random.normal()));
  expectClose(result.failed / (result.failed + result.trials), {
    expected: 0.1,
    abs: 0.01,
    because: 'chance',
  });
  expectClose(result.mean, { expected: 5, abs: 0.05, because: 'normal' });
  expect([...propagateByDrawing(() => NaN, settings)]).toEqual([]);
});

test('batches do not depend on each other: stopping earlier leaves the first ones as they are', () => {
  const draw = (random: Random): number => random.normal() ** 9;
  const some = [...propagateByDrawing(draw, { ...settings, maxTrials: 20_000 })];
  const more = [...propagateByDrawing(draw, { ...settings, maxTrials: 40_000 })];
  expect(more.slice(0, 2)).toEqual(some);
});

test.each([
  [0.0357, 1, 0.005],
  [0.0357, 2, 0.0005],
  [31.7, 1, 5],
  [31.7, 2, 0.5],
  [9.96, 1, 5],
] as const)('half a unit in the last of %d with %d digits is %d', (u, digits, expected) => {
  // JCGM 101:2008, examples of 7.9.2: 0.0357 g as 36 mg or 4 x 10 mg.
  expectClose(lastDigitTolerance(u, digits), { expected, rel: 1e-12, because: 'JCGM 101:2008 7.9.2' });
});

test('it stops at the stated number of trials and says that it is not stable', () => {
  const steps = [...propagateByDrawing((random) => random.normal() ** 9, { ...settings, maxTrials: 20_000 })];
  expect(steps.map(({ trials }) => trials)).toEqual([10_000, 20_000]);
  expect(steps.at(-1)!.isStable).toBe(false);
});
