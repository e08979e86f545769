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
  type JointProblem,
  type Segment,
} from './joint-problem.ts';

/** Chi-square, its half gradient and the Gauss-Newton matrix at one point; arrays are over active parameters. */
export interface Evaluation {
  readonly normal: Float64Array;
  readonly right: Float64Array;
  /** Data part only. */
  chiSquare: number;
  /** Data plus beliefs: what the fit minimises. */
  objective: number;
}

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
  setVariance(problem, problem.expected ?? roughExpectation(problem, values), variance);

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

/** The part of the normal equations that one segment feeds: shared, its lines', its baseline's parameters, in that order. */
interface Block {
  readonly segment: Segment;
  readonly index: number;
  readonly size: number;
  /** Parameter number of each row of the block. */
  readonly parameters: Int32Array;
  /** Derivatives of one pixel. */
  readonly slope: Float64Array;
  /** Lower triangle, row-major. */
  readonly normal: Float64Array;
  readonly right: Float64Array;
}

function createBlock(segment: Segment, index: number, lineCount: number): Block {
  const parameters: number[] = [offsetIndex, stretchIndex, instrumentIndex, starkIndex];
  for (const line of segment.lines) {
    for (let k = 0; k < lineParameterCount; k++) parameters.push(lineBase(line) + k);
  }
  const base = segmentBase(lineCount, index);
  parameters.push(base, base + 1);
  const size = parameters.length;
  return {
    segment,
    index,
    size,
    parameters: Int32Array.from(parameters),
    slope: new Float64Array(size),
    normal: new Float64Array(size * size),
    right: new Float64Array(size),
  };
}

/** Adds a block to the equations of the active parameters, lower triangle. */
function addBlock(
  { parameters, normal, right, size: own }: Block,
  position: Int32Array,
  size: number,
  out: Evaluation,
): void {
  for (let i = 0; i < own; i++) {
    const row = position[parameters[i]!]!;
    if (row < 0) continue;
    out.right[row] = out.right[row]! + right[i]!;
    for (let j = 0; j <= i; j++) {
      const column = position[parameters[j]!]!;
      if (column < 0) continue;
      const at = row >= column ? row * size + column : column * size + row;
      out.normal[at] = out.normal[at]! + normal[i * own + j]!;
    }
  }
}

/** s^T C s for the derivatives s of one pixel. */
function quadraticForm(
  { parameters, slope, size }: Block,
  covariance: Float64Array,
  parameterCount: number,
): number {
  let sum = 0;
  for (let i = 0; i < size; i++) {
    for (let j = 0; j < size; j++) {
      sum += slope[i]! * slope[j]! * covariance[parameters[i]! * parameterCount + parameters[j]!]!;
    }
  }
  return sum;
}

function setVariance(
  { recording, segments, variancePerSignal, relativeMisfit }: JointProblem,
  expected: { readonly modelled: Float64Array; readonly baseline: Float64Array },
  variance: Float64Array,
): void {
  const { fixedVariance, signalReference } = recording.noise;
  for (const { firstPx, endPx } of segments) {
    for (let px = firstPx; px < endPx; px++) {
      const overBaseline = Math.max(0, expected.modelled[px]! - expected.baseline[px]!);
      const light = signalReference === 'zero' ? Math.max(0, expected.modelled[px]!) : overBaseline;
      const miss = relativeMisfit * overBaseline;
      variance[px] = fixedVariance[px]! + variancePerSignal * light + miss * miss;
    }
  }
}

/** Before any fit: the signal itself, over the baselines the fit starts from. */
function roughExpectation(problem: JointProblem, values: Float64Array) {
  const { netSignal } = problem.recording;
  const baseline = new Float64Array(netSignal.length);
  for (const [s, { firstPx, endPx }] of problem.segments.entries()) {
    baseline.fill(values[segmentBase(problem.lines.length, s)]!, firstPx, endPx);
  }
  return { modelled: netSignal, baseline };
}

/** Baselines from the quieter half of each segment, areas from what stands above within a width of each line. */
function startLinearParameters(problem: JointProblem, values: Float64Array): void {
  const { recording, segments, lines, masked } = problem;
  const { netSignal, wavelengthNm } = recording;
  for (const [s, { firstPx, endPx, lines: members }] of segments.entries()) {
    const kept = netSignal.slice(firstPx, endPx).filter((_, i) => masked[firstPx + i] === 0);
    const floor = quantile25(kept);
    values[segmentBase(lines.length, s)] = floor;
    for (const index of members) {
      const line = lines[index]!;
      const reachNm = 1.2 * (values[instrumentIndex]! + line.starkRatio * Math.max(0, values[starkIndex]!));
      let area = 0;
      for (let px = firstPx; px < endPx; px++) {
        if (masked[px] === 1 || Math.abs(wavelengthNm[px]! - line.nominalCentreNm) > reachNm) continue;
        const widthNm =
          recording.signalKind === 'per-nm' ? recording.edgeNm[px + 1]! - recording.edgeNm[px]! : 1;
        area += (netSignal[px]! - floor) * widthNm;
      }
      // Never zero: a line without area has no shape, and the first step could not tell its width.
      values[lineBase(index)] = Math.max(area, Math.abs(area) * 0.1 + Number.EPSILON);
    }
  }
}

function quantile25(values: Float64Array): number {
  const sorted = values.sort();
  return sorted[Math.floor(0.25 * Math.max(0, sorted.length - 1))] ?? 0;
}
