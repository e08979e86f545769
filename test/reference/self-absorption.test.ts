import { expect, test } from 'vitest';
import { dopplerFwhmNm } from '../../shared-core/physics/broadening.ts';
import { atomicMassU } from '../../shared-core/physics/constants.ts';
import {
  dopplerCrossSectionM2,
  gaussianAreaEscape,
  gaussianWidthRatio,
  lorentzianAreaEscape,
  lorentzianWidthRatio,
  peakEscape,
} from '../../shared-core/physics/self-absorption.ts';
import { checkKeys, checkValue, expectCheckValue, numberInput } from '../support/check-values.ts';

test('cross-section at the line centre', () => {
  for (const key of checkKeys(/^sigma0_m2/)) {
    const { inputs } = checkValue(key);
    const nm = numberInput(inputs, 'lambda_nm');
    const doppler = dopplerFwhmNm(nm, numberInput(inputs, 'T_K'), atomicMassU.H);
    expectCheckValue(key, dopplerCrossSectionM2(numberInput(inputs, 'f_abs'), nm, doppler));
  }
});

test('share of the light that leaves a slab', () => {
  for (const key of checkKeys(/^self_absorption/)) {
    const depth = numberInput(checkValue(key).inputs, 'tau0');
    expectCheckValue(key, peakEscape(depth), 'SA_peak');
    expectCheckValue(key, gaussianAreaEscape(depth), 'area_factor_gauss');
    expectCheckValue(key, lorentzianAreaEscape(depth), 'area_factor_lorentz');
    expectCheckValue(key, gaussianWidthRatio(depth), 'width_ratio_gauss');
    expectCheckValue(key, lorentzianWidthRatio(depth), 'width_ratio_lorentz');
  }
});

test('all of it leaves a thin one', () => {
  for (const escape of [peakEscape, gaussianAreaEscape, lorentzianAreaEscape]) {
    expect(escape(0)).toBe(1);
    expect(escape(1e-9)).toBeCloseTo(1, 8);
  }
  // Series and quotient meet: the slope there is -1/2 + tau/3.
  expect(peakEscape(0.999e-3) - peakEscape(1.001e-3)).toBeCloseTo(2e-6 * (0.5 - 1e-3 / 3), 11);
});
