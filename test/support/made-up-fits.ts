import type { LineFit, LineFits } from '../../shared-core/lines/line-fit.ts';
import type { HydrogenLine } from '../../shared-core/physics/hydrogen.ts';
import type { TemperatureInput } from '../../shared-core/populations/temperature.ts';

export interface MadeUpLine {
  readonly line: HydrogenLine;
  readonly area: number;
  readonly relativeSigma: number;
}

/** Line fits that no recording gave: independent areas with the stated uncertainties, all else without fault. */
export function madeUpFits(made: readonly MadeUpLine[], change: Partial<LineFits> = {}): LineFits {
  const n = made.length;
  const areaCovariance = new Float64Array(n * n);
  for (const [i, { area, relativeSigma }] of made.entries()) {
    areaCovariance[i * n + i] = (area * relativeSigma) ** 2;
  }
  return {
    status: 'converged',
    sharing: 'shared',
    fits: made.map(({ line, area, relativeSigma }): LineFit => ({
      id: line.id,
      upperLevel: line.upperLevel,
      referenceNm: line.wavelengthAirNm,
      status: 'converged',
      recordedCentreNm: line.wavelengthAirNm,
      centreSigmaNm: 0.001,
      area,
      areaSigma: Math.abs(area) * relativeSigma,
      gaussianFwhmNm: 0.18,
      lorentzianFwhmNm: 0,
      lorentzianFwhmSigmaNm: 0.002,
      reducedChiSquare: 1,
      coreDegreesOfFreedom: 20,
      widening: 1,
    })),
    obstacles: new Map(),
    neighbours: new Map(),
    areaCovariance,
    chiSquare: 100,
    degreesOfFreedom: 100,
    variancePerSignal: 0,
    instrumentFwhmNm: 0.18,
    instrumentFwhmSigmaNm: 0.004,
    instrumentFrom: 'bench',
    axisShift: { offsetNm: 0, offsetSigmaNm: 0.001, stretch: 0, stretchSigma: 1e-6 },
    deuterium: null,
    gasTemperature: null,
    companions: [],
    baselineCovariance: new Float64Array(n * n),
    correlatedNoise: null,
    modelled: new Float64Array(0),
    baseline: new Float64Array(0),
    pixelVariance: new Float64Array(0),
    windows: [],
    curveOf: () => new Float64Array(0),
    ...change,
  };
}

/** The question that made-up lines put to the population stage; no response table unless one is given. */
export function madeUpInput(
  made: readonly MadeUpLine[],
  change: Partial<TemperatureInput> = {},
): TemperatureInput {
  return {
    fits: madeUpFits(made),
    lines: made.map(({ line }) => line),
    wavelengthNm: made.map(({ line }) => line.wavelengthAirNm),
    response: null,
    bench: {},
    barred: new Set(),
    coverage: 0.95,
    widening: 'none',
    whyNoFits: null,
    ...change,
  };
}

/** Photon areas of Boltzmann populations, H-alpha being `brightest`. */
export function boltzmannArea(
  line: HydrogenLine,
  alpha: HydrogenLine,
  kelvin: number,
  brightest = 1e6,
): number {
  const weight = ({ upperWeight, transitionProbabilityPerS }: HydrogenLine): number =>
    upperWeight * transitionProbabilityPerS;
  const boltzmann = Math.exp((alpha.upperEnergyEv - line.upperEnergyEv) / (8.617333262e-5 * kelvin));
  return ((brightest * weight(line)) / weight(alpha)) * boltzmann;
}
