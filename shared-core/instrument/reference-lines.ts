import type { Peak, PeakSearch } from '../axis/find-peaks.ts';
import { pixelAt } from '../axis/pixel-at.ts';
import type { CorrectedRecording } from '../noise/corrected-recording.ts';

/** A line of the reference lamp that stands alone, with the pixels it is measured on. */
export interface ReferenceLine {
  /** nm, recorded axis. */
  readonly centreNm: number;
  readonly firstPx: number;
  /** Exclusive. */
  readonly endPx: number;
}

/** Fainter lines say little of the wings. */
const leastSignalToNoise = 40;
/** A neighbour this much fainter moves the profile by less than it is worth. */
const negligibleShare = 0.005;
/** Half-width of a line's window, and of the room that has to be free around it, in line widths. */
const windowWidths = 5;
const freeWidths = 7;
const mostLines = 8;

/** The strongest lines that are not clipped and have no neighbour within seven widths, strongest first; eight at most. */
export function findReferenceLines(
  recording: CorrectedRecording,
  search: PeakSearch,
): readonly ReferenceLine[] {
  const { wavelengthNm } = recording;
  const { peaks, fainter, fwhmNm } = search;
  const all = [...peaks, ...fainter];
  const first = wavelengthNm[0]! + windowWidths * fwhmNm;
  const last = wavelengthNm[wavelengthNm.length - 1]! - windowWidths * fwhmNm;
  const isAlone = (peak: Peak): boolean =>
    all.every(
      (other) =>
        other === peak ||
        Math.abs(other.recordedNm - peak.recordedNm) > freeWidths * fwhmNm ||
        other.height < negligibleShare * peak.height,
    );
  return peaks
    .filter(
      (peak) =>
        peak.signalToNoise >= leastSignalToNoise &&
        !peak.hasClipping &&
        peak.recordedNm > first &&
        peak.recordedNm < last &&
        isAlone(peak),
    )
    .slice(0, mostLines)
    .map(({ recordedNm }) => ({
      centreNm: recordedNm,
      firstPx: pixelAt(wavelengthNm, recordedNm - windowWidths * fwhmNm),
      endPx: pixelAt(wavelengthNm, recordedNm + windowWidths * fwhmNm) + 1,
    }));
}
