import { describe, expect, test } from 'vitest';
import { naturalFwhmNm } from '../../shared-core/physics/broadening.ts';
import { hydrogenLine } from '../../shared-core/physics/hydrogen.ts';
import {
  defaultGasTemperatureK,
  lorentzianBeforehandNm,
  thermalFwhmSquaredNm2,
} from '../../shared-core/physics/line-widths.ts';
import { checkValue, expectCheckValue, numberInput } from '../support/check-values.ts';
import { expectClose } from '../support/expect-close.ts';

const alpha = hydrogenLine(3);
const beta = hydrogenLine(4);

describe('fine structure', () => {
  test.each([
    ['Halpha', 3],
    ['Hbeta', 4],
    ['Hgamma', 5],
  ])('of %s has the spread of its components', (name, upper) => {
    expectCheckValue(`fine_structure.${name}_rms_spread_pm`, hydrogenLine(upper).fineStructureRmsNm * 1e3);
  });

  test.each([
    [6, 0.1714],
    [8, 0.1728],
    [12, 0.1735],
    [20, 0.1737],
  ])('of the line from n = %d is within 2 %% of %d per cm', (upper, expected) => {
    const line = hydrogenLine(upper);
    expectClose((line.fineStructureRmsNm * 1e7) / line.wavelengthVacuumNm ** 2, {
      expected,
      rel: 0.02,
      because: 'all components by Dirac energies, Lamb shift and line strengths, computed independently',
    });
  });

  test('in wavenumbers rises smoothly from the computed lines to the estimated ones', () => {
    const perCm = [3, 4, 5, 6, 7, 12].map((n) => {
      const line = hydrogenLine(n);
      return (line.fineStructureRmsNm * 1e7) / line.wavelengthVacuumNm ** 2;
    });
    for (let i = 1; i < perCm.length; i++) expect(perCm[i]).toBeGreaterThanOrEqual(perCm[i - 1]! - 1e-12);
    // The 2p doublet alone, 0.365892 cm^-1 with weights 2:1, spreads by its rms 0.1725 cm^-1.
    expect(perCm[5]).toBeGreaterThan(0.365892 * Math.sqrt(2 / 9));
  });
});

describe('Gaussian part', () => {
  test('is within a few per cent of the whole blend where Doppler broadening rules', () => {
    // The blend of H-beta at 3000 K, summed component by component; the rms rule holds for its far wider instrument.
    const key = 'fine_structure.fwhm_of_doppler_blend_pm.Hbeta.T3000';
    const { expected, source } = checkValue(key);
    const kelvin = numberInput(checkValue(key).inputs, 'T_K');
    const pm = Math.sqrt(thermalFwhmSquaredNm2(beta, { gasTemperatureK: kelvin })) * 1e3;
    expectClose(pm, { expected: Number(expected), rel: 0.04, because: source });
  });

  test('adds Doppler and fine structure in quadrature', () => {
    const doppler = Number(checkValue('doppler_fwhm_nm.Halpha.T1000').expected);
    const fine = 2.3548200450309493 * 6.763e-3;
    expectClose(thermalFwhmSquaredNm2(alpha, { gasTemperatureK: 1000 }), {
      expected: doppler * doppler + fine * fine,
      rel: 1e-3,
      because: 'reference Doppler width (air wavelength) and fine structure',
    });
  });

  test('takes 1000 K when the bench is silent, and is narrower for deuterium', () => {
    expect(thermalFwhmSquaredNm2(beta, {})).toBe(
      thermalFwhmSquaredNm2(beta, { gasTemperatureK: defaultGasTemperatureK }),
    );
    expect(thermalFwhmSquaredNm2(hydrogenLine(4, 'D'), {})).toBeLessThan(thermalFwhmSquaredNm2(beta, {}));
  });
});

describe('Lorentz part before Stark broadening', () => {
  test('is natural alone while the pressure is not known', () => {
    expect(lorentzianBeforehandNm(beta, { gas: 'Ar' })).toBe(naturalFwhmNm(beta.wavelengthVacuumNm, 4, 2));
  });

  // Sizes computed independently, pm; Lindholm-Foley, natural width added.
  test.each([
    [alpha, 'H2', 100, 300, 0.065 + 0.13],
    [alpha, 'H2', 1e4, 1000, 2.8 + 0.13],
    [beta, 'Ar', 1e5, 1000, 34.4 + 0.06],
    [beta, 'Ar', 1e5, 3000, 16 + 0.06],
  ])('of $id', (line, gas, pressurePa, gasTemperatureK, pm) => {
    expectClose(lorentzianBeforehandNm(line, { gas, pressurePa, gasTemperatureK }) * 1e3, {
      expected: pm,
      rel: 0.03,
      because: 'van der Waals and natural widths to two digits, computed independently',
    });
  });

  test('takes an unnamed or unknown gas as hydrogen, and names without regard to case', () => {
    const at = { pressurePa: 1e5 };
    const hydrogen = lorentzianBeforehandNm(beta, { ...at, gas: 'H2' });
    expect(lorentzianBeforehandNm(beta, at)).toBe(hydrogen);
    expect(lorentzianBeforehandNm(beta, { ...at, gas: 'forming gas' })).toBe(hydrogen);
    expect(lorentzianBeforehandNm(beta, { ...at, gas: ' ar ' })).toBeGreaterThan(hydrogen);
  });
});
