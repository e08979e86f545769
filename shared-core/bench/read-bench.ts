import type { InputFile } from '../result/input-file.ts';
import { fail, ok, type Problem, type Result } from '../result/result.ts';
import type { z } from '../schema/zod.ts';
import { wholeText } from '../text/decode-text.ts';
import { benchSchema, type Bench } from './bench.ts';
import { fieldsBeside, nearestField } from './known-fields.ts';
import { parseJson, type ParsedJson } from './parse-json.ts';

const SUBJECT = 'bench file';
/** A bench file is a page of text. */
const LARGEST_BYTES = 1024 * 1024;

/** Reads a bench file, or its text; what is wrong with it is one Problem with the line to look at. */
export function readBench(source: Pick<InputFile, 'name' | 'bytes'> | string): Result<Bench> {
  const fileName = typeof source === 'string' ? null : source.name;
  const problem = (facts: Omit<Problem, 'fileName' | 'subject'>): Result<never> =>
    fail({ fileName, subject: SUBJECT, ...facts });
  const byteCount = typeof source === 'string' ? source.length : source.bytes.length;
  if (byteCount > LARGEST_BYTES) {
    return problem({
      code: 'file.too-large',
      lineNumber: null,
      expected: 'at most 1 MiB of JSON',
      found: `${String(Math.ceil(byteCount / 1024))} KiB`,
      remedy: 'Choose the JSON file that describes the bench.',
    });
  }
  const text = typeof source === 'string' ? source.replace(/^\ufeff/, '') : wholeText(source.bytes);
  if (text.trim() === '') {
    return problem({
      code: 'file.empty',
      lineNumber: null,
      expected: 'JSON such as {"schema": "lampwright.bench/1"}',
      found: byteCount === 0 ? 'an empty file' : 'nothing but blanks',
      remedy: 'Choose the JSON file that describes the bench, or work without one.',
    });
  }
  const parsed = parseJson(text);
  if (!parsed.ok) {
    const { kind, ...facts } = parsed.fault;
    return problem({ code: kind === 'duplicate' ? 'bench.bad-value' : 'bench.not-json', ...facts });
  }
  const checked = benchSchema.safeParse(parsed.value.value);
  if (checked.success) return ok(checked.data);
  const found = checked.error.issues.map((issue) => issueProblem(issue, parsed.value));
  return problem(
    found.reduce((first, next) => ((next.lineNumber ?? 0) < (first.lineNumber ?? 0) ? next : first)),
  );
}

type Issue = z.core.$ZodIssue;
type Facts = Omit<Problem, 'fileName' | 'subject'>;

function issueProblem(issue: Issue, parsed: ParsedJson): Facts {
  if (issue.code === 'unrecognized_keys') {
    const path = [...issue.path, issue.keys[0]!];
    const name = path.map(String).join('.');
    const nearest = nearestField(name);
    return {
      code: 'bench.unknown-field',
      lineNumber: parsed.lineOf(path),
      expected: `one of the fields ${fieldsBeside(name).join(', ')}`,
      found: `the unknown field "${name}"`,
      remedy: nearest === null ? 'Remove it.' : `Did you mean "${nearest}"?`,
    };
  }
  const last = issue.path.at(-1);
  const isEntry = typeof last === 'number';
  const field = `"${issue.path
    .slice(0, isEntry ? -1 : undefined)
    .map(String)
    .join('.')}"`;
  const where =
    issue.path.length === 0 ? '' : isEntry ? ` as entry ${String(last + 1)} of ${field}` : ` for ${field}`;
  return {
    code: 'bench.bad-value',
    lineNumber: parsed.lineOf(issue.path),
    expected: `${expectedBy(issue)}${where}`,
    found: shown(valueAt(parsed.value, issue.path)),
    remedy: 'Correct that value or leave the field out.',
  };
}

const KIND_WORDS: Readonly<Record<string, string>> = {
  string: 'text in double quotes',
  number: 'a number',
  int: 'a whole number',
  object: 'fields in braces',
  array: 'a list in brackets',
};

function expectedBy(issue: Issue): string {
  switch (issue.code) {
    case 'invalid_type':
      return KIND_WORDS[issue.expected] ?? issue.expected;
    case 'invalid_value':
      return issue.values.map((value) => JSON.stringify(value)).join(' or ');
    case 'too_small':
      if (issue.origin === 'array') return `at least ${String(issue.minimum)} entries`;
      if (issue.origin === 'string') return 'text that is not empty';
      return `a number ${issue.inclusive === true ? 'of at least' : 'above'} ${String(issue.minimum)}`;
    case 'too_big':
      if (issue.origin === 'array') return `at most ${String(issue.maximum)} entries`;
      if (issue.origin === 'string') return `at most ${String(issue.maximum)} characters`;
      return `a number ${issue.inclusive === true ? 'of at most' : 'below'} ${String(issue.maximum)}`;
    default:
      return issue.message;
  }
}

function valueAt(value: unknown, path: readonly PropertyKey[]): unknown {
  let inner = value;
  for (const key of path) inner = (inner as Readonly<Record<PropertyKey, unknown>> | null)?.[key];
  return inner;
}

function shown(value: unknown): string {
  if (typeof value === 'number' && !Number.isFinite(value)) return 'a number too large for any use';
  const text = JSON.stringify(value) ?? 'nothing';
  return text.length > 60 ? `${text.slice(0, 60)}…` : text;
}
