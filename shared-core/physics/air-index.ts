/**
 * Refractive index of dry air at 15 C, 101 325 Pa, by the vacuum wavelength in nm.
 *
 * The two dispersion formulas differ by at most 1.5e-8 (0.015 pm) between 230 and 1000 nm. Air wavelengths of the
 * program use Peck and Reeder, as the published tables of wavelengths in air do. Coefficients from memory; the values
 * were checked against published ones.
 */

/**
 * n - 1 by Peck and Reeder: 1e-8 (8060.51 + 2480990/(132.274 - s^2) + 17455.7/(39.32957 - s^2)), s = 1/lambda in um^-1.
 * @param wavelengthVacuumNm  185 to 1700
 * @source [Peck1972]
 * @check  test/reference/air-index.test.ts
 */
export function airRefractivity(wavelengthVacuumNm: number): number {
  const s2 = 1e6 / (wavelengthVacuumNm * wavelengthVacuumNm);
  return (8060.51 + 2480990 / (132.274 - s2) + 17455.7 / (39.32957 - s2)) * 1e-8;
}

/**
 * n - 1 by Ciddor, 450 ppm CO2: 1e-8 (5792105/(238.0185 - s^2) + 167917/(57.362 - s^2)), s = 1/lambda in um^-1.
 * @param wavelengthVacuumNm  230 to 1700; the form drifts below
 * @source [Ciddor1996]
 * @check  test/reference/air-index.test.ts
 */
export function airRefractivityCiddor(wavelengthVacuumNm: number): number {
  const s2 = 1e6 / (wavelengthVacuumNm * wavelengthVacuumNm);
  return (5792105 / (238.0185 - s2) + 167917 / (57.362 - s2)) * 1e-8;
}

/** n - 1 at a vacuum wavelength in nm. */
export type Refractivity = (wavelengthVacuumNm: number) => number;

/**
 * Vacuum wavelength to standard air, nm: lambda / n(lambda).
 * @check test/reference/air-index.test.ts
 */
export function vacuumToAirNm(
  wavelengthVacuumNm: number,
  refractivity: Refractivity = airRefractivity,
): number {
  return wavelengthVacuumNm / (1 + refractivity(wavelengthVacuumNm));
}

/**
 * Standard air wavelength to vacuum, nm, by the fixed point v = a n(v); four rounds reach the last digit.
 * @check test/reference/air-index.test.ts
 */
export function airToVacuumNm(wavelengthAirNm: number, refractivity: Refractivity = airRefractivity): number {
  let vacuum = wavelengthAirNm;
  for (let round = 0; round < 4; round++) vacuum = wavelengthAirNm * (1 + refractivity(vacuum));
  return vacuum;
}
