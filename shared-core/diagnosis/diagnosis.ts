import { z } from '../schema/zod.ts';
import { choicesSchema } from './analysis-options.ts';
import { benchFindingSchema, impuritySchema, unassignedPeaksSchema } from './identification-schema.ts';
import {
  companionSchema,
  deuteriumSchema,
  equilibriumSchema,
  gasTemperatureSchema,
  instrumentProfileSchema,
  lineRatioSchema,
  monteCarloSchema,
  opticalDepthSchema,
  selfAbsorptionSchema,
} from './population-schema.ts';

/**
 * The diagnosis, schema `lampwright.diagnosis/1`: what the command prints, a saved diagnosis holds and a
 * report shows. Units are in the names; a value that is absent is null. Fields may be added, these keep
 * their meaning.
 */
const number = z.number();
const numberOrNull = z.number().nullable();

export const verdictSchema = z.enum(['sound', 'use with care', 'not defensible']);
export type Verdict = z.infer<typeof verdictSchema>;

export const diagnosedLineSchema = z.strictObject({
  id: z.string(),
  upperLevel: number,
  lowerLevel: number,
  /** nm, blend centroid in the medium of the recording. */
  referenceNm: number,
  /** nm, in the recorded axis (before registration); null when the line could not be fitted. */
  recordedNm: numberOrNull,
  /** nm, after registration of the axis. */
  centreNm: numberOrNull,
  centreSigmaNm: numberOrNull,
  /** Electrons when the gain is known, else counts: integrated over the line, before the response. */
  area: numberOrNull,
  areaSigma: numberOrNull,
  areaUnit: z.enum(['electrons', 'counts', 'signal nm']),
  signalToNoise: numberOrNull,
  gaussianFwhmNm: numberOrNull,
  lorentzianFwhmNm: numberOrNull,
  lorentzianFwhmSigmaNm: numberOrNull,
  /** Response at the line relative to its value at the strongest used line; null without a table. */
  response: numberOrNull,
  reducedChiSquare: numberOrNull,
  fitStatus: z.enum(['converged', 'stalled', 'iteration-limit', 'singular', 'not-fitted']),
  used: z.boolean(),
  /** Why the line is not used; empty when it is. */
  reasons: z.array(z.string()),
});
export type DiagnosedLine = z.infer<typeof diagnosedLineSchema>;

export const checkSchema = z.strictObject({
  id: z.string(),
  verdict: verdictSchema,
  facts: z.record(z.string(), z.union([z.number(), z.string(), z.boolean(), z.null()])),
  /** What was seen, one sentence. */
  text: z.string(),
  /** What to do, one sentence; empty when nothing needs doing. */
  remedy: z.string(),
});
export type Check = z.infer<typeof checkSchema>;

export const diagnosisSchema = z.strictObject({
  schema: z.literal('lampwright.diagnosis/1'),
  program: z.strictObject({ name: z.literal('lampwright'), version: z.string() }),
  recording: z.strictObject({
    name: z.string(),
    sha256: z.string(),
    pointCount: number,
    firstNm: number,
    lastNm: number,
    medium: z.enum(['air', 'vacuum']),
  }),
  inputs: z.strictObject({
    bench: z.string().nullable(),
    dark: z.strictObject({ name: z.string(), sha256: z.string() }).nullable(),
    response: z
      .strictObject({ name: z.string(), sha256: z.string(), per: z.enum(['photon', 'energy']) })
      .nullable(),
    /** Reference lamp that the instrument's profile was measured on. */
    profile: z.strictObject({ name: z.string(), sha256: z.string() }).nullable(),
    /** With a mirror behind the tube; a source behind it, alone and through the burning tube. */
    mirror: z.strictObject({ name: z.string(), sha256: z.string() }).nullable(),
    source: z.strictObject({ name: z.string(), sha256: z.string() }).nullable(),
    through: z.strictObject({ name: z.string(), sha256: z.string() }).nullable(),
  }),
  options: z.strictObject({
    upperLevels: z.array(number),
    leftOut: z.array(z.string()),
    coverage: number,
    deuterium: z.enum(['auto', 'absent', 'present']),
    ...choicesSchema.shape,
  }),
  axis: z.strictObject({
    status: z.enum(['registered', 'ambiguous', 'not-found']),
    /** Registered = recorded + offsetNm + stretch * (recorded - pivotNm). */
    offsetNm: numberOrNull,
    offsetSigmaNm: numberOrNull,
    stretch: numberOrNull,
    stretchSigma: numberOrNull,
    pivotNm: number,
    matchedLines: z.array(z.string()),
    text: z.string(),
  }),
  lines: z.array(diagnosedLineSchema),
  temperature: z.strictObject({
    status: z.enum(['measured', 'lower-limit', 'not-determined']),
    kelvin: numberOrNull,
    sigmaKelvin: numberOrNull,
    lowKelvin: numberOrNull,
    highKelvin: numberOrNull,
    coverage: number,
    chiSquare: numberOrNull,
    degreesOfFreedom: numberOrNull,
    /** Of the combined uncertainty, by Welch and Satterthwaite; null where all components count as known. */
    effectiveDegreesOfFreedom: numberOrNull,
    /** sqrt(chi-square / degrees of freedom); null with two lines. */
    birgeRatio: numberOrNull,
    /** Factor by which the interval was widened: the Birge ratio where that was chosen and exceeds 1, else 1. */
    widening: number,
    /** False when no response table was given: the number is then a comparison value only. */
    responseCorrected: z.boolean(),
    text: z.string(),
  }),
  electronDensity: z.strictObject({
    status: z.enum(['measured', 'upper-limit', 'not-determined']),
    perCubicMetre: numberOrNull,
    lowPerCubicMetre: numberOrNull,
    highPerCubicMetre: numberOrNull,
    coverage: number,
    line: z.string().nullable(),
    text: z.string(),
  }),
  meaning: z.strictObject({
    kind: z.enum(['electron-temperature', 'distribution-temperature']),
    lowestEquilibratedLevel: numberOrNull,
    text: z.string(),
  }),
  /** The temperature by Monte Carlo; null unless asked for. */
  monteCarlo: monteCarloSchema.nullable(),
  /** Two-line temperatures: neighbours, and the first line with the last. */
  lineRatios: z.array(lineRatioSchema),
  equilibrium: equilibriumSchema,
  selfAbsorption: selfAbsorptionSchema,
  deuterium: deuteriumSchema,
  gasTemperature: gasTemperatureSchema,
  /** Lines of other species fitted together with a Balmer line. */
  companions: z.array(companionSchema),
  /** Measured on the lines of a reference lamp; null without such a recording. */
  instrumentProfile: instrumentProfileSchema.nullable(),
  /** Measured with a mirror or a light source behind the tube; empty without such recordings. */
  opticalDepths: z.array(opticalDepthSchema),
  impurities: z.array(impuritySchema),
  benchFindings: z.array(benchFindingSchema),
  unassignedPeaks: unassignedPeaksSchema,
  checks: z.array(checkSchema),
  budget: z.array(
    z.strictObject({
      source: z.string(),
      sigmaKelvin: number,
      /** Part of the variance, 0 to 1. */
      share: number,
      remedy: z.string(),
      /** Of the cause itself, in `unit`; null where no one number states it. */
      standardUncertainty: numberOrNull,
      /** "K", "nm", "1" for a share. */
      unit: z.string(),
      /** Change of the temperature per unit of the cause, K. */
      sensitivityKelvin: numberOrNull,
      /** Relative standard uncertainty it gives the area of a line: the smallest and the largest of the lines used. */
      smallestRelative: number,
      largestRelative: number,
      /** Null where the standard uncertainty counts as known. */
      degreesOfFreedom: numberOrNull,
    }),
  ),
  verdict: verdictSchema,
  /** One sentence: why the verdict is not better and the most useful remedy. */
  verdictText: z.string(),
  notes: z.array(z.string()),
});
export type Diagnosis = z.infer<typeof diagnosisSchema>;
