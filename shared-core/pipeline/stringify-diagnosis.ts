import { type Diagnosis, diagnosisSchema } from '../diagnosis/diagnosis.ts';
import { invariant } from '../result/result.ts';

/** Enough that no meaning is lost, few enough that the text stays readable. */
const significantDigits = 10;

/**
 * The diagnosis as JSON text: keys in the order of the schema, numbers to 10 significant digits, indented
 * by two blanks, no newline at the end. Every door prints this text, so it is the same byte for byte.
 * A diagnosis that breaks its own schema (a NaN, a missing field) is a bug and throws.
 */
export function stringifyDiagnosis(diagnosis: Diagnosis): string {
  return JSON.stringify(ordered(diagnosis), null, 2);
}

/** The same on one line, for `--ndjson`. */
export function stringifyDiagnosisOnOneLine(diagnosis: Diagnosis): string {
  return JSON.stringify(ordered(diagnosis));
}

/** Parsing rebuilds every object in the order of the schema. */
function ordered(diagnosis: Diagnosis): unknown {
  const parsed = diagnosisSchema.safeParse(diagnosis);
  const fault = parsed.error?.issues[0];
  const where = fault?.path.map(String).join('.') ?? '';
  invariant(parsed.success, `the diagnosis at "${where}": ${fault?.message ?? ''}`);
  return rounded(parsed.data);
}

function rounded(value: unknown): unknown {
  if (typeof value === 'number') return roundTo(value);
  if (Array.isArray(value)) return value.map(rounded);
  if (typeof value === 'object' && value !== null) {
    return Object.fromEntries(Object.entries(value).map(([key, inner]) => [key, rounded(inner)]));
  }
  return value;
}

/** toPrecision is defined exactly by the language, so every engine gives the same digits. Minus zero becomes 0. */
function roundTo(value: number): number {
  return Number(value.toPrecision(significantDigits)) + 0;
}
