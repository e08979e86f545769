import { hBetaTabulatedFwhmNm } from '../../shared-core/physics/stark-table.ts';
import { describe, expect, test } from 'vitest';
import {
  electronDensityFromHAlpha,
  electronDensityFromHBeta,
  hAlphaStarkFwhaNm,
  hAlphaStarkRelativeSigma,
  hBetaStarkFwhmNm,
  hBetaStarkRelativeSigma,
  starkValidity,
  starkWidthRelativeToHBeta,
} from '../../shared-core/physics/stark.ts';
import { checkKeys, checkValue, expectCheckValue, numberInput } from '../support/check-values.ts';
import { expectClose } from '../support/expect-close.ts';

describe('width laws', () => {
  test('give the published widths', () => {
    for (const key of checkKeys(/^stark\.Halpha_FWHA_nm/)) {
      expectCheckValue(key, hAlphaStarkFwhaNm(numberInput(checkValue(key).inputs, 'Ne_m-3')));
    }
    for (const key of checkKeys(/^stark\.Hbeta_FWHM_nm/)) {
      expectCheckValue(key, hBetaStarkFwhmNm(numberInput(checkValue(key).inputs, 'Ne_m-3')));
    }
  });

  test('invert', () => {
    for (const key of checkKeys(/^stark\.Ne_from_Halpha/)) {
      expectCheckValue(key, electronDensityFromHAlpha(numberInput(checkValue(key).inputs, 'FWHA_nm')));
    }
    for (const key of checkKeys(/^stark\.Ne_from_Hbeta/)) {
      expectCheckValue(key, electronDensityFromHBeta(numberInput(checkValue(key).inputs, 'FWHM_nm')));
    }
    for (
      let density = starkValidity.lowPerCubicMetre;
      density <= starkValidity.highPerCubicMetre;
      density *= 10
    ) {
      expect(electronDensityFromHBeta(hBetaStarkFwhmNm(density)) / density).toBeCloseTo(1, 12);
      expect(electronDensityFromHAlpha(hAlphaStarkFwhaNm(density)) / density).toBeCloseTo(1, 12);
    }
  });

  test('take the full width of H-alpha, not the half width', () => {
    expect(checkValue('simulation.Halpha_FWHA_nm').expected).toBeGreaterThan(0.9);
    expectClose(hAlphaStarkFwhaNm(1e23), {
      expected: Number(checkValue('simulation.Halpha_FWHA_nm').expected),
      rel: hAlphaStarkRelativeSigma,
      because: 'independent simulation of the microfield at 1e23 m^-3, 1e4 K',
    });
  });

  test('H-beta stays within its stated uncertainty of an independent theory', () => {
    // Kepple-Griem widths as in the NIST compendium; 1e4 to 3e4 K, 1e21 to 1e23 m^-3.
    const keys = checkKeys(/^stark\.Hbeta_Griem_FWHM_nm\.T[123]0000_Ne1e\+1[567]/);
    expect(keys).toHaveLength(9);
    for (const key of keys) {
      const { expected, inputs, source } = checkValue(key);
      const density = numberInput(inputs, 'Ne_cm-3') * 1e6;
      expectClose(hBetaStarkFwhmNm(density), {
        expected: Number(expected),
        rel: hBetaStarkRelativeSigma,
        because: source,
      });
    }
  });
});

describe('widths against H-beta', () => {
  // Full widths at 1e4 K of C. Stehle, R. Hutcheon, Astron. Astrophys. Suppl. Ser. 140, 93 (1999), nm, Doppler
  // included: it counts for less than 3 % of H-beta, H-gamma and H-delta at these densities.
  test.each([
    [1e21, 0.1994, 0.2498, 0.4089],
    [1e22, 0.9307, 1.1721, 2.0092],
    [1e23, 4.4717, 5.6363, 9.3118],
  ])('at %d per m^3', (_density, beta, gamma, delta) => {
    expectClose(starkWidthRelativeToHBeta(5).ratio, { expected: gamma / beta, rel: 0.02, because: 'Stehle' });
    expectClose(starkWidthRelativeToHBeta(6).ratio, { expected: delta / beta, rel: 0.04, because: 'Stehle' });
  });

  test('of H-alpha is the ratio of the two laws at 1e23 per m^3', () => {
    expectClose(starkWidthRelativeToHBeta(3).ratio, {
      expected: hAlphaStarkFwhaNm(1e23) / hBetaStarkFwhmNm(1e23),
      rel: 2e-3,
      because: 'Gigosos et al. 2003',
    });
    expect(starkWidthRelativeToHBeta(4).ratio).toBe(1);
  });

  test('rise with the level and become less certain', () => {
    for (let n = 4; n < 20; n++) {
      const here = starkWidthRelativeToHBeta(n);
      const next = starkWidthRelativeToHBeta(n + 1);
      expect(next.ratio).toBeGreaterThan(here.ratio);
      expect(next.relativeSigma).toBeGreaterThanOrEqual(here.relativeSigma);
    }
  });

  test('of the lines beyond H-delta would describe H-gamma and H-delta too, within their uncertainty', () => {
    // 0.95 lambda^2 n (n - 1) against the tabulated ratios.
    const scaling = (nm: number, n: number): number => (0.95 * (nm / 486.268) ** 2 * n * (n - 1)) / 12;
    const { relativeSigma } = starkWidthRelativeToHBeta(7);
    expectClose(scaling(434.168, 5), { expected: 1.25, rel: relativeSigma, because: 'H-gamma' });
    expectClose(scaling(410.289, 6), { expected: 2.1, rel: relativeSigma, because: 'H-delta' });
  });
});

describe('tabulated widths of H-beta (prefactor from memory)', () => {
  test('are those of the table', () => {
    const keys = checkKeys(/^stark\.Hbeta_Griem_FWHM_nm/);
    expect(keys).toHaveLength(15);
    for (const key of keys) {
      const { inputs } = checkValue(key);
      const found = hBetaTabulatedFwhmNm(1e6 * numberInput(inputs, 'Ne_cm-3'), numberInput(inputs, 'T_K'));
      expectCheckValue(key, found ?? NaN);
    }
  });

  test('lie between their neighbours, and end with the table', () => {
    const between = hBetaTabulatedFwhmNm(3e22, 14_000)!;
    expect(between).toBeGreaterThan(hBetaTabulatedFwhmNm(1e22, 14_000)!);
    expect(between).toBeLessThan(hBetaTabulatedFwhmNm(1e23, 14_000)!);
    for (const [density, kelvin] of [
      [9e20, 10_000],
      [2e24, 10_000],
      [1e22, 4900],
      [1e22, 31_000],
      [5e23, 6000],
    ] as const) {
      expect(hBetaTabulatedFwhmNm(density, kelvin)).toBeNull();
    }
  });
});
