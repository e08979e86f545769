import type { CorrectedRecording } from '../noise/corrected-recording.ts';

/** A parameter's Gaussian belief before the fit: sigma 0 holds it fixed, Infinity leaves it free. */
export interface Belief {
  readonly mean: number;
  readonly sigma: number;
}

export const free: Belief = Object.freeze({ mean: 0, sigma: Infinity });
export const fixedAt = (mean: number): Belief => ({ mean, sigma: 0 });

/** One line of the joint model, on the recorded axis. */
export interface JointLine {
  readonly id: string;
  readonly upperLevel: number;
  readonly referenceNm: number;
  /** nm, recorded axis; from the registration. */
  readonly nominalCentreNm: number;
  /** nm^2: squared FWHM of Doppler and fine structure, added to the instrument's. */
  readonly extraFwhmSquaredNm2: number;
  /** Lorentz FWHM relative to H-beta's Stark width. */
  readonly starkRatio: number;
  /** nm: Lorentz FWHM known beforehand (van der Waals, natural). */
  readonly fixedLorentzianFwhmNm: number;
}

/** A stretch of pixels with one straight baseline and the lines that stand on it. */
export interface Segment {
  readonly firstPx: number;
  /** Exclusive. */
  readonly endPx: number;
  /** Indices into the problem's lines. */
  readonly lines: readonly number[];
}

/**
 * Everything the joint fit needs. Single lines may depart from what they share, each departure with a belief:
 * that is how faint lines lean on bright ones while bright ones speak for themselves.
 */
export interface JointProblem {
  readonly recording: CorrectedRecording;
  /** Length n, 1 where a pixel is left out (clipped, or on a foreign line). */
  readonly masked: Uint8Array;
  readonly lines: readonly JointLine[];
  readonly segments: readonly Segment[];
  readonly pivotNm: number;
  /** Counts of variance per count of signal; may differ from the recording's when it was measured on the lines. */
  readonly variancePerSignal: number;
  /** Share of the light by which the profile may miss a pixel, 1 sigma: for a first look where no noise is known yet, else 0. */
  readonly relativeMisfit: number;
  readonly beliefs: {
    readonly offsetNm: Belief;
    readonly stretch: Belief;
    readonly instrumentFwhmNm: Belief;
    /** H-beta's Stark width, nm. */
    readonly starkFwhmNm: Belief;
    /** Departure of one line's centre from the axis map, nm. */
    readonly centreDepartureNm: Belief;
    /** Relative departure of one line's Stark width from the law; one belief a line. */
    readonly starkDeparture: readonly Belief[];
    /** Relative departure of one line's instrument width from the shared one. */
    readonly widthDeparture: Belief;
  };
  /** Light and baseline per pixel from an earlier fit, for the first weights; the signal itself when null. */
  readonly expected: { readonly modelled: Float64Array; readonly baseline: Float64Array } | null;
  readonly start: { readonly instrumentFwhmNm: number; readonly starkFwhmNm: number };
}

/** Chi-square, its half gradient and the Gauss-Newton matrix at one point; arrays are over active parameters. */
export interface Evaluation {
  readonly normal: Float64Array;
  readonly right: Float64Array;
  /** Data part only. */
  chiSquare: number;
  /** Data plus beliefs: what the fit minimises. */
  objective: number;
}

export const sharedParameterCount = 4;
export const lineParameterCount = 4;
export const segmentParameterCount = 2;

/** Where each parameter lives: shared (offset, stretch, instrument, Stark), then lines, then segments. */
export const offsetIndex = 0;
export const stretchIndex = 1;
export const instrumentIndex = 2;
export const starkIndex = 3;
export const lineBase = (line: number): number => sharedParameterCount + line * lineParameterCount;
export const segmentBase = (lineCount: number, segment: number): number =>
  sharedParameterCount + lineCount * lineParameterCount + segment * segmentParameterCount;
