import { expect, test } from 'vitest';
import { planckRadiance, tungstenEmissivity } from '../../shared-core/physics/planck.ts';
import { checkKeys, checkValue, expectCheckValue, numberInput } from '../support/check-values.ts';

test('black-body radiance', () => {
  for (const key of checkKeys(/^planck_W/)) {
    const { inputs } = checkValue(key);
    expectCheckValue(key, planckRadiance(numberInput(inputs, 'lambda_nm'), numberInput(inputs, 'T_K')));
  }
});

test('emissivity of tungsten', () => {
  for (const key of checkKeys(/^tungsten_emissivity/)) {
    const { inputs } = checkValue(key);
    expectCheckValue(
      key,
      tungstenEmissivity(numberInput(inputs, 'lambda_um') * 1e3, numberInput(inputs, 'T_K')),
    );
  }
});

test('its pieces join within 0.001', () => {
  for (const kelvin of [1600, 2000, 2400]) {
    for (const nm of [450, 680]) {
      expect(Math.abs(tungstenEmissivity(nm, kelvin) - tungstenEmissivity(nm - 1e-9, kelvin))).toBeLessThan(
        1e-3,
      );
    }
  }
});
