import type { Peak } from '../axis/find-peaks.ts';
import { pixelAt } from '../axis/pixel-at.ts';
import { log } from '../numeric/portable-math.ts';
import { voigtFwhmNm } from '../numeric/voigt-pixel.ts';
import type { CorrectedRecording } from '../noise/corrected-recording.ts';
import type { JointLine, Segment } from './joint-problem.ts';
import type { FitWindow, LineObstacle } from './line-fit.ts';

/** Half-width of a window in line widths: wide enough that the straight baseline costs the area under 8 %. */
const windowHalfWidths = 8;
const leastHalfWidthPx = 10;
/** Widths over which the wing of a neighbouring line is felt: beyond three a Lorentz line holds a tenth of its light. */
const wingReach = 3;
/** A peak of its own this strong inside a window is masked, or named as a neighbour when too near. */
const foreignSignalToNoise = 6;

/** What is needed of a line to say where it stands and how wide it is. */
export type PlacedLine = Pick<JointLine, 'id' | 'nominalCentreNm' | 'starkRatio'>;

/** nm: widths expected of the lines, Gaussian of the instrument and Stark width of H-beta. */
export interface ExpectedWidths {
  readonly instrumentNm: number;
  readonly starkNm: number;
}

export interface WindowPlan {
  readonly lines: readonly JointLine[];
  readonly windows: readonly FitWindow[];
  readonly segments: readonly Segment[];
  readonly masked: Uint8Array;
  readonly obstacles: ReadonlyMap<string, LineObstacle>;
  readonly neighbours: ReadonlyMap<string, number>;
  /** Peaks of something else whose tops are masked: their wings may still reach a line. */
  readonly maskedPeaks: readonly { readonly lineId: string; readonly recordedNm: number }[];
}

/**
 * Decides which pixels each line is fitted on: a window around it, clipped and foreign pixels masked, windows
 * that touch merged into one segment with one baseline. Lines that are clipped or out of range are left out here,
 * so that no clipped pixel can enter an area.
 *
 * @param fwhm  nm: widths expected of the lines (Gaussian of the instrument, Stark width of H-beta)
 * @check test/unit/lines/choose-windows.test.ts
 */
export function chooseWindows(
  recording: CorrectedRecording,
  candidates: readonly JointLine[],
  foreignPeaks: readonly Peak[],
  fwhm: ExpectedWidths,
): WindowPlan {
  const { wavelengthNm, clipped } = recording;
  const n = wavelengthNm.length;
  const pixelNm = (wavelengthNm[n - 1]! - wavelengthNm[0]!) / (n - 1);
  const obstacles = new Map<string, LineObstacle>();
  const neighbours = new Map<string, number>();
  const maskedPeaks: { lineId: string; recordedNm: number }[] = [];
  const masked = clipped.slice();
  const lines: JointLine[] = [];
  const windows: FitWindow[] = [];
  const isOwn = ({ recordedNm }: Peak): boolean =>
    candidates.some(
      (line) =>
        Math.abs(line.nominalCentreNm - recordedNm) < 0.3 * Math.max(pixelNm, expectedFwhmNm(line, fwhm)),
    );
  for (const line of candidates) {
    const widthNm = Math.max(1.2 * pixelNm, expectedFwhmNm(line, fwhm));
    const centre = line.nominalCentreNm;
    if (centre - 1.5 * widthNm < wavelengthNm[0]! || centre + 1.5 * widthNm > wavelengthNm[n - 1]!) {
      obstacles.set(line.id, { kind: 'out-of-range' });
      continue;
    }
    let clippedPixelCount = 0;
    const coreFrom = pixelAt(wavelengthNm, centre - 1.5 * widthNm);
    const coreTo = pixelAt(wavelengthNm, centre + 1.5 * widthNm);
    for (let px = Math.max(0, coreFrom - 1); px <= Math.min(n - 1, coreTo + 1); px++)
      clippedPixelCount += clipped[px]!;
    if (clippedPixelCount > 0) {
      obstacles.set(line.id, { kind: 'clipped', clippedPixelCount });
      continue;
    }
    const halfNm = Math.max(windowHalfWidths * widthNm, leastHalfWidthPx * pixelNm);
    const firstPx = pixelAt(wavelengthNm, centre - halfNm);
    const endPx = pixelAt(wavelengthNm, centre + halfNm) + 1;
    for (const peak of foreignPeaks) {
      if (peak.signalToNoise < foreignSignalToNoise || isOwn(peak)) continue;
      const distance = Math.abs(peak.recordedNm - centre);
      if (distance > halfNm + widthNm) continue;
      if (distance < 1.5 * widthNm) {
        neighbours.set(line.id, peak.recordedNm);
        continue;
      }
      const reach = Math.min(
        maskedWidths(peak) * Math.max(fwhm.instrumentNm, 1.5 * pixelNm) + 0.5 * pixelNm,
        distance - widthNm,
      );
      const from = pixelAt(wavelengthNm, peak.recordedNm - reach);
      const to = pixelAt(wavelengthNm, peak.recordedNm + reach);
      for (let px = from; px <= to; px++) masked[px] = 1;
      maskedPeaks.push({ lineId: line.id, recordedNm: peak.recordedNm });
    }
    lines.push(line);
    windows.push({ lineId: line.id, firstPx, endPx });
  }
  return { lines, windows, segments: mergeWindows(windows), masked, obstacles, neighbours, maskedPeaks };
}

/** Half-width of the mask in widths: where a Gaussian as bright as this is lost in the noise of a pixel. */
const maskedWidths = ({ signalToNoise }: Peak): number =>
  Math.max(1.3, Math.sqrt(log(3 * signalToNoise) / (4 * Math.LN2)));

/** FWHM that a line should have, nm. */
function expectedFwhmNm({ starkRatio }: PlacedLine, fwhm: ExpectedWidths): number {
  return voigtFwhmNm(fwhm.instrumentNm, Math.max(0, fwhm.starkNm * starkRatio));
}

/**
 * Lines that nobody asked for but whose wings reach into the windows of those that are wanted: they have to be fitted along.
 */
export function reachingLines(
  wanted: readonly PlacedLine[],
  others: readonly PlacedLine[],
  fwhm: ExpectedWidths,
): readonly PlacedLine[] {
  return others.filter((other) =>
    wanted.some(
      (line) =>
        Math.abs(line.nominalCentreNm - other.nominalCentreNm) <
        windowHalfWidths * expectedFwhmNm(line, fwhm) + wingReach * expectedFwhmNm(other, fwhm),
    ),
  );
}

function mergeWindows(windows: readonly FitWindow[]): readonly Segment[] {
  const order = [...windows.keys()].sort((a, b) => windows[a]!.firstPx - windows[b]!.firstPx);
  const segments: { firstPx: number; endPx: number; lines: number[] }[] = [];
  for (const index of order) {
    const window = windows[index]!;
    const last = segments.at(-1);
    if (last !== undefined && window.firstPx < last.endPx) {
      last.endPx = Math.max(last.endPx, window.endPx);
      last.lines.push(index);
    } else {
      segments.push({ firstPx: window.firstPx, endPx: window.endPx, lines: [index] });
    }
  }
  return segments;
}
