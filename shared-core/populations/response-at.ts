import { exp } from '../numeric/portable-math.ts';
import type { ResponseTable } from '../recording/recording.ts';

/** Relative standard uncertainty taken when the table states none: usual for an uncertified lamp calibration. */
export const assumedResponseSigma = 0.04;

export interface ResponseAt {
  /** Relative response at each wavelength. */
  readonly response: Float64Array;
  readonly relativeSigma: Float64Array;
  /** d ln(response)/d wavelength, per nm. */
  readonly logSlopePerNm: Float64Array;
}

/** True when the table reaches the wavelength. */
export function coversNm(table: ResponseTable, nm: number): boolean {
  return nm >= table.wavelengthNm[0]! && nm <= table.wavelengthNm[table.wavelengthNm.length - 1]!;
}

/**
 * Response at the given wavelengths by straight interpolation between the rows of the table.
 *
 * @param wavelengthNm  nm, each inside the table (see coversNm)
 * @check test/unit/populations/response-at.test.ts
 */
export function responseAt(table: ResponseTable, wavelengthNm: readonly number[]): ResponseAt {
  const count = wavelengthNm.length;
  const response = new Float64Array(count);
  const relativeSigma = new Float64Array(count);
  const logSlopePerNm = new Float64Array(count);
  const last = table.wavelengthNm.length - 1;
  for (const [i, nm] of wavelengthNm.entries()) {
    let low = 0;
    let high = last;
    while (high - low > 1) {
      const middle = (low + high) >> 1;
      if (table.wavelengthNm[middle]! <= nm) low = middle;
      else high = middle;
    }
    const spanNm = table.wavelengthNm[high]! - table.wavelengthNm[low]!;
    const t = spanNm > 0 ? (nm - table.wavelengthNm[low]!) / spanNm : 0;
    const blend = (values: Float64Array): number => values[low]! + t * (values[high]! - values[low]!);
    const value = blend(table.response);
    response[i] = value;
    relativeSigma[i] = table.relativeSigma === null ? assumedResponseSigma : blend(table.relativeSigma);
    logSlopePerNm[i] = spanNm > 0 ? (table.response[high]! - table.response[low]!) / spanNm / value : 0;
  }
  return { response, relativeSigma, logSlopePerNm };
}

/**
 * Covariance of the relative response errors of several lines, row-major:
 * C_ij = u_i u_j exp(-|l_i - l_j| / L). L = 0 makes them independent, a large L common to all lines.
 *
 * @param correlationLengthNm  nm, >= 0
 * @source exponential correlation, the usual first model of a smooth calibration error (common practice)
 * @check  test/unit/populations/response-at.test.ts
 */
export function responseCovariance(
  wavelengthNm: readonly number[],
  relativeSigma: Float64Array,
  correlationLengthNm: number,
): Float64Array {
  const count = wavelengthNm.length;
  const covariance = new Float64Array(count * count);
  for (let i = 0; i < count; i++) {
    for (let j = 0; j < count; j++) {
      const distance = Math.abs(wavelengthNm[i]! - wavelengthNm[j]!);
      const correlation = i === j ? 1 : correlationLengthNm > 0 ? exp(-distance / correlationLengthNm) : 0;
      covariance[i * count + j] = relativeSigma[i]! * relativeSigma[j]! * correlation;
    }
  }
  return covariance;
}
