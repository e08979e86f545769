import type { LineFit } from '../lines/line-fit.ts';
import { exp } from '../numeric/portable-math.ts';
import type { LineAbsorption } from '../physics/balmer-absorption.ts';
import { boltzmannEvPerK } from '../physics/constants.ts';
import { coverageFactor, type CombinedUncertainty } from '../uncertainty/gum.ts';
import { combineComponents } from './combine-components.ts';
import type { ErrorComponent } from './error-component.ts';
import type { BoltzmannInput } from './boltzmann-input.ts';
import { fitBoltzmann, type BoltzmannFit } from './fit-boltzmann.ts';
import type { fitOpticalDepth } from './optical-depth.ts';
import { componentsOf, poseBoltzmann, type PopulationInput, type PosedBoltzmann } from './pose-boltzmann.ts';

export interface TemperatureFit {
  readonly status: 'measured' | 'lower-limit' | 'not-determined';
  /** Why there is no number, in one clause; empty when measured. */
  readonly reason: string;
  /** Indices into LineFits.fits of the lines used. */
  readonly used: readonly number[];
  readonly boltzmann: BoltzmannFit | null;
  /** What the plot was fitted to; null without one. */
  readonly problem: BoltzmannInput | null;
  /** By cause; together they are boltzmann.ordinateCovariance. */
  readonly components: readonly ErrorComponent[];
  /** Their shares and the coverage factor; of 1/(kT), per eV, before any widening. Null without a plot. */
  readonly combined: CombinedUncertainty | null;
  readonly kelvin: number | null;
  readonly sigmaKelvin: number | null;
  readonly lowKelvin: number | null;
  readonly highKelvin: number | null;
  readonly coverage: number;
  /** sqrt(chi-square / degrees of freedom) of the plot; null with two lines. */
  readonly birgeRatio: number | null;
  /** Factor by which the interval was widened: the Birge ratio where that was asked for and exceeds 1, else 1. */
  readonly widening: number;
  /** Share of each line's light that left the lamp, by id, where the plot is corrected for self-absorption; else null. */
  readonly escape: ReadonlyMap<string, number> | null;
  /** What the correction was fitted to; null without one. */
  readonly absorbed: AbsorbedPlot | null;
}

/** Lines whose absorption is fitted along: see fitOpticalDepth. */
export interface AbsorbedPlot {
  readonly problem: BoltzmannInput;
  readonly absorption: readonly LineAbsorption[];
  readonly start: Parameters<typeof fitOpticalDepth>[2];
}

export interface TemperatureInput extends PopulationInput {
  /** Fits that may not be used (left out, blended beyond use), by id. */
  readonly barred: ReadonlySet<string>;
  readonly coverage: number;
  /** Whether scatter beyond the stated uncertainties widens the interval. */
  readonly widening: 'none' | 'birge';
  /** Why there are no fits at all, in one clause; null when there are. */
  readonly whyNoFits: string | null;
}

/** A line enters when the others expect it to stand this far out of the noise; judging it by itself would bias it. */
export const leastExpectedSignificance = 3;
/** At least two lines must be this plain to start from. */
const leastSeedSignificance = 5;
/** Where the model misses a line, its widened uncertainty must leave this much of it. */
const leastWidenedSignificance = 2;

/** Whether a line is plain to see: judged by noise, for a bright line that the profile misses is no less there. */
export const standsOut = ({ area, areaSigma, widening }: LineFit): boolean =>
  area * widening > leastSeedSignificance * areaSigma && area > leastWidenedSignificance * areaSigma;

/**
 * Temperature of the level populations from the fitted areas.
 *
 * Lines are chosen by what the others expect of them, not by their own noise: those that stand at 5 sigma start the
 * plot; then every line whose expected area exceeds 3 sigma takes part, whatever it measured. The interval is that
 * of 1/T, which is the normal variable; where it reaches zero only a lower limit is stated.
 *
 * @source Boltzmann plot: [Griem1964] ch. 13; interval of a reciprocal: [JCGM2008] 5.1.2 applied to 1/T
 * @check  test/property/temperature-coverage.test.ts
 */
export function fitTemperature(input: TemperatureInput): TemperatureFit {
  const { fits, barred } = input;
  const seeds: number[] = [];
  for (const [i, fit] of fits.fits.entries()) {
    if (barred.has(fit.id) || fit.status !== 'converged') continue;
    if (standsOut(fit)) seeds.push(i);
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
  return describeTemperature(input, used, boltzmann, posed, null);
}

/** Reads temperature and interval off a plot. */
export function describeTemperature(
  input: TemperatureInput,
  used: readonly number[],
  boltzmann: BoltzmannFit,
  posed: PosedBoltzmann,
  escape: TemperatureFit['escape'],
): TemperatureFit {
  const { chiSquare, degreesOfFreedom } = boltzmann.line;
  const birgeRatio = degreesOfFreedom < 1 ? null : Math.sqrt(chiSquare / degreesOfFreedom);
  const widening = input.widening === 'birge' ? Math.max(1, birgeRatio ?? 1) : 1;
  const components = componentsOf(input, used, boltzmann, posed);
  const combined = combineComponents(boltzmann, components, input.coverage);
  return {
    ...readInterval(boltzmann.inverseKtPerEv, widening * boltzmann.inverseKtSigmaPerEv, {
      coverage: input.coverage,
      effectiveDegreesOfFreedom: combined.effectiveDegreesOfFreedom,
    }),
    used,
    boltzmann,
    problem: posed.problem,
    components,
    combined,
    coverage: input.coverage,
    birgeRatio,
    widening,
    escape,
    absorbed: null,
  };
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
    problem: null,
    components: [],
    combined: null,
    kelvin: null,
    sigmaKelvin: null,
    lowKelvin: null,
    highKelvin: null,
    coverage: input.coverage,
    birgeRatio: null,
    widening: 1,
    escape: null,
    absorbed: null,
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

type Interval = Pick<
  TemperatureFit,
  'status' | 'reason' | 'kelvin' | 'sigmaKelvin' | 'lowKelvin' | 'highKelvin'
>;

/**
 * T = 1/(k b) with the interval of b, 1/(kT) per eV, turned over: the interval of T is not symmetric, and ends in a lower
 * limit where b is not told from zero.
 */
function readInterval(
  b: number,
  sigma: number,
  known: { readonly coverage: number; readonly effectiveDegreesOfFreedom: number },
): Interval {
  const none = { kelvin: null, sigmaKelvin: null, lowKelvin: null, highKelvin: null };
  const k = coverageFactor(known.coverage, known.effectiveDegreesOfFreedom);
  const toKelvin = (inverse: number): number => 1 / (boltzmannEvPerK * inverse);
  if (b - k * sigma > 0) {
    const kelvin = toKelvin(b);
    return {
      status: 'measured',
      reason: '',
      kelvin,
      sigmaKelvin: kelvin * (sigma / b),
      lowKelvin: toKelvin(b + k * sigma),
      highKelvin: toKelvin(b - k * sigma),
    };
  }
  // One-sided: the chance that the true temperature lies below the limit is 1 - coverage.
  const oneSided = coverageFactor(2 * known.coverage - 1, known.effectiveDegreesOfFreedom);
  const steepest = b + oneSided * sigma;
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
