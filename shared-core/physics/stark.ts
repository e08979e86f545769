import { pow } from '../numeric/portable-math.ts';
import { hydrogenLine, seriesLine } from './hydrogen.ts';

/**
 * Stark widths and electron density.
 * @source [Gigosos2003]: fits to computer-simulated profiles with moving ions
 * @check  test/reference/stark.test.ts
 */

/** Electron densities over which the width laws were fitted, m^-3. */
export const starkValidity = Object.freeze({ lowPerCubicMetre: 1e20, highPerCubicMetre: 1e25 });
/** Relative standard uncertainty of the width law: H-beta 5-8 %, H-alpha 8-12 % by comparison of theories. */
export const hBetaStarkRelativeSigma = 0.07;
export const hAlphaStarkRelativeSigma = 0.1;

const referencePerCubicMetre = 1e23;
const hBeta = { widthNm: 4.8, exponent: 0.68116 };
/** A full width at half area. The 0.549 nm often printed is the half width; taken for a full one it gives 2.8 times the density. */
const hAlpha = { widthNm: 1.098, exponent: 0.67965 };

/** Full width at half maximum of H-beta, nm: 4.800 (Ne/1e23)^0.68116. */
export function hBetaStarkFwhmNm(perCubicMetre: number): number {
  return hBeta.widthNm * pow(perCubicMetre / referencePerCubicMetre, hBeta.exponent);
}

/** Full width at half area of H-alpha, nm: 1.098 (Ne/1e23)^0.67965. */
export function hAlphaStarkFwhaNm(perCubicMetre: number): number {
  return hAlpha.widthNm * pow(perCubicMetre / referencePerCubicMetre, hAlpha.exponent);
}

/** Electron density, m^-3, from the Stark FWHM of H-beta, nm (> 0). */
export function electronDensityFromHBeta(fwhmNm: number): number {
  return referencePerCubicMetre * pow(fwhmNm / hBeta.widthNm, 1 / hBeta.exponent);
}

/** Electron density, m^-3, from the Stark full width at half area of H-alpha, nm (> 0); for a Lorentz shape its FWHM. */
export function electronDensityFromHAlpha(fwhaNm: number): number {
  return referencePerCubicMetre * pow(fwhaNm / hAlpha.widthNm, 1 / hAlpha.exponent);
}

/** Full widths of the tabulated lines over that of H-beta, with the relative spread over 1e21 to 1e23 m^-3. */
const tabulatedRatios: Readonly<Record<number, { readonly ratio: number; readonly relativeSigma: number }>> =
  Object.freeze({
    // The two laws above at 1e23 m^-3.
    3: { ratio: 0.229, relativeSigma: 0.1 },
    // The unit itself; the law shared by the lines bends by this much over a decade of density.
    4: { ratio: 1, relativeSigma: 0.02 },
    5: { ratio: 1.25, relativeSigma: 0.15 },
    6: { ratio: 2.1, relativeSigma: 0.15 },
  });

/**
 * Stark FWHM of a Balmer line over that of H-beta at the same density.
 *
 * n = 5 and 6: full widths at 1e4 K, 1e21 to 1e23 m^-3, of the tables named below (1.25 to 1.26 and 2.05 to 2.16).
 * n >= 7: 0.95 of the linear Stark scaling lambda^2 n (n - 1), H-gamma's own ratio to it. H-delta lies 18 % above the
 * scaling, as lines without an unshifted component do; the 25 % covers both kinds. Lines of other series by the same
 * scaling, untested: 50 %.
 *
 * @source [Stehle1999], for n = 5, 6
 * @check  test/reference/stark.test.ts
 */
export function starkWidthRelativeToHBeta(
  upperLevel: number,
  lowerLevel = 2,
): { readonly ratio: number; readonly relativeSigma: number } {
  const tabulated = lowerLevel === 2 ? tabulatedRatios[upperLevel] : undefined;
  if (tabulated !== undefined) return tabulated;
  const { wavelengthVacuumNm } = seriesLine(upperLevel, lowerLevel);
  const stretch = wavelengthVacuumNm / hydrogenLine(4).wavelengthVacuumNm;
  return {
    ratio: (0.95 * stretch * stretch * upperLevel * (upperLevel - 1)) / 12,
    relativeSigma: lowerLevel === 2 ? 0.25 : 0.5,
  };
}

/**
 * Stark width of the Balmer line from `upperLevel`, nm: the laws of H-alpha and H-beta, the other lines by their ratio to
 * H-beta.
 */
export function starkWidthOfLine(upperLevel: number, perCubicMetre: number): number {
  return upperLevel === 3
    ? hAlphaStarkFwhaNm(perCubicMetre)
    : hBetaStarkFwhmNm(perCubicMetre) * starkWidthRelativeToHBeta(upperLevel).ratio;
}
