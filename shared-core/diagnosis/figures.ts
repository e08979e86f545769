import type { Verdict } from './diagnosis.ts';

/** What the screens and the report draw. Arrays are plain numbers, finite, equally long within one object. */
export interface Figures {
  readonly recording: RecordingFigure;
  readonly lines: readonly LineFigure[];
  readonly populations: PopulationFigure;
}

export interface RecordingFigure {
  /** nm, registered axis where there is one, else as recorded. */
  readonly wavelengthNm: Float64Array;
  /** Recorded signal less dark, in `signalUnit`. */
  readonly signal: Float64Array;
  /** 1 sigma of `signal`, same unit. */
  readonly sigma: Float64Array;
  /** 1 where the pixel is clipped, else 0. */
  readonly clipped: Uint8Array;
  readonly signalUnit: 'counts' | 'signal';
  /** Fitted windows, nm on the same axis. */
  readonly windows: readonly { readonly lineId: string; readonly fromNm: number; readonly toNm: number }[];
  /** Lines found, for the ticks along the top edge. */
  readonly marks: readonly {
    readonly lineId: string;
    readonly wavelengthNm: number;
    readonly used: boolean;
  }[];
}

export interface LineFigure {
  readonly lineId: string;
  /** nm, registered; pixel centres inside the window. */
  readonly wavelengthNm: Float64Array;
  readonly signal: Float64Array;
  readonly sigma: Float64Array;
  readonly model: Float64Array;
  readonly baseline: Float64Array;
  /** (signal - model) / sigma. */
  readonly residualSigma: Float64Array;
  readonly clipped: Uint8Array;
  /** The model drawn finely between the pixels, for the curve. */
  readonly curveNm: Float64Array;
  readonly curve: Float64Array;
}

export interface PopulationPoint {
  readonly lineId: string;
  readonly upperLevel: number;
  /** eV above the ground level. */
  readonly upperEnergyEv: number;
  /** ln(population per sublevel), relative: ordinate of the Boltzmann plot. Null when the area is not positive. */
  readonly lnPopulation: number | null;
  readonly lnPopulationSigma: number | null;
  readonly used: boolean;
  /** True when the line is not significant: the point is drawn as an arrow at its upper limit. */
  readonly isUpperLimit: boolean;
}

export interface PopulationFigure {
  readonly points: readonly PopulationPoint[];
  /** Straight line and its band at the stated coverage; null when there is no fit. */
  readonly line: {
    readonly energyEv: Float64Array;
    readonly lnPopulation: Float64Array;
    readonly low: Float64Array;
    readonly high: Float64Array;
  } | null;
  readonly verdict: Verdict;
}
