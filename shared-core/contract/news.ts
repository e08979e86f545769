import { z } from '../schema/zod.ts';

/**
 * News that a host tells its page without being asked. They are numbered from 1 without gaps, so a page that
 * was cut off asks for what it missed by the last number it saw.
 */
export const newsSchema = z.discriminatedUnion('kind', [
  /** First on every connection: the number of the latest news, and the version of the program behind it. */
  z.strictObject({ kind: z.literal('connected'), sequence: z.int().nonnegative(), version: z.string() }),
  /** A computation in the host began or ended. */
  z.strictObject({
    kind: z.literal('work'),
    sequence: z.int().positive(),
    state: z.enum(['started', 'done', 'failed']),
    /** Name of the recording, as the page sent it. */
    recordingName: z.string(),
  }),
]);
export type News = z.infer<typeof newsSchema>;
