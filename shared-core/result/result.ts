/**
 * How a stage of the chain answers: a value, or a Problem that the user can act on.
 * Programmer errors are neither; they throw through `invariant`.
 */

/** What went wrong with an input, in facts. `problemSentence` turns it into the one sentence people read. */
export interface Problem {
  readonly code: ProblemCode;
  /** The file as the user knows it; null when the problem is not about a file. */
  readonly fileName: string | null;
  /** 1-based line in that file; null when no single line is to blame. */
  readonly lineNumber: number | null;
  /** "recording", "dark", "response table", "bench file": what the file was wanted for. */
  readonly subject: string;
  readonly expected: string;
  readonly found: string;
  readonly remedy: string;
}

export type ProblemCode =
  | 'file.empty'
  | 'file.too-large'
  | 'file.not-text'
  | 'file.unreadable'
  | 'table.no-numbers'
  | 'table.one-column'
  | 'table.too-few-rows'
  | 'table.not-finite'
  | 'table.column-count'
  | 'axis.duplicate'
  | 'axis.not-monotonic'
  | 'axis.missing'
  | 'axis.implausible'
  | 'bench.not-json'
  | 'bench.unknown-field'
  | 'bench.bad-value'
  | 'dark.length'
  | 'pair.axis'
  | 'response.coverage'
  | 'response.bad-value'
  | 'saved.not-recognised'
  | 'service.refused'
  | 'service.timeout'
  | 'service.internal';

export type Result<T> =
  { readonly ok: true; readonly value: T } | { readonly ok: false; readonly problem: Problem };

export const ok = <T>(value: T): Result<T> => ({ ok: true, value });
export const fail = (problem: Problem): Result<never> => ({ ok: false, problem });

/** A remark that rides on a result which stands: what was assumed, noticed or left out. */
export interface Note {
  /** Stable, kebab-case; tests and screens key on it. */
  readonly code: string;
  readonly text: string;
}

/** The one sentence for a Problem: what, where, expected, found, what to do. */
export function problemSentence(problem: Problem): string {
  const file = problem.fileName === null ? '' : ` "${problem.fileName}"`;
  const line = problem.lineNumber === null ? '' : `, line ${String(problem.lineNumber)}`;
  return `Cannot use the ${problem.subject}${file}${line}: expected ${problem.expected}, found ${problem.found}. ${problem.remedy}`;
}

/** Throws when `condition` is false: for mistakes in this program, never for bad input. */
export function invariant(condition: boolean, message: string): asserts condition {
  if (!condition) throw new Error(`invariant broken: ${message}`);
}
