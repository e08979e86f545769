import {
  levelsChoiceSchema,
  selfAbsorptionChoiceSchema,
  wideningSchema,
  type Bench,
} from '../bench/bench.ts';
import { z } from '../schema/zod.ts';

/** Choices a person makes on the sheet; they override the bench file. */
export const analysisOptionsSchema = z.strictObject({
  /** Line ids the person switched off. */
  leftOut: z.array(z.string().min(1).max(40)).max(100).readonly(),
  widening: wideningSchema.optional(),
  selfAbsorption: selfAbsorptionChoiceSchema.optional(),
  levels: levelsChoiceSchema.optional(),
  /** Check the interval of the temperature by Monte Carlo, with this seed. */
  monteCarlo: z.strictObject({ seed: z.number().int().min(0).max(0xffffffff) }).optional(),
});
export type AnalysisOptions = Readonly<z.infer<typeof analysisOptionsSchema>>;

export const defaultAnalysisOptions: AnalysisOptions = Object.freeze({ leftOut: Object.freeze([]) });

export const choicesSchema = z.strictObject({
  widening: wideningSchema,
  selfAbsorption: selfAbsorptionChoiceSchema,
  levels: levelsChoiceSchema,
});
/** How the populations are judged: the sheet's choice, else the bench file's, else the careful default. */
export type Choices = Readonly<z.infer<typeof choicesSchema>>;

export function choicesOf({ analysis }: Bench, options: AnalysisOptions): Choices {
  return {
    widening: options.widening ?? analysis?.widening ?? 'none',
    selfAbsorption: options.selfAbsorption ?? analysis?.selfAbsorption ?? 'report',
    levels: options.levels ?? analysis?.levels ?? 'all',
  };
}
