import { describe, expect, test } from 'vitest';
import { projectRoot } from '../support/source-files.ts';
import {
  deviationsFromScatter,
  digitsAgreed,
  fewestDigits,
  fitNonlinearSet,
  nonlinearSets,
} from '../support/strd/data-sets.ts';
import { nonlinearModels } from '../support/strd/nonlinear-models.ts';
import { wantedDigits } from '../support/strd/wanted-digits.ts';

/**
 * NIST Statistical Reference Datasets, nonlinear regression: certified to 11 digits. Digits agreed are log relative
 * errors; both of NIST's starts must lead there.
 */
const sets = nonlinearSets(projectRoot);

test('all 27 sets are there', () => {
  expect(sets.map(({ name }) => name).sort()).toEqual(Object.keys(nonlinearModels).sort());
  expect(sets).toHaveLength(27);
  for (const { starts } of sets) expect(starts).toHaveLength(2);
});

describe.each(sets)('$name ($level)', (set) => {
  test.each([1, 2])('from start %i', (number) => {
    const fit = fitNonlinearSet(set, [set.starts[number - 1]!]);
    const wanted = wantedDigits(set.name, 'nonlinear');
    expect(fit.status).toBe('converged');
    expect(fit.degreesOfFreedom).toBe(set.observed.length - set.values.length);
    expect(fewestDigits(fit.values, set.values, 11)).toBeGreaterThanOrEqual(wanted.values);
    expect(fewestDigits(deviationsFromScatter(fit), set.deviations, 11)).toBeGreaterThanOrEqual(
      wanted.deviations,
    );
    expect(digitsAgreed(fit.chiSquare, set.residualSumOfSquares, 11)).toBeGreaterThanOrEqual(
      wanted.deviations - 0.31,
    );
    const residualDeviation = Math.sqrt(fit.chiSquare / fit.degreesOfFreedom);
    expect(digitsAgreed(residualDeviation, set.residualDeviation, 11)).toBeGreaterThanOrEqual(
      wanted.deviations,
    );
  });

  test('the derivatives are those of the model', () => {
    const model = nonlinearModels[set.name]!;
    const b = Float64Array.from(set.values);
    const slope = new Float64Array(b.length);
    const unused = new Float64Array(b.length);
    const x = set.predictors.map((column) => column[Math.floor(column.length / 3)]!);
    const value = model(b, x, slope);
    for (let j = 0; j < b.length; j++) {
      const step = 1e-5 * Math.abs(b[j]!);
      const moved = (factor: number): number => model(b.with(j, b[j]! + factor * step), x, unused);
      const measured = (8 * (moved(1) - moved(-1)) - (moved(2) - moved(-2))) / (12 * step);
      // Rounding of the four values, and what the difference formula leaves out.
      const allowed = (1e-14 * Math.abs(value)) / step + 1e-8 * Math.abs(measured);
      expect(Math.abs(slope[j]! - measured)).toBeLessThanOrEqual(allowed);
    }
  });
});

test('both starts in one call give the certified answer and say how each ended', () => {
  const set = sets.find(({ name }) => name === 'Eckerle4')!;
  const fit = fitNonlinearSet(set, set.starts);
  expect(fit.byStart.map(({ status }) => status)).toEqual(['converged', 'converged']);
  expect(fewestDigits(fit.values, set.values, 11)).toBeGreaterThanOrEqual(10);
});
