import { describe, expect, test } from 'vitest';
import {
  griemPartialEquilibriumDensity,
  lowestEquilibratedLevel,
  mcWhirterDensity,
  sahaDensity,
  seriesLimitDensity,
} from '../../shared-core/physics/equilibrium.ts';
import { checkKeys, checkValue, expectCheckValue, numberInput } from '../support/check-values.ts';

test('density for partial equilibrium', () => {
  for (const key of checkKeys(/^griem_PLTE/)) {
    const { inputs } = checkValue(key);
    const density = griemPartialEquilibriumDensity(numberInput(inputs, 'n'), numberInput(inputs, 'T_K'));
    expectCheckValue(key, density * 1e-6);
  }
});

describe('lowest level in equilibrium', () => {
  // From the densities of H. R. Griem (1963) at 10 000 K: n = 3 1.55e20, n = 4 1.34e19, n = 5 2.02e18 per m^3.
  test.each([
    [1e22, 2],
    [2e20, 3],
    [1.5e20, 4],
    [1e19, 5],
    [1e12, null],
  ])('at %d per m^3 and 10 000 K', (density, level) => {
    expect(lowestEquilibratedLevel(density, 10_000)).toBe(level);
  });
});

test('density for local thermodynamic equilibrium', () => {
  for (const key of checkKeys(/^mcwhirter/)) {
    const { inputs } = checkValue(key);
    expectCheckValue(key, mcWhirterDensity(numberInput(inputs, 'T_K'), numberInput(inputs, 'dE_eV')) * 1e-6);
  }
});

test('Saha equation', () => {
  for (const key of checkKeys(/^saha_S/)) {
    expectCheckValue(key, sahaDensity(numberInput(checkValue(key).inputs, 'T_K')));
  }
  expect(sahaDensity(10_000, 2, 0.1)).toBeGreaterThan(sahaDensity(10_000));
  expect(sahaDensity(10_000, 4)).toBe(sahaDensity(10_000) / 2);
});

test('density where the series merges', () => {
  for (const key of checkKeys(/^inglis_teller/)) {
    expectCheckValue(key, seriesLimitDensity(numberInput(checkValue(key).inputs, 'n_max')) * 1e-6);
  }
});
