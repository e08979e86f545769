import { describe, expect, test } from 'vitest';
import {
  dopplerFwhmNm,
  naturalFwhmNm,
  perturbers,
  resonanceFwhmNm,
  vanDerWaalsFwhmNm,
} from '../../shared-core/physics/broadening.ts';
import { atomicMassU, constants } from '../../shared-core/physics/constants.ts';
import { checkKeys, checkValue, expectCheckValue, numberInput } from '../support/check-values.ts';
import { expectClose } from '../support/expect-close.ts';

test('Doppler widths', () => {
  for (const key of checkKeys(/^doppler_fwhm_nm/)) {
    const { inputs } = checkValue(key);
    const [nm, kelvin, mass] = ['lambda_nm', 'T_K', 'M_u'].map((name) => numberInput(inputs, name));
    expectCheckValue(key, dopplerFwhmNm(nm!, kelvin!, mass!));
  }
  expectCheckValue('derived.doppler_fwhm_const', dopplerFwhmNm(1, 1, 1));
});

test.each([
  ['Halpha', 656.461, 3],
  ['Hbeta', 486.268, 4],
  ['Hgamma', 434.168, 5],
])('natural width of %s', (name, nm, upper) => {
  expectCheckValue(`natural_fwhm_fm.${name}`, naturalFwhmNm(nm, upper, 2) * 1e6);
});

test.each([
  ['Hbeta_Ar', 4, perturbers.Ar],
  ['Halpha_H2', 3, perturbers.H2],
])('van der Waals width of %s at 1000 K and 1 bar', (name, upper, perturber) => {
  const key = `vdw.lindholm_foley_fwhm_nm.${name}_1000K_1bar`;
  const { inputs } = checkValue(key);
  expect(perturber.polarisabilityA3).toBe(inputs['alpha_A3']);
  const nm = numberInput(inputs, 'lambda_nm');
  expectCheckValue(key, vanDerWaalsFwhmNm(nm, upper, atomicMassU.H, perturber, 1e5, 1000));
});

// Static dipole polarisabilities in a_0^3, from memory: P. Schwerdtfeger, J. K. Nagle, Mol. Phys. 117, 1200 (2019) for
// the atoms, orientation averages of common tables for the molecules.
test.each([
  ['H', 4.5],
  ['H2', 5.41],
  ['D2', 5.36],
  ['He', 1.384],
  ['Ne', 2.661],
  ['Ar', 11.08],
  ['N2', 11.74],
] as const)('polarisability of %s', (gas, atomicUnits) => {
  const a0InAngstrom = constants.bohrRadius.value * 1e10;
  expectClose(perturbers[gas].polarisabilityA3, {
    expected: atomicUnits * Math.pow(a0InAngstrom, 3),
    rel: 0.01,
    because: 'polarisability in atomic units, from memory',
  });
});

describe('van der Waals coefficient, width times T^0.7 over pressure', () => {
  // nm K^0.7/atm by Lindholm-Foley, computed independently to three digits at these air wavelengths.
  test.each([
    ['Ar', 4.23, 4.39],
    ['H2', 3.56, 3.7],
    ['H', 3.6, 3.74],
    ['He', 1.95, 2.03],
    ['N2', 4.34, 4.51],
  ] as const)('%s', (gas, alpha, beta) => {
    for (const [expected, nm, upper] of [
      [alpha, 656.28, 3],
      [beta, 486.135, 4],
    ] as const) {
      for (const kelvin of [300, 1000, 3000]) {
        const width = vanDerWaalsFwhmNm(nm, upper, atomicMassU.H, perturbers[gas], 101325, kelvin);
        expectClose(width * Math.pow(kelvin, 0.7), { expected, abs: 0.005, because: 'Lindholm-Foley' });
      }
    }
  });
});

describe('resonance widths', () => {
  test.each([
    ['Halpha', 3],
    ['Hbeta', 4],
    ['Hgamma', 5],
  ])('of %s at full dissociation', (name, upper) => {
    const key = `resonance_fwhm_coeff_nm_K_per_atm.${name}`;
    const atomsAtOneKelvin = 101325 / constants.boltzmann.value;
    const nm = numberInput(checkValue(key).inputs, 'lambda_nm');
    expectCheckValue(key, resonanceFwhmNm(nm, upper, atomsAtOneKelvin));
  });

  test('of H-beta agrees with the published coefficient', () => {
    expectClose(resonanceFwhmNm(486.135, 4, 101325 / constants.boltzmann.value), {
      expected: 30.2,
      rel: 0.01,
      because: 'C. O. Laux et al., Plasma Sources Sci. Technol. 12, 125 (2003), from memory',
    });
  });
});
