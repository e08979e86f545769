/**
 * Bands of N2 (second positive system) and a bent continuum, as of a little air in a hydrogen tube.
 *
 * P and R branches about the origin, m = -J and m = J + 1: wavenumber offset (B' + B'') m + (B' - B'') m^2, strength |m|
 * exp(-B' m (m - 1) hc/kT), shifted so that the head lies where it is tabulated: G. Herzberg, Spectra of Diatomic Molecules
 * (1950), ch. IV; spin splitting and the weak Q branch left out. Rotational constants from memory; heads R. W. B. Pearse, A.
 * G. Gaydon, The Identification of Molecular Spectra (1976), from memory to 0.05 nm.
 */
const bands = [
  { headNm: 434.36, upperVibration: 0, lowerVibration: 4, electrons: 150 },
  { headNm: 405.94, upperVibration: 0, lowerVibration: 3, electrons: 100 },
  { headNm: 399.84, upperVibration: 1, lowerVibration: 4, electrons: 120 },
] as const;
const kelvinPerWavenumber = 1.438776877;
const instrumentSigmaNm = 0.18 / 2.3548200450309493;
const stepNm = 0.02;
const firstNm = 360;
const lastNm = 720;

/** Electrons per pixel at a wavelength in nm; `electrons` of the list is the top of a band. */
export function molecularBackground(rotationalKelvin: number): (nm: number) => number {
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
    const band = grid[i]! + (at - i) * (grid[i + 1]! - grid[i]!);
    return band + 150 * Math.exp(-(nm - 370) / 90) + 60 * Math.exp(-(((nm - 600) / 40) ** 2));
  };
}
