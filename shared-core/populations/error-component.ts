import type { Bench } from '../bench/bench.ts';
import type { LineFits } from '../lines/line-fit.ts';
import type { HydrogenLine } from '../physics/hydrogen.ts';
import type { ResponseTable } from '../recording/recording.ts';
import { strayLightErrors, lampTemperatureErrors } from './response-errors.ts';
import { responseAt, responseCovariance } from './response-at.ts';

export type ErrorComponentId =
  | 'noise'
  | 'baseline-model'
  | 'response'
  | 'response-lamp'
  | 'stray-light'
  | 'transition-probabilities'
  | 'axis'
  | 'self-absorption';

/** A named part of the covariance of the ordinates; all parts add up to the covariance that the fit used. */
export interface ErrorComponent {
  readonly id: ErrorComponentId;
  /** Plain words, lower case: "temperature of the standard lamp". */
  readonly label: string;
  /** What lowers it, imperative, without a full stop. */
  readonly remedy: string;
  /** Whether following the remedy halves it; otherwise the remedy stands alone. */
  readonly isHalvedByRemedy: boolean;
  /** Row-major over the used lines, dimensionless: covariance of the relative errors of the areas. */
  readonly covariance: Float64Array;
  /** Null where the standard uncertainty counts as known. */
  readonly degreesOfFreedom: number | null;
  /** Where one number states the cause; null where every line has its own. */
  readonly standardUncertainty: number | null;
  /** "K", "nm"; "1" for a share or a relative error; empty with a null uncertainty. */
  readonly unit: string;
}

/** Relative standard uncertainty of averaged transition probabilities of hydrogen [Wiese2009]. */
export const transitionProbabilityRelativeSigma = 1e-4;
const assumedAxisSigmaNm = 0.02;

export interface CalibrationInput {
  readonly lines: readonly HydrogenLine[];
  /** nm, in the response table's terms. */
  readonly wavelengthNm: readonly number[];
  readonly response: ResponseTable | null;
  readonly bench: Bench;
}

/**
 * The error components that come from calibration and atomic data, in the order of the chain; those that cannot act
 * on these lines (no response table, no lamp stated) are left out.
 *
 * Each is rank one, C_ij = d_i d_j u^2 with one sensitivity d a line, but for the table (see responseCovariance) and
 * the transition probabilities (independent).
 *
 * @source [JCGM2008] 5.2: components of uncertainty by cause
 * @check  test/unit/populations/error-component.test.ts
 */
export function calibrationComponents({
  lines,
  wavelengthNm,
  response,
  bench,
}: CalibrationInput): readonly ErrorComponent[] {
  const n = lines.length;
  const atomic: ErrorComponent = {
    id: 'transition-probabilities',
    label: 'transition probabilities',
    remedy: 'Nothing needs doing: they are known to one part in ten thousand',
    isHalvedByRemedy: false,
    covariance: diagonal(n, transitionProbabilityRelativeSigma * transitionProbabilityRelativeSigma),
    degreesOfFreedom: null,
    standardUncertainty: transitionProbabilityRelativeSigma,
    unit: '1',
  };
  if (response === null) return [atomic];
  const table = responseAt(response, wavelengthNm);
  const parts: ErrorComponent[] = [
    {
      id: 'response',
      label: 'spectral response',
      remedy: 'Halve the uncertainty of the response table',
      isHalvedByRemedy: true,
      covariance: responseCovariance(
        wavelengthNm,
        table.relativeSigma,
        bench.response?.correlationLengthNm ?? 0,
      ),
      degreesOfFreedom: null,
      standardUncertainty: null,
      unit: '',
    },
  ];
  const lamp = bench.response?.lamp;
  if (lamp !== undefined) {
    const vacuumNm = lines.map(({ wavelengthVacuumNm }) => wavelengthVacuumNm);
    parts.push({
      id: 'response-lamp',
      label: 'temperature of the standard lamp',
      remedy: 'Have the standard lamp calibrated to half its temperature uncertainty',
      isHalvedByRemedy: true,
      covariance: rankOne(lampTemperatureErrors(vacuumNm, lamp.temperatureK), lamp.sigmaK),
      degreesOfFreedom: null,
      standardUncertainty: lamp.sigmaK,
      unit: 'K',
    });
  }
  const strayLight = bench.response?.strayLight;
  if (strayLight !== undefined) {
    parts.push({
      id: 'stray-light',
      label: 'stray light of the standard lamp',
      remedy: 'Measure the stray light with a long-pass filter before the standard lamp',
      isHalvedByRemedy: true,
      covariance: rankOne(strayLightErrors(response, bench, wavelengthNm), strayLight.sigma),
      degreesOfFreedom: null,
      standardUncertainty: strayLight.sigma,
      unit: '1',
    });
  }
  // A shift of the whole axis reads every response a little off: one error common to all lines.
  const axisSigmaNm = bench.axis?.sigmaNm ?? assumedAxisSigmaNm;
  parts.push(atomic, {
    id: 'axis',
    label: 'wavelength axis',
    remedy: 'Halve the axis uncertainty',
    isHalvedByRemedy: true,
    covariance: rankOne(table.logSlopePerNm, axisSigmaNm),
    degreesOfFreedom: null,
    standardUncertainty: axisSigmaNm,
    unit: 'nm',
  });
  return parts;
}

/**
 * The components that come from the line fit, as relative covariances: noise with what widened it, and the choice of
 * the baseline. `noiseCovariance` is that of the fit used, relative to the expected areas.
 */
export function lineFitComponents(
  fits: LineFits,
  used: readonly number[],
  covariances: { readonly noise: Float64Array; readonly baseline: Float64Array },
  bench: Bench,
): readonly ErrorComponent[] {
  const isWidened = used.some((index) => fits.fits[index]!.widening > 1);
  const isStated = bench.detector?.gainElectronsPerCount !== undefined;
  const noise: ErrorComponent = {
    id: 'noise',
    label: isWidened ? 'noise and misfit of the line areas' : 'noise of the line areas',
    remedy: isWidened
      ? 'Measure the instrument profile and check focus and slit: more light does not lower a misfit'
      : 'Collect four times the light (exposure or repeats)',
    isHalvedByRemedy: !isWidened,
    covariance: covariances.noise,
    // Measured on the residuals unless the bench states gain and read noise.
    degreesOfFreedom: isStated ? null : Math.max(1, fits.degreesOfFreedom),
    standardUncertainty: null,
    unit: '',
  };
  if (covariances.baseline.every((value) => value === 0)) return [noise];
  return [
    noise,
    {
      id: 'baseline-model',
      label: 'shape of the background under the lines',
      remedy: 'Use a narrower slit, or a tube with less molecular light',
      isHalvedByRemedy: false,
      covariance: covariances.baseline,
      degreesOfFreedom: null,
      standardUncertainty: null,
      unit: '',
    },
  ];
}

function diagonal(n: number, value: number): Float64Array {
  const matrix = new Float64Array(n * n);
  for (let i = 0; i < n; i++) matrix[i * n + i] = value;
  return matrix;
}

function rankOne(sensitivity: Float64Array, sigma: number): Float64Array {
  const n = sensitivity.length;
  const matrix = new Float64Array(n * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) matrix[i * n + j] = sensitivity[i]! * sensitivity[j]! * sigma * sigma;
  }
  return matrix;
}
