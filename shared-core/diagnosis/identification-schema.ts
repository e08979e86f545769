import { z } from '../schema/zod.ts';

/** What else is in the tube; see diagnosis.ts for the whole. */
const number = z.number();
const confidence = z.enum(['sure', 'likely']);

export const impuritySchema = z.strictObject({
  /** "Hg", "N2". */
  species: z.string(),
  /** "Hg I", "N2". */
  emitter: z.string(),
  evidence: z.string(),
  /** Of the strongest line. */
  signalToNoise: number,
  meaning: z.string(),
  linesSeen: number,
  /** Lines in range that should stand out, those seen included. */
  linesExpected: number,
  /** That noise and stray lines look like this, all species looked for counted. */
  chanceProbability: number,
  confidence,
});

export const benchFindingSchema = z.strictObject({
  id: z.enum([
    'air-leak',
    'water',
    'oxygen',
    'hydrocarbons',
    'carbon-oxides',
    'mercury',
    'electrode-metal',
    'glass',
    'other-gas',
    'molecular-hydrogen',
  ]),
  title: z.string(),
  confidence,
  evidenceFor: z.array(z.string()),
  evidenceAgainst: z.array(z.string()),
  wouldSettle: z.array(z.string()),
});

export const unassignedPeaksSchema = z.strictObject({
  count: number,
  /** Of them between 430 and 500 nm, around H-beta and H-gamma. */
  nearBalmerCount: number,
  strongest: z.array(
    z.strictObject({
      /** nm in air, registered axis. */
      wavelengthNm: number,
      signalToNoise: number,
      /** Main lines of species that lie there; one coincidence claims nothing. */
      candidates: z.array(z.string()),
    }),
  ),
});
