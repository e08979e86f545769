import { expect, test } from 'vitest';
import { drawChiSquare } from '../../shared-core/numeric/chi-square-draw.ts';
import { chiSquareCdf } from '../../shared-core/numeric/distributions.ts';
import { createRandom } from '../../shared-core/numeric/random.ts';

test.each([0.7, 1, 2, 3.5, 20, 147])(
  'draws with %d degrees of freedom follow chi-square',
  (degreesOfFreedom) => {
    const random = createRandom(17);
    const count = 20_000;
    const values = Array.from({ length: count }, () => drawChiSquare(random, degreesOfFreedom)).sort(
      (a, b) => a - b,
    );
    // Kolmogorov's statistic sqrt(n) D exceeds 1.949 once in a thousand (Kolmogorov 1933, tabulated).
    const distance = values.reduce((largest, value, index) => {
      const expected = chiSquareCdf(value, degreesOfFreedom);
      return Math.max(largest, Math.abs(expected - index / count), Math.abs(expected - (index + 1) / count));
    }, 0);
    expect(Math.sqrt(count) * distance).toBeLessThan(1.949);
  },
);
