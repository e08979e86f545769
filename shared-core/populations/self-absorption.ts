import { chiSquareUpperTail, normalQuantile } from '../numeric/distributions.ts';
import { log } from '../numeric/portable-math.ts';
import { balmerAbsorption, type LineAbsorption } from '../physics/balmer-absorption.ts';
import type { LampConditions } from '../physics/line-widths.ts';
import { areaDeficit } from './area-deficit.ts';
import type { ErrorComponent } from './error-component.ts';
import { fitBoltzmann } from './fit-boltzmann.ts';
import { depthOfDeficit, fitOpticalDepth, type OpticalDepthFit } from './optical-depth.ts';
import { poseBoltzmann } from './pose-boltzmann.ts';
import { coversNm } from './response-at.ts';
import {
  type AbsorbedPlot,
  describeTemperature,
  type TemperatureFit,
  type TemperatureInput,
} from './temperature.ts';

/** What the deficit of H-alpha against the line through the others says of self-absorption. */
export interface SelfAbsorption {
  readonly status: 'none-seen' | 'suspected' | 'not-testable';
  /** Why it cannot be tested, in one clause; else empty. */
  readonly reason: string;
  /** ln(expected/measured area of H-alpha), its standard uncertainty, and the one over the other. */
  readonly deficit: number | null;
  readonly deficitSigma: number | null;
  readonly significance: number | null;
  /** Optical depth at the centre of H-alpha; null unless suspected and consistent. */
  readonly opticalDepth: number | null;
  readonly low: number | null;
  /** Also without a depth: one-sided upper limit. Null when the curve of growth is too flat to bound it. */
  readonly high: number | null;
  /** Share of the light of H-alpha that leaves the lamp. */
  readonly areaFactor: number | null;
  readonly predictedHBetaFactor: number | null;
  /** Whether all lines agree with one depth and one temperature (p > 0.01); null where nothing is left to test it. */
  readonly isConsistent: boolean | null;
  /** The temperature with the depth fitted along; null unless suspected and consistent. */
  readonly corrected: TemperatureFit | null;
}

/** The gas that absorbs, as far as it is known. */
export interface AbsorbingGas {
  readonly lamp: LampConditions;
  /** Electrons per m^3: the density taken, and what bounds it, `halfRange` standard uncertainties either way. */
  readonly electrons: {
    readonly low: number;
    readonly middle: number;
    readonly high: number;
    readonly halfRange: number;
  };
}

/** One-sided chance of a false alarm of 1 %. */
export const leastDeficitSignificance = 2.3263;
const leastConsistency = 0.01;
/**
 * The correction frees the plot from the direction in which the depth moves it. As a covariance along that direction this
 * many times the uncertainty of the depth frees it to one part in two thousand, and keeps the matrix well conditioned.
 */
const freedomSigmas = 30;

/**
 * Self-absorption of H-alpha: the other lines predict its area, the deficit gives the depth by the curve of growth, and
 * the depth predicts the deficits of all other lines. Found by one fit of temperature and depth to all lines.
 *
 * The interval is that of the deficit, which is nearer to normal than the depth, read through the curve of growth.
 *
 * The Stark part of the absorbing shapes is known within limits only; what it leaves open is part of the covariance.
 *
 * @source curve of growth: [Ladenburg1913]; test of an added variable: [Draper1998] ch. 12
 * @check  test/property/self-absorption.test.ts
 */
export function judgeSelfAbsorption(
  input: TemperatureInput,
  temperature: TemperatureFit,
  gas: AbsorbingGas,
): SelfAbsorption {
  const { lines } = input;
  const alpha = lines.findIndex(({ upperLevel, lowerLevel }) => upperLevel === 3 && lowerLevel === 2);
  const fault = whyNot(input, temperature, alpha);
  if (fault !== null) return untested(fault);
  const used = [...new Set([alpha, ...temperature.used])].sort((a, b) => a - b);
  const row = used.indexOf(alpha);
  const posed = poseBoltzmann(input, used);
  const deficit = areaDeficit(posed.problem, row);
  if (deficit === null) return untested('the plot without H-alpha did not settle');
  const significance = deficit.value / deficit.sigma;
  const measured = { deficit: deficit.value, deficitSigma: deficit.sigma, significance };
  if (significance < leastDeficitSignificance) {
    if (input.response === null && input.bench.detector?.signal !== 'energy') {
      return {
        ...untested('without a response table a response that favours the red would hide it'),
        ...measured,
      };
    }
    const limit = Math.max(0, deficit.value) + normalQuantile(input.coverage) * deficit.sigma;
    const { curve } = balmerAbsorption([lines[alpha]!], gas.lamp, gas.electrons.middle, lines[alpha]!)[0]!;
    return { ...untested(''), ...measured, status: 'none-seen', low: 0, high: depthOfDeficit(curve, limit) };
  }
  const suspected = { ...untested(''), ...measured, status: 'suspected', low: 0 } as const;
  const at = (electronsPerCubicMetre: number): readonly LineAbsorption[] =>
    balmerAbsorption(
      used.map((i) => lines[i]!),
      gas.lamp,
      electronsPerCubicMetre,
      lines[alpha]!,
    );
  const absorption = at(gas.electrons.middle);
  const { curve } = absorption[row]!;
  const opticalDepth = depthOfDeficit(curve, deficit.value);
  if (opticalDepth === null) return suspected;
  const first = fitOpticalDepth(posed.problem, absorption, { ...deficit, opticalDepth });
  if (first === null) return suspected;
  const shape = shapeCovariance(first.opticalDepth, at(gas.electrons.low), at(gas.electrons.high), gas);
  const problem = {
    ...posed.problem,
    relativeCovariance: posed.problem.relativeCovariance.map((value, index) => value + shape[index]!),
  };
  const joint = fitOpticalDepth(problem, absorption, { ...deficit, opticalDepth: first.opticalDepth });
  if (joint === null) return suspected;
  const isConsistent =
    joint.degreesOfFreedom < 1
      ? null
      : chiSquareUpperTail(joint.chiSquare, joint.degreesOfFreedom) > leastConsistency;
  if (isConsistent === false) return { ...suspected, isConsistent };
  const beta = used.findIndex((i) => lines[i]!.upperLevel === 4 && lines[i]!.lowerLevel === 2);
  const betaAbsorption = beta < 0 ? null : absorption[beta]!;
  return {
    ...suspected,
    ...depthInterval(curve, joint, row, input.coverage),
    opticalDepth: joint.opticalDepth,
    areaFactor: joint.share[row]!,
    predictedHBetaFactor:
      betaAbsorption === null
        ? null
        : betaAbsorption.curve.escapeAt(joint.opticalDepth * betaAbsorption.relativeDepth).share,
    isConsistent,
    corrected: correct(input, used, joint, shape, {
      problem,
      absorption,
      start: { ...deficit, inverseKtPerEv: joint.inverseKtPerEv, opticalDepth: joint.opticalDepth },
    }),
  };
}

function whyNot(
  { fits, lines, response, whyNoFits }: TemperatureInput,
  temperature: TemperatureFit,
  alpha: number,
): string | null {
  if (fits.fits.length === 0) return whyNoFits ?? 'no line was fitted';
  if (alpha < 0) {
    return fits.obstacles.get('H-alpha')?.kind === 'core-deficit'
      ? 'the top of H-alpha lies too low for its area to be used, by soft clipping or by strong self-absorption'
      : 'H-alpha could not be fitted';
  }
  const fit = fits.fits[alpha]!;
  if (fit.status !== 'converged' || !(fit.area > 5 * fit.areaSigma)) return 'H-alpha is too faint';
  if (response !== null && !coversNm(response, fit.referenceNm))
    return 'the response table does not reach H-alpha';
  const others = temperature.used.filter((i) => i !== alpha && lines[i]!.lowerLevel === 2);
  return others.length < 2 || temperature.boltzmann === null
    ? 'it needs two usable lines besides H-alpha'
    : null;
}

function untested(reason: string): SelfAbsorption {
  return {
    status: 'not-testable',
    reason,
    deficit: null,
    deficitSigma: null,
    significance: null,
    opticalDepth: null,
    low: null,
    high: null,
    areaFactor: null,
    predictedHBetaFactor: null,
    isConsistent: null,
    corrected: null,
  };
}

function depthInterval(
  curve: LineAbsorption['curve'],
  joint: OpticalDepthFit,
  row: number,
  coverage: number,
): Pick<SelfAbsorption, 'low' | 'high'> {
  const deficit = -log(joint.share[row]!);
  const half =
    normalQuantile(0.5 * (1 + coverage)) * joint.opticalDepthSigma * Math.abs(joint.logSlope[row]!);
  return {
    low: Math.max(0, depthOfDeficit(curve, deficit - half) ?? 0),
    high: depthOfDeficit(curve, deficit + half),
  };
}

/** What the limits of the density leave open of ln(share) at a depth: one error common to all lines. */
function shapeCovariance(
  opticalDepth: number,
  low: readonly LineAbsorption[],
  high: readonly LineAbsorption[],
  { electrons }: AbsorbingGas,
): Float64Array {
  const n = low.length;
  const sigma = low.map((line, i) => {
    const lnShare = ({ curve, relativeDepth }: LineAbsorption): number =>
      log(curve.escapeAt(opticalDepth * relativeDepth).share);
    return (lnShare(high[i]!) - lnShare(line)) / (2 * electrons.halfRange);
  });
  const covariance = new Float64Array(n * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) covariance[i * n + j] = sigma[i]! * sigma[j]!;
  }
  return covariance;
}

/** The Boltzmann plot of what the atoms emitted, free along the direction in which the depth moves it. */
function correct(
  input: TemperatureInput,
  used: readonly number[],
  joint: OpticalDepthFit,
  shape: Float64Array,
  absorbed: AbsorbedPlot,
): TemperatureFit | null {
  const n = used.length;
  const posed = poseBoltzmann(input, used);
  const freedom = freedomSigmas * joint.opticalDepthSigma;
  const covariance = shape.slice();
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      covariance[i * n + j] =
        covariance[i * n + j]! + joint.logSlope[i]! * joint.logSlope[j]! * freedom * freedom;
    }
  }
  const component: ErrorComponent = {
    id: 'self-absorption',
    label: 'self-absorption of H-alpha',
    remedy: 'Look across the narrow side of the tube, or run it at a lower current',
    isHalvedByRemedy: false,
    covariance,
    degreesOfFreedom: null,
    standardUncertainty: null,
    unit: '',
  };
  const freed = {
    ...posed,
    problem: {
      ...posed.problem,
      areaPerPopulation: posed.problem.areaPerPopulation.map((value, i) => value * joint.share[i]!),
      relativeCovariance: posed.problem.relativeCovariance.map((value, at) => value + covariance[at]!),
    },
    calibration: [...posed.calibration, component],
  };
  const boltzmann = fitBoltzmann(freed.problem);
  if (boltzmann === null || !boltzmann.isConverged) return null;
  const { line } = boltzmann;
  // The depth is fitted too, which costs one degree of freedom.
  const counted = { ...boltzmann, line: { ...line, degreesOfFreedom: line.degreesOfFreedom - 1 } };
  const escape = new Map(used.map((i, at) => [input.fits.fits[i]!.id, joint.share[at]!]));
  return { ...describeTemperature(input, used, counted, freed, escape), absorbed };
}
