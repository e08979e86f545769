import { log } from '../numeric/portable-math.ts';
import { boltzmannEvPerK } from './constants.ts';

/** What a line of the Boltzmann plot needs to be known for. */
export interface PopulationLine {
  readonly wavelengthNm: number;
  readonly transitionProbabilityPerS: number;
  readonly upperWeight: number;
  readonly upperEnergyEv: number;
}

/** Whether areas count photons (or electrons over quantum efficiency) or energy. */
export type AreaUnit = 'photon' | 'energy';

/**
 * Ordinate of the Boltzmann plot: ln(area/(g A)) for photon areas, ln(area lambda/(g A)) for energy areas.
 *
 * Its slope against the upper energy is -1/(k T). Mixing the two units up shifts 5000 K to 6099 or 4236 K.
 * @param area  after the response is divided out, > 0
 * @source [Griem1964] ch. 13
 * @check  test/reference/boltzmann.test.ts
 */
export function populationOrdinate(line: PopulationLine, area: number, unit: AreaUnit): number {
  const perWeight = area / (line.upperWeight * line.transitionProbabilityPerS);
  return log(unit === 'energy' ? perWeight * line.wavelengthNm : perWeight);
}

export type TwoLineTemperature =
  | { readonly kind: 'temperature'; readonly kelvin: number }
  /** The ratio lies at or beyond its limit for infinite temperature: inverted, self-absorbed or miscalibrated. */
  | { readonly kind: 'no-positive-temperature' };

/**
 * Temperature from the ratio of two line areas: T = (E_b - E_a)/(k ln[R/R_infinity]).
 *
 * R_infinity = g_a A_a/(g_b A_b), times lambda_b/lambda_a for energy.
 * @param ratio  area of `a` over area of `b`, > 0, responses divided out; E_b > E_a
 * @source [Griem1964] ch. 13
 * @check  test/reference/boltzmann.test.ts
 */
export function twoLineTemperature(
  a: PopulationLine,
  b: PopulationLine,
  ratio: number,
  unit: AreaUnit,
): TwoLineTemperature {
  const slopeLog = populationOrdinate(a, ratio, unit) - populationOrdinate(b, 1, unit);
  const kelvin = (b.upperEnergyEv - a.upperEnergyEv) / (boltzmannEvPerK * slopeLog);
  return kelvin > 0 && Number.isFinite(kelvin)
    ? { kind: 'temperature', kelvin }
    : { kind: 'no-positive-temperature' };
}
