import { describe, expect, test } from 'vitest';
import { dopplerFwhmNm } from '../../shared-core/physics/broadening.ts';
import { atomicMassU, constants } from '../../shared-core/physics/constants.ts';
import { blendCentroid, fineStructureComponents } from '../../shared-core/physics/fine-structure.ts';
import { oscillatorStrength, transitionProbabilityPerS } from '../../shared-core/physics/hydrogen.ts';
import { ionisationPerCm, statePerCm } from '../../shared-core/physics/hydrogen-levels.ts';
import { radialIntegrals } from '../../shared-core/physics/radial-integrals.ts';
import { checkKeys, checkValue, expectCheckValue, numberInput } from '../support/check-values.ts';
import { expectClose } from '../support/expect-close.ts';

const picometres = (perCm: number, atPerCm: number): number => (perCm / atPerCm / atPerCm) * 1e10;

describe('states', () => {
  test('the 2p doublet, the Lamb shift of 2s and the ionisation energy', () => {
    expectCheckValue('fine_structure.2p_doublet_cm-1', statePerCm(2, 1, 3, 'H') - statePerCm(2, 1, 1, 'H'));
    // 2s1/2 - 2p1/2, measured 1057.845 MHz (S. R. Lundeen, F. M. Pipkin, Metrologia 22, 9 (1986)); from memory.
    const lambMhz =
      (statePerCm(2, 0, 1, 'H') - statePerCm(2, 1, 1, 'H')) * constants.speedOfLight.value * 1e-4;
    expectClose(lambMhz, { expected: 1057.845, abs: 2, because: 'Lundeen and Pipkin 1986, from memory' });
    // NIST Atomic Spectra Database, from memory.
    expectClose(ionisationPerCm('H'), {
      expected: 109678.77174307,
      abs: 1e-4,
      because: 'NIST ASD, from memory',
    });
    expectClose(ionisationPerCm('D'), {
      expected: 109708.614553,
      abs: 3e-4,
      because: 'NIST ASD, from memory',
    });
  });
});

describe('components', () => {
  test('their number, and shares that sum to one', () => {
    for (const [upper, lower, count] of [
      [2, 1, 2],
      [3, 2, 7],
      [8, 2, 7],
      [4, 3, 13],
    ] as const) {
      const components = fineStructureComponents(upper, lower);
      expect(components).toHaveLength(count);
      expectClose(
        components.reduce((sum, { share }) => sum + share, 0),
        {
          expected: 1,
          abs: 1e-14,
          because: 'shares',
        },
      );
    }
  });

  test('the strongest of H-alpha and H-beta, and of D-alpha', () => {
    // Own calculation with 40 digits outside the program; 656.10665 nm in air is the line often quoted for D-alpha.
    const strongest = (upper: number, isotope: 'H' | 'D') =>
      [...fineStructureComponents(upper, 2, isotope)].sort((a, b) => b.share - a.share);
    for (const [upper, expected] of [
      [
        3,
        [
          [656.46647, 0.489],
          [656.45225, 0.271],
          [656.45377, 0.113],
        ],
      ],
      [
        4,
        [
          [486.27195, 0.459],
          [486.26366, 0.255],
          [486.26449, 0.144],
        ],
      ],
    ] as const) {
      for (const [index, [nm, share]] of expected.entries()) {
        const found = strongest(upper, 'H')[index]!;
        expectClose(1e7 / found.wavenumberPerCm, { expected: nm, abs: 1.2e-5, because: 'component' });
        expectClose(found.share, { expected: share, abs: 6e-4, because: 'its share' });
      }
    }
  });

  test('spread and splitting', () => {
    for (const [name, upper] of [
      ['Halpha', 3],
      ['Hbeta', 4],
      ['Hgamma', 5],
    ] as const) {
      const components = fineStructureComponents(upper, 2);
      const { wavenumberPerCm, rmsPerCm } = blendCentroid(components);
      expectCheckValue(`fine_structure.${name}_rms_spread_pm`, picometres(rmsPerCm, wavenumberPerCm));
      if (upper === 5) continue;
      const [first, second] = [...components].sort((a, b) => b.share - a.share);
      expectCheckValue(
        `fine_structure.${name}_main_pair_separation_pm`,
        picometres(Math.abs(first!.wavenumberPerCm - second!.wavenumberPerCm), wavenumberPerCm),
      );
    }
  });

  test('the Doppler-broadened blend is as wide as calculated elsewhere', () => {
    for (const key of checkKeys(/^fine_structure\.fwhm_of_doppler_blend/)) {
      const upper = key.includes('Halpha') ? 3 : 4;
      const components = fineStructureComponents(upper, 2);
      const centre = 1e7 / blendCentroid(components).wavenumberPerCm;
      const kelvin = numberInput(checkValue(key).inputs, 'T_K');
      const sigma = dopplerFwhmNm(centre, kelvin, atomicMassU.H) / 2.3548200450309493;
      const light = (nm: number): number =>
        components.reduce((sum, { wavenumberPerCm, share }) => {
          const from = (nm - 1e7 / wavenumberPerCm) / sigma;
          return sum + share * Math.exp(-0.5 * from * from);
        }, 0);
      const grid = Array.from({ length: 8001 }, (_, i) => centre - 0.04 + i * 1e-5);
      const values = grid.map(light);
      const half = Math.max(...values) / 2;
      const inside = grid.filter((_, i) => values[i]! >= half);
      expectCheckValue(key, (inside.at(-1)! - inside[0]!) * 1e3);
    }
  });
});

describe('radial integrals', () => {
  test('squared, in a_0^2, against their closed values', () => {
    // 2^15/3^9 and the values of H. A. Bethe, E. E. Salpeter (1957), table 13.
    expectClose(radialIntegrals(2, 1).upperAbove[1]!, {
      expected: 32768 / 19683,
      rel: 1e-12,
      because: '2p-1s',
    });
    const { upperAbove, upperBelow } = radialIntegrals(3, 2);
    expectClose(upperAbove[1]!, { expected: 9.39309347635, rel: 1e-11, because: '3p-2s' });
    expectClose(upperAbove[2]!, {
      expected: 22.543424343244803,
      rel: 1e-11,
      because: '3d-2p, by quadrature',
    });
    expectClose(upperBelow[1]!, { expected: 0.880602513408, rel: 1e-11, because: '3s-2p' });
  });

  test('summed they give the averaged oscillator strength of the closed form', () => {
    for (const [upper, lower] of [
      [2, 1],
      [3, 2],
      [20, 2],
      [12, 3],
      [20, 4],
    ] as const) {
      const { upperAbove, upperBelow } = radialIntegrals(upper, lower);
      let sum = 0;
      for (let l = 1; l <= lower; l++) sum += l * (upperAbove[l]! + (l < lower ? upperBelow[l]! : 0));
      const gap = 1 / (lower * lower) - 1 / (upper * upper);
      expectClose((gap * sum) / (3 * lower * lower), {
        expected: oscillatorStrength(lower, upper),
        rel: 1e-11,
        because: 'Menzel and Pekeris',
      });
    }
    expect(transitionProbabilityPerS(3, 2)).toBeGreaterThan(4.4e7);
  });
});
