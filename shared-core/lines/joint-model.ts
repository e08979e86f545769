import type { RowStarts } from '../numeric/cholesky.ts';
import {
  instrumentIndex,
  lineBase,
  lineParameterCount,
  segmentBase,
  segmentParameterCount,
  sharedParameterCount,
  starkIndex,
  type Belief,
  type Evaluation,
  type JointProblem,
} from './joint-problem.ts';
import { setVariance } from './pixel-variance.ts';
import { createSegmentBasis, fillSegmentBasis, type SegmentBasis } from './segment-basis.ts';
import { addToEquations, createSegmentSums, sumSegment, type SegmentSums } from './segment-sums.ts';
import { roughExpectation, startLinearParameters } from './start-values.ts';

export interface JointModel {
  readonly parameterCount: number;
  /** Parameter number of each active parameter: segment by segment, what all share at the end. */
  readonly active: Int32Array;
  /** First active parameter that each one's equation can hold: segments know nothing of each other but by what they share. */
  readonly rowStarts: RowStarts;
  readonly values: Float64Array;
  readonly beliefs: readonly Belief[];
  /** Per pixel of the recording: model, baseline, variance used as weight; defined inside segments only. */
  readonly modelled: Float64Array;
  readonly baseline: Float64Array;
  readonly variance: Float64Array;
  readonly pixelCount: number;
  /** Columns and chain rule of each segment, as last evaluated. */
  readonly bases: readonly SegmentBasis[];
  newEvaluation(): Evaluation;
  evaluate(values: Float64Array, out: Evaluation): void;
  /** Recomputes the weights from the model last evaluated. */
  reweigh(): void;
}

/**
 * The joint model of all lines: signal of a pixel = local baseline + sum over lines of area x (share of a unit-area
 * profile that falls on the pixel), the profile being the line's components through the instrument.
 *
 * Units: areas in counts (or signal nm for a spectral density), widths and centres in nm on the recorded axis,
 * baselines in counts with the slope per half segment. All derivatives are analytic.
 *
 * @source [Weideman1994] for the profile
 * @check test/unit/lines/joint-model.test.ts (derivatives against finite differences)
 */
export function createJointModel(problem: JointProblem): JointModel {
  const { recording, masked, lines, segments } = problem;
  const lineCount = lines.length;
  const parameterCount = segmentBase(lineCount, segments.length);
  const beliefs = listBeliefs(problem, parameterCount);
  const { active, rowStarts } = orderParameters(problem, beliefs);
  const position = new Int32Array(parameterCount).fill(-1);
  active.forEach((parameter, index) => (position[parameter] = index));
  const size = active.length;
  const n = recording.netSignal.length;
  const modelled = new Float64Array(n);
  const baseline = new Float64Array(n);
  const variance = new Float64Array(n);
  const values = startValues(problem, beliefs);
  let pixelCount = 0;
  for (const { firstPx, endPx } of segments) {
    for (let px = firstPx; px < endPx; px++) if (masked[px] === 0) pixelCount++;
  }
  setVariance(problem, problem.expected ?? roughExpectation(problem, values, baseline), variance);
  const bases = segments.map((_, index) => createSegmentBasis(problem, index));
  const sums = bases.map(createSegmentSums);
  const longest = bases.reduce((most, basis) => Math.max(most, basis.pixelCount), 0);
  const residual = new Float64Array(longest);
  const weight = new Float64Array(longest);

  function evaluate(at: Float64Array, out: Evaluation): void {
    const { normal, right } = out;
    normal.fill(0);
    right.fill(0);
    let chiSquare = 0;
    for (const basis of bases) {
      fillSegmentBasis(problem, basis, at);
      chiSquare += accumulate(basis, sums[basis.index]!, at);
      addToEquations(basis, sums[basis.index]!, position, size, out);
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

  /** Models one segment's pixels and sums them; returns its chi-square. */
  function accumulate(basis: SegmentBasis, out: SegmentSums, at: Float64Array): number {
    const { segment, columns, columnCount, pixelCount: count, lineColumns, baselineColumn } = basis;
    const { firstPx } = segment;
    modelled.fill(0, firstPx, firstPx + count);
    const base = segmentBase(lineCount, basis.index);
    for (let column = baselineColumn; column < columnCount; column++)
      addColumn(modelled, firstPx, columns, column * count, count, at[base + column - baselineColumn]!);
    for (let i = 0; i < count; i++) baseline[firstPx + i] = modelled[firstPx + i]!;
    for (const { line, share } of lineColumns)
      addColumn(modelled, firstPx, columns, share * count, count, at[lineBase(line)]!);
    let chiSquare = 0;
    for (let i = 0; i < count; i++) {
      const px = firstPx + i;
      const isUsed = masked[px] === 0;
      residual[i] = isUsed ? recording.netSignal[px]! - modelled[px]! : 0;
      weight[i] = isUsed ? 1 / variance[px]! : 0;
      chiSquare += weight[i]! * residual[i]! * residual[i]!;
    }
    sumSegment(basis, weight, residual, out);
    return chiSquare;
  }

  return {
    parameterCount,
    active,
    rowStarts,
    values,
    beliefs,
    modelled,
    baseline,
    variance,
    pixelCount,
    bases,
    newEvaluation: () => ({
      normal: new Float64Array(size * size),
      right: new Float64Array(size),
      chiSquare: 0,
      objective: 0,
    }),
    evaluate,
    reweigh: () => {
      setVariance(problem, { modelled, baseline }, variance);
    },
  };
}

/** Active parameters with those of each segment together, and where the equations of each begin. */
function orderParameters(
  { lines, segments }: JointProblem,
  beliefs: readonly Belief[],
): Pick<JointModel, 'active' | 'rowStarts'> {
  const active: number[] = [];
  const rowStarts: number[] = [];
  const add = (parameter: number, start: number): void => {
    if (beliefs[parameter]!.sigma === 0) return;
    active.push(parameter);
    rowStarts.push(start);
  };
  for (const [index, segment] of segments.entries()) {
    const start = active.length;
    for (const line of segment.lines)
      for (let k = 0; k < lineParameterCount; k++) add(lineBase(line) + k, start);
    for (let k = 0; k < segmentParameterCount; k++) add(segmentBase(lines.length, index) + k, start);
  }
  for (let parameter = 0; parameter < sharedParameterCount; parameter++) add(parameter, 0);
  return { active: Int32Array.from(active), rowStarts: Int32Array.from(rowStarts) };
}

/** out[at + i] += amount x columns[from + i]. */
function addColumn(
  out: Float64Array,
  at: number,
  columns: Float64Array,
  from: number,
  count: number,
  amount: number,
): void {
  for (let i = 0; i < count; i++) out[at + i] = out[at + i]! + amount * columns[from + i]!;
}

function startValues(problem: JointProblem, beliefs: readonly Belief[]): Float64Array {
  const values = Float64Array.from(beliefs, ({ mean }) => (Number.isFinite(mean) ? mean : 0));
  for (const parameter of [instrumentIndex, starkIndex])
    values[parameter] = problem.start.get(parameter) ?? values[parameter]!;
  if (!problem.start.has(lineBase(0))) startLinearParameters(problem, values);
  for (const [parameter, value] of problem.start) values[parameter] = value;
  return values;
}

function listBeliefs({ beliefs, lines, segments }: JointProblem, count: number): readonly Belief[] {
  const list: Belief[] = [
    beliefs.offsetNm,
    beliefs.stretch,
    beliefs.instrumentFwhmNm,
    beliefs.starkFwhmNm,
    beliefs.gasKelvin,
    beliefs.deuteriumRatio,
  ];
  const unbound: Belief = { mean: 0, sigma: Infinity };
  for (const { centreDepartureNm, starkDeparture, widthDeparture } of lines)
    list.push(unbound, centreDepartureNm, starkDeparture, widthDeparture);
  for (const s of segments.keys()) list.push(unbound, unbound, beliefs.baselineCurvature[s]!);
  if (list.length !== count || sharedParameterCount !== 6) throw new Error('parameter layout broken');
  return list;
}
