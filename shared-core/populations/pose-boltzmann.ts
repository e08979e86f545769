import type { Bench } from '../bench/bench.ts';
import type { LineFits } from '../lines/line-fit.ts';
import type { HydrogenLine } from '../physics/hydrogen.ts';
import type { ResponseTable } from '../recording/recording.ts';
import { calibrationComponents, lineFitComponents, type ErrorComponent } from './error-component.ts';
import type { BoltzmannInput } from './boltzmann-input.ts';
import type { BoltzmannFit } from './fit-boltzmann.ts';
import { responseAt } from './response-at.ts';

/** The fitted lines with all that turns their areas into populations. */
export interface PopulationInput {
  readonly fits: LineFits;
  /** Of each fit, same order. */
  readonly lines: readonly HydrogenLine[];
  /** nm, true wavelength of each fit in the response table's terms. */
  readonly wavelengthNm: readonly number[];
  readonly response: ResponseTable | null;
  readonly bench: Bench;
}

export interface PosedBoltzmann {
  readonly problem: BoltzmannInput;
  /** Part of problem.areaCovariance that the choice of the baseline adds. */
  readonly baselineCovariance: Float64Array;
  readonly calibration: readonly ErrorComponent[];
}

/** Whether areas, response divided out, stand for energy instead of photons. */
export function isEnergyArea(bench: Bench): boolean {
  return bench.response?.per === 'energy' || bench.detector?.signal === 'energy';
}

/** The Boltzmann plot of the lines `used` (indices into the fits). */
export function poseBoltzmann(input: PopulationInput, used: readonly number[]): PosedBoltzmann {
  const { fits, response, bench } = input;
  const n = used.length;
  const total = fits.fits.length;
  const lines = used.map((i) => input.lines[i]!);
  const wavelengthNm = used.map((i) => input.wavelengthNm[i]!);
  const table = response === null ? null : responseAt(response, wavelengthNm);
  const areaPerPopulation = Float64Array.from(lines, (line, row) => {
    const photons = line.upperWeight * line.transitionProbabilityPerS;
    // Energy ordinate: a photon carries hc/lambda; the constant hc drops out of the slope.
    return (table?.response[row] ?? 1) * (isEnergyArea(bench) ? photons / line.wavelengthVacuumNm : photons);
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
export function componentsOf(
  { fits, bench }: PopulationInput,
  used: readonly number[],
  { ordinateCovariance, expectedArea }: BoltzmannFit,
  { problem, baselineCovariance, calibration }: PosedBoltzmann,
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
