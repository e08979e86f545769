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
    for (const role of ['dark', 'response'] as const) {
      const name = fileNamedBy(stated, role);
      if (name !== null) named.set(name, role);
    }
  }
  return files.map((file) => ({ file, role: guessRole(file, named) }));
}

function guessRole(file: InputFile, named: ReadonlyMap<string, Role>): RoledFile['role'] {
  const stated = statedJson(file);
  if (stated !== null) return stated['schema'] === savedSchemaName ? 'saved' : 'bench';
  const byBench = named.get(file.name.toLowerCase());
  if (byBench !== undefined) return byBench;
  if (/\.json$/i.test(file.name)) return 'bench';
  const stem = file.name.toLowerCase();
  if (/(^|[^a-z])dark/.test(stem)) return 'dark';
  if (/(^|[^a-z])response/.test(stem)) return 'response';
  return 'recording';
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

/** Bench files may name dark and response by a path; only its last part can be matched here. */
function fileNamedBy(stated: Record<string, unknown> | null, role: 'dark' | 'response'): string | null {
  const part = stated?.[role];
  if (typeof part !== 'object' || part === null || !('file' in part)) return null;
  if (typeof part.file !== 'string') return null;
  return part.file.split(/[\\/]/).at(-1)?.toLowerCase() ?? null;
}
