import { boltzmannEvPerK } from '../physics/constants.ts';
import {
  confirmsFirstOrder,
  lastDigitTolerance,
  propagateByDrawing,
  type MonteCarloSummary,
} from '../uncertainty/monte-carlo.ts';
import { absorbedTemperatureDraws, inverseTemperatureDraws } from './temperature-monte-carlo.ts';
import type { TemperatureFit } from './temperature.ts';

/** The temperature by Monte Carlo, beside its first-order interval; all kelvins are turned over from 1/T. */
export interface DrawnTemperature {
  readonly seed: number;
  readonly trials: number;
  readonly isStable: boolean;
  /** Of the mean of 1/T; null where the interval of 1/T reaches zero. */
  readonly kelvin: number | null;
  readonly medianKelvin: number | null;
  readonly sigmaKelvin: number | null;
  readonly lowKelvin: number | null;
  readonly highKelvin: number | null;
  /** Skewness of 1/T. */
  readonly skewness: number;
  /** Whether both ends of the first-order interval of 1/T agree within half a unit of the first digit of its uncertainty. */
  readonly confirmsFirstOrder: boolean;
  /** Why there is no interval, in one clause; else empty. */
  readonly reason: string;
}

/** Enough for two stable digits of nearly every temperature: a second or two of work. */
export const maxMonteCarloTrials = 500_000;
/** Each of these fits a depth as well: up to ten seconds. */
const maxAbsorbedTrials = 100_000;
/** Draws without an answer may be left out while they are this much rarer than those outside the interval. */
const negligibleShare = 0.1;

/**
 * Checks a temperature by drawing all its inputs.
 *
 * @param onTrials  told the number of trials after every batch
 * @returns null where there is nothing to draw from
 * @source [JCGM101] clauses 7 and 8
 * @check  test/property/temperature-monte-carlo.test.ts
 */
export function checkByDrawing(
  temperature: TemperatureFit,
  seed: number,
  onTrials: (trials: number) => void,
): DrawnTemperature | null {
  const { boltzmann, combined, widening, coverage } = temperature;
  const draw = drawsOf(temperature);
  if (boltzmann === null || combined === null || draw === null) return null;
  let summary: MonteCarloSummary | null = null;
  for (const step of propagateByDrawing(draw, {
    seed,
    coverage,
    digits: 2,
    maxTrials: temperature.absorbed === null ? maxMonteCarloTrials : maxAbsorbedTrials,
  })) {
    summary = step;
    onTrials(step.trials);
  }
  if (summary === null) return null;
  const { mean, median, standardUncertainty, trials, failed, isStable, skewness } = summary;
  // A chosen widening is for causes that are not among the inputs drawn.
  const low = mean - widening * (mean - summary.low);
  const high = mean + widening * (summary.high - mean);
  const half = combined.coverageFactor * boltzmann.inverseKtSigmaPerEv * widening;
  const isComplete = failed <= negligibleShare * (1 - coverage) * trials;
  const toKelvin = (inverse: number): number | null =>
    isComplete && inverse > 0 ? 1 / (boltzmannEvPerK * inverse) : null;
  const isBounded = isComplete && low > 0;
  return {
    seed,
    trials,
    isStable,
    kelvin: isBounded ? toKelvin(mean) : null,
    medianKelvin: isBounded ? toKelvin(median) : null,
    sigmaKelvin: isBounded ? (toKelvin(mean)! * widening * standardUncertainty) / mean : null,
    lowKelvin: toKelvin(high),
    highKelvin: toKelvin(low),
    skewness,
    confirmsFirstOrder:
      isComplete &&
      confirmsFirstOrder(
        { low: boltzmann.inverseKtPerEv - half, high: boltzmann.inverseKtPerEv + half },
        { low, high },
        lastDigitTolerance(widening * standardUncertainty, 1),
      ),
    reason: isComplete
      ? ''
      : `in ${String(failed)} of ${String(failed + trials)} trials the depth of self-absorption had no bound`,
  };
}

function drawsOf({ boltzmann, problem, components, absorbed }: TemperatureFit) {
  if (boltzmann === null || problem === null) return null;
  const noiseFreedom = components.find(({ id }) => id === 'noise')?.degreesOfFreedom ?? null;
  return absorbed === null
    ? inverseTemperatureDraws(problem, boltzmann, noiseFreedom)
    : absorbedTemperatureDraws(absorbed, noiseFreedom);
}
