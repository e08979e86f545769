import { describe, expect, test } from 'vitest';
import {
  boltzmannEvPerK,
  constants,
  firstRadiationConstant,
  photonEnergyEvNm,
  reducedMassRatio,
  rydbergPerM,
  secondRadiationConstantMK,
  wavenumberPerEv,
} from '../../shared-core/physics/constants.ts';
import { levelEnergyEv } from '../../shared-core/physics/hydrogen-levels.ts';
import { checkValue, expectCheckValue } from '../support/check-values.ts';
import { expectClose } from '../support/expect-close.ts';

describe('CODATA 2022', () => {
  test.each([
    ['c', constants.speedOfLight],
    ['h', constants.planck],
    ['e', constants.elementaryCharge],
    ['k', constants.boltzmann],
    ['N_A', constants.avogadro],
    ['R_inf', constants.rydberg],
    ['alpha', constants.fineStructure],
    ['m_e', constants.electronMass],
    ['mp_over_me', constants.protonPerElectronMass],
    ['md_over_me', constants.deuteronPerElectronMass],
    ['u', constants.atomicMassUnit],
    ['a0', constants.bohrRadius],
    ['eps0', constants.vacuumPermittivity],
    ['r_e', constants.classicalElectronRadius],
  ])('%s has the recommended value, unit and uncertainty', (key, constant) => {
    const { expected, inputs, tolerance } = checkValue(`codata2022.${key}`);
    expect(constant.value).toBe(expected);
    expect(constant.unit).toBe(inputs['unit']);
    expect(constant.standardUncertainty).toBe(tolerance.abs);
  });

  test('the constants agree with each other', () => {
    const { fineStructure, electronMass, speedOfLight, planck, rydberg, elementaryCharge } = constants;
    const alpha = fineStructure.value;
    expectClose((alpha * alpha * electronMass.value * speedOfLight.value) / (2 * planck.value), {
      expected: rydberg.value,
      rel: 4e-10,
      because: 'R_inf = alpha^2 m_e c/(2h), within the uncertainty of m_e',
    });
    const permittivity = elementaryCharge.value ** 2 / (2 * alpha * planck.value * speedOfLight.value);
    expectClose(permittivity, {
      expected: constants.vacuumPermittivity.value,
      rel: 4e-10,
      because: 'eps_0 = e^2/(2 alpha h c)',
    });
  });
});

test.each([
  ['derived.hc_eV_nm', photonEnergyEvNm],
  ['derived.k_eV_per_K', boltzmannEvPerK],
  ['derived.eV_in_cm-1', wavenumberPerEv],
  ['derived.c2_hc_over_k', secondRadiationConstantMK],
  ['derived.c1L_2hc2', firstRadiationConstant],
  ['derived.eV_over_k', 1 / boltzmannEvPerK],
  ['derived.c1_2pi_hc2', Math.PI * firstRadiationConstant],
  [
    'derived.stefan_boltzmann',
    (2 * Math.PI ** 5 * constants.boltzmann.value ** 4) /
      (15 * constants.planck.value ** 3 * constants.speedOfLight.value ** 2),
  ],
  ['derived.R_H_hc_eV', rydbergPerM.H * photonEnergyEvNm * 1e-9],
  ['derived.pi_re_c', Math.PI * constants.classicalElectronRadius.value * constants.speedOfLight.value],
  [
    'derived.8pi2_re_c',
    8 * Math.PI ** 2 * constants.classicalElectronRadius.value * constants.speedOfLight.value,
  ],
  ['derived.R_H', rydbergPerM.H],
  ['derived.R_D', rydbergPerM.D],
  ['derived.mu_H/me', reducedMassRatio.H],
  ['derived.mu_D/me', reducedMassRatio.D],
])('%s follows', (key, value) => {
  expectCheckValue(key, value);
});

test('masses of the atoms: nuclear mass plus electron, less the binding of the electron', () => {
  const { protonPerElectronMass, deuteronPerElectronMass, electronMass, atomicMassUnit, speedOfLight } =
    constants;
  const electronU = electronMass.value / atomicMassUnit.value;
  const bindingU =
    (levelEnergyEv(1000) * constants.elementaryCharge.value) / speedOfLight.value ** 2 / atomicMassUnit.value;
  expectClose(constants.hydrogenMass.value, {
    expected: (1 + protonPerElectronMass.value) * electronU - bindingU,
    abs: 1e-9,
    because: 'm_p + m_e - 13.6 eV',
  });
  expectClose(constants.deuteriumMass.value, {
    expected: (1 + deuteronPerElectronMass.value) * electronU - bindingU,
    abs: 1e-9,
    because: 'm_d + m_e - 13.6 eV',
  });
});
