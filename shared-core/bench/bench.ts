import { z } from '../schema/zod.ts';

/**
 * The bench file, schema `lampwright.bench/1`: one description of lamp, supply, spectrometer and choices.
 * Every field is optional and an unknown field is refused, so that a misspelt one cannot be ignored in silence.
 */
const positive = z.number().positive().finite();
const notNegative = z.number().nonnegative().finite();

export const wideningSchema = z.enum(['none', 'birge']);
export const selfAbsorptionChoiceSchema = z.enum(['report', 'correct']);
export const levelsChoiceSchema = z.enum(['all', 'equilibrated']);

export const benchSchema = z.strictObject({
  schema: z.literal('lampwright.bench/1').optional(),
  name: z.string().max(200).optional(),
  lamp: z
    .strictObject({
      id: z.string().max(100).optional(),
      gas: z.string().max(50).optional(),
      pressurePa: positive.optional(),
      pathLengthMm: positive.optional(),
      gasTemperatureK: z.number().min(50).max(50_000).optional(),
    })
    .optional(),
  supply: z
    .strictObject({
      openCircuitVolts: positive.optional(),
      currentMilliamps: positive.optional(),
      capacitanceMicrofarads: notNegative.optional(),
      bleedResistanceMegohms: positive.optional(),
    })
    .optional(),
  axis: z
    .strictObject({
      unit: z.enum(['nm', 'angstrom', 'um', 'cm-1']).optional(),
      medium: z.enum(['air', 'vacuum']).optional(),
      coefficientsNm: z.array(z.number().finite()).min(2).max(6).optional(),
      sigmaNm: notNegative.optional(),
    })
    .optional(),
  detector: z
    .strictObject({
      signal: z.enum(['counts', 'energy']).optional(),
      offsetCounts: z.number().finite().optional(),
      gainElectronsPerCount: positive.optional(),
      readNoiseElectrons: notNegative.optional(),
      saturationCounts: positive.optional(),
    })
    .optional(),
  instrument: z
    .strictObject({
      fwhmNm: positive.max(50).optional(),
      fwhmSigmaNm: notNegative.optional(),
      lorentzShare: z.number().min(0).max(1).optional(),
      /** A recording of a lamp with sharp lines, on which all of these are measured. */
      profileFile: z.string().min(1).max(1000).optional(),
    })
    .optional(),
  dark: z.strictObject({ file: z.string().min(1).max(1000) }).optional(),
  response: z
    .strictObject({
      file: z.string().min(1).max(1000),
      per: z.enum(['photon', 'energy']).optional(),
      correlationLengthNm: notNegative.optional(),
      /** Standard lamp that the table was made with: a black body's shape at this temperature. */
      lamp: z
        .strictObject({ temperatureK: z.number().min(500).max(10_000), sigmaK: notNegative.max(1000) })
        .optional(),
      /** Share of the lamp's mean light on every pixel; 0 where the table is already corrected for it. */
      strayLight: z.strictObject({ share: notNegative.max(0.1), sigma: notNegative.max(0.1) }).optional(),
    })
    .optional(),
  /** A recording with a mirror behind the tube. */
  mirror: z.strictObject({ file: z.string().min(1).max(1000) }).optional(),
  /** A continuum source behind the tube, alone and through the burning tube. */
  absorption: z
    .strictObject({
      sourceFile: z.string().min(1).max(1000),
      throughFile: z.string().min(1).max(1000),
    })
    .optional(),
  analysis: z
    .strictObject({
      upperLevels: z.array(z.number().int().min(3).max(20)).min(1).max(18).optional(),
      deuterium: z.enum(['auto', 'absent', 'present']).optional(),
      fit: z.enum(['joint', 'line-by-line']).optional(),
      coverage: z.number().min(0.5).max(0.999).optional(),
      /** Whether scatter beyond the stated uncertainties widens the interval by the Birge ratio. */
      widening: wideningSchema.optional(),
      /** Whether self-absorption of H-alpha is only reported, or the temperature corrected for it. */
      selfAbsorption: selfAbsorptionChoiceSchema.optional(),
      /** Whether levels below the lowest equilibrated one may carry the temperature. */
      levels: levelsChoiceSchema.optional(),
    })
    .optional(),
});

export type Bench = z.infer<typeof benchSchema>;
