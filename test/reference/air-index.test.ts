import { expect, test } from 'vitest';
import {
  airRefractivity,
  airRefractivityCiddor,
  airToVacuumNm,
  vacuumToAirNm,
} from '../../shared-core/physics/air-index.ts';
import { checkKeys, checkValue, expectCheckValue, numberInput } from '../support/check-values.ts';

const formulas = { PeckReeder1972: airRefractivity, Ciddor1996: airRefractivityCiddor };

test.each(Object.entries(formulas))('refractivity of %s', (name, refractivity) => {
  for (const key of checkKeys(new RegExp(`^n-1_x1e8\\.${name}\\.`))) {
    expectCheckValue(key, refractivity(numberInput(checkValue(key).inputs, 'lambda_vac_nm')) * 1e8);
  }
});

test.each([
  ['PR72', airRefractivity],
  ['Ciddor', airRefractivityCiddor],
])('wavelengths from vacuum to air and back, %s', (name, refractivity) => {
  for (const key of checkKeys(new RegExp(`^vac_to_air_${name}_nm`))) {
    expectCheckValue(key, vacuumToAirNm(numberInput(checkValue(key).inputs, 'lambda_vac_nm'), refractivity));
  }
  for (const key of checkKeys(new RegExp(`^air_to_vac_${name}_nm`))) {
    expectCheckValue(key, airToVacuumNm(numberInput(checkValue(key).inputs, 'lambda_air_nm'), refractivity));
  }
});

test('there and back again changes nothing, and the two formulas agree within 0.015 pm', () => {
  for (let nm = 230; nm <= 1000; nm += 7.7) {
    expect(Math.abs(vacuumToAirNm(airToVacuumNm(nm)) - nm)).toBeLessThan(1e-12 * nm);
    expect(Math.abs(airRefractivity(nm) - airRefractivityCiddor(nm)) * nm).toBeLessThan(1.6e-5);
  }
});
