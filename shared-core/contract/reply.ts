import type { ProblemCode, Result } from '../result/result.ts';
import { z } from '../schema/zod.ts';

const problemCodes: Record<ProblemCode, true> = {
  'file.empty': true,
  'file.too-large': true,
  'file.not-text': true,
  'file.unreadable': true,
  'table.no-numbers': true,
  'table.one-column': true,
  'table.too-few-rows': true,
  'table.not-finite': true,
  'table.column-count': true,
  'axis.duplicate': true,
  'axis.not-monotonic': true,
  'axis.missing': true,
  'axis.implausible': true,
  'bench.not-json': true,
  'bench.unknown-field': true,
  'bench.bad-value': true,
  'dark.length': true,
  'pair.axis': true,
  'response.coverage': true,
  'response.bad-value': true,
  'saved.not-recognised': true,
  'service.refused': true,
  'service.timeout': true,
  'service.internal': true,
};

const problemSchema = z.strictObject({
  code: z.string().refine((code): code is ProblemCode => Object.hasOwn(problemCodes, code)),
  fileName: z.string().nullable(),
  lineNumber: z.int().nullable(),
  subject: z.string(),
  expected: z.string(),
  found: z.string(),
  remedy: z.string(),
});

const replySchema = z.discriminatedUnion('ok', [
  z.strictObject({ ok: z.literal(true), value: z.unknown() }),
  z.strictObject({ ok: z.literal(false), problem: problemSchema }),
]);

/** What every call answers: a value of the table's output schema, or a Problem. Plain JSON in both hosts. */
export type Reply<T> = Result<T>;

/**
 * Reads an answer that came over a transport.
 * A host that answers anything else is a fault of this program and throws.
 */
export function parseReply<T>(raw: unknown, output: z.ZodType<T>): Reply<T> {
  const reply = replySchema.parse(raw);
  return reply.ok ? { ok: true, value: output.parse(reply.value) } : { ok: false, problem: reply.problem };
}
