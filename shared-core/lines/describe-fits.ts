import { chiSquareUpperTail } from '../numeric/distributions.ts';
import { noiseMemory } from '../noise/noise-memory.ts';
import { voigtFwhmNm } from '../numeric/voigt-pixel.ts';
import { deuteriumPlaces, type Additions } from './additions.ts';
import { pixelAt } from '../axis/pixel-at.ts';
import type { WindowPlan } from './choose-windows.ts';
import {
  deuteriumIndex,
  instrumentIndex,
  lineBase,
  offsetIndex,
  starkIndex,
  stretchIndex,
} from './joint-problem.ts';
import { lineShape, type LineShape } from './line-shape.ts';
import type { PlannedFit } from './planned-fit.ts';
import type { FitLinesInput, SolvedFit } from './solved-fit.ts';
import { correlatedCovariance } from './correlated-covariance.ts';
import { gasFromWidths } from './gas-from-widths.ts';
import { sampleModel } from './sample-model.ts';
import type { FitWindow, LineFit, LineFits } from './line-fit.ts';

/** Core pixels that fit this badly widen the line's uncertainty by sqrt(reduced chi-square). */
const misfitPValue = 1e-3;

/** Turns a solution (or none) into LineFits: areas, shapes, their covariance, curves for the figures. */
export function describeFits(input: FitLinesInput, plan: WindowPlan, planned: PlannedFit | null): LineFits {
  const none = new Float64Array(0);
  const isWanted = (id: string): boolean => input.lines.some((line) => line.id === id);
  const windows = plan.windows.filter(({ lineId }) => isWanted(lineId));
  const common = {
    obstacles: new Map([...plan.obstacles].filter(([id]) => isWanted(id))),
    windows,
    instrumentFrom: input.bench.instrument?.fwhmNm === undefined ? 'recording' : 'bench',
  } as const;
  if (planned === null) {
    return {
      ...common,
      correlatedNoise: null,
      neighbours: plan.neighbours,
      status: 'not-fitted',
      sharing: 'shared',
      fits: [],
      areaCovariance: none,
      baselineCovariance: none,
      deuterium: null,
      gasTemperature: null,
      companions: [],
      chiSquare: 0,
      degreesOfFreedom: 0,
      variancePerSignal: input.recording.noise.variancePerSignal,
      instrumentFwhmNm: input.search.fwhmNm,
      instrumentFwhmSigmaNm: input.search.fwhmNm,
      axisShift: { offsetNm: 0, offsetSigmaNm: 0, stretch: 0, stretchSigma: 0 },
      modelled: none,
      baseline: none,
      pixelVariance: none,
      curveOf: () => none,
    };
  }
  const { fit, additions } = planned;
  const { problem, model, solution } = fit;
  const size = model.parameterCount;
  const { correlation } = input.recording.noise;
  const covariance = correlation.length === 0 ? solution.covariance : correlatedCovariance(fit, correlation);
  const variance = (a: number, b = a): number => covariance[a * size + b]!;
  const fits = input.lines
    .filter(({ id }) => plan.lines.some((line) => line.id === id))
    .map((line) =>
      describeLine(
        fit,
        plan.lines.findIndex(({ id }) => id === line.id),
        line.upperLevel,
        variance,
      ),
    );
  const count = fits.length;
  const areaCovariance = new Float64Array(count * count);
  for (let i = 0; i < count; i++) {
    for (let j = 0; j < count; j++) {
      areaCovariance[i * count + j] =
        variance(lineBase(i), lineBase(j)) * fits[i]!.widening * fits[j]!.widening;
    }
  }
  return {
    ...common,
    correlatedNoise: correlation.length === 0 ? null : { correlation, widening: widening(fit, covariance) },
    neighbours: unexplained(input, plan, additions),
    status: solution.status,
    sharing: problem.lines[0]!.widthDeparture.sigma > 0 ? 'own' : 'shared',
    fits,
    areaCovariance,
    baselineCovariance: baselineCovariance(additions, count),
    deuterium: additions.deuterium
      ? {
          ratio: solution.values[deuteriumIndex]!,
          ratioSigma: Math.sqrt(variance(deuteriumIndex)),
          isFitted: true,
        }
      : additions.deuteriumIfFitted && { ...additions.deuteriumIfFitted, isFitted: false },
    gasTemperature: gasFromWidths(input, fit),
    companions: additions.companions.map(({ hostId, species, line }, index) => ({
      lineId: hostId,
      species,
      referenceNm: line.referenceNm,
      area: solution.values[lineBase(plan.lines.length + index)]!,
      areaSigma: Math.sqrt(variance(lineBase(plan.lines.length + index))),
    })),
    chiSquare: solution.chiSquare,
    degreesOfFreedom: solution.degreesOfFreedom,
    variancePerSignal: problem.variancePerSignal,
    instrumentFwhmNm: solution.values[instrumentIndex]!,
    instrumentFwhmSigmaNm: Math.sqrt(variance(instrumentIndex)),
    axisShift: {
      offsetNm: solution.values[offsetIndex]!,
      offsetSigmaNm: Math.sqrt(variance(offsetIndex)),
      stretch: solution.values[stretchIndex]!,
      stretchSigma: Math.sqrt(variance(stretchIndex)),
    },
    modelled: model.modelled,
    baseline: model.baseline,
    pixelVariance: model.variance,
    curveOf: (windowIndex, pointsPerPixel) => drawWindow(fit, windows[windowIndex]!, pointsPerPixel),
  };
}

/**
 * What leaving hinted light and curvatures out of the background may do to the areas: for each, the shift that fitting it
 * would bring squared, less the part that noise alone makes of it. What is below two sigma adds nothing.
 */
function baselineCovariance({ leftOut }: Additions, count: number): Float64Array {
  const covariance = new Float64Array(count * count);
  for (const { z, areaShift } of leftOut) {
    const beyondNoise = Math.max(0, 1 - 4 / (z * z));
    for (let i = 0; i < count; i++) {
      for (let j = 0; j < count; j++) {
        const at = i * count + j;
        covariance[at] = covariance[at]! + beyondNoise * areaShift[i]! * areaShift[j]!;
      }
    }
  }
  return covariance;
}

/** By what correlated noise widens the brightest line's area against white noise of the same size. */
function widening({ problem, model, solution }: SolvedFit, covariance: Float64Array): number {
  const areas = Array.from(problem.lines.keys(), lineBase);
  const brightest = areas.reduce((so, next) => (solution.values[next]! > solution.values[so]! ? next : so));
  const at = brightest * model.parameterCount + brightest;
  return Math.sqrt(covariance[at]! / solution.covariance[at]!);
}

/** Peaks beside a line that nothing in the fit stands for. */
function unexplained(
  { search }: FitLinesInput,
  { neighbours, lines }: WindowPlan,
  { companions, deuterium }: Additions,
): ReadonlyMap<string, number> {
  const fitted = [
    ...companions.map(({ line }) => line.nominalCentreNm),
    ...(deuterium ? lines.flatMap(deuteriumPlaces) : []),
  ];
  return new Map(
    [...neighbours].filter(([, nm]) => fitted.every((at) => Math.abs(at - nm) > 0.5 * search.fwhmNm)),
  );
}

/** The window's part of its segment's curve. */
function drawWindow(fit: SolvedFit, { firstPx, endPx }: FitWindow, pointsPerPixel: number): Float64Array {
  const index = fit.problem.segments.findIndex(
    (segment) => segment.firstPx <= firstPx && endPx <= segment.endPx,
  );
  const from = (firstPx - fit.problem.segments[index]!.firstPx) * pointsPerPixel;
  return sampleModel(fit, index, pointsPerPixel).slice(from, from + (endPx - firstPx) * pointsPerPixel);
}

function describeLine(
  { problem, model, solution }: SolvedFit,
  index: number,
  upperLevel: number,
  covariance: (a: number, b?: number) => number,
): LineFit {
  const line = problem.lines[index]!;
  const { values } = solution;
  const base = lineBase(index);
  const shape = lineShape(problem, values, index);
  const core = coreChiSquare(problem, model, shape);
  const reducedChiSquare = core.count > 0 ? core.chiSquare / core.count : 0;
  // Correlated noise makes chi-square scatter as if there were fewer pixels.
  const spread = noiseMemory(problem.recording.noise.correlation).varianceOfChiSquare;
  const isMisfit =
    reducedChiSquare > 1 && chiSquareUpperTail(core.chiSquare / spread, core.count / spread) < misfitPValue;
  const widening = isMisfit ? Math.sqrt(reducedChiSquare) : 1;

  const u = line.referenceNm - problem.pivotNm;
  const centreVariance =
    covariance(offsetIndex) +
    u * u * covariance(stretchIndex) +
    covariance(base + 1) +
    2 *
      (u * covariance(offsetIndex, stretchIndex) +
        covariance(offsetIndex, base + 1) +
        u * covariance(stretchIndex, base + 1));
  const byStark = line.starkRatio * (1 + values[base + 2]!);
  const byDeparture = line.starkRatio * values[starkIndex]!;
  const lorentzVariance =
    byStark * byStark * covariance(starkIndex) +
    byDeparture * byDeparture * covariance(base + 2) +
    2 * byStark * byDeparture * covariance(starkIndex, base + 2);
  return {
    id: line.id,
    upperLevel,
    referenceNm: line.referenceNm,
    status: solution.status,
    recordedCentreNm: shape.centreNm,
    centreSigmaNm: Math.sqrt(Math.max(0, centreVariance)) * widening,
    area: values[base]!,
    areaSigma: Math.sqrt(covariance(base)) * widening,
    gaussianFwhmNm: shape.gaussianFwhmNm,
    lorentzianFwhmNm: shape.lorentzianFwhmNm,
    lorentzianFwhmSigmaNm: Math.sqrt(Math.max(0, lorentzVariance)) * widening,
    reducedChiSquare,
    coreDegreesOfFreedom: core.count,
    widening,
  };
}

function coreChiSquare(
  problem: SolvedFit['problem'],
  model: SolvedFit['model'],
  shape: LineShape,
): { chiSquare: number; count: number } {
  const { wavelengthNm, netSignal } = problem.recording;
  const reachNm = 2.5 * voigtFwhmNm(shape.gaussianFwhmNm, Math.max(0, shape.lorentzianFwhmNm));
  const from = pixelAt(wavelengthNm, shape.centreNm - reachNm);
  const to = pixelAt(wavelengthNm, shape.centreNm + reachNm);
  let chiSquare = 0;
  let count = 0;
  for (let px = from; px <= to; px++) {
    if (problem.masked[px] === 1 || !(model.variance[px]! > 0)) continue;
    const residual = netSignal[px]! - model.modelled[px]!;
    chiSquare += (residual * residual) / model.variance[px]!;
    count++;
  }
  return { chiSquare, count };
}
