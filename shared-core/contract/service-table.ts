import { analysisOptionsSchema } from '../diagnosis/analysis-options.ts';
import type { ProblemCode } from '../result/result.ts';
import { z } from '../schema/zod.ts';
import { maxFileBytes, maxFileChars } from './limits.ts';

/**
 * The one table of what a page may ask of its host: input, output, the problems a call may answer, and its
 * time limit. Clients, handlers, both hosts and the contract tests derive from it. A new service is one row
 * here and one handler in electron/services.
 */
export interface ServiceSpec {
  readonly input: z.ZodType;
  readonly output: z.ZodType;
  /** Besides these, every call may answer `service.refused`, `service.timeout` and `service.internal`. */
  readonly problems: readonly ProblemCode[];
  readonly timeLimitMs: number;
}

/** A file on its way between page and host. Its name is for people, never a path to open. */
export const filePayload = z.strictObject({
  name: z.string().min(1).max(255),
  bytesBase64: z.string().max(maxFileChars),
});
export type FilePayload = z.infer<typeof filePayload>;

const sentFile = z.strictObject({
  name: z.string().min(1).max(255),
  bytesBase64: z.string().max(maxFileChars),
  /** Lower-case hex SHA-256 of the bytes. */
  sha256: z.string().regex(/^[0-9a-f]{64}$/),
});
export type SentFile = z.infer<typeof sentFile>;

const readingProblems: readonly ProblemCode[] = [
  'file.empty',
  'file.too-large',
  'file.not-text',
  'file.unreadable',
  'table.no-numbers',
  'table.one-column',
  'table.too-few-rows',
  'table.not-finite',
  'table.column-count',
  'axis.duplicate',
  'axis.not-monotonic',
  'axis.missing',
  'axis.implausible',
  'bench.not-json',
  'bench.unknown-field',
  'bench.bad-value',
  'dark.length',
  'pair.axis',
  'response.coverage',
  'response.bad-value',
];

export const serviceTable = {
  /** What the program is, and how large a file may be. */
  'app.info': {
    input: z.strictObject({}),
    output: z.strictObject({
      name: z.literal('lampwright'),
      version: z.string(),
      maxFileBytes: z.literal(maxFileBytes),
    }),
    problems: [],
    timeLimitMs: 5_000,
  },
  /** The recording that the first start shows, with the files that belong to it. */
  'demo.open': {
    input: z.strictObject({}),
    output: z.strictObject({
      recording: sentFile,
      dark: sentFile.nullable(),
      response: sentFile.nullable(),
      bench: sentFile.nullable(),
    }),
    problems: ['file.unreadable', 'file.too-large'],
    timeLimitMs: 10_000,
  },
  /** The shipped table of impurity and calibration lines, as the text of assets/lines/lines.csv. */
  'lines.table': {
    input: z.strictObject({}),
    output: z.strictObject({ csv: z.string() }),
    problems: ['file.unreadable', 'file.too-large'],
    timeLimitMs: 10_000,
  },
  /** One diagnosis computed by the host; the same text, byte for byte, as the command prints. */
  'diagnosis.run': {
    input: z.strictObject({
      recording: filePayload,
      dark: filePayload.nullable(),
      response: filePayload.nullable(),
      bench: filePayload.nullable(),
      profile: filePayload.nullable().optional(),
      mirror: filePayload.nullable().optional(),
      source: filePayload.nullable().optional(),
      through: filePayload.nullable().optional(),
      options: analysisOptionsSchema,
    }),
    output: z.strictObject({ diagnosisJson: z.string() }),
    problems: readingProblems,
    timeLimitMs: 60_000,
  },
} as const satisfies Record<string, ServiceSpec>;

export type ServiceName = keyof typeof serviceTable;
export type InputOf<N extends ServiceName> = z.output<(typeof serviceTable)[N]['input']>;
export type OutputOf<N extends ServiceName> = z.output<(typeof serviceTable)[N]['output']>;

/** Own rows only: "toString" and "__proto__" are no services. */
export function isServiceName(name: string): name is ServiceName {
  return Object.hasOwn(serviceTable, name);
}
