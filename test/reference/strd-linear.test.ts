import { describe, expect, test } from 'vitest';
import { projectRoot } from '../support/source-files.ts';
import { digitsAgreed, fewestDigits, fitLinearSet, linearSets } from '../support/strd/data-sets.ts';

/**
 * NIST Statistical Reference Datasets, linear regression: certified to 15 digits. Digits agreed are log relative errors.
 *
 * What can be had depends on the condition number. Filip is a tenth-degree polynomial about a distant zero: rounding
 * its powers of x to doubles, before any fit, leaves no more than about 8 of the 15 digits.
 */
const wanted: Readonly<Record<string, { values: number; deviations: number }>> = {
  Filip: { values: 7, deviations: 7 },
  Longley: { values: 13, deviations: 12 },
};
const usual = { values: 13, deviations: 13 };

const sets = linearSets(projectRoot);

test('all 11 sets are there', () => {
  expect(sets.map(({ name }) => name)).toHaveLength(11);
});

describe.each(sets)('$name ($level)', (set) => {
  test('parameters, standard deviations, residual and R^2', () => {
    const fit = fitLinearSet(set)!;
    const digits = wanted[set.name] ?? usual;
    expect(fewestDigits(fit.values, set.values, 15)).toBeGreaterThanOrEqual(digits.values);
    expect(fewestDigits(fit.deviations, set.deviations, 15)).toBeGreaterThanOrEqual(digits.deviations);
    expect(digitsAgreed(fit.residualDeviation, set.residualDeviation, 15)).toBeGreaterThanOrEqual(
      digits.values,
    );
    expect(digitsAgreed(fit.rSquared, set.rSquared, 15)).toBeGreaterThanOrEqual(
      Math.min(13, digits.values + 2),
    );
  });
});
