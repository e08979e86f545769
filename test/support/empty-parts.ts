import type { Diagnosis } from '../../shared-core/diagnosis/diagnosis.ts';

/** Choices as they stand when nobody chose. */
export const plainChoices = { widening: 'none', selfAbsorption: 'report', levels: 'all' } as const;

/** Parts of a diagnosis that has found nothing, for fixtures that are about something else. */
export const emptyParts: Pick<
  Diagnosis,
  | 'monteCarlo'
  | 'lineRatios'
  | 'equilibrium'
  | 'selfAbsorption'
  | 'deuterium'
  | 'gasTemperature'
  | 'companions'
  | 'opticalDepths'
  | 'instrumentProfile'
  | 'impurities'
  | 'benchFindings'
  | 'unassignedPeaks'
> = {
  opticalDepths: [],
  instrumentProfile: null,
  impurities: [],
  benchFindings: [],
  unassignedPeaks: { count: 0, nearBalmerCount: 0, strongest: [] },
  monteCarlo: null,
  lineRatios: [],
  equilibrium: {
    densityStatus: 'not-determined',
    lowestEquilibratedLevel: null,
    levels: [],
    complete: { neededPerCubicMetre: null, status: 'not-known' },
    saha: {
      perCubicMetre: null,
      pressurePa: null,
      factor: null,
      lowFactor: null,
      highFactor: null,
      text: 'There is no temperature.',
    },
    seriesLimit: {
      highestLevel: null,
      lineId: null,
      highPerCubicMetre: null,
      text: 'No series member is seen.',
    },
    text: 'Without a temperature nothing can be said of equilibrium.',
  },
  selfAbsorption: {
    status: 'not-testable',
    deficit: null,
    deficitSigma: null,
    opticalDepth: null,
    low: null,
    high: null,
    coverage: 0.95,
    areaFactor: null,
    predictedHBetaFactor: null,
    isConsistent: null,
    corrected: null,
    isApplied: false,
    text: 'Not tested: no line was fitted.',
  },
  deuterium: {
    status: 'not-determined',
    fraction: null,
    sigmaFraction: null,
    lowFraction: null,
    highFraction: null,
    coverage: 0.95,
    text: 'Deuterium is not determined: no line shows it or rules it out.',
  },
  gasTemperature: {
    status: 'not-determined',
    kelvin: null,
    lowKelvin: null,
    highKelvin: null,
    coverage: 0.95,
    text: 'The instrument width is not known, so nothing can be said of the Doppler width.',
  },
  companions: [],
};
