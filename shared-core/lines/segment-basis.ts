import { fillVoigtRun, voigtRunStride, type VoigtShape } from '../numeric/voigt-run.ts';
import {
  deuteriumIndex,
  gasIndex,
  instrumentIndex,
  lineBase,
  offsetIndex,
  segmentBase,
  starkIndex,
  stretchIndex,
  type JointLine,
  type JointProblem,
  type Segment,
} from './joint-problem.ts';
import { centreNm, lorentzianFwhmNm, sharedCentreNm } from './line-shape.ts';

/**
 * One segment's pixels described by few columns. All derivatives of a line are combinations of a handful: its share of
 * the pixel, and the slopes of the share by centre, instrument width, Lorentz width, gas temperature and deuterium.
 * Sums over pixels run over these; parameters come in afterwards, by the chain rule.
 */
export interface SegmentBasis {
  readonly segment: Segment;
  readonly index: number;
  readonly pixelCount: number;
  readonly columnCount: number;
  /** Column after column, each pixelCount long. */
  readonly columns: Float64Array;
  /** Chain rule: d signal/d parameter = sum of weight x column; one entry a term. */
  readonly links: readonly Link[];
  readonly lineColumns: readonly LineColumns[];
  /** First column of the baseline; the rest are its higher terms. */
  readonly baselineColumn: number;
}

export interface Link {
  readonly column: number;
  readonly parameter: number;
  weight: number;
}

/** Number of each column of one line; -1 where the line has none. */
export interface LineColumns {
  readonly line: number;
  readonly share: number;
  readonly centre: number;
  readonly instrument: number;
  readonly lorentzian: number;
  readonly gas: number;
  readonly deuterium: number;
}

/** Lays out the columns; what the problem holds fixed gets none. */
export function createSegmentBasis(problem: JointProblem, index: number): SegmentBasis {
  const segment = problem.segments[index]!;
  const { beliefs, lines } = problem;
  const pixelCount = segment.endPx - segment.firstPx;
  let columnCount = 0;
  const next = (isWanted: boolean): number => (isWanted ? columnCount++ : -1);
  const lineColumns = segment.lines.map((line): LineColumns => ({
    line,
    share: next(true),
    centre: next(true),
    instrument: next(true),
    lorentzian: next(lines[line]!.starkRatio > 0),
    gas: next(beliefs.gasKelvin.sigma > 0),
    deuterium: next(
      beliefs.deuteriumRatio.sigma > 0 && lines[line]!.sticks.some(({ isDeuterium }) => isDeuterium),
    ),
  }));
  const links: Link[] = [];
  const link = (column: number, ...parameters: number[]): void => {
    if (column >= 0) for (const parameter of parameters) links.push({ column, parameter, weight: 0 });
  };
  for (const { line, ...columns } of lineColumns) {
    const first = lineBase(line);
    link(columns.share, first);
    link(columns.centre, offsetIndex, stretchIndex, first + 1);
    link(columns.instrument, instrumentIndex, first + 3);
    link(columns.lorentzian, starkIndex, first + 2);
    link(columns.gas, gasIndex);
    link(columns.deuterium, deuteriumIndex);
  }
  const base = segmentBase(lines.length, index);
  const hasCurvature = beliefs.baselineCurvature[index]!.sigma > 0;
  const baselineColumn = columnCount;
  const baselineTermCount = hasCurvature ? 3 : 2;
  columnCount += baselineTermCount;
  const columns = new Float64Array(pixelCount * columnCount);
  for (let power = 0; power < baselineTermCount; power++) {
    links.push({ column: baselineColumn + power, parameter: base + power, weight: 1 });
    for (let i = 0; i < pixelCount; i++)
      columns[(baselineColumn + power) * pixelCount + i] = baselineTerm(segment, power, i);
  }
  return {
    segment,
    index,
    pixelCount,
    columnCount,
    columns,
    links,
    lineColumns,
    baselineColumn,
  };
}

/** Legendre-like terms of the baseline on -1 to 1 over the segment: 1, u, u^2 - 1/3. */
export function baselineTerm({ firstPx, endPx }: Segment, power: number, pixel: number): number {
  const u = (2 * pixel - (endPx - firstPx - 1)) / Math.max(1, endPx - firstPx);
  return power === 0 ? 1 : power === 1 ? u : u * u - 1 / 3;
}

/** Fills the line columns and the chain rule at the given parameter values. */
export function fillSegmentBasis(problem: JointProblem, basis: SegmentBasis, values: Float64Array): void {
  const { columns, pixelCount, links } = basis;
  const ratio = values[deuteriumIndex]!;
  for (const line of basis.lineColumns) {
    columns.fill(0, line.share * pixelCount, (lastColumn(line) + 1) * pixelCount);
    addSticks(problem, basis, values, line, { isDeuterium: false, scale: 1 });
    if (line.deuterium >= 0) addSticks(problem, basis, values, line, { isDeuterium: true, scale: ratio });
  }
  let at = 0;
  const set = (weight: number): void => {
    links[at++]!.weight = weight;
  };
  for (const { line, lorentzian, gas, deuterium } of basis.lineColumns) {
    const first = lineBase(line);
    const area = values[first]!;
    const { starkRatio, referenceNm } = problem.lines[line]!;
    set(1);
    set(area);
    set(area * (referenceNm - problem.pivotNm));
    set(area);
    set(area * (1 + values[first + 3]!));
    set(area * values[instrumentIndex]!);
    if (lorentzian >= 0) {
      set(area * starkRatio * (1 + values[first + 2]!));
      set(area * starkRatio * values[starkIndex]!);
    }
    if (gas >= 0) set(area);
    if (deuterium >= 0) set(area);
  }
}

const lastColumn = ({ instrument, lorentzian, gas, deuterium }: LineColumns): number =>
  Math.max(instrument, lorentzian, gas, deuterium);

/** Adds the sticks of one isotope to the columns of a line, `scale` times. */
function addSticks(
  problem: JointProblem,
  { segment, pixelCount, columns }: SegmentBasis,
  values: Float64Array,
  line: LineColumns,
  { isDeuterium, scale }: { readonly isDeuterium: boolean; readonly scale: number },
): void {
  const { recording, instrumentShape } = problem;
  const { sticks } = problem.lines[line.line]!;
  const instrument = values[instrumentIndex]! * (1 + values[lineBase(line.line) + 3]!);
  const centre = centreNm(problem, values, line.line);
  const lorentz = lorentzianFwhmNm(problem.lines[line.line]!, values, line.line);
  const isDensity = recording.signalKind === 'per-nm';
  const [share, byCentre, byInstrument, byLorentz, byGas, byRatio] = [
    line.share,
    line.centre,
    line.instrument,
    line.lorentzian,
    line.gas,
    isDeuterium ? line.deuterium : -1,
  ].map((column) => column * pixelCount) as [number, number, number, number, number, number];
  for (const stick of sticks) {
    if (stick.isDeuterium !== isDeuterium) continue;
    const ownSquared = stick.dopplerSquaredNm2PerK * values[gasIndex]! + stick.fixedSquaredNm2;
    for (const term of instrumentShape) {
      const throughInstrument = term.gaussianShare * instrument;
      const gaussianFwhmNm = Math.sqrt(throughInstrument * throughInstrument + ownSquared);
      const shape = {
        centreNm: centre + stick.shiftNm + term.shiftShare * instrument,
        gaussianFwhmNm,
        lorentzianFwhmNm: lorentz + term.lorentzianShare * instrument,
      };
      const run = smoothedRun(shape, stick.weight * term.weight, recording, segment);
      const gaussianByInstrument = (throughInstrument * term.gaussianShare) / gaussianFwhmNm;
      const gaussianByKelvin = stick.dopplerSquaredNm2PerK / (2 * gaussianFwhmNm);
      for (let i = 0, at = 0; i < pixelCount; i++, at += voigtRunStride) {
        const px = segment.firstPx + i;
        const perPixel = isDensity ? 1 / (recording.edgeNm[px + 1]! - recording.edgeNm[px]!) : 1;
        const scaled = perPixel * scale;
        const byGaussian = run[at + 2]! * scaled;
        const byLorentzian = run[at + 3]! * scaled;
        columns[share + i] = columns[share + i]! + run[at]! * scaled;
        columns[byCentre + i] = columns[byCentre + i]! + run[at + 1]! * scaled;
        columns[byInstrument + i] =
          columns[byInstrument + i]! +
          byGaussian * gaussianByInstrument +
          byLorentzian * term.lorentzianShare +
          run[at + 1]! * scaled * term.shiftShare;
        if (byLorentz >= 0) columns[byLorentz + i] = columns[byLorentz + i]! + byLorentzian;
        if (byGas >= 0) columns[byGas + i] = columns[byGas + i]! + byGaussian * gaussianByKelvin;
        if (byRatio >= 0) columns[byRatio + i] = columns[byRatio + i]! + run[at]! * perPixel;
      }
    }
  }
}

/**
 * Share of a line's light on each pixel of a segment, for a line that may not be in the problem: at the shared values of
 * axis, widths and gas temperature, without departures of its own.
 */
export function shareColumn(
  problem: JointProblem,
  values: Float64Array,
  line: JointLine,
  segment: Segment,
  { isDeuterium }: { readonly isDeuterium: boolean },
): Float64Array {
  const { recording, instrumentShape } = problem;
  const pixelCount = segment.endPx - segment.firstPx;
  const column = new Float64Array(pixelCount);
  const instrument = values[instrumentIndex]!;
  const centre = sharedCentreNm(problem, values, line);
  const lorentz = line.fixedLorentzianFwhmNm + line.starkRatio * values[starkIndex]!;
  for (const stick of line.sticks) {
    if (stick.isDeuterium !== isDeuterium) continue;
    const ownSquared = stick.dopplerSquaredNm2PerK * values[gasIndex]! + stick.fixedSquaredNm2;
    for (const term of instrumentShape) {
      const throughInstrument = term.gaussianShare * instrument;
      const shape = {
        centreNm: centre + stick.shiftNm + term.shiftShare * instrument,
        gaussianFwhmNm: Math.sqrt(throughInstrument * throughInstrument + ownSquared),
        lorentzianFwhmNm: lorentz + term.lorentzianShare * instrument,
      };
      const run = smoothedRun(shape, stick.weight * term.weight, recording, segment);
      for (let i = 0; i < pixelCount; i++) column[i] = column[i]! + run[i * voigtRunStride]!;
    }
  }
  if (recording.signalKind === 'per-nm') {
    const { edgeNm } = recording;
    for (let i = 0, px = segment.firstPx; i < pixelCount; i++, px++)
      column[i] = column[i]! / (edgeNm[px + 1]! - edgeNm[px]!);
  }
  return column;
}

/** Overwritten by every run; grows to the longest segment. */
let scratch = new Float64Array(64 * voigtRunStride);

/** One profile on a segment's pixels, through the running mean that the recording went through, if any. */
function smoothedRun(
  shape: VoigtShape,
  weight: number,
  { edgeNm, noise }: JointProblem['recording'],
  { firstPx, endPx }: Segment,
): Float64Array {
  const half = (noise.runningMeanPoints - 1) / 2;
  const from = Math.max(0, firstPx - half);
  const end = Math.min(edgeNm.length - 1, endPx + half);
  if (scratch.length < (end - from) * voigtRunStride)
    scratch = new Float64Array(2 * (end - from) * voigtRunStride);
  fillVoigtRun(shape, weight, edgeNm, from, end, scratch);
  return half === 0 ? scratch : runningMean(scratch, end - from, firstPx - from, endPx - firstPx, half);
}

/** Mean over 2 half + 1 neighbours around each of `count` pixels from `offset` on; ends are held, as exports do. */
function runningMean(
  run: Float64Array,
  available: number,
  offset: number,
  count: number,
  half: number,
): Float64Array {
  const out = new Float64Array(count * voigtRunStride);
  for (let i = 0; i < count; i++) {
    for (let k = -half; k <= half; k++) {
      const from = Math.max(0, Math.min(available - 1, offset + i + k)) * voigtRunStride;
      for (let part = 0; part < voigtRunStride; part++) {
        const at = i * voigtRunStride + part;
        out[at] = out[at]! + run[from + part]! / (2 * half + 1);
      }
    }
  }
  return out;
}
