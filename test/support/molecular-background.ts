/**
 * Bands of N2 (second positive system) and a bent continuum, as of a little air in a hydrogen tube.
 *
 * P and R branches about the origin, m = -J and m = J + 1: wavenumber offset (B' + B'') m + (B' - B'') m^2, strength |m|
 * exp(-B' m (m - 1) hc/kT), shifted so that the head lies where it is tabulated: G. Herzberg, Spectra of Diatomic Molecules
 * (1950), ch. IV; spin splitting and the weak Q branch left out. Rotational constants from memory; heads R. W. B. Pearse, A.
 * G. Gaydon, The Identification of Molecular Spectra (1976), from memory to 0.05 nm.
 */
interface Band {
  readonly headNm: number;
  readonly upperVibration: number;
  readonly lowerVibration: number;
  /** Top of the band, electrons per pixel. */
  readonly electrons: number;
}
const bands: readonly Band[] = [
  { headNm: 434.36, upperVibration: 0, lowerVibration: 4, electrons: 150 },
  { headNm: 405.94, upperVibration: 0, lowerVibration: 3, electrons: 100 },
  { headNm: 399.84, upperVibration: 1, lowerVibration: 4, electrons: 120 },
];
/** The strong bands, relative: as tabulated for common lamps. */
const strongBands: readonly Band[] = [
  { headNm: 315.93, upperVibration: 1, lowerVibration: 0, electrons: 0.6 },
  { headNm: 337.13, upperVibration: 0, lowerVibration: 0, electrons: 1 },
  { headNm: 353.67, upperVibration: 1, lowerVibration: 2, electrons: 0.25 },
  { headNm: 357.69, upperVibration: 0, lowerVibration: 1, electrons: 0.7 },
  { headNm: 371.05, upperVibration: 2, lowerVibration: 4, electrons: 0.15 },
  { headNm: 375.54, upperVibration: 1, lowerVibration: 3, electrons: 0.35 },
  { headNm: 380.49, upperVibration: 0, lowerVibration: 2, electrons: 0.3 },
  { headNm: 399.84, upperVibration: 1, lowerVibration: 4, electrons: 0.2 },
  { headNm: 405.94, upperVibration: 0, lowerVibration: 3, electrons: 0.1 },
];
const kelvinPerWavenumber = 1.438776877;
const instrumentSigmaNm = 0.18 / 2.3548200450309493;
const stepNm = 0.02;
const firstNm = 300;
const lastNm = 720;

/** Electrons per pixel at a wavelength in nm. */
export function molecularBackground(rotationalKelvin: number): (nm: number) => number {
  const band = bandLight(bands, rotationalKelvin);
  return (nm) => band(nm) + 150 * Math.exp(-(nm - 370) / 90) + 60 * Math.exp(-(((nm - 600) / 40) ** 2));
}

/** Bands of nitrogen from the ultraviolet to the violet, the strongest 1 at its top. */
export const nitrogenLight = (rotationalKelvin: number): ((nm: number) => number) =>
  bandLight(strongBands, rotationalKelvin);

function bandLight(bands: readonly Band[], rotationalKelvin: number): (nm: number) => number {
  const grid = new Float64Array(Math.round((lastNm - firstNm) / stepNm) + 2);
  for (const { headNm, upperVibration, lowerVibration, electrons } of bands) {
    const upperB = 1.8247 - 0.0187 * (upperVibration + 0.5);
    const lowerB = 1.6375 - 0.0179 * (lowerVibration + 0.5);
    const sum = upperB + lowerB;
    const difference = upperB - lowerB;
    const headOffset = -(sum * sum) / (4 * difference);
    const shape = new Float64Array(grid.length);
    for (let m = -60; m <= 60; m++) {
      const offset = sum * m + difference * m * m - headOffset;
      const strength =
        Math.abs(m) * Math.exp((-upperB * m * (m - 1) * kelvinPerWavenumber) / rotationalKelvin);
      const centreNm = 1e7 / (1e7 / headNm + offset);
      const at = (centreNm - firstNm) / stepNm;
      const reach = Math.ceil((5 * instrumentSigmaNm) / stepNm);
      for (let i = Math.max(0, Math.floor(at) - reach); i <= Math.min(grid.length - 1, at + reach); i++) {
        const distance = (i - at) * stepNm;
        shape[i]! +=
          strength * Math.exp(-(distance * distance) / (2 * instrumentSigmaNm * instrumentSigmaNm));
      }
    }
    const top = Math.max(...shape);
    for (const [i, value] of shape.entries()) grid[i]! += (electrons * value) / top;
  }
  return (nm) => {
    const at = Math.max(0, Math.min(grid.length - 2, (nm - firstNm) / stepNm));
    const i = Math.floor(at);
    return grid[i]! + (at - i) * (grid[i + 1]! - grid[i]!);
  };
}
