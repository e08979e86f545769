import type { Peak } from './find-peaks.ts';

export interface MatchedLine {
  readonly id: string;
  readonly referenceNm: number;
  readonly peak: Peak;
}

/**
 * recorded = reference + offsetNm + stretch (reference - pivotNm) + bow (reference - pivotNm)^2.
 * This direction (where does a known line lie on the recorded axis?) is the one the fit needs.
 */
export interface RecordedAxisMap {
  readonly pivotNm: number;
  readonly offsetNm: number;
  readonly stretch: number;
  /** nm^-1; zero unless enough lines call for it. */
  readonly bowPerNm: number;
}
