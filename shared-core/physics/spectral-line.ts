/** One row of the shipped table of impurity and calibration lines (assets/lines/lines.csv). */
export interface SpectralLine {
  /** "Hg", "N2", "OH". */
  readonly species: string;
  /** "I", "II" for atoms and ions, "mol" for molecules. */
  readonly ionStage: string;
  /** nm in standard air (15 C, 101 325 Pa); for a bandhead, of the head. */
  readonly wavelengthAirNm: number;
  /** nm, by how far the tabulated place may be off. */
  readonly wavelengthToleranceNm: number;
  /** s^-1; null when not known. Mostly from memory: never the basis of a temperature. */
  readonly transitionProbabilityPerS: number | null;
  /** eV; null when not known. */
  readonly upperEnergyEv: number | null;
  readonly upperWeight: number | null;
  /** eV; null when the levels were not recalled apart from the wavelength. */
  readonly lowerEnergyEv: number | null;
  /**
   * Order of magnitude against the other rows of the species, for rows whose transition probabilities do not say it;
   * null elsewhere. Only for asking whether a stronger line is missing.
   */
  readonly relativeStrength: number | null;
  readonly kind: 'line' | 'bandhead';
  /** To which side of its head a band fades; 'none' where it has no plain head (Q branches); null for lines. */
  readonly shading: 'violet' | 'red' | 'none' | null;
  readonly use: 'impurity' | 'calibration' | 'both';
  /** Band system and vibrational levels of a molecule; empty for atoms. */
  readonly transition: string;
  /** What it means at the bench; after a semicolon, what lies near. */
  readonly meaning: string;
  readonly source: string;
  /**
   * How far the wavelength is verified: 'read' in a public copy of the source, 'computed' here, 'level-checked' from
   * memory but agreeing within 5 pm with energies of both levels recalled apart from it, 'memory' alone.
   */
  readonly verified: (typeof verifications)[number];
}

export const verifications = ['read', 'computed', 'level-checked', 'memory'] as const;
