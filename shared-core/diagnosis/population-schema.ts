import { z } from '../schema/zod.ts';

/** Parts of the diagnosis that follow from the populations and the gas; see diagnosis.ts for the whole. */
const number = z.number();
const numberOrNull = z.number().nullable();

export const lineRatioSchema = z.strictObject({
  /** Line ids; the line of the lower upper level is the numerator. */
  numerator: z.string(),
  denominator: z.string(),
  /** Of the areas, response divided out: photons, or energy where the response table is per energy. */
  ratio: numberOrNull,
  ratioSigma: numberOrNull,
  /** Value at infinite temperature; at or below it there is no positive temperature. */
  limit: number,
  status: z.enum(['measured', 'lower-limit', 'no-positive-temperature', 'not-determined']),
  kelvin: numberOrNull,
  lowKelvin: numberOrNull,
  highKelvin: numberOrNull,
  coverage: number,
  text: z.string(),
});

export const instrumentProfileSchema = z.strictObject({
  status: z.enum(['measured', 'not-measured']),
  shape: z.enum(['pseudo-voigt', 'tabulated']).nullable(),
  fwhmNm: numberOrNull,
  /** Holds for the whole range: with the spread of the lines' widths. */
  fwhmSigmaNm: numberOrNull,
  /** Of a pseudo-Voigt shape. */
  lorentzShare: numberOrNull,
  lorentzShareSigma: numberOrNull,
  /** nm, recorded axis. */
  linesNm: z.array(number),
  reducedChiSquare: numberOrNull,
  text: z.string(),
});

const equilibriumStatus = z.enum(['equilibrated', 'not-equilibrated', 'not-known']);

export const equilibriumSchema = z.strictObject({
  /** What is known of the electron density that decides. */
  densityStatus: z.enum(['measured', 'upper-limit', 'not-determined']),
  lowestEquilibratedLevel: numberOrNull,
  /** Partial equilibrium of each fitted level with the free electrons. */
  levels: z.array(
    z.strictObject({
      upperLevel: number,
      lineIds: z.array(z.string()),
      /** Electron density that Griem's criterion asks for; null without a temperature. */
      neededPerCubicMetre: numberOrNull,
      status: equilibriumStatus,
    }),
  ),
  /** Complete local equilibrium, ground state included: McWhirter's necessary density. */
  complete: z.strictObject({ neededPerCubicMetre: numberOrNull, status: equilibriumStatus }),
  /** Electron density of pure hydrogen in equilibrium at the stated pressure and the measured temperature. */
  saha: z.strictObject({
    perCubicMetre: numberOrNull,
    pressurePa: numberOrNull,
    /** Measured density over that one, and its range. */
    factor: numberOrNull,
    lowFactor: numberOrNull,
    highFactor: numberOrNull,
    text: z.string(),
  }),
  /** Upper bound of the density from the highest series member seen (Inglis and Teller), a factor of three included. */
  seriesLimit: z.strictObject({
    highestLevel: numberOrNull,
    lineId: z.string().nullable(),
    highPerCubicMetre: numberOrNull,
    text: z.string(),
  }),
  text: z.string(),
});

export const selfAbsorptionSchema = z.strictObject({
  status: z.enum(['none-seen', 'suspected', 'not-testable']),
  /** ln(expected / measured area of H-alpha) and its standard uncertainty. */
  deficit: numberOrNull,
  deficitSigma: numberOrNull,
  /** At the centre of H-alpha; null unless suspected. */
  opticalDepth: numberOrNull,
  low: numberOrNull,
  /** A one-sided upper limit where none is seen. */
  high: numberOrNull,
  coverage: number,
  /** Share of the light that leaves the lamp, H-alpha, and what the depth predicts for H-beta. */
  areaFactor: numberOrNull,
  predictedHBetaFactor: numberOrNull,
  /** Whether all lines agree with one depth; null where nothing is left to test it. */
  isConsistent: z.boolean().nullable(),
  /** The temperature with the depth fitted along. */
  corrected: z
    .strictObject({ kelvin: number, sigmaKelvin: number, lowKelvin: number, highKelvin: number })
    .nullable(),
  /** Whether `temperature` is the corrected one. */
  isApplied: z.boolean(),
  text: z.string(),
});

export const deuteriumSchema = z.strictObject({
  status: z.enum(['measured', 'upper-limit', 'not-determined']),
  /** Atoms of deuterium over all hydrogen atoms, D/(H + D), in the emitting levels. */
  fraction: numberOrNull,
  sigmaFraction: numberOrNull,
  lowFraction: numberOrNull,
  highFraction: numberOrNull,
  coverage: number,
  text: z.string(),
});

export const gasTemperatureSchema = z.strictObject({
  status: z.enum(['measured', 'upper-limit', 'given', 'not-determined']),
  kelvin: numberOrNull,
  lowKelvin: numberOrNull,
  highKelvin: numberOrNull,
  coverage: number,
  text: z.string(),
});

export const monteCarloSchema = z.strictObject({
  seed: number,
  trials: number,
  /** Whether mean, uncertainty and both ends are stable to two digits of the uncertainty. */
  isStable: z.boolean(),
  /** Of the mean and of the median of 1/T. */
  kelvin: numberOrNull,
  medianKelvin: numberOrNull,
  sigmaKelvin: numberOrNull,
  lowKelvin: numberOrNull,
  highKelvin: numberOrNull,
  coverage: number,
  /** Of the distribution of 1/T. */
  skewness: number,
  /** When false and both ends are known, `temperature` carries the interval of the trials. */
  confirmsFirstOrder: z.boolean(),
  text: z.string(),
});

export const companionSchema = z.strictObject({
  /** Balmer line it lies under. */
  lineId: z.string(),
  species: z.string(),
  wavelengthNm: number,
  /** In the unit of the lines' areas. */
  area: number,
  areaSigma: number,
  signalToNoise: number,
  text: z.string(),
});

export const opticalDepthSchema = z.strictObject({
  lineId: z.string(),
  method: z.enum(['mirror', 'absorption']),
  status: z.enum(['measured', 'upper-limit', 'not-determined']),
  /** At the peak of the atoms' own profile, once through the tube. */
  opticalDepth: numberOrNull,
  low: numberOrNull,
  /** A one-sided upper limit where none is seen; null where the light no longer bounds it. */
  high: numberOrNull,
  coverage: number,
  /** Atoms in the lower level along the line of sight. */
  columnDensityPerSquareMetre: numberOrNull,
  columnDensityLowPerSquareMetre: numberOrNull,
  columnDensityHighPerSquareMetre: numberOrNull,
  /** The same per volume, where the bench states the path. */
  lowerLevelDensityPerCubicMetre: numberOrNull,
  /** Share of the line's light that leaves the lamp, and the line whose column says so. */
  areaFactor: numberOrNull,
  areaFactorFrom: z.string().nullable(),
  /** Mirror: light of the line with it over light without it, and the same of thin lines. */
  ratio: numberOrNull,
  ratioSigma: numberOrNull,
  thinRatio: numberOrNull,
  thinRatioSigma: numberOrNull,
  /** Absorption: width of continuum that is missing. */
  equivalentWidthNm: numberOrNull,
  equivalentWidthSigmaNm: numberOrNull,
  /** Whether the depths of single pixels in `profile` are those of the gas; else the instrument has smeared them. */
  isResolved: z.boolean(),
  profile: z.array(z.strictObject({ offsetNm: number, opticalDepth: number, sigma: number })),
  text: z.string(),
});
