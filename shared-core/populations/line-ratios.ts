import { normalQuantile } from '../numeric/distributions.ts';
import { log } from '../numeric/portable-math.ts';
import { boltzmannEvPerK } from '../physics/constants.ts';
import type { HydrogenLine } from '../physics/hydrogen.ts';
import type { BoltzmannInput } from './boltzmann-input.ts';
import { isEnergyArea, poseBoltzmann, type PopulationInput } from './pose-boltzmann.ts';

/** The temperature that two lines alone give. */
export interface LineRatio {
  /** Lower upper level first: its line is the numerator. */
  readonly numerator: string;
  readonly denominator: string;
  /** Of the areas, response divided out (photons or energy as the response table says). Null where an area is not positive. */
  readonly ratio: number | null;
  readonly ratioSigma: number | null;
  /** The ratio at infinite temperature: no positive temperature lies at or below it. */
  readonly limit: number;
  readonly status: 'measured' | 'lower-limit' | 'no-positive-temperature' | 'not-determined';
  readonly kelvin: number | null;
  readonly lowKelvin: number | null;
  readonly highKelvin: number | null;
  /** Why there is no temperature; empty when there is. */
  readonly reason: string;
}

/**
 * Two-line temperatures of neighbouring lines, and of the first with the last: T = (E_b - E_a)/(k ln(R/R_infinity)).
 *
 * ln R is the normal variable; the interval of T is that of ln R turned over, and has no upper end where it reaches the
 * limit. R_infinity = g_a A_a/(g_b A_b), times lambda_b/lambda_a for energy.
 *
 * @param used  indices into the fits; pairs on one upper level are left out
 * @source [Griem1964] ch. 13
 * @check  test/unit/populations/line-ratios.test.ts
 */
export function lineRatios(
  input: PopulationInput,
  used: readonly number[],
  coverage: number,
): readonly LineRatio[] {
  const sorted = [...used].sort((a, b) => input.lines[a]!.upperLevel - input.lines[b]!.upperLevel);
  const { problem } = poseBoltzmann(input, sorted);
  const pairs = sorted.slice(1).map((_, at) => [at, at + 1] as const);
  if (sorted.length > 2) pairs.push([0, sorted.length - 1]);
  const lines = sorted.map((i) => input.lines[i]!);
  return pairs
    .filter(([a, b]) => lines[a]!.upperLevel !== lines[b]!.upperLevel)
    .map(([a, b]) =>
      lineRatio(pickPair(problem, a, b), lines[a]!, lines[b]!, isEnergyArea(input.bench), coverage),
    );
}

interface Pair {
  readonly areas: readonly [number, number];
  readonly perPopulation: readonly [number, number];
  /** Of ln(ratio) but for the areas' own part, and the covariance of the areas. */
  readonly relativeVariance: number;
  readonly areaCovariance: readonly [number, number, number];
}

function pickPair(problem: BoltzmannInput, a: number, b: number): Pair {
  const n = problem.area.length;
  const { area, areaPerPopulation, areaCovariance, relativeCovariance: relative } = problem;
  return {
    areas: [area[a]!, area[b]!],
    perPopulation: [areaPerPopulation[a]!, areaPerPopulation[b]!],
    relativeVariance: relative[a * n + a]! + relative[b * n + b]! - 2 * relative[a * n + b]!,
    areaCovariance: [areaCovariance[a * n + a]!, areaCovariance[b * n + b]!, areaCovariance[a * n + b]!],
  };
}

function lineRatio(
  { areas, perPopulation, relativeVariance, areaCovariance }: Pair,
  a: HydrogenLine,
  b: HydrogenLine,
  isEnergy: boolean,
  coverage: number,
): LineRatio {
  const photons =
    (a.upperWeight * a.transitionProbabilityPerS) / (b.upperWeight * b.transitionProbabilityPerS);
  const limit = isEnergy ? (photons * b.wavelengthVacuumNm) / a.wavelengthVacuumNm : photons;
  const bare = {
    numerator: a.id,
    denominator: b.id,
    limit,
    kelvin: null,
    lowKelvin: null,
    highKelvin: null,
  };
  const [areaA, areaB] = areas;
  if (!(areaA > 0 && areaB > 0)) {
    const lost = areaA > 0 ? bare.denominator : bare.numerator;
    return {
      ...bare,
      ratio: null,
      ratioSigma: null,
      status: 'not-determined',
      reason: `the area of ${lost} is not positive`,
    };
  }
  const [perA, perB] = perPopulation;
  const aboveLimit = log((areaA * perB) / (areaB * perA));
  const [varianceA, varianceB, covariance] = areaCovariance;
  const sigma = Math.sqrt(
    varianceA / (areaA * areaA) +
      varianceB / (areaB * areaB) -
      (2 * covariance) / (areaA * areaB) +
      relativeVariance,
  );
  const ratio = ((areaA * perB) / (areaB * perA)) * limit;
  const z = normalQuantile(0.5 * (1 + coverage));
  const kelvinAt = (logRatio: number): number =>
    (b.upperEnergyEv - a.upperEnergyEv) / (boltzmannEvPerK * logRatio);
  const measured = { ...bare, ratio, ratioSigma: ratio * sigma };
  if (aboveLimit - z * sigma > 0) {
    return {
      ...measured,
      status: 'measured',
      kelvin: kelvinAt(aboveLimit),
      lowKelvin: kelvinAt(aboveLimit + z * sigma),
      highKelvin: kelvinAt(aboveLimit - z * sigma),
      reason: '',
    };
  }
  const steepest = aboveLimit + normalQuantile(coverage) * sigma;
  return steepest > 0
    ? {
        ...measured,
        status: 'lower-limit',
        lowKelvin: kelvinAt(steepest),
        reason: 'the ratio is not told from its limit at infinite temperature',
      }
    : {
        ...measured,
        status: 'no-positive-temperature',
        reason:
          'the ratio lies below its limit at infinite temperature: inverted, self-absorbed or a wrong response',
      };
}
