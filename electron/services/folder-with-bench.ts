import { stat } from 'node:fs/promises';
import { join, resolve } from 'node:path';
import { fail, ok, type Result } from '../../shared-core/result/result.ts';
import { findRecordings } from './find-recordings.ts';
import { noPaths, withPathsOfBench } from './load-surroundings.ts';
import { readInputFile, systemReason, unreadable } from './read-input-file.ts';

/** A folder describes its own bench by holding a file of this name. */
export const benchFileName = 'bench.json';

export interface FolderContent {
  /** Path of the folder's own bench file; null when it has none. */
  readonly bench: string | null;
  /** Paths of the recordings, sorted by name; dark and response files of the bench are not among them. */
  readonly recordings: readonly string[];
}

/**
 * What a folder holds. The dark and response files that `bench` (by default the folder's own) or the caller
 * names are no recordings. A bench file that cannot be used excludes nothing; using it then fails by itself.
 */
export async function recordingsInFolder(
  folder: string,
  given: { readonly bench: string | null; readonly others: readonly string[] } = { bench: null, others: [] },
): Promise<Result<FolderContent>> {
  let names: string[];
  try {
    names = await findRecordings(folder);
  } catch (error) {
    return fail(unreadable('folder', folder, systemReason(error)));
  }
  const ownBench = join(folder, benchFileName);
  const bench = given.bench ?? ((await isFile(ownBench)) ? ownBench : null);
  const excluded = new Set([...given.others, ...(await filesNamedBy(bench))].map((path) => resolve(path)));
  const recordings = names.map((name) => join(folder, name)).filter((path) => !excluded.has(resolve(path)));
  return ok({ bench, recordings });
}

export async function isFile(path: string): Promise<boolean> {
  try {
    return (await stat(path)).isFile();
  } catch {
    return false;
  }
}

async function filesNamedBy(bench: string | null): Promise<string[]> {
  if (bench === null) return [];
  const file = await readInputFile(bench, 'bench file');
  if (!file.ok) return [];
  const paths = withPathsOfBench({ ...noPaths, bench }, file.value);
  if (!paths.ok) return [];
  const { bench: _bench, ...named } = paths.value;
  return Object.values(named).filter((path) => path !== null);
}
