import type { Note } from '../result/result.ts';

/**
 * Variance of one pixel as a function of the signal the model expects there, in counts^2:
 * fixedVariance[i] + variancePerSignal * max(0, signal above `signalReference`).
 */
export interface NoiseModel {
  /** Counts^2, length n: read noise, quantisation, dark current and the noise of the dark frame itself. */
  readonly fixedVariance: Float64Array;
  /** Counts: 1/gain for a counting detector. */
  readonly variancePerSignal: number;
  /** 'zero': the whole net signal makes noise; 'baseline': the fixed part was measured on the baseline, which it holds. */
  readonly signalReference: 'zero' | 'baseline';
  readonly origin: 'bench' | 'estimated';
  /** Autocorrelation of the noise at lags 1, 2, ... pixels; empty for white noise. */
  readonly correlation: readonly number[];
  /** Points of the running mean that the export went through, odd; 1 when none was recognised. */
  readonly runningMeanPoints: number;
  /** Electrons per count; null when not known, and then areas stay in counts. */
  readonly gainElectronsPerCount: number | null;
}

/** A recording with dark or offset removed and its clipped pixels known; the axis still as recorded. */
export interface CorrectedRecording {
  readonly name: string;
  readonly sha256: string;
  readonly medium: 'air' | 'vacuum';
  /** nm, length n, pixel centres, strictly increasing. */
  readonly wavelengthNm: Float64Array;
  /** nm, length n + 1: half way between neighbouring centres. */
  readonly edgeNm: Float64Array;
  /** Counts (or signal units), length n, dark or offset removed. */
  readonly netSignal: Float64Array;
  /** 1 where the pixel is clipped. */
  readonly clipped: Uint8Array;
  /** Recorded level at which clipping was found; null when none was. */
  readonly clipLevel: number | null;
  readonly noise: NoiseModel;
  /** 'per-pixel': counts collected by a pixel; 'per-nm': a spectral density, as an irradiance is. */
  readonly signalKind: 'per-pixel' | 'per-nm';
  readonly darkUsed: 'frame' | 'offset' | 'none';
  readonly notes: readonly Note[];
}
