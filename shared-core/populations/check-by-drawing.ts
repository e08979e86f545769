import { boltzmannEvPerK } from '../physics/constants.ts';
import { normalQuantile } from '../numeric/distributions.ts';
import {
  confirmsFirstOrder,
  lastDigitTolerance,
  propagateByDrawing,
  type MonteCarloSummary,
} from '../uncertainty/monte-carlo.ts';
import { inverseTemperatureDraws } from './temperature-monte-carlo.ts';
import type { TemperatureFit } from './temperature.ts';

/** The temperature by Monte Carlo, beside its first-order interval. */
export interface DrawnTemperature {
  readonly seed: number;
  readonly trials: number;
  readonly isStable: boolean;
  /** Turned over from 1/T; null where the interval of 1/T reaches zero. */
  readonly kelvin: number | null;
  readonly sigmaKelvin: number | null;
  readonly lowKelvin: number | null;
  readonly highKelvin: number | null;
  /** Whether both ends of the first-order interval of 1/T agree within half a unit of the first digit of its uncertainty. */
  readonly confirmsFirstOrder: boolean;
}

/** Enough for two stable digits of nearly every temperature; a second of work. */
export const maxMonteCarloTrials = 500_000;

/**
 * Checks a temperature by drawing all its inputs.
 *
 * @param onTrials  told the number of trials after every batch
 * @returns null where there is nothing to draw from: no plot, or one corrected for self-absorption, whose depth is no input
 * @source [JCGM101] clauses 7 and 8
 * @check  test/property/temperature-monte-carlo.test.ts
 */
export function checkByDrawing(
  { boltzmann, problem, escape, widening, coverage }: TemperatureFit,
  seed: number,
  onTrials: (trials: number) => void,
): DrawnTemperature | null {
  if (boltzmann === null || problem === null || escape !== null) return null;
  const draw = inverseTemperatureDraws(problem, boltzmann);
  if (draw === null) return null;
  let summary: MonteCarloSummary | null = null;
  for (const step of propagateByDrawing(draw, {
    seed,
    coverage,
    digits: 2,
    maxTrials: maxMonteCarloTrials,
  })) {
    summary = step;
    onTrials(step.trials);
  }
  if (summary === null) return null;
  const { mean, standardUncertainty, trials, isStable } = summary;
  // A chosen widening is for causes that are not among the inputs drawn.
  const low = mean - widening * (mean - summary.low);
  const high = mean + widening * (summary.high - mean);
  const half = normalQuantile(0.5 * (1 + coverage)) * boltzmann.inverseKtSigmaPerEv * widening;
  const toKelvin = (inverse: number): number | null => (inverse > 0 ? 1 / (boltzmannEvPerK * inverse) : null);
  const isBounded = low > 0;
  return {
    seed,
    trials,
    isStable,
    kelvin: isBounded ? toKelvin(mean) : null,
    sigmaKelvin: isBounded ? (toKelvin(mean)! * widening * standardUncertainty) / mean : null,
    lowKelvin: toKelvin(high),
    highKelvin: toKelvin(low),
    confirmsFirstOrder: confirmsFirstOrder(
      { low: boltzmann.inverseKtPerEv - half, high: boltzmann.inverseKtPerEv + half },
      { low, high },
      lastDigitTolerance(standardUncertainty, 1),
    ),
  };
}
