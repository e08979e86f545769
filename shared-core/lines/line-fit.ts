import type { FitStatus } from './solve-joint.ts';

/** One fitted line: area and shape with their uncertainties, on the recorded axis. */
export interface LineFit {
  readonly id: string;
  readonly upperLevel: number;
  readonly referenceNm: number;
  readonly status: FitStatus;
  /** nm, recorded axis. */
  readonly recordedCentreNm: number;
  readonly centreSigmaNm: number;
  /** Counts (or signal nm), before the response; may be negative for a line that is not there. */
  readonly area: number;
  readonly areaSigma: number;
  readonly gaussianFwhmNm: number;
  /** nm; may be slightly negative within its uncertainty, see numeric/voigt-pixel.ts. */
  readonly lorentzianFwhmNm: number;
  readonly lorentzianFwhmSigmaNm: number;
  /** Of the pixels within two and a half widths of the centre. */
  readonly reducedChiSquare: number;
  readonly coreDegreesOfFreedom: number;
  /** Factor by which areaSigma was widened because the model does not describe this line; 1 when it does. */
  readonly widening: number;
}

/** Why a line of the pattern has no fit. */
export type LineObstacle =
  | { readonly kind: 'out-of-range' }
  | { readonly kind: 'clipped'; readonly clippedPixelCount: number }
  | { readonly kind: 'core-deficit'; readonly deficitFraction: number; readonly significance: number }
  /** Less light than the baseline: `depthFraction` of it at the deepest, null where the baseline is no continuum. */
  | { readonly kind: 'absorption'; readonly depthFraction: number | null; readonly significance: number }
  /** A dip in the middle of an emission line, as a share of the lower shoulder's height. */
  | { readonly kind: 'self-reversal'; readonly dipFraction: number; readonly significance: number }
  | { readonly kind: 'no-pixels' };

/** What the line fits of one recording came to. */
export interface LineFits {
  readonly status: FitStatus | 'not-fitted';
  /** 'shared': one width law and one axis for all; 'own': every line has its own width and place. */
  readonly sharing: 'shared' | 'own';
  readonly fits: readonly LineFit[];
  readonly obstacles: ReadonlyMap<string, LineObstacle>;
  /** Lines with an unassigned peak closer than one and a half widths: id to the peak's recorded place, nm. */
  readonly neighbours: ReadonlyMap<string, number>;
  /** Covariance of the areas, row-major in the order of `fits`, counts^2 (widened). */
  readonly areaCovariance: Float64Array;
  readonly chiSquare: number;
  readonly degreesOfFreedom: number;
  /** Counts of variance per count that the lines showed; the bench's value when it gave one. */
  readonly variancePerSignal: number;
  /** Instrument FWHM, nm, and what is known of it. */
  readonly instrumentFwhmNm: number;
  readonly instrumentFwhmSigmaNm: number;
  readonly instrumentFrom: 'bench' | 'recording';
  /** Departure from the registration found by the fit: offset nm and stretch, with sigmas; pivot as registration. */
  readonly axisShift: {
    readonly offsetNm: number;
    readonly offsetSigmaNm: number;
    readonly stretch: number;
    readonly stretchSigma: number;
  };
  /** Deuterium beside hydrogen, one ratio for all lines; null when it was not asked for or nothing was fitted. */
  readonly deuterium: DeuteriumRatio | null;
  /** What the Gaussian widths say of the gas temperature; null when nothing was fitted. */
  readonly gasTemperature: FittedGasTemperature | null;
  /** Lines of other species that lie under or beside a Balmer line and were fitted with it. */
  readonly companions: readonly CompanionLine[];
  /** What the choice of the baseline's shape adds to the areas, area^2, row-major over `fits`; zero where straight serves. */
  readonly baselineCovariance: Float64Array;
  /** Noise shared by neighbouring points, already in every uncertainty; null where the noise is white. */
  readonly correlatedNoise: CorrelatedNoise | null;
  /** Per pixel of the recording, defined inside the windows; empty when nothing was fitted. */
  readonly modelled: Float64Array;
  readonly baseline: Float64Array;
  readonly pixelVariance: Float64Array;
  readonly windows: readonly FitWindow[];
  /** The fitted signal of a window drawn between its pixels, `pointsPerPixel` values a pixel from its centre on. */
  readonly curveOf: (windowIndex: number, pointsPerPixel: number) => Float64Array;
}

/** Atoms of deuterium per atom of hydrogen in the emitting level. */
export interface DeuteriumRatio {
  readonly ratio: number;
  readonly ratioSigma: number;
  /** False when it was searched for and not found: the ratio is what it would have come to, and the fit holds none. */
  readonly isFitted: boolean;
}

/**
 * Gas temperature from the Doppler part of the widths. The data's own word, with what was assumed beforehand taken out
 * again; sigma is infinite when the data say nothing.
 */
export interface FittedGasTemperature {
  readonly kelvin: number;
  readonly kelvinSigma: number;
  /** True when the bench states it and the fit was held there. */
  readonly isGiven: boolean;
}

export interface CompanionLine {
  /** Balmer line it lies under. */
  readonly lineId: string;
  /** "Hg I", "Ca II", "He I", "N2". */
  readonly species: string;
  /** nm in the medium of the recording. */
  readonly referenceNm: number;
  /** Counts (or signal nm), as the areas of the Balmer lines. */
  readonly area: number;
  readonly areaSigma: number;
}

export interface CorrelatedNoise {
  /** Autocorrelation at lags 1, 2, ... pixels. */
  readonly correlation: readonly number[];
  /** By what the standard uncertainty of the mean of many pixels exceeds that of white noise. */
  readonly widening: number;
}

export interface FitWindow {
  readonly lineId: string;
  readonly firstPx: number;
  /** Exclusive. */
  readonly endPx: number;
}
