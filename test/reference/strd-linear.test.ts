import { describe, expect, test } from 'vitest';
import { projectRoot } from '../support/source-files.ts';
import { digitsAgreed, fewestDigits, fitLinearSet, linearSets } from '../support/strd/data-sets.ts';
import { wantedDigits } from '../support/strd/wanted-digits.ts';

/** NIST Statistical Reference Datasets, linear regression: certified to 15 digits. Digits agreed are log relative errors. */
const sets = linearSets(projectRoot);

test('all 11 sets are there', () => {
  expect(sets.map(({ name }) => name)).toHaveLength(11);
});

describe.each(sets)('$name ($level)', (set) => {
  test('parameters, standard deviations, residual and R^2', () => {
    const fit = fitLinearSet(set)!;
    const digits = wantedDigits(set.name, 'linear');
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
