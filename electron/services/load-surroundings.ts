import { dirname, resolve } from 'node:path';
import { readBench } from '../../shared-core/bench/read-bench.ts';
import { readSurroundings, type Surroundings } from '../../shared-core/pipeline/diagnose-files.ts';
import type { InputFile } from '../../shared-core/result/input-file.ts';
import { ok, type Result } from '../../shared-core/result/result.ts';
import { readInputFile } from './read-input-file.ts';

/** Paths as given; what is null may still be named by the bench file, relative to itself. */
export interface SurroundingPaths {
  readonly bench: string | null;
  readonly dark: string | null;
  readonly response: string | null;
  readonly profile: string | null;
  readonly mirror: string | null;
  readonly source: string | null;
  readonly through: string | null;
}

/** No file named. */
export const noPaths: SurroundingPaths = Object.freeze({
  bench: null,
  dark: null,
  response: null,
  profile: null,
  mirror: null,
  source: null,
  through: null,
});

/** Reads and parses the bench file and the dark and response files that it or the caller names. */
export async function loadSurroundings(paths: SurroundingPaths): Promise<Result<Surroundings>> {
  const bench = await readOptional(paths.bench, 'bench file');
  if (!bench.ok) return bench;
  const resolved = withPathsOfBench(paths, bench.value);
  if (!resolved.ok) return resolved;
  const dark = await readOptional(resolved.value.dark, 'dark');
  if (!dark.ok) return dark;
  const response = await readOptional(resolved.value.response, 'response table');
  if (!response.ok) return response;
  const profile = await readOptional(resolved.value.profile, 'reference lamp recording');
  if (!profile.ok) return profile;
  const mirror = await readOptional(resolved.value.mirror, 'mirror recording');
  if (!mirror.ok) return mirror;
  const source = await readOptional(resolved.value.source, 'source recording');
  if (!source.ok) return source;
  const through = await readOptional(resolved.value.through, 'recording through the tube');
  if (!through.ok) return through;
  return readSurroundings({
    bench: bench.value,
    dark: dark.value,
    response: response.value,
    profile: profile.value,
    mirror: mirror.value,
    source: source.value,
    through: through.value,
  });
}

/** The dark and response paths, taken from the bench file where the caller gives none. */
export function withPathsOfBench(
  paths: SurroundingPaths,
  benchFile: InputFile | null,
): Result<SurroundingPaths> {
  if (benchFile === null || paths.bench === null) return ok(paths);
  const bench = readBench(benchFile);
  if (!bench.ok) return bench;
  const folder = dirname(paths.bench);
  const named = (file: string | undefined): string | null =>
    file === undefined ? null : resolve(folder, file);
  return ok({
    bench: paths.bench,
    dark: paths.dark ?? named(bench.value.dark?.file),
    response: paths.response ?? named(bench.value.response?.file),
    profile: paths.profile ?? named(bench.value.instrument?.profileFile),
    mirror: paths.mirror ?? named(bench.value.mirror?.file),
    source: paths.source ?? named(bench.value.absorption?.sourceFile),
    through: paths.through ?? named(bench.value.absorption?.throughFile),
  });
}

async function readOptional(path: string | null, subject: string): Promise<Result<InputFile | null>> {
  return path === null ? ok(null) : readInputFile(path, subject);
}
