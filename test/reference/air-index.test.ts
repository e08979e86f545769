import { describe, expect, test } from 'vitest';
import {
  airRefractivity,
  airRefractivityCiddor,
  airToVacuumNm,
  vacuumToAirNm,
} from '../../shared-core/physics/air-index.ts';
import { moistAirRefractivity } from '../../shared-core/physics/moist-air.ts';
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

describe('moist air', () => {
  test('dry, at other temperatures and pressures', () => {
    for (const key of checkKeys(/^ciddor_full_dry/)) {
      const { inputs } = checkValue(key);
      const air = { celsius: numberInput(inputs, 't_C'), pressurePa: numberInput(inputs, 'p_Pa') };
      expectCheckValue(key, moistAirRefractivity(1e3 * numberInput(inputs, 'lambda_vac_um'), air) * 1e8);
    }
  });

  test('with humidity', () => {
    for (const key of checkKeys(/^ciddor_full_moist/)) {
      const { inputs } = checkValue(key);
      const air = {
        celsius: numberInput(inputs, 't_C'),
        pressurePa: numberInput(inputs, 'p_Pa'),
        relativeHumidity: numberInput(inputs, 'RH'),
      };
      expectCheckValue(key, moistAirRefractivity(1e3 * numberInput(inputs, 'lambda_vac_um'), air) * 1e8);
    }
  });

  test('at 15 C, 101 325 Pa, dry, it is the standard formula', () => {
    for (const nm of [350, 486, 656, 900]) {
      const moist = moistAirRefractivity(nm, { celsius: 15, pressurePa: 101_325 });
      expect(Math.abs(moist - airRefractivityCiddor(nm))).toBeLessThan(1e-12);
    }
  });
});

/** Other published forms, s2 in um^-2, n - 1 in 1e-8: what the program does not use has to agree with what it does. */
const otherForms: Readonly<Record<string, (s2: number) => number>> = {
  // B. Edlen, Metrologia 2, 71 (1966); coefficients from memory.
  Edlen1966: (s2) => 8342.13 + 2406030 / (130 - s2) + 15997 / (38.9 - s2),
  // B. Edlen, J. Opt. Soc. Am. 43, 339 (1953), as in D. C. Morton, Astrophys. J. Suppl. Ser. 77, 119 (1991); from memory.
  Edlen1953_Morton1991: (s2) => 6432.8 + 2949810 / (146 - s2) + 25540 / (41 - s2),
  // K. P. Birch, M. J. Downs, Metrologia 31, 315 (1994), as in D. C. Morton, ibid. 130, 403 (2000); from memory.
  BirchDowns1994_Morton2000: (s2) => 8342.54 + 2406147 / (130 - s2) + 15998 / (38.9 - s2),
};

test.each(Object.entries(otherForms))(
  '%s has its published values and lies within 2e-8 of ours',
  (name, form) => {
    for (const key of checkKeys(new RegExp(`^n-1_x1e8\\.${name}`))) {
      const nm = numberInput(checkValue(key).inputs, 'lambda_vac_nm');
      const value = form(1e6 / (nm * nm));
      expectCheckValue(key, value);
      expect(Math.abs(value - airRefractivity(nm) * 1e8)).toBeLessThan(2);
    }
  },
);
