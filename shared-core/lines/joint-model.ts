import { voigtPixel, type PixelShare } from '../numeric/voigt-pixel.ts';
import {
  instrumentIndex,
  lineBase,
  offsetIndex,
  segmentBase,
  sharedParameterCount,
  starkIndex,
  stretchIndex,
  type Belief,
  type JointProblem,
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

  // Scratch of one pixel: which parameters it feels and how strongly.
  const touched = new Int32Array(parameterCount);
  const slope = new Float64Array(parameterCount);
  const share: PixelShare = { share: 0, byCentre: 0, byGaussianFwhm: 0, byLorentzianFwhm: 0 };
  const shapes: LineShape[] = lines.map(() => ({ centreNm: 0, gaussianFwhmNm: 1, lorentzianFwhmNm: 0 }));
  const size = active.length;

  function evaluate(at: Float64Array, out: Evaluation, leverage?: LeverageRequest): void {
    const { normal, right } = out;
    normal.fill(0);
    right.fill(0);
    let chiSquare = 0;
    for (let line = 0; line < lineCount; line++) lineShape(problem, at, line, shapes[line]!);
    for (let s = 0; s < segments.length; s++) {
      const { firstPx, endPx, lines: members } = segments[s]!;
      const base = segmentBase(lineCount, s);
      const middle = 0.5 * (firstPx + endPx - 1);
      const half = Math.max(1, 0.5 * (endPx - firstPx));
      for (let px = firstPx; px < endPx; px++) {
        const u = (px - middle) / half;
        const floor = at[base]! + at[base + 1]! * u;
        let mean = floor;
        let count = 0;
        let byOffset = 0;
        let byStretch = 0;
        let byInstrument = 0;
        let byStark = 0;
        const fromNm = recording.edgeNm[px]!;
        const toNm = recording.edgeNm[px + 1]!;
        const perPixel = recording.signalKind === 'per-nm' ? 1 / (toNm - fromNm) : 1;
        for (const line of members) {
          const shape = shapes[line]!;
          voigtPixel(shape, fromNm, toNm, share);
          const first = lineBase(line);
          const area = at[first]! * perPixel;
          const instrument = at[instrumentIndex]!;
          const ownWidth = 1 + at[first + 3]!;
          mean += area * share.share;
          const byCentre = area * share.byCentre;
          const byWidth = (area * share.byGaussianFwhm * instrument * ownWidth) / shape.gaussianFwhmNm;
          const ratio = lines[line]!.starkRatio;
          const byLorentz = area * share.byLorentzianFwhm * ratio;
          byOffset += byCentre;
          byStretch += byCentre * (lines[line]!.referenceNm - problem.pivotNm);
          byInstrument += byWidth * ownWidth;
          byStark += byLorentz * (1 + at[first + 2]!);
          count = note(first, share.share * perPixel, count);
          count = note(first + 1, byCentre, count);
          count = note(first + 2, byLorentz * at[starkIndex]!, count);
          count = note(first + 3, byWidth * instrument, count);
        }
        modelled[px] = mean;
        baseline[px] = floor;
        if (masked[px] === 1) continue;
        count = note(offsetIndex, byOffset, count);
        count = note(stretchIndex, byStretch, count);
        count = note(instrumentIndex, byInstrument, count);
        count = note(starkIndex, byStark, count);
        count = note(base, 1, count);
        count = note(base + 1, u, count);
        const weight = 1 / variance[px]!;
        if (leverage !== undefined) leverage.out[px] = weight * quadraticForm(leverage.covariance, count);
        const residual = recording.netSignal[px]! - mean;
        chiSquare += weight * residual * residual;
        for (let i = 0; i < count; i++) {
          const row = touched[i]!;
          const scaled = weight * slope[i]!;
          right[row] = right[row]! + scaled * residual;
          for (let j = 0; j <= i; j++) {
            const column = touched[j]!;
            const at2 = row >= column ? row * size + column : column * size + row;
            normal[at2] = normal[at2]! + scaled * slope[j]!;
          }
        }
      }
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

  /** s^T C s over the touched parameters. */
  function quadraticForm(covariance: Float64Array, count: number): number {
    let sum = 0;
    for (let i = 0; i < count; i++) {
      for (let j = 0; j < count; j++) {
        const at2 = active[touched[i]!]! * parameterCount + active[touched[j]!]!;
        sum += slope[i]! * slope[j]! * covariance[at2]!;
      }
    }
    return sum;
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

  function note(parameter: number, derivative: number, count: number): number {
    const row = position[parameter]!;
    if (row < 0) return count;
    touched[count] = row;
    slope[count] = derivative;
    return count + 1;
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
