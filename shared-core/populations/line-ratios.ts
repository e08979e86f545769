import { normalQuantile } from '../numeric/distributions.ts';
import { log } from '../numeric/portable-math.ts';
import { boltzmannEvPerK } from '../physics/constants.ts';
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
 * @source H. R. Griem, Plasma Spectroscopy (1964), ch. 13 [Griem1964]
 * @check  test/unit/populations/line-ratios.test.ts
 */
export function lineRatios(
  input: PopulationInput,
  used: readonly number[],
  coverage: number,
): readonly LineRatio[] {
  const sorted = [...used].sort((a, b) => input.lines[a]!.upperLevel - input.lines[b]!.upperLevel);
  const pairs = sorted.slice(1).map((second, at) => [sorted[at]!, second] as const);
  if (sorted.length > 2) pairs.push([sorted[0]!, sorted.at(-1)!]);
  return pairs
    .filter(([a, b]) => input.lines[a]!.upperLevel !== input.lines[b]!.upperLevel)
    .map((pair) => lineRatio(input, pair, coverage));
}

function lineRatio(input: PopulationInput, pair: readonly [number, number], coverage: number): LineRatio {
  const { problem } = poseBoltzmann(input, pair);
  const [a, b] = pair.map((i) => input.lines[i]!) as [
    (typeof input.lines)[number],
    (typeof input.lines)[number],
  ];
  const photons =
    (a.upperWeight * a.transitionProbabilityPerS) / (b.upperWeight * b.transitionProbabilityPerS);
  const limit = isEnergyArea(input.bench) ? (photons * b.wavelengthVacuumNm) / a.wavelengthVacuumNm : photons;
  const bare = {
    numerator: input.fits.fits[pair[0]]!.id,
    denominator: input.fits.fits[pair[1]]!.id,
    limit,
    kelvin: null,
    lowKelvin: null,
    highKelvin: null,
  };
  const [areaA, areaB] = problem.area as unknown as [number, number];
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
  const [perA, perB] = problem.areaPerPopulation as unknown as [number, number];
  const aboveLimit = log((areaA * perB) / (areaB * perA));
  const relative = (i: number, j: number, areas: number): number =>
    problem.areaCovariance[2 * i + j]! / areas + problem.relativeCovariance[2 * i + j]!;
  const sigma = Math.sqrt(
    relative(0, 0, areaA * areaA) + relative(1, 1, areaB * areaB) - 2 * relative(0, 1, areaA * areaB),
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
