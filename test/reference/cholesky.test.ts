import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { expect, test } from 'vitest';
import { choleskyFactor, choleskyInverse, choleskySolve } from '../../shared-core/numeric/cholesky.ts';
import { expectClose } from '../support/expect-close.ts';
import { projectRoot } from '../support/source-files.ts';

/** A parabola, for which the straight line does not serve: normal equations in x over its largest value. */
test('NIST StRD, Pontius: certified parameters and deviations', () => {
  const { x, y, certified } = JSON.parse(
    readFileSync(join(projectRoot, 'test/data/strd-pontius.json'), 'utf8'),
  ) as {
    x: number[];
    y: number[];
    certified: { parameters: number[]; deviations: number[]; residualDeviation: number };
  };
  const scale = Math.max(...x);
  const powers = x.map((value) => [1, value / scale, (value / scale) ** 2]);
  const matrix = new Float64Array(9);
  const right = new Float64Array(3);
  for (const [i, row] of powers.entries()) {
    for (let a = 0; a < 3; a++) {
      right[a]! += row[a]! * y[i]!;
      for (let b = 0; b < 3; b++) matrix[3 * a + b]! += row[a]! * row[b]!;
    }
  }
  expect(choleskyFactor(matrix, 3)).toBe(true);
  const inverse = choleskyInverse(matrix, 3);
  choleskySolve(matrix, 3, right);
  const left = powers.map((row, i) => y[i]! - row.reduce((sum, value, a) => sum + value * right[a]!, 0));
  const residual = Math.sqrt(left.reduce((sum, value) => sum + value * value, 0) / (x.length - 3));
  const because = 'P. Pontius, NIST Statistical Reference Datasets, certified value';
  expectClose(residual, { expected: certified.residualDeviation, rel: 1e-9, because });
  for (let a = 0; a < 3; a++) {
    const unit = scale ** a;
    expectClose(right[a]! / unit, { expected: certified.parameters[a]!, rel: 1e-9, because });
    const deviation = (residual * Math.sqrt(inverse[4 * a]!)) / unit;
    expectClose(deviation, { expected: certified.deviations[a]!, rel: 1e-9, because });
  }
});
