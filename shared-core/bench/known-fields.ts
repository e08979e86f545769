import { z } from '../schema/zod.ts';
import { benchSchema } from './bench.ts';

/** Every field of the bench file as a path such as "lamp.pressurePa", read off the schema. */
export const knownFields: readonly string[] = Object.freeze(fieldsOf(benchSchema, ''));

function fieldsOf(schema: unknown, prefix: string): string[] {
  const bare = schema instanceof z.ZodOptional ? schema.unwrap() : schema;
  if (!(bare instanceof z.ZodObject)) return [];
  return Object.entries(bare.shape).flatMap(([name, field]) => {
    const path = prefix === '' ? name : `${prefix}.${name}`;
    return [path, ...fieldsOf(field, path)];
  });
}

/** The known field that an unknown one most likely stands for, or null when none is near. */
export function nearestField(unknownPath: string): string | null {
  const parent = parentOf(unknownPath);
  const name = nameOf(unknownPath);
  const rated = knownFields.map((field) => {
    const distance = editDistance(name.toLowerCase(), nameOf(field).toLowerCase());
    return { field, distance: distance + (parentOf(field) === parent ? 0 : 0.5) };
  });
  const best = rated.reduce((so, next) => (next.distance < so.distance ? next : so));
  return best.distance <= Math.max(1.5, name.length * 0.4) ? best.field : null;
}

/** Fields that may stand beside the unknown one. */
export function fieldsBeside(unknownPath: string): readonly string[] {
  const parent = parentOf(unknownPath);
  return knownFields.filter((field) => parentOf(field) === parent).map(nameOf);
}

const parentOf = (path: string): string => path.slice(0, Math.max(0, path.lastIndexOf('.')));
const nameOf = (path: string): string => path.slice(path.lastIndexOf('.') + 1);

/** Least number of letters added, dropped or changed (V. I. Levenshtein, Sov. Phys. Dokl. 10, 707 (1966)). */
function editDistance(a: string, b: string): number {
  let row = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i += 1) {
    const next = [i];
    for (let j = 1; j <= b.length; j += 1) {
      const change = row[j - 1]! + (a[i - 1] === b[j - 1] ? 0 : 1);
      next.push(Math.min(change, row[j]! + 1, next[j - 1]! + 1));
    }
    row = next;
  }
  return row[b.length]!;
}
