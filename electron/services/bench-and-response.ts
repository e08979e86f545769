import type { Bench } from '../../shared-core/bench/bench.ts';
import { readBench } from '../../shared-core/bench/read-bench.ts';
import { readResponse } from '../../shared-core/recording/read-response.ts';
import type { ResponseTable } from '../../shared-core/recording/recording.ts';
import { ok, type Result } from '../../shared-core/result/result.ts';
import { noPaths, withPathsOfBench } from './load-surroundings.ts';
import { readInputFile } from './read-input-file.ts';

export interface BenchAndResponse {
  readonly bench: Bench;
  readonly response: ResponseTable | null;
}

/** The bench file and the response table it names; its dark, which a simulation makes no use of, is not read. */
export async function loadBenchAndResponse(path: string | null): Promise<Result<BenchAndResponse>> {
  if (path === null) return ok({ bench: {}, response: null });
  const file = await readInputFile(path, 'bench file');
  if (!file.ok) return file;
  const bench = readBench(file.value);
  if (!bench.ok) return bench;
  const paths = withPathsOfBench({ ...noPaths, bench: path }, file.value);
  if (!paths.ok) return paths;
  if (paths.value.response === null) return ok({ bench: bench.value, response: null });
  const table = await readInputFile(paths.value.response, 'response table');
  if (!table.ok) return table;
  const response = readResponse(table.value, bench.value);
  return response.ok ? ok({ bench: bench.value, response: response.value }) : response;
}
