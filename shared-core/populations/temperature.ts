import type { Bench } from '../bench/bench.ts';
import { normalQuantile } from '../numeric/distributions.ts';
import { exp } from '../numeric/portable-math.ts';
import { boltzmannEvPerK } from '../physics/constants.ts';
import type { HydrogenLine } from '../physics/hydrogen.ts';
import type { LineFits } from '../lines/line-fit.ts';
import type { ResponseTable } from '../recording/recording.ts';
import { fitBoltzmann, type BoltzmannFit, type BoltzmannInput } from './fit-boltzmann.ts';
import { calibrationComponents, lineFitComponents, type ErrorComponent } from './error-component.ts';
import { responseAt } from './response-at.ts';

export interface TemperatureFit {
  readonly status: 'measured' | 'lower-limit' | 'not-determined';
  /** Why there is no number, in one clause; empty when measured. */
  readonly reason: string;
  /** Indices into LineFits.fits of the lines used. */
  readonly used: readonly number[];
  readonly boltzmann: BoltzmannFit | null;
  /** By cause; together they are boltzmann.ordinateCovariance. */
  readonly components: readonly ErrorComponent[];
  readonly kelvin: number | null;
  readonly sigmaKelvin: number | null;
  readonly lowKelvin: number | null;
  readonly highKelvin: number | null;
  readonly coverage: number;
}

export interface TemperatureInput {
  readonly fits: LineFits;
  /** Of each fit, same order. */
  readonly lines: readonly HydrogenLine[];
  /** nm, true wavelength of each fit in the response table's terms. */
  readonly wavelengthNm: readonly number[];
  /** Fits that may not be used (left out, blended beyond use), by id. */
  readonly barred: ReadonlySet<string>;
  readonly response: ResponseTable | null;
  readonly bench: Bench;
  readonly coverage: number;
  /** Why there are no fits at all, in one clause; null when there are. */
  readonly whyNoFits: string | null;
}

/** A line enters when the others expect it to stand this far out of the noise; judging it by itself would bias it. */
export const leastExpectedSignificance = 3;
/** At least two lines must be this plain to start from. */
export const leastSeedSignificance = 5;

/**
 * Temperature of the level populations from the fitted areas.
 *
 * Lines are chosen by what the others expect of them, not by their own noise: those that stand at 5 sigma start the
 * plot; then every line whose expected area exceeds 3 sigma takes part, whatever it measured. The interval is that
 * of 1/T, which is the normal variable; where it reaches zero only a lower limit is stated.
 *
 * @source Boltzmann plot: H. R. Griem, Plasma Spectroscopy (1964), ch. 13; interval of a reciprocal: GUM (JCGM
 *         100:2008) 5.1.2 applied to 1/T
 * @check  test/property/temperature-coverage.test.ts
 */
export function fitTemperature(input: TemperatureInput): TemperatureFit {
  const { fits, barred, coverage } = input;
  const seeds: number[] = [];
  for (const [i, fit] of fits.fits.entries()) {
    if (barred.has(fit.id) || fit.status !== 'converged') continue;
    if (fit.area > leastSeedSignificance * fit.areaSigma) seeds.push(i);
  }
  if (seeds.length < 2) return undetermined(input, seeds, input.whyNoFits ?? tooFewText(seeds.length));
  let used = seeds;
  let posed = poseBoltzmann(input, used);
  let boltzmann = fitBoltzmann(posed.problem);
  for (let round = 0; round < 4 && boltzmann !== null; round++) {
    const next = chooseExpected(input, seeds, used, boltzmann);
    if (next.length === used.length && next.every((value, index) => value === used[index])) break;
    used = next;
    posed = poseBoltzmann(input, used);
    boltzmann = fitBoltzmann(posed.problem);
  }
  if (boltzmann === null || !boltzmann.isConverged) {
    return undetermined(input, used, 'the straight-line fit of the populations did not settle');
  }
  const components = componentsOf(input, used, boltzmann, posed);
  return { ...readInterval(boltzmann, coverage), used, boltzmann, components, coverage };
}

function tooFewText(count: number): string {
  return count === 0
    ? 'no Balmer line stands out of the noise unclipped and in range'
    : 'only one Balmer line can be used, and a temperature needs two';
}

function undetermined(input: TemperatureInput, used: readonly number[], reason: string): TemperatureFit {
  return {
    status: 'not-determined',
    reason,
    used,
    boltzmann: null,
    components: [],
    kelvin: null,
    sigmaKelvin: null,
    lowKelvin: null,
    highKelvin: null,
    coverage: input.coverage,
  };
}

/** Seeds, and lines that the present fit expects above 3 sigma. */
function chooseExpected(
  input: TemperatureInput,
  seeds: readonly number[],
  used: readonly number[],
  boltzmann: BoltzmannFit,
): number[] {
  const { fits, barred } = input;
  const all = [...fits.fits.keys()];
  const { problem } = poseBoltzmann(input, all);
  const chosen: number[] = [];
  const anchor = used[0]!;
  for (const i of all) {
    const fit = fits.fits[i]!;
    if (barred.has(fit.id) || fit.status !== 'converged') continue;
    // Extrapolated from a used line along the fitted slope: no need for the intercept's convention.
    const lnRatio = -boltzmann.inverseKtPerEv * (problem.upperEnergyEv[i]! - problem.upperEnergyEv[anchor]!);
    const expected =
      (boltzmann.expectedArea[0]! * problem.areaPerPopulation[i]! * exp(lnRatio)) /
      problem.areaPerPopulation[anchor]!;
    if (seeds.includes(i) || expected > leastExpectedSignificance * fit.areaSigma) chosen.push(i);
  }
  return chosen;
}

interface Posed {
  readonly problem: BoltzmannInput;
  /** Part of problem.areaCovariance that the choice of the baseline adds. */
  readonly baselineCovariance: Float64Array;
  readonly calibration: readonly ErrorComponent[];
}

function poseBoltzmann(input: TemperatureInput, used: readonly number[]): Posed {
  const { fits, response, bench } = input;
  const n = used.length;
  const total = fits.fits.length;
  const lines = used.map((i) => input.lines[i]!);
  const wavelengthNm = used.map((i) => input.wavelengthNm[i]!);
  const table = response === null ? null : responseAt(response, wavelengthNm);
  const isEnergy = bench.response?.per === 'energy' || bench.detector?.signal === 'energy';
  const areaPerPopulation = Float64Array.from(lines, (line, row) => {
    const photons = line.upperWeight * line.transitionProbabilityPerS;
    // Energy ordinate: a photon carries hc/lambda; the constant hc drops out of the slope.
    return (table?.response[row] ?? 1) * (isEnergy ? photons / line.wavelengthVacuumNm : photons);
  });
  const areaCovariance = new Float64Array(n * n);
  const baselineCovariance = new Float64Array(n * n);
  for (const [row, i] of used.entries()) {
    for (const [column, j] of used.entries()) {
      const baseline = fits.baselineCovariance[i * total + j]!;
      baselineCovariance[row * n + column] = baseline;
      areaCovariance[row * n + column] = fits.areaCovariance[i * total + j]! + baseline;
    }
  }
  const calibration = calibrationComponents({ lines, wavelengthNm, response, bench });
  const relativeCovariance = new Float64Array(n * n);
  for (const { covariance } of calibration) {
    for (const [at, value] of covariance.entries()) relativeCovariance[at] = relativeCovariance[at]! + value;
  }
  return {
    problem: {
      area: Float64Array.from(used, (i) => fits.fits[i]!.area),
      areaCovariance,
      variancePerArea: fits.variancePerSignal,
      areaPerPopulation,
      upperEnergyEv: Float64Array.from(lines, ({ upperEnergyEv }) => upperEnergyEv),
      relativeCovariance,
    },
    baselineCovariance,
    calibration,
  };
}

/** Splits the covariance that the fit used by cause: what calibration and baseline do not explain is noise. */
function componentsOf(
  { fits, bench }: TemperatureInput,
  used: readonly number[],
  { ordinateCovariance, expectedArea }: BoltzmannFit,
  { problem, baselineCovariance, calibration }: Posed,
): readonly ErrorComponent[] {
  const n = used.length;
  const baseline = baselineCovariance.map(
    (value, at) => value / (expectedArea[Math.floor(at / n)]! * expectedArea[at % n]!),
  );
  const noise = ordinateCovariance.map(
    (value, at) => value - baseline[at]! - problem.relativeCovariance[at]!,
  );
  return [...lineFitComponents(fits, used, { noise, baseline }, bench), ...calibration];
}

type Interval = Pick<
  TemperatureFit,
  'status' | 'reason' | 'kelvin' | 'sigmaKelvin' | 'lowKelvin' | 'highKelvin'
>;

/** T = 1/(k b) with the interval of b turned over. */
function readInterval(
  { inverseKtPerEv: b, inverseKtSigmaPerEv: sigma }: BoltzmannFit,
  coverage: number,
): Interval {
  const none = { kelvin: null, sigmaKelvin: null, lowKelvin: null, highKelvin: null };
  const z = normalQuantile(0.5 * (1 + coverage));
  const toKelvin = (inverse: number): number => 1 / (boltzmannEvPerK * inverse);
  if (b - z * sigma > 0) {
    const kelvin = toKelvin(b);
    return {
      status: 'measured',
      reason: '',
      kelvin,
      sigmaKelvin: kelvin * (sigma / b),
      lowKelvin: toKelvin(b + z * sigma),
      highKelvin: toKelvin(b - z * sigma),
    };
  }
  // One-sided: the chance that the true temperature lies below the limit is 1 - coverage.
  const steepest = b + normalQuantile(coverage) * sigma;
  if (steepest <= 0) {
    return {
      ...none,
      status: 'not-determined',
      reason:
        'the populations rise with energy, which no temperature describes (look for self-absorption, clipping or a wrong response)',
    };
  }
  return {
    ...none,
    status: 'lower-limit',
    reason: 'the spread of the populations is not resolved from that of an infinite temperature',
    lowKelvin: toKelvin(steepest),
  };
}
