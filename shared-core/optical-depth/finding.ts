/** A value with the ends of its interval; what the data do not bound is null. */
export interface Bounded {
  readonly value: number | null;
  readonly low: number | null;
  /** A one-sided upper limit where there is no value. */
  readonly high: number | null;
}

/** What the recordings show at a line, before any model of the gas. */
export type SeenAtLine =
  | {
      readonly kind: 'mirror';
      /** Light with the mirror over light without it, in the window of the line. */
      readonly ratio: number;
      readonly ratioSigma: number;
      /** The same where nothing absorbs. */
      readonly thinRatio: number;
      readonly thinRatioSigma: number;
      /** Factor that the line's light has to be raised by, taken from the ratios alone. */
      readonly correction: number | null;
    }
  | {
      readonly kind: 'absorption';
      readonly equivalentWidthNm: number;
      readonly equivalentWidthSigmaNm: number;
    };

/** Optical depth across a line, pixel by pixel. */
export interface DepthOfPixel {
  /** From the line's centre. */
  readonly offsetNm: number;
  readonly opticalDepth: number;
  readonly sigma: number;
}

/** Optical depth of one line, measured apart from its place on the Boltzmann plot. */
export interface OpticalDepthFinding {
  readonly lineId: string;
  readonly method: 'mirror' | 'absorption';
  readonly status: 'measured' | 'upper-limit' | 'not-determined';
  /** Why it is not determined, in one clause; else empty. */
  readonly reason: string;
  /** At the peak of the atoms' own profile, once through the tube. */
  readonly opticalDepth: Bounded;
  /** Atoms in the lower level along the line of sight, m^-2. */
  readonly columnPerSquareMetre: Bounded;
  /** Share of the line's light that leaves the tube: by its own depth, else by the column that another line shows. */
  readonly areaFactor: number | null;
  /** The line whose column gives `areaFactor`; null where there is none. */
  readonly areaFactorFrom: string | null;
  readonly seen: SeenAtLine | null;
  /** Whether the instrument is narrow enough for the depths of single pixels to be those of the gas. */
  readonly isResolved: boolean;
  readonly profile: readonly DepthOfPixel[];
}
