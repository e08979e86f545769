import { setVariance } from './pixel-variance.ts';
import { addBlock, createBlock, quadraticForm, type Block } from './segment-block.ts';
import { roughExpectation, startLinearParameters } from './start-values.ts';
import { voigtPixel, type PixelShare } from '../numeric/voigt-pixel.ts';
import {
  instrumentIndex,
  lineBase,
  lineParameterCount,
  offsetIndex,
  segmentBase,
  sharedParameterCount,
  starkIndex,
  stretchIndex,
  type Belief,
  type Evaluation,
  type JointProblem,
} from './joint-problem.ts';

interface LeverageRequest {
  readonly covariance: Float64Array;
  readonly out: Float64Array;
}

export interface JointModel {
  readonly parameterCount: number;
  /** Parameter number of each active parameter. */
  readonly active: Int32Array;
  readonly values: Float64Array;
  readonly beliefs: readonly Belief[];
  /** Per pixel of the recording: model, baseline, variance used as weight; defined inside segments only. */
  readonly modelled: Float64Array;
  readonly baseline: Float64Array;
  readonly variance: Float64Array;
  readonly pixelCount: number;
  newEvaluation(): Evaluation;
  evaluate(values: Float64Array, out: Evaluation): void;
  /** Leverage of each pixel, 0 to 1, at a solution with its full covariance; length of the recording. */
  leverages(values: Float64Array, covariance: Float64Array): Float64Array;
  /** Recomputes the weights from the model last evaluated. */
  reweigh(): void;
}

/** Centre, widths and area of one line at the given parameter values. */
export interface LineShape {
  centreNm: number;
  gaussianFwhmNm: number;
  lorentzianFwhmNm: number;
}

export function lineShape(problem: JointProblem, values: Float64Array, line: number, out: LineShape): void {
  const { nominalCentreNm, referenceNm, extraFwhmSquaredNm2, starkRatio, fixedLorentzianFwhmNm } =
    problem.lines[line]!;
  const base = lineBase(line);
  const instrument = values[instrumentIndex]! * (1 + values[base + 3]!);
  out.centreNm =
    nominalCentreNm +
    values[offsetIndex]! +
    values[stretchIndex]! * (referenceNm - problem.pivotNm) +
    values[base + 1]!;
  out.gaussianFwhmNm = Math.sqrt(instrument * instrument + extraFwhmSquaredNm2);
  out.lorentzianFwhmNm = fixedLorentzianFwhmNm + starkRatio * values[starkIndex]! * (1 + values[base + 2]!);
}

/**
 * The joint model of all lines: signal of a pixel = straight local baseline + sum over lines of
 * area x (share of a unit-area Voigt profile that falls on the pixel).
 *
 * Units: areas in counts (or signal nm for a spectral density), widths and centres in nm on the recorded axis,
 * baselines in counts with the slope per half segment. All derivatives are analytic.
 *
 * @check test/unit/lines/joint-model.test.ts (derivatives against finite differences)
 */
export function createJointModel(problem: JointProblem): JointModel {
  const { recording, masked, lines, segments } = problem;
  const lineCount = lines.length;
  const parameterCount = segmentBase(lineCount, segments.length);
  const beliefs = listBeliefs(problem, parameterCount);
  const active = Int32Array.from(beliefs.keys()).filter((index) => beliefs[index]!.sigma > 0);
  const position = new Int32Array(parameterCount).fill(-1);
  active.forEach((parameter, index) => (position[parameter] = index));
  const n = recording.netSignal.length;
  const modelled = new Float64Array(n);
  const baseline = new Float64Array(n);
  const variance = new Float64Array(n);
  const values = Float64Array.from(beliefs, (belief) => (Number.isFinite(belief.mean) ? belief.mean : 0));
  values[instrumentIndex] = problem.start.instrumentFwhmNm;
  values[starkIndex] = problem.start.starkFwhmNm;
  startLinearParameters(problem, values);
  let pixelCount = 0;
  for (const segment of segments) {
    for (let px = segment.firstPx; px < segment.endPx; px++) {
      if (masked[px] === 0) pixelCount++;
    }
  }
  setVariance(problem, problem.expected ?? roughExpectation(problem, values, baseline), variance);

  const share: PixelShare = { share: 0, byCentre: 0, byGaussianFwhm: 0, byLorentzianFwhm: 0 };
  const shapes: LineShape[] = lines.map(() => ({ centreNm: 0, gaussianFwhmNm: 1, lorentzianFwhmNm: 0 }));
  const size = active.length;
  const blocks = segments.map((segment, index) => createBlock(segment, index, lineCount));

  function evaluate(at: Float64Array, out: Evaluation, leverage?: LeverageRequest): void {
    const { normal, right } = out;
    normal.fill(0);
    right.fill(0);
    let chiSquare = 0;
    for (let line = 0; line < lineCount; line++) lineShape(problem, at, line, shapes[line]!);
    for (const block of blocks) {
      chiSquare += accumulate(block, at, leverage);
      addBlock(block, position, size, out);
    }
    let objective = chiSquare;
    for (let i = 0; i < size; i++) {
      const { mean, sigma } = beliefs[active[i]!]!;
      if (!Number.isFinite(sigma)) continue;
      const pull = (mean - at[active[i]!]!) / sigma;
      objective += pull * pull;
      right[i] = right[i]! + pull / sigma;
      normal[i * size + i] = normal[i * size + i]! + 1 / (sigma * sigma);
    }
    for (let i = 0; i < size; i++) {
      for (let j = 0; j < i; j++) normal[j * size + i] = normal[i * size + j]!;
    }
    out.chiSquare = chiSquare;
    out.objective = objective;
  }

  /** Sums one segment into its block; returns its chi-square. */
  function accumulate(block: Block, at: Float64Array, leverage: LeverageRequest | undefined): number {
    const { segment, slope, normal, right, size: own } = block;
    const { firstPx, endPx, lines: members } = segment;
    normal.fill(0);
    right.fill(0);
    const base = segmentBase(lineCount, block.index);
    const middle = 0.5 * (firstPx + endPx - 1);
    const half = Math.max(1, 0.5 * (endPx - firstPx));
    const instrument = at[instrumentIndex]!;
    const stark = at[starkIndex]!;
    const isDensity = recording.signalKind === 'per-nm';
    let chiSquare = 0;
    for (let px = firstPx; px < endPx; px++) {
      const u = (px - middle) / half;
      const floor = at[base]! + at[base + 1]! * u;
      const fromNm = recording.edgeNm[px]!;
      const toNm = recording.edgeNm[px + 1]!;
      const perPixel = isDensity ? 1 / (toNm - fromNm) : 1;
      let mean = floor;
      let byOffset = 0;
      let byStretch = 0;
      let byInstrument = 0;
      let byStark = 0;
      let slot = sharedParameterCount;
      for (let k = 0; k < members.length; k++) {
        const line = members[k]!;
        const shape = shapes[line]!;
        voigtPixel(shape, fromNm, toNm, share);
        const first = lineBase(line);
        const area = at[first]! * perPixel;
        const ownWidth = 1 + at[first + 3]!;
        mean += area * share.share;
        const byCentre = area * share.byCentre;
        const byWidth = (area * share.byGaussianFwhm * instrument * ownWidth) / shape.gaussianFwhmNm;
        const byLorentz = area * share.byLorentzianFwhm * lines[line]!.starkRatio;
        byOffset += byCentre;
        byStretch += byCentre * (lines[line]!.referenceNm - problem.pivotNm);
        byInstrument += byWidth * ownWidth;
        byStark += byLorentz * (1 + at[first + 2]!);
        slope[slot] = share.share * perPixel;
        slope[slot + 1] = byCentre;
        slope[slot + 2] = byLorentz * stark;
        slope[slot + 3] = byWidth * instrument;
        slot += lineParameterCount;
      }
      modelled[px] = mean;
      baseline[px] = floor;
      if (masked[px] === 1) continue;
      slope[offsetIndex] = byOffset;
      slope[stretchIndex] = byStretch;
      slope[instrumentIndex] = byInstrument;
      slope[starkIndex] = byStark;
      slope[slot] = 1;
      slope[slot + 1] = u;
      const weight = 1 / variance[px]!;
      if (leverage !== undefined)
        leverage.out[px] = weight * quadraticForm(block, leverage.covariance, parameterCount);
      const residual = recording.netSignal[px]! - mean;
      chiSquare += weight * residual * residual;
      for (let i = 0; i < own; i++) {
        const scaled = weight * slope[i]!;
        const row = i * own;
        right[i] = right[i]! + scaled * residual;
        for (let j = 0; j <= i; j++) normal[row + j] = normal[row + j]! + scaled * slope[j]!;
      }
    }
    return chiSquare;
  }

  function leverages(at: Float64Array, covariance: Float64Array): Float64Array {
    const out = new Float64Array(n);
    evaluate(at, newEvaluation(), { covariance, out });
    return out;
  }

  function newEvaluation(): Evaluation {
    return {
      normal: new Float64Array(size * size),
      right: new Float64Array(size),
      chiSquare: 0,
      objective: 0,
    };
  }

  function reweigh(): void {
    setVariance(problem, { modelled, baseline }, variance);
  }

  return {
    parameterCount,
    active,
    values,
    beliefs,
    modelled,
    baseline,
    variance,
    pixelCount,
    newEvaluation,
    evaluate,
    leverages,
    reweigh,
  };
}

function listBeliefs({ beliefs, lines, segments }: JointProblem, count: number): readonly Belief[] {
  const list: Belief[] = [beliefs.offsetNm, beliefs.stretch, beliefs.instrumentFwhmNm, beliefs.starkFwhmNm];
  const unbound: Belief = { mean: 0, sigma: Infinity };
  for (const line of lines.keys()) {
    list.push(unbound, beliefs.centreDepartureNm, beliefs.starkDeparture[line]!, beliefs.widthDeparture);
  }
  for (let s = 0; s < segments.length; s++) list.push(unbound, unbound);
  if (list.length !== count || sharedParameterCount !== 4) throw new Error('parameter layout broken');
  return list;
}
