import { describe, expect, test } from 'vitest';
import { absorbingProfile } from '../../../shared-core/optical-depth/absorbing-profile.ts';
import { dopplerFwhmNm } from '../../../shared-core/physics/broadening.ts';
import { atomicMassU } from '../../../shared-core/physics/constants.ts';
import { hydrogenLine } from '../../../shared-core/physics/hydrogen.ts';
import { lorentzianBeforehandNm } from '../../../shared-core/physics/line-widths.ts';
import { checkValue } from '../../support/check-values.ts';

const thin = { electronsPerCubicMetre: 0, deuteriumRatio: 0 };
const alpha = hydrogenLine(3);

describe('cross-section at the peak', () => {
  // Seven components with Dirac levels and the Lamb shifts of 2s and 3s, summed with NumPy: peak over that of one Doppler
  // profile of the same area.
  test.each([
    [300, 0.5447],
    [1000, 0.6231],
    [2000, 0.7597],
    [3000, 0.8296],
    [5000, 0.8928],
  ])('H-alpha at %d K: the fine structure leaves %d of it', (kelvin, left) => {
    const lamp = { gasTemperatureK: kelvin };
    const { peakPerNm, depthNmPerColumn } = absorbingProfile(alpha, { lamp, ...thin });
    const doppler = dopplerFwhmNm(alpha.wavelengthVacuumNm, kelvin, atomicMassU.H);
    // The natural width lowers the peak of a Voigt profile by 2 a/sqrt(pi).
    const a = (Math.sqrt(Math.LN2) * lorentzianBeforehandNm(alpha, lamp)) / doppler;
    const published = checkValue('sigma0_m2.Halpha.T1000').expected as number;
    const expected = published * Math.sqrt(1000 / kelvin) * left * (1 - (2 * a) / Math.sqrt(Math.PI));
    expect(Math.abs((peakPerNm * depthNmPerColumn) / expected - 1)).toBeLessThan(0.003);
  });
});

describe('the quadrature', () => {
  test.each([
    ['cold hydrogen', 300, 0, 0],
    ['hot hydrogen', 5000, 0, 0],
    ['with electrons', 1000, 1e21, 0],
    ['dense', 1000, 1e23, 0],
    ['a mixture with deuterium', 800, 1e19, 0.7],
  ])('holds the whole area of %s', (_name, gasTemperatureK, electronsPerCubicMetre, deuteriumRatio) => {
    for (const level of [3, 4, 7]) {
      const { weightNm, perNm } = absorbingProfile(hydrogenLine(level), {
        lamp: { gasTemperatureK },
        electronsPerCubicMetre,
        deuteriumRatio,
      });
      const area = weightNm.reduce((sum, weight, i) => sum + weight * perNm[i]!, 0);
      expect(Math.abs(area - 1)).toBeLessThan(3e-4);
    }
  });

  test('puts deuterium where its line is, with its share of the atoms', () => {
    const { offsetNm, weightNm, perNm } = absorbingProfile(alpha, {
      lamp: { gasTemperatureK: 800 },
      electronsPerCubicMetre: 0,
      deuteriumRatio: 0.25,
    });
    // Isotope shift of H-alpha: 656.279 - 656.101 nm (NIST Atomic Spectra Database).
    const near = (nm: number) => Math.abs(nm + 0.178) < 0.05;
    const share = offsetNm.reduce((sum, nm, i) => sum + (near(nm) ? weightNm[i]! * perNm[i]! : 0), 0);
    expect(Math.abs(share - 0.2)).toBeLessThan(0.002);
  });

  test('gives an atom the integrated depth pi r_e f lambda^2', () => {
    // f = 0.64108 (Wiese and Fuhr 2009): 3.14159 x 2.81794e-15 m x 0.64108 x (656.47 nm)^2 = 2.4458e-27 m^3, so
    // 2.4458e-18 nm for one atom per m^2.
    const { depthNmPerColumn } = absorbingProfile(alpha, { lamp: {}, ...thin });
    expect(Math.abs(depthNmPerColumn / 2.4458e-18 - 1)).toBeLessThan(1e-3);
  });
});
