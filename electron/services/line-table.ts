import { readLineTable } from '../../shared-core/identify/read-line-table.ts';
import type { SpectralLine } from '../../shared-core/physics/spectral-line.ts';
import { ok, type Result } from '../../shared-core/result/result.ts';
import { assetPath } from './app-root.ts';
import { readInputFile } from './read-input-file.ts';

/** The text of the shipped table of impurity and calibration lines. */
export async function readLineTableText(): Promise<Result<string>> {
  const file = await readInputFile(assetPath('lines', 'lines.csv'), 'line table');
  return file.ok ? ok(new TextDecoder().decode(file.value.bytes)) : file;
}

/** The shipped table, parsed. */
export async function loadLineTable(): Promise<Result<readonly SpectralLine[]>> {
  const text = await readLineTableText();
  return text.ok ? readLineTable(text.value) : text;
}
