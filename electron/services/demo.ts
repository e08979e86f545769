import type { OutputOf } from '../../shared-core/contract/service-table.ts';
import { fail, ok, type Result } from '../../shared-core/result/result.ts';
import { assetPath } from './app-root.ts';
import { benchFileName, recordingsInFolder } from './folder-with-bench.ts';
import { noPaths, withPathsOfBench } from './load-surroundings.ts';
import { payloadOfFile } from './payload.ts';
import { readInputFile, unreadable } from './read-input-file.ts';

/** The demo recording of assets/demo with the bench file beside it and what that names. */
export async function openDemo(folder: string = assetPath('demo')): Promise<Result<OutputOf<'demo.open'>>> {
  const found = await recordingsInFolder(folder);
  if (!found.ok) return found;
  const first = found.value.recordings[0];
  if (first === undefined) return fail(unreadable('recording', 'demo', 'no demo recording'));
  const benchPath = found.value.bench;
  const bench = benchPath === null ? ok(null) : await readInputFile(benchPath, 'bench file', benchFileName);
  if (!bench.ok) return bench;
  const paths = withPathsOfBench({ ...noPaths, bench: benchPath }, bench.value);
  if (!paths.ok) return paths;
  const recording = await readInputFile(first, 'recording');
  if (!recording.ok) return recording;
  const dark = paths.value.dark === null ? ok(null) : await readInputFile(paths.value.dark, 'dark');
  if (!dark.ok) return dark;
  const response =
    paths.value.response === null ? ok(null) : await readInputFile(paths.value.response, 'response table');
  if (!response.ok) return response;
  return ok({
    recording: payloadOfFile(recording.value),
    dark: dark.value === null ? null : payloadOfFile(dark.value),
    response: response.value === null ? null : payloadOfFile(response.value),
    bench: bench.value === null ? null : payloadOfFile(bench.value),
  });
}
