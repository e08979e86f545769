import { expect, test } from 'vitest';
import { coverageCases } from '../accuracy/coverage-cases.ts';
import { runCoverageCase } from '../accuracy/run-coverage.ts';

const drawCount = 150;

/**
 * Shared laws are information, so the joint fit must scatter less than a fit line by line of the same recordings. Where the
 * response rules the uncertainty there is nothing to win.
 */
test.each([
  ['bright', 1],
  ['faint', 0.93],
  ['deuterium 20 %', 1],
  ['blended', 1],
  ['8-bit', 0.85],
])('%s: the joint fit scatters less than line by line', (name, most) => {
  const each = coverageCases.find((candidate) => candidate.name === name)!;
  const joint = runCoverageCase(each, drawCount).temperature;
  const single = runCoverageCase(each, drawCount, { fit: 'line-by-line' }).temperature;
  expect(joint.measured).toBe(drawCount);
  expect(joint.rms / single.rms).toBeLessThan(most);
});
