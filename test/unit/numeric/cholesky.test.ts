import { expect, test } from 'vitest';
import { choleskyFactor, choleskyInverse, choleskySolve } from '../../../shared-core/numeric/cholesky.ts';
import { createRandom } from '../../../shared-core/numeric/random.ts';

/** L of the textbook matrix is whole-numbered. */
const textbook = [4, 12, -16, 12, 37, -43, -16, -43, 98];

test('a matrix with a known factor', () => {
  const matrix = Float64Array.from(textbook);
  expect(choleskyFactor(matrix, 3)).toBe(true);
  const lower = [matrix[0], matrix[3], matrix[4], matrix[6], matrix[7], matrix[8]];
  expect(lower).toEqual([2, 6, 1, -8, 5, 3]);
  const right = Float64Array.from([-20, -43, 192]);
  choleskySolve(matrix, 3, right);
  // 4 x + 12 y - 16 z and so on for (1, 2, 3).
  expect([...right]).toEqual([1, 2, 3]);
});

test('only the lower triangle is read', () => {
  const matrix = Float64Array.from(textbook);
  for (const upper of [1, 2, 5]) matrix[upper] = NaN;
  expect(choleskyFactor(matrix, 3)).toBe(true);
  expect(matrix[8]).toBe(3);
});

test.each([
  ['indefinite', [1, 2, 2, 1]],
  ['singular', [1, 1, 1, 1]],
  ['not a number', [NaN, 0, 0, 1]],
  ['infinite', [Infinity, 0, 0, 1]],
  ['negative', [-1, 0, 0, -1]],
])('a matrix that is %s is refused', (_what, values) => {
  expect(choleskyFactor(Float64Array.from(values), 2)).toBe(false);
});

test('random matrices: inverse times matrix is one', () => {
  const random = createRandom(3);
  for (const n of [1, 2, 5, 20]) {
    const root = Float64Array.from({ length: n * n }, () => random.normal());
    const matrix = new Float64Array(n * n);
    for (let i = 0; i < n; i++) {
      for (let j = 0; j < n; j++) {
        for (let k = 0; k < n; k++) matrix[i * n + j]! += root[i * n + k]! * root[j * n + k]!;
      }
      matrix[i * n + i]! += 1;
    }
    const factor = Float64Array.from(matrix);
    expect(choleskyFactor(factor, n)).toBe(true);
    const inverse = choleskyInverse(factor, n);
    for (let i = 0; i < n; i++) {
      for (let j = 0; j < n; j++) {
        let sum = 0;
        for (let k = 0; k < n; k++) sum += matrix[i * n + k]! * inverse[k * n + j]!;
        expect(sum).toBeCloseTo(i === j ? 1 : 0, 11);
      }
    }
  }
});
