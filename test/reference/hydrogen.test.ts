import { describe, expect, test } from 'vitest';
import { airRefractivityCiddor, vacuumToAirNm } from '../../shared-core/physics/air-index.ts';
import type { HydrogenIsotope } from '../../shared-core/physics/constants.ts';
import {
  hydrogenLine,
  oscillatorStrength,
  statisticalWeight,
  transitionProbabilityPerS,
} from '../../shared-core/physics/hydrogen.ts';
import { levelEnergyEv, levelPerCm } from '../../shared-core/physics/hydrogen-levels.ts';
import { checkKeys, checkValue, expectCheckValue, numberInput } from '../support/check-values.ts';
import { expectClose } from '../support/expect-close.ts';

const isotopes: readonly HydrogenIsotope[] = ['H', 'D'];
const upperOf = (key: string): number => numberInput(checkValue(key).inputs, 'n_upper');
const lowerOf = (key: string): number => numberInput(checkValue(key).inputs, 'n_lower');
const levelOf = (key: string): number => numberInput(checkValue(key).inputs, 'n');

describe('levels', () => {
  test.each(isotopes)('of %s are the centroids of their fine structure', (isotope) => {
    for (const key of checkKeys(new RegExp(`^${isotope}\\.level_centroid_theory`))) {
      expectCheckValue(key, levelPerCm(levelOf(key), isotope));
    }
  });

  test('agree with the tabulated averages within 1e-6 eV, n = 2 within 6e-6', () => {
    // The published average of n = 2 lies 0.047 cm^-1 above the centroid of its states.
    for (const key of checkKeys(/^H\.level_nist_avg_eV/)) {
      const n = levelOf(key);
      const { expected, source } = checkValue(key);
      expectClose(levelEnergyEv(n), {
        expected: Number(expected),
        abs: n === 2 ? 6e-6 : 1e-6,
        because: source,
      });
    }
  });

  test('rise from the ground state', () => {
    expect(levelEnergyEv(1)).toBe(0);
    for (let n = 1; n < 40; n++) expect(levelEnergyEv(n + 1)).toBeGreaterThan(levelEnergyEv(n));
  });
});

describe('Balmer lines', () => {
  test.each(isotopes)('of %s have the wavelengths of their blends', (isotope) => {
    for (const key of checkKeys(new RegExp(`^${isotope}\\.balmer_centroid_vac`))) {
      expectCheckValue(key, hydrogenLine(upperOf(key), isotope).wavelengthVacuumNm);
    }
    for (const key of checkKeys(new RegExp(`^${isotope}\\.balmer_centroid_air_PR72`))) {
      expectCheckValue(key, hydrogenLine(upperOf(key), isotope).wavelengthAirNm);
    }
    for (const key of checkKeys(new RegExp(`^${isotope}\\.balmer_centroid_air_Ciddor`))) {
      const vacuum = hydrogenLine(upperOf(key), isotope).wavelengthVacuumNm;
      expectCheckValue(key, vacuumToAirNm(vacuum, airRefractivityCiddor));
    }
  });

  test('agree with observed wavelengths, the computed ones beyond n = 12 too', () => {
    for (const key of checkKeys(/^H\.balmer_nist_observed/)) {
      expectCheckValue(key, hydrogenLine(upperOf(key)).wavelengthAirNm);
    }
  });

  test.each(isotopes)(
    'of %s: the level formula that continues them meets the table at its end',
    (isotope) => {
      const computed = 1e7 / (levelPerCm(12, isotope) - levelPerCm(2, isotope));
      expectClose(computed, {
        expected: hydrogenLine(12, isotope).wavelengthVacuumNm,
        abs: 2.5e-5,
        because: 'blend centroid of n = 12',
      });
    },
  );

  test('carry names, weights and energies', () => {
    expect([3, 4, 5, 6, 7, 8, 20].map((n) => hydrogenLine(n).id)).toEqual([
      'H-alpha',
      'H-beta',
      'H-gamma',
      'H-delta',
      'H-epsilon',
      'H-8',
      'H-20',
    ]);
    expect(hydrogenLine(4, 'D').id).toBe('D-beta');
    const beta = hydrogenLine(4);
    expect(beta).toMatchObject({ upperLevel: 4, lowerLevel: 2, upperWeight: 32, isotope: 'H' });
    expect(beta.upperEnergyEv).toBe(levelEnergyEv(4));
    expect(beta.transitionProbabilityPerS).toBe(transitionProbabilityPerS(4, 2));
    expect(statisticalWeight(5)).toBe(50);
  });

  test.each([2, 21, 3.5, NaN])('refuse the upper level %d', (level) => {
    expect(() => hydrogenLine(level)).toThrow('upper levels 3 to 20');
  });
});

describe('transition probabilities', () => {
  test('oscillator strengths are exact', () => {
    for (const key of checkKeys(/^H\.f_abs/)) {
      expectCheckValue(key, oscillatorStrength(lowerOf(key), upperOf(key)));
    }
  });

  test('of hydrogen agree with the exact calculation and with the published tables', () => {
    for (const key of checkKeys(/^H\.A_(avg|nist)/)) {
      expectCheckValue(key, transitionProbabilityPerS(upperOf(key), lowerOf(key)));
    }
  });

  test('of deuterium are larger by the reduced mass', () => {
    expectClose(transitionProbabilityPerS(3, 2, 'D'), {
      expected: 4.4113517e7,
      rel: 1e-7,
      because: 'exact non-relativistic value times mu_D/m_e, computed with 40 digits',
    });
  });

  test('strengths from one level sum to nearly one electron, the rest being the continuum', () => {
    let sum = 0;
    for (let n = 2; n <= 44; n++) sum += oscillatorStrength(1, n);
    // H. A. Bethe, E. E. Salpeter (1957), table 13: discrete spectrum of 1s 0.5650.
    expectClose(sum, { expected: 0.565, abs: 5e-4, because: 'sum over the discrete Lyman lines' });
  });
});
