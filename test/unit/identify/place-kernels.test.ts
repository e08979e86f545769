import { expect, test } from 'vitest';
import { kernelFamily, phaseCount } from '../../../shared-core/identify/place-kernels.ts';

const shapes = ['line', 'violet', 'red'] as const;

test.each(shapes)('%s: blind to straight baselines, and one for the shape itself', (shape) => {
  const { before, weights, shapes: drawn } = kernelFamily(shape, 4, 0.09);
  expect(weights).toHaveLength(phaseCount + 1);
  for (const [phase, row] of weights.entries()) {
    let level = 0;
    let slope = 0;
    let own = 0;
    for (const [k, w] of row.entries()) {
      level += w;
      slope += w * (k - before);
      own += w * drawn[phase]![k]!;
    }
    expect(level).toBeCloseTo(0, 12);
    expect(slope).toBeCloseTo(0, 10);
    expect(own).toBeCloseTo(1, 12);
  }
});

test('a band fades to its side, and the shapes to both sides mirror each other', () => {
  const violet = kernelFamily('violet', 4, 0.09).shapes[phaseCount / 2]!;
  const red = kernelFamily('red', 4, 0.09).shapes[phaseCount / 2]!;
  const middle = (violet.length - 1) / 2;
  expect(violet[middle - 8]).toBeGreaterThan(10 * violet[middle + 8]!);
  for (const [k, value] of violet.entries()) expect(value).toBeCloseTo(red[red.length - 1 - k]!, 12);
});
