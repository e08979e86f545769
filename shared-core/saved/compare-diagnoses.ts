import type { Diagnosis } from '../diagnosis/diagnosis.ts';
import { stringifyDiagnosis } from '../pipeline/stringify-diagnosis.ts';

export interface Difference {
  /** Where in the diagnosis: "temperature.kelvin". */
  readonly path: string;
  readonly before: string;
  readonly now: string;
}

/**
 * What differs between two diagnoses as they are printed, in the order of the schema; empty when they are
 * the same to the last printed digit. The program's version is no number and is left out.
 */
export function compareDiagnoses(before: Diagnosis, now: Diagnosis): readonly Difference[] {
  const differences: Difference[] = [];
  walk('', plain(before), plain(now), differences);
  return differences;
}

const plain = (diagnosis: Diagnosis): unknown => {
  const { program: _program, ...rest } = JSON.parse(stringifyDiagnosis(diagnosis)) as Diagnosis;
  return rest;
};

function walk(path: string, before: unknown, now: unknown, differences: Difference[]): void {
  if (isTree(before) && isTree(now)) {
    const keys = new Set([...Object.keys(before), ...Object.keys(now)]);
    for (const key of keys) {
      walk(path === '' ? key : `${path}.${key}`, before[key], now[key], differences);
    }
  } else if (before !== now) {
    differences.push({
      path,
      before: JSON.stringify(before) ?? 'nothing',
      now: JSON.stringify(now) ?? 'nothing',
    });
  }
}

const isTree = (value: unknown): value is Record<string, unknown> =>
  typeof value === 'object' && value !== null;
