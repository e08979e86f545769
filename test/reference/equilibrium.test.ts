import { describe, expect, test } from 'vitest';
import {
  griemPartialEquilibriumDensity,
  lowestEquilibratedLevel,
  mcWhirterDensity,
  sahaDensity,
  seriesLimitDensity,
} from '../../shared-core/physics/equilibrium.ts';
import { hydrogenLine } from '../../shared-core/physics/hydrogen.ts';
import { lineToContinuumRatio } from '../../shared-core/physics/line-to-continuum.ts';
import {
  debyeLengthM,
  equilibriumElectronDensity,
  hydrogenDissociationDensity,
  hydrogenPartitionFunction,
  ionisationLoweringEv,
  relaxationTimeS,
} from '../../shared-core/physics/local-equilibrium.ts';
import { checkKeys, checkValue, expectCheckValue, numberInput } from '../support/check-values.ts';

test('density for partial equilibrium (constant from memory)', () => {
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

test('density for local thermodynamic equilibrium (constant from memory)', () => {
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

test('density where the series merges (constant from memory)', () => {
  for (const key of checkKeys(/^inglis_teller/)) {
    expectCheckValue(key, seriesLimitDensity(numberInput(checkValue(key).inputs, 'n_max')) * 1e-6);
  }
});

test('partition function of the atom', () => {
  for (const key of checkKeys(/^partition_H/)) {
    const { inputs } = checkValue(key);
    expectCheckValue(
      key,
      hydrogenPartitionFunction(numberInput(inputs, 'T_K'), numberInput(inputs, 'n_max')),
    );
  }
});

test('Debye length and lowering of the ionisation energy', () => {
  const { inputs } = checkValue('debye_length_m');
  const at = [numberInput(inputs, 'Ne_m-3'), numberInput(inputs, 'T_K')] as const;
  expectCheckValue('debye_length_m', debyeLengthM(...at));
  expectCheckValue('debye_lowering_eV', ionisationLoweringEv(...at));
});

describe('electron density in equilibrium at a pressure', () => {
  test('atoms only', () => {
    for (const key of checkKeys(/^saha_ne_1atm/)) {
      const { inputs } = checkValue(key);
      expectCheckValue(
        key,
        equilibriumElectronDensity(numberInput(inputs, 'T_K'), numberInput(inputs, 'p_Pa'), 'atoms'),
      );
    }
  });

  test('molecules take part below 5000 K and are gone at 10 000 K', () => {
    const ratio = (kelvin: number) =>
      equilibriumElectronDensity(kelvin, 101_325) / equilibriumElectronDensity(kelvin, 101_325, 'atoms');
    expect(ratio(3000)).toBeLessThan(0.5);
    expect(ratio(10_000)).toBeGreaterThan(0.999);
  });

  test('dissociation: 3000 K, log10 of the equilibrium constant of H per bar -0.803 (JANAF tables, from memory)', () => {
    const constantBar = 10 ** (2 * -0.803);
    const found = (hydrogenDissociationDensity(3000) * 1.380649e-23 * 3000) / 1e5;
    expect(Math.abs(Math.log10(found / constantBar))).toBeLessThan(0.05);
  });
});

test('relaxation time (constant from memory)', () => {
  const { inputs } = checkValue('cristoforetti_tau_s');
  expectCheckValue(
    'cristoforetti_tau_s',
    relaxationTimeS(
      1e6 * numberInput(inputs, 'ne_cm-3'),
      numberInput(inputs, 'T_K'),
      numberInput(inputs, 'dE_eV'),
      numberInput(inputs, 'f12'),
      numberInput(inputs, 'gbar'),
    ),
  );
});

test('line over continuum of a dense plasma', () => {
  const levels: Readonly<Record<string, number>> = { Halpha: 3, Hbeta: 4, Hgamma: 5 };
  for (const key of checkKeys(/^line_to_continuum/)) {
    const line = hydrogenLine(levels[key.split('.')[1]!]!);
    expectCheckValue(key, lineToContinuumRatio(line, numberInput(checkValue(key).inputs, 'T_K'), 10));
  }
});
