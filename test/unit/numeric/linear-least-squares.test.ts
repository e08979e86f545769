import { expect, test } from 'vitest';
import { fitLinear } from '../../../shared-core/numeric/linear-least-squares.ts';
import { expectClose } from '../../support/expect-close.ts';
import { leastSquaresCases } from '../../support/least-squares-cases.ts';

const line = (x: readonly number[]): Float64Array => Float64Array.from([...x.map(() => 1), ...x]);

test('weights: a straight line in 50 digits', () => {
  const { x, y, weights, values, covariance, chiSquare, rSquared } = leastSquaresCases.weightedLinear;
  const fit = fitLinear({
    design: line(x),
    observed: Float64Array.from(y),
    weights: Float64Array.from(weights),
    hasIntercept: true,
  })!;
  const because = 'mpmath, 50 digits';
  for (const [j, expected] of values.entries()) {
    expectClose(fit.values[j]!, { expected, rel: 1e-14, because });
    for (const k of [0, 1])
      expectClose(fit.covariance[2 * j + k]!, { expected: covariance[j]![k]!, rel: 1e-13, because });
    const variance = (covariance[j]![j]! * chiSquare) / 4;
    expectClose(fit.deviations[j]!, { expected: Math.sqrt(variance), rel: 1e-13, because });
  }
  expectClose(fit.chiSquare, { expected: chiSquare, rel: 1e-13, because });
  expectClose(fit.rSquared, { expected: rSquared, rel: 1e-14, because });
  expect(fit.degreesOfFreedom).toBe(4);
  for (const [i, residual] of fit.residuals.entries())
    expect(residual).toBeCloseTo(y[i]! - fit.values[0]! - fit.values[1]! * x[i]!, 13);
});

test('as many observations as parameters: exact, and no scatter to speak of', () => {
  const fit = fitLinear({ design: line([1, 3]), observed: Float64Array.from([5, 9]), hasIntercept: true })!;
  expect([...fit.values]).toEqual([3, 2]);
  expect(fit.degreesOfFreedom).toBe(0);
  expect(fit.residualDeviation).toBeNaN();
});

test.each([
  ['dependent columns', [1, 1, 1, 2, 2, 2], 3],
  ['a column of zeros', [1, 1, 1, 0, 0, 0], 3],
  ['a column that is not finite', [1, 1, 1, 2, NaN, 3], 3],
  ['fewer observations than parameters', [1, 2], 1],
  ['no observations', [], 0],
])('%s: no answer', (_what, design, rows) => {
  const observed = new Float64Array(rows).fill(1);
  expect(fitLinear({ design: Float64Array.from(design), observed, hasIntercept: false })).toBeNull();
});
