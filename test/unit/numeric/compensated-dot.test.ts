import { expect, test } from 'vitest';
import { compensatedDot } from '../../../shared-core/numeric/compensated-dot.ts';
import { expectClose } from '../../support/expect-close.ts';
import { leastSquaresCases } from '../../support/least-squares-cases.ts';

const whole = (values: readonly number[]) => ({ values: Float64Array.from(values), offset: 0, stride: 1 });

test('sums that cancel keep the digits of twice the working precision', () => {
  for (const { start, a, b, exact, size } of leastSquaresCases.dots) {
    // Dot2: |error| <= eps |result| + (length eps)^2 sum |a b|.
    const eps = 1.2e-16;
    expectClose(compensatedDot(start, whole(a), whole(b), a.length), {
      expected: exact,
      rel: 2 * eps,
      abs: 2 * (a.length * eps) * (a.length * eps) * size,
      because: 'exact fractions of Python',
    });
    const plain = a.reduce((sum, value, i) => sum + value * b[i]!, start);
    // The cases mean something: without the errors of the products most digits are gone.
    if (a.length > 3) expect(Math.abs(plain - exact)).toBeGreaterThan(1e-3 * Math.abs(exact));
  }
});

test('offset and stride pick the elements', () => {
  const a = { values: Float64Array.from([9, 2, 9, 3, 9]), offset: 1, stride: 2 };
  const b = { values: Float64Array.from([9, 9, 5, 7]), offset: 2, stride: 1 };
  expect(compensatedDot(1, a, b, 2)).toBe(32);
  expect(compensatedDot(4, a, b, 0)).toBe(4);
});
