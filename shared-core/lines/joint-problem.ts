import type { InstrumentTerm } from '../instrument/instrument-term.ts';
import type { CorrectedRecording } from '../noise/corrected-recording.ts';

/** A parameter's Gaussian belief before the fit: sigma 0 holds it fixed, Infinity leaves it free. */
export interface Belief {
  readonly mean: number;
  readonly sigma: number;
}

export const free: Belief = Object.freeze({ mean: 0, sigma: Infinity });
export const fixedAt = (mean: number): Belief => ({ mean, sigma: 0 });

/**
 * One component of a line: a fine-structure component, or the blend of all of them, of one isotope.
 * The hydrogen sticks of a line weigh 1 together, the deuterium sticks 1 per unit of the D/H ratio.
 */
export interface Stick {
  /** nm from the line's centre. */
  readonly shiftNm: number;
  readonly weight: number;
  /** Squared Doppler FWHM per kelvin of gas temperature, nm^2/K. */
  readonly dopplerSquaredNm2PerK: number;
  /** Squared FWHM that does not depend on temperature (unresolved fine structure), nm^2. */
  readonly fixedSquaredNm2: number;
  readonly isDeuterium: boolean;
}

/** One line of the joint model, on the recorded axis. */
export interface JointLine {
  readonly id: string;
  readonly referenceNm: number;
  /** nm, recorded axis; from the registration. */
  readonly nominalCentreNm: number;
  /** Hydrogen sticks first; sticks of deuterium may be present whether or not their ratio is fitted. */
  readonly sticks: readonly Stick[];
  /** Lorentz FWHM relative to H-beta's Stark width; 0 for a line of another species. */
  readonly starkRatio: number;
  /** nm: Lorentz FWHM known beforehand (van der Waals, natural). */
  readonly fixedLorentzianFwhmNm: number;
  /** Departure of the line's centre from the axis map, nm. */
  readonly centreDepartureNm: Belief;
  /** Relative departure of its Stark width from the law. */
  readonly starkDeparture: Belief;
  /** Relative departure of its instrument width from the shared one. */
  readonly widthDeparture: Belief;
}

/** A stretch of pixels with one baseline and the lines that stand on it. */
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
  readonly instrumentShape: readonly InstrumentTerm[];
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
    /** Gas temperature of the Doppler widths, K. */
    readonly gasKelvin: Belief;
    /** Deuterium per hydrogen; fixed at 0 leaves the deuterium sticks out. */
    readonly deuteriumRatio: Belief;
    /** Curvature of each segment's baseline. */
    readonly baselineCurvature: readonly Belief[];
  };
  /** Light and baseline per pixel from an earlier fit, for the first weights; the signal itself when null. */
  readonly expected: { readonly modelled: Float64Array; readonly baseline: Float64Array } | null;
  /** Values to start from, by parameter number; means and rough sums where absent. */
  readonly start: ReadonlyMap<number, number>;
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

/** Where each parameter lives: shared ones, then lines, then segments. */
export const offsetIndex = 0;
export const stretchIndex = 1;
export const instrumentIndex = 2;
export const starkIndex = 3;
export const gasIndex = 4;
export const deuteriumIndex = 5;
export const sharedParameterCount = 6;

/** Of a line: area, then departures of centre, Stark width and instrument width. */
export const lineParameterCount = 4;
export const lineBase = (line: number): number => sharedParameterCount + line * lineParameterCount;

/** Of a segment: level, slope per half segment, curvature. */
export const segmentParameterCount = 3;
export const segmentBase = (lineCount: number, segment: number): number =>
  sharedParameterCount + lineCount * lineParameterCount + segment * segmentParameterCount;
