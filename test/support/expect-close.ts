import { expect } from 'vitest';

export interface Expected {
  readonly expected: number;
  /** Largest relative and absolute difference; the wider of the two counts, both absent means equal. */
  readonly rel?: number | undefined;
  readonly abs?: number | undefined;
  /** Where the expected value comes from; shown when the check fails. */
  readonly because: string;
}

/** Checks a number against a reference, and names the reference when it fails. */
export function expectClose(actual: number, { expected, rel = 0, abs = 0, because }: Expected): void {
  const allowed = Math.max(rel * Math.abs(expected), abs);
  const difference = Math.abs(actual - expected);
  const text = `${String(actual)} against ${String(expected)} +- ${String(allowed)}: ${because}`;
  expect(difference <= allowed, text).toBe(true);
}
