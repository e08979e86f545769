/**
 * What a spectral line of zero width looks like through the instrument: a sum of Voigt profiles of weight 1 together, all
 * lengths in units of the instrument's FWHM.
 */
export interface InstrumentTerm {
  readonly weight: number;
  readonly gaussianShare: number;
  readonly lorentzianShare: number;
  /** Where the profile lies; terms off the centre come in pairs, so that the whole is symmetric. */
  readonly shiftShare: number;
}

export const gaussianInstrument: readonly InstrumentTerm[] = Object.freeze([
  Object.freeze({ weight: 1, gaussianShare: 1, lorentzianShare: 0, shiftShare: 0 }),
]);

/** Pseudo-Voigt: a Gaussian and a Lorentzian of the same FWHM, the latter with this share of the light. */
export function pseudoVoigtInstrument(lorentzShare: number): readonly InstrumentTerm[] {
  return lorentzShare === 0
    ? gaussianInstrument
    : [
        { weight: 1 - lorentzShare, gaussianShare: 1, lorentzianShare: 0, shiftShare: 0 },
        { weight: lorentzShare, gaussianShare: 0, lorentzianShare: 1, shiftShare: 0 },
      ];
}
