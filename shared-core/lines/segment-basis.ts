import { addVoigtRun, createVoigtRun, type VoigtRun, type VoigtShape } from '../numeric/voigt-run.ts';
import {
  deuteriumIndex,
  gasIndex,
  instrumentIndex,
  lineBase,
  offsetIndex,
  segmentBase,
  starkIndex,
  stretchIndex,
  type JointProblem,
  type Segment,
} from './joint-problem.ts';
import { centreNm, lorentzianFwhmNm } from './line-shape.ts';

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
  /** Row-major, pixelCount x columnCount. */
  readonly columns: Float64Array;
  /** Chain rule: d signal/d parameter = sum of weight x column; one entry a term. */
  readonly links: readonly Link[];
  readonly lineColumns: readonly LineColumns[];
  /** First column of the baseline; the rest are its higher terms. */
  readonly baselineColumn: number;
  readonly scratch: VoigtRun;
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
  const smoothing = problem.recording.noise.runningMeanPoints;
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
      columns[i * columnCount + baselineColumn + power] = baselineTerm(segment, power, i);
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
    scratch: createVoigtRun(pixelCount + smoothing - 1),
  };
}

/** Legendre-like terms of the baseline on -1 to 1 over the segment: 1, u, u^2 - 1/3. */
export function baselineTerm({ firstPx, endPx }: Segment, power: number, pixel: number): number {
  const u = (2 * pixel - (endPx - firstPx - 1)) / Math.max(1, endPx - firstPx);
  return power === 0 ? 1 : power === 1 ? u : u * u - 1 / 3;
}

/** Fills the line columns and the chain rule at the given parameter values. */
export function fillSegmentBasis(problem: JointProblem, basis: SegmentBasis, values: Float64Array): void {
  const { columns, columnCount, links } = basis;
  const ratio = values[deuteriumIndex]!;
  for (const line of basis.lineColumns) {
    const end = lastColumn(line);
    for (let row = 0; row < columns.length; row += columnCount) {
      for (let column = line.share; column <= end; column++) columns[row + column] = 0;
    }
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
  basis: SegmentBasis,
  values: Float64Array,
  line: LineColumns,
  { isDeuterium, scale }: { readonly isDeuterium: boolean; readonly scale: number },
): void {
  const { segment, pixelCount, columns, columnCount, scratch } = basis;
  const { recording, instrumentShape } = problem;
  const { sticks } = problem.lines[line.line]!;
  const instrument = values[instrumentIndex]! * (1 + values[lineBase(line.line) + 3]!);
  const centre = centreNm(problem, values, line.line);
  const lorentz = lorentzianFwhmNm(problem.lines[line.line]!, values, line.line);
  for (const stick of sticks) {
    if (stick.isDeuterium !== isDeuterium) continue;
    const ownSquared = stick.dopplerSquaredNm2PerK * values[gasIndex]! + stick.fixedSquaredNm2;
    for (const term of instrumentShape) {
      const throughInstrument = term.gaussianShare * instrument;
      const gaussianFwhmNm = Math.sqrt(throughInstrument * throughInstrument + ownSquared);
      const lorentzianFwhmNm = lorentz + term.lorentzianShare * instrument;
      scratch.share.fill(0);
      scratch.byCentre.fill(0);
      scratch.byGaussianFwhm.fill(0);
      scratch.byLorentzianFwhm.fill(0);
      addSmoothedRun(
        { centreNm: centre + stick.shiftNm, gaussianFwhmNm, lorentzianFwhmNm },
        stick.weight * term.weight,
        recording,
        segment,
        scratch,
      );
      const gaussianByInstrument = (throughInstrument * term.gaussianShare) / gaussianFwhmNm;
      const gaussianByKelvin = stick.dopplerSquaredNm2PerK / (2 * gaussianFwhmNm);
      const isDensity = recording.signalKind === 'per-nm';
      for (let i = 0, row = 0; i < pixelCount; i++, row += columnCount) {
        const px = segment.firstPx + i;
        const perPixel = isDensity ? 1 / (recording.edgeNm[px + 1]! - recording.edgeNm[px]!) : 1;
        const share = scratch.share[i]! * perPixel;
        const byGaussian = scratch.byGaussianFwhm[i]! * perPixel * scale;
        const byLorentzian = scratch.byLorentzianFwhm[i]! * perPixel * scale;
        columns[row + line.share] = columns[row + line.share]! + share * scale;
        columns[row + line.centre] = columns[row + line.centre]! + scratch.byCentre[i]! * perPixel * scale;
        columns[row + line.instrument] =
          columns[row + line.instrument]! +
          byGaussian * gaussianByInstrument +
          byLorentzian * term.lorentzianShare;
        if (line.lorentzian >= 0)
          columns[row + line.lorentzian] = columns[row + line.lorentzian]! + byLorentzian;
        if (line.gas >= 0) columns[row + line.gas] = columns[row + line.gas]! + byGaussian * gaussianByKelvin;
        if (isDeuterium) columns[row + line.deuterium] = columns[row + line.deuterium]! + share;
      }
    }
  }
}

/** Like addVoigtRun, through the running mean that the recording went through, if any. Ends are held, as exports do. */
function addSmoothedRun(
  shape: VoigtShape,
  weight: number,
  { edgeNm, noise }: JointProblem['recording'],
  { firstPx, endPx }: Segment,
  out: VoigtRun,
): void {
  const half = (noise.runningMeanPoints - 1) / 2;
  const from = Math.max(0, firstPx - half);
  const end = Math.min(edgeNm.length - 1, endPx + half);
  addVoigtRun(shape, weight, edgeNm, from, end, out);
  if (half === 0) return;
  for (const values of [out.share, out.byCentre, out.byGaussianFwhm, out.byLorentzianFwhm])
    runningMean(values, end - from, firstPx - from, endPx - firstPx, half);
}

/** Replaces values[0 .. count - 1] by the mean over 2 half + 1 neighbours around values[offset + i]. */
function runningMean(
  values: Float64Array,
  available: number,
  offset: number,
  count: number,
  half: number,
): void {
  const source = values.slice(0, available);
  const at = (i: number): number => source[Math.max(0, Math.min(available - 1, i))]!;
  for (let i = 0; i < count; i++) {
    let sum = 0;
    for (let k = -half; k <= half; k++) sum += at(offset + i + k);
    values[i] = sum / (2 * half + 1);
  }
}
