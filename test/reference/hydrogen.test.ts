import { describe, expect, test } from 'vitest';
import { airRefractivityCiddor, vacuumToAirNm } from '../../shared-core/physics/air-index.ts';
import { constants, wavenumberPerEv, type HydrogenIsotope } from '../../shared-core/physics/constants.ts';
import {
  hydrogenLine,
  oscillatorStrength,
  seriesLine,
  statisticalWeight,
  transitionProbabilityPerS,
} from '../../shared-core/physics/hydrogen.ts';
import { ionisationPerCm, levelEnergyEv, levelPerCm } from '../../shared-core/physics/hydrogen-levels.ts';
import { radialIntegrals } from '../../shared-core/physics/radial-integrals.ts';
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

describe('the other series', () => {
  test('wavelengths as tabulated, vacuum below 200 nm and air above', () => {
    // NIST Atomic Spectra Database, averaged blends, from memory; Lyman in vacuum.
    for (const [upper, lower, nm] of [
      [2, 1, 121.567],
      [3, 1, 102.5722],
      [4, 3, 1875.1],
      [5, 3, 1281.807],
      [7, 3, 1004.98],
      [5, 4, 4051.16],
    ] as const) {
      const line = seriesLine(upper, lower);
      expectClose(lower === 1 ? line.wavelengthVacuumNm : line.wavelengthAirNm, {
        expected: nm,
        abs: lower === 1 ? 6e-4 : 0.06,
        because: `${line.id}, NIST ASD from memory`,
      });
    }
    expect(seriesLine(2, 1).wavelengthAirNm).toBe(seriesLine(2, 1).wavelengthVacuumNm);
  });

  test('names', () => {
    expect(
      [seriesLine(2, 1), seriesLine(9, 3), seriesLine(5, 4, 'D'), seriesLine(4, 2)].map(({ id }) => id),
    ).toEqual(['Lyman-alpha', 'Paschen-9', 'D Brackett-alpha', 'H-beta']);
  });

  test.each([
    [3, 5],
    [3, 3],
    [21, 1],
    [2.5, 1],
  ])('there is none from %d to %d', (upper, lower) => {
    expect(() => seriesLine(upper, lower)).toThrow('hydrogen lines end on the levels 1 to 4');
  });
});

test('rules of thumb of the trade hold, beside the published values', () => {
  // Common practice: 13.6 eV to ionise; -3.4 eV for the first excited level; 2.2e-18 J; R 1.0973732e7 per metre; 0.529 angstrom.
  const ionisationEv = ionisationPerCm() / wavenumberPerEv;
  expectClose(ionisationEv, { expected: 13.6, abs: 0.005, because: 'common practice' });
  expectCheckValue('H.ionization_eV', ionisationEv);
  expectCheckValue('H.ionization_cm-1', ionisationPerCm());
  expectClose(levelEnergyEv(2) - ionisationEv, { expected: -3.4, abs: 0.005, because: 'common practice' });
  expectClose(ionisationEv * constants.elementaryCharge.value, {
    expected: 2.2e-18,
    abs: 0.03e-18,
    because: 'common practice',
  });
  expectClose(constants.rydberg.value, { expected: 1.0973732e7, abs: 0.5, because: 'common practice' });
  expectClose(constants.bohrRadius.value, { expected: 0.529e-10, abs: 5e-14, because: 'common practice' });
  // Shortest (series limit) to longest Lyman wavelength 3 : 4, as 1/(1 - 1/4) says.
  expectClose(1e7 / ionisationPerCm() / seriesLine(2, 1).wavelengthVacuumNm, {
    expected: 3 / 4,
    rel: 1e-5,
    because: 'common practice',
  });
});

test('squared radial integrals as tabulated', () => {
  const { upperAbove, upperBelow } = radialIntegrals(3, 2);
  expectCheckValue('H.radial_sq_a0^2.2p-1s', radialIntegrals(2, 1).upperAbove[1]!);
  expectCheckValue('H.radial_sq_a0^2.3p-2s', upperAbove[1]!);
  expectCheckValue('H.radial_sq_a0^2.3d-2p', upperAbove[2]!);
  expectCheckValue('H.radial_sq_a0^2.3s-2p', upperBelow[1]!);
});

test('published averages of the levels, cm^-1, agree within 0.006, n = 2 within 0.05', () => {
  for (const key of checkKeys(/^H\.level_nist_avg_cm-1/)) {
    const n = levelOf(key);
    // The average of n = 2 derives from the solar corona and lies 0.047 above the centroid of its states.
    expectClose(levelPerCm(n), {
      expected: Number(checkValue(key).expected),
      abs: n === 2 ? 0.05 : 0.006,
      because: checkValue(key).source,
    });
  }
});

test('Gaunt factors: oscillator strength over the semiclassical one of Kramers', () => {
  for (const key of checkKeys(/^H\.gaunt_bb/)) {
    const [upper, lower] = [upperOf(key), lowerOf(key)];
    const gap = 1 / (lower * lower) - 1 / (upper * upper);
    const kramers = 32 / (3 * Math.sqrt(3) * Math.PI) / (lower ** 5 * upper ** 3 * gap ** 3);
    expectCheckValue(key, oscillatorStrength(lower, upper) / kramers);
  }
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
