/** One row of the shipped table of impurity and calibration lines (assets/lines/lines.csv). */
export interface SpectralLine {
  /** "Hg", "N2", "OH". */
  readonly species: string;
  /** "I", "II" for atoms and ions, "mol" for molecules. */
  readonly ionStage: string;
  /** nm in standard air (15 C, 101 325 Pa); for a bandhead, of the head. */
  readonly wavelengthAirNm: number;
  /** s^-1; null when not known. Mostly from memory: never the basis of a temperature. */
  readonly transitionProbabilityPerS: number | null;
  /** eV; null when not known. */
  readonly upperEnergyEv: number | null;
  readonly upperWeight: number | null;
  readonly kind: 'line' | 'bandhead';
  readonly use: 'impurity' | 'calibration' | 'both';
  /** What it means at the bench. */
  readonly meaning: string;
  readonly source: string;
}
