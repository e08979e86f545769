import { describe, expect, test } from 'vitest';
import {
  applyQ,
  applyQTransposed,
  inverseOfNormal,
  qrFactor,
  solveUpper,
  solveUpperTransposed,
} from '../../../shared-core/numeric/qr.ts';
import { createRandom } from '../../../shared-core/numeric/random.ts';
import { expectClose } from '../../support/expect-close.ts';
import { columnByColumn, leastSquaresCases } from '../../support/least-squares-cases.ts';

function randomMatrix(rows: number, columns: number, seed: number): Float64Array {
  const random = createRandom(seed);
  return Float64Array.from({ length: rows * columns }, () => random.normal());
}

/** R of the factors, row-major. */
function upper({ matrix, rows, columns }: ReturnType<typeof qrFactor>): number[][] {
  return Array.from({ length: columns }, (_, i) =>
    Array.from({ length: columns }, (_unused, j) => (j < i ? 0 : matrix[j * rows + i]!)),
  );
}

test.each([
  [5, 5],
  [8, 3],
  [40, 7],
  [1, 1],
])('%i x %i: Q R is the matrix with its columns in order, pivots fall', (rows, columns) => {
  const original = randomMatrix(rows, columns, 7 * rows + columns);
  const factors = qrFactor(original.slice(), rows, columns);
  const r = upper(factors);
  expect(factors.rank).toBe(columns);
  for (let k = 0; k < columns; k++) {
    const column = new Float64Array(rows);
    for (let i = 0; i <= k; i++) column[i] = r[i]![k]!;
    applyQ(factors, column);
    const from = factors.order[k]! * rows;
    for (let i = 0; i < rows; i++) expect(column[i]).toBeCloseTo(original[from + i]!, 13);
    if (k > 0) expect(Math.abs(r[k]![k]!)).toBeLessThanOrEqual(Math.abs(r[k - 1]![k - 1]!));
  }
});

test('Q keeps lengths, and its transpose undoes it', () => {
  const factors = qrFactor(randomMatrix(9, 4, 3), 9, 4);
  const vector = randomMatrix(9, 1, 4);
  const turned = vector.slice();
  applyQTransposed(factors, turned);
  const squares = (v: Float64Array): number => v.reduce((sum, value) => sum + value * value, 0);
  expect(squares(turned)).toBeCloseTo(squares(vector), 13);
  applyQ(factors, turned);
  for (const [i, value] of turned.entries()) expect(value).toBeCloseTo(vector[i]!, 14);
});

test('R and its transpose are solved', () => {
  const factors = qrFactor(randomMatrix(6, 4, 5), 6, 4);
  const r = upper(factors);
  const right = Float64Array.from([1, -2, 3, 0.5]);
  const x = right.slice();
  solveUpper(factors, x);
  const y = right.slice();
  solveUpperTransposed(factors, y);
  for (let i = 0; i < 4; i++) {
    expect(r[i]!.reduce((sum, value, j) => sum + value * x[j]!, 0)).toBeCloseTo(right[i]!, 12);
    expect(r.reduce((sum, row, j) => sum + row[i]! * y[j]!, 0)).toBeCloseTo(right[i]!, 12);
  }
});

test('the inverse of the normal matrix is that of 50 digits', () => {
  const { matrix, inverse } = leastSquaresCases.inverseOfNormal;
  const found = inverseOfNormal(qrFactor(columnByColumn(matrix), matrix.length, 4));
  for (const [i, row] of inverse.entries()) {
    for (const [j, expected] of row.entries())
      expectClose(found[i * 4 + j]!, { expected, rel: 1e-12, because: 'mpmath, 50 digits' });
  }
});

describe('rank', () => {
  test.each([
    ['two equal columns', [1, 2, 3, 1, 2, 3, 4, 0, 1], 2],
    ['a column of zeros', [1, 2, 3, 0, 0, 0, 4, 0, 1], 2],
    ['only zeros', new Array<number>(9).fill(0), 0],
    ['a sum of the others', [0.1, 0.2, 0.7, 0.3, 0.9, 0.5, 0.1 + 0.3, 0.2 + 0.9, 0.7 + 0.5], 2],
    ['nearly dependent, but not to working precision', [1, 1, 1, 1, 1, 1 + 1e-10, 0, 1, 0], 3],
  ])('%s', (_what, matrix, rank) => {
    expect(qrFactor(Float64Array.from(matrix), 3, 3).rank).toBe(rank);
  });
});
