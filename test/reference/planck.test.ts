import { expect, test } from 'vitest';
import {
  planckLogSlope,
  planckPhotonRadiance,
  planckRadiance,
  tungstenEmissivity,
} from '../../shared-core/physics/planck.ts';
import { checkKeys, checkValue, expectCheckValue, numberInput } from '../support/check-values.ts';
import { expectClose } from '../support/expect-close.ts';

test('black-body radiance', () => {
  for (const key of checkKeys(/^planck_W/)) {
    const { inputs } = checkValue(key);
    expectCheckValue(key, planckRadiance(numberInput(inputs, 'lambda_nm'), numberInput(inputs, 'T_K')));
  }
});

test('black-body radiance in photons', () => {
  const because = 'computed with 40 digits';
  expectClose(planckPhotonRadiance(656.279, 2856), { expected: 1.499558100963e21, rel: 1e-10, because });
  const ratio = planckPhotonRadiance(486.135, 2856) / planckPhotonRadiance(656.279, 2856);
  expectClose(ratio, { expected: 0.2261277437063, rel: 1e-10, because });
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

test('relative growth with temperature', () => {
  // x/(1 - e^-x) at x = 10.0755: 10.0759 at 500 nm, 2856 K (mpmath, 30 digits).
  expect(planckLogSlope(500, 2856)).toBeCloseTo(10.0759, 4);
});
