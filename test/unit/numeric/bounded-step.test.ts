import { describe, expect, test } from 'vitest';
import {
  createStepSolver,
  isPressed,
  type Linearisation,
} from '../../../shared-core/numeric/bounded-step.ts';
import { expectClose } from '../../support/expect-close.ts';
import { columnByColumn, leastSquaresCases } from '../../support/least-squares-cases.ts';

function problem(
  matrix: readonly (readonly number[])[],
  right: readonly number[],
  lowest?: readonly number[],
  highest?: readonly number[],
): Linearisation {
  const columns = matrix[0]!.length;
  return {
    rows: matrix.length,
    columns,
    jacobian: columnByColumn(matrix),
    residuals: Float64Array.from(right),
    scale: Float64Array.from({ length: columns }, (_, j) =>
      Math.sqrt(matrix.reduce((sum, row) => sum + row[j]! ** 2, 0)),
    ),
    lowest: Float64Array.from(lowest ?? new Array<number>(columns).fill(-Infinity)),
    highest: Float64Array.from(highest ?? new Array<number>(columns).fill(Infinity)),
  };
}

const objective = (
  matrix: readonly (readonly number[])[],
  right: readonly number[],
  at: ArrayLike<number>,
): number =>
  matrix.reduce(
    (sum, row, i) => sum + (right[i]! - row.reduce((s, value, j) => s + value * at[j]!, 0)) ** 2,
    0,
  );

describe('bounded problems solved by an independent active-set method', () => {
  test.each(leastSquaresCases.boundedLinear)('case %#', (given) => {
    const step = new Float64Array(given.values.length);
    // Steps are legs towards the answer: repeated from where the last one ended, they arrive.
    const at = new Float64Array(step.length);
    for (let round = 0; round < 12; round++) {
      const residuals = given.right.map(
        (y, i) => y - given.matrix[i]!.reduce((s, value, j) => s + value * at[j]!, 0),
      );
      const here = problem(
        given.matrix,
        residuals,
        given.lowest.map((bound, j) => Math.min(0, bound - at[j]!)),
        given.highest.map((bound, j) => Math.max(0, bound - at[j]!)),
      );
      const before = objective(given.matrix, given.right, at);
      const promised = createStepSolver(here).solve(0, step)!;
      for (const [j, value] of step.entries())
        at[j] = Math.max(given.lowest[j]!, Math.min(given.highest[j]!, at[j]! + value));
      // Never uphill.
      expect(promised).toBeGreaterThan(-1e-12);
      expect(objective(given.matrix, given.right, at)).toBeLessThanOrEqual(before * (1 + 1e-12));
    }
    for (const [j, expected] of given.values.entries())
      expectClose(at[j]!, {
        expected,
        rel: 1e-8,
        abs: 1e-8,
        because: 'SciPy lsq_linear, bounded-variable least squares',
      });
    for (const [j, isHeld] of given.held.entries())
      expect(at[j] === given.lowest[j] || at[j] === given.highest[j]).toBe(isHeld);
    expectClose(objective(given.matrix, given.right, at), {
      expected: given.objective,
      rel: 1e-9,
      because: 'SciPy',
    });
  });
});

describe('damping', () => {
  const matrix = [
    [3, 1],
    [0, 2],
    [4, -1],
  ];
  const right = [1, 5, -2];

  test('solves (J^T J + damping D^2) s = J^T r', () => {
    const at = problem(matrix, right);
    for (const damping of [1e-8, 0.3, 20]) {
      const step = new Float64Array(2);
      const promised = createStepSolver(at).solve(damping, step)!;
      const half = [0, 1].map((j) => matrix.reduce((sum, row, i) => sum + row[j]! * right[i]!, 0));
      for (const j of [0, 1]) {
        let sum = damping * at.scale[j]! ** 2 * step[j]!;
        for (const row of matrix) sum += row[j]! * (row[0]! * step[0]! + row[1]! * step[1]!);
        expect(sum).toBeCloseTo(half[j]!, 12);
      }
      expect(promised).toBeCloseTo(step[0]! * half[0]! + step[1]! * half[1]!, 12);
    }
  });

  test('gives a step where the undamped equations have none', () => {
    const dependent = matrix.map(([a]) => [a!, 2 * a!]);
    const solver = createStepSolver(problem(dependent, right));
    const step = new Float64Array(2);
    expect(solver.solve(0, step)).toBeNull();
    expect(solver.solve(1e-3, step)).toBeGreaterThan(0);
    expect(solver.solve(0, step)).toBeNull();
  });
});

test('a parameter is pressed on the bound that the data pull it over, or when it has no room', () => {
  const pulled = (lowest: number, highest: number): boolean =>
    isPressed(problem([[1]], [2], [lowest], [highest]), 0);
  expect(pulled(-1, 0)).toBe(true);
  expect(pulled(0, 1)).toBe(false);
  expect(pulled(-1, 1)).toBe(false);
  expect(pulled(0, 0)).toBe(true);
});

test('residuals that are not numbers give no step', () => {
  const step = new Float64Array(1);
  expect(createStepSolver(problem([[1], [2]], [NaN, 1])).solve(0.1, step)).toBeNull();
});
