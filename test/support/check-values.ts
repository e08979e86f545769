import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { projectRoot } from './source-files.ts';
import { expectClose } from './expect-close.ts';

export type Inputs = Readonly<Record<string, unknown>>;

interface CheckValue {
  readonly inputs: Inputs;
  readonly expected: unknown;
  readonly tolerance: { readonly rel?: number; readonly abs?: number };
  readonly source: string;
  readonly verifiedBy: string;
}

const file = JSON.parse(readFileSync(join(projectRoot, 'test/data/physics-check-values.json'), 'utf8')) as {
  values: Readonly<Record<string, CheckValue>>;
};

/** The reference value of that name. */
export function checkValue(key: string): CheckValue {
  const value = file.values[key];
  if (value === undefined) throw new Error(`no reference value ${key}`);
  return value;
}

/** Names of all reference values that match. */
export function checkKeys(pattern: RegExp): string[] {
  const keys = Object.keys(file.values).filter((key) => pattern.test(key));
  if (keys.length === 0) throw new Error(`no reference value matches ${String(pattern)}`);
  return keys;
}

/** A number among the inputs of a reference value. */
export function numberInput(inputs: Inputs, name: string): number {
  const value = inputs[name];
  if (typeof value !== 'number') throw new Error(`input ${name} is no number`);
  return value;
}

/** Checks a number against the reference value of that name, or against one part of it, within its tolerance. */
export function expectCheckValue(key: string, actual: number, part?: string): void {
  const { expected, tolerance, source, verifiedBy } = checkValue(key);
  const wanted = part === undefined ? expected : (expected as Record<string, unknown>)[part];
  if (typeof wanted !== 'number') throw new Error(`${key} ${part ?? ''} is no number`);
  expectClose(actual, { expected: wanted, ...tolerance, because: `${key}; ${source}; ${verifiedBy}` });
}
