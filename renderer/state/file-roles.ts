import { savedSchemaName } from '../../shared-core/saved/saved-diagnosis.ts';
import type { InputFile } from '../../shared-core/result/input-file.ts';
import type { Role } from './inputs.ts';

/** A file with what it is to be used as; a saved diagnosis brings everything with it. */
export interface RoledFile {
  readonly file: InputFile;
  readonly role: Role | 'saved';
}

/**
 * What each dropped file most likely is: by the schema it states, by the bench file that names it, then by
 * its own name. The person can change it in the tray.
 */
export function guessRoles(files: readonly InputFile[]): readonly RoledFile[] {
  const named = new Map<string, Role>();
  for (const file of files) {
    const stated = statedJson(file);
    for (const [role, part, field] of namedInBench) {
      const name = fileNamedBy(stated, part, field);
      if (name !== null) named.set(name, role);
    }
  }
  return files.map((file) => ({ file, role: guessRole(file, named) }));
}

/** Where a bench file names the files that go with it. */
const namedInBench = [
  ['dark', 'dark', 'file'],
  ['response', 'response', 'file'],
  ['profile', 'instrument', 'profileFile'],
  ['mirror', 'mirror', 'file'],
  ['source', 'absorption', 'sourceFile'],
  ['through', 'absorption', 'throughFile'],
] as const satisfies readonly (readonly [Role, string, string])[];

/** In this order: "source-through-lamp" is the recording through the tube. */
const guessedByName = [
  'dark',
  'response',
  'profile',
  'mirror',
  'through',
  'source',
] as const satisfies readonly Role[];

function guessRole(file: InputFile, named: ReadonlyMap<string, Role>): RoledFile['role'] {
  const stated = statedJson(file);
  if (stated !== null) return stated['schema'] === savedSchemaName ? 'saved' : 'bench';
  const byBench = named.get(file.name.toLowerCase());
  if (byBench !== undefined) return byBench;
  if (/\.json$/i.test(file.name)) return 'bench';
  const stem = file.name.toLowerCase();
  return guessedByName.find((role) => new RegExp(`(^|[^a-z])${role}`).test(stem)) ?? 'recording';
}

/** The object that a JSON file holds, or null when the file is something else. */
function statedJson(file: InputFile): Record<string, unknown> | null {
  // A table starts with a digit, a sign or a header; only an object starts with a brace.
  const firstByte = file.bytes.find((byte) => byte > 0x20 && byte < 0x80);
  if (firstByte !== 0x7b) return null;
  try {
    const value: unknown = JSON.parse(new TextDecoder().decode(file.bytes));
    return typeof value === 'object' && value !== null ? (value as Record<string, unknown>) : null;
  } catch {
    return null;
  }
}

/** Bench files may name other files by a path; only its last part can be matched here. */
function fileNamedBy(stated: Record<string, unknown> | null, part: string, field: string): string | null {
  const named = stated?.[part];
  if (typeof named !== 'object' || named === null) return null;
  const path = (named as Readonly<Record<string, unknown>>)[field];
  return typeof path === 'string' ? (path.split(/[\\/]/).at(-1)?.toLowerCase() ?? null) : null;
}
