import type { Bench } from '../bench/bench.ts';
import { planckLogSlope, planckPhotonRadiance, planckRadiance } from '../physics/planck.ts';
import type { ResponseTable } from '../recording/recording.ts';
import { responseAt } from './response-at.ts';

/** Distribution temperature taken for a standard lamp that states none, K: a tungsten lamp run as illuminant A. */
export const assumedLampKelvin = 2856;

/**
 * Relative error of the area, response divided out, for each kelvin by which the lamp was hotter than stated:
 * d ln B/dT, since the response is the lamp's counts over its radiance B.
 *
 * @param wavelengthNm  vacuum
 * @returns per K
 * @check  test/unit/populations/response-errors.test.ts
 */
export function lampTemperatureErrors(wavelengthNm: readonly number[], lampKelvin: number): Float64Array {
  return Float64Array.from(wavelengthNm, (nm) => planckLogSlope(nm, lampKelvin) / lampKelvin);
}

/**
 * Relative error of the response for each unit of the lamp's light that reaches every pixel: mean of the lamp's
 * counts over the table / counts at the wavelength. The counts are response x radiance of a black body.
 *
 * @param wavelengthNm  inside the table
 * @returns dimensionless, > 0
 * @source uniform stray light, the usual first model of a grating spectrometer (common practice)
 * @check  test/unit/populations/response-errors.test.ts
 */
export function strayLightErrors(
  table: ResponseTable,
  bench: Bench,
  wavelengthNm: readonly number[],
): Float64Array {
  const kelvin = bench.response?.lamp?.temperatureK ?? assumedLampKelvin;
  const radiance = bench.response?.per === 'energy' ? planckRadiance : planckPhotonRadiance;
  const rows = table.wavelengthNm.length;
  let integral = 0;
  for (let i = 1; i < rows; i++) {
    const stepNm = table.wavelengthNm[i]! - table.wavelengthNm[i - 1]!;
    const before = table.response[i - 1]! * radiance(table.wavelengthNm[i - 1]!, kelvin);
    const after = table.response[i]! * radiance(table.wavelengthNm[i]!, kelvin);
    integral += 0.5 * stepNm * (before + after);
  }
  const mean = integral / (table.wavelengthNm[rows - 1]! - table.wavelengthNm[0]!);
  const { response } = responseAt(table, wavelengthNm);
  return response.map((value, i) => mean / (value * radiance(wavelengthNm[i]!, kelvin)));
}

/**
 * The response table with the stated share of stray light taken out: R (1 - share x mean counts/counts). What is left
 * of it is the uncertainty of the share. Unchanged where the bench states none; never below a tenth of itself.
 *
 * @check test/unit/populations/response-errors.test.ts
 */
export function withoutStrayLight(table: ResponseTable, bench: Bench): ResponseTable {
  const share = bench.response?.strayLight?.share ?? 0;
  if (share === 0) return table;
  const errors = strayLightErrors(table, bench, Array.from(table.wavelengthNm));
  return {
    ...table,
    response: table.response.map((value, i) => value * Math.max(0.1, 1 - share * errors[i]!)),
  };
}
