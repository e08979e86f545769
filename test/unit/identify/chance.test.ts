import { expect, test } from 'vitest';
import { chanceOfAtLeast } from '../../../shared-core/identify/chance.ts';

test('none is always reached', () => {
  expect(chanceOfAtLeast(0, [0.2, 0.3])).toBe(1);
});

test('equal chances follow the binomial distribution', () => {
  // P(X >= 2), n = 4, p = 0.1: 1 - 0.9^4 - 4 0.1 0.9^3 = 0.0523.
  expect(chanceOfAtLeast(2, [0.1, 0.1, 0.1, 0.1])).toBeCloseTo(0.0523, 12);
});

test('unequal chances by hand', () => {
  // At least one of 0.5 and 0.2: 1 - 0.5 0.8; both: 0.1; three of two never.
  expect(chanceOfAtLeast(1, [0.5, 0.2])).toBeCloseTo(0.6, 15);
  expect(chanceOfAtLeast(2, [0.5, 0.2])).toBeCloseTo(0.1, 15);
  expect(chanceOfAtLeast(3, [0.5, 0.2])).toBe(0);
});
