import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { readLineTable } from '../../shared-core/identify/read-line-table.ts';
import type { SpectralLine } from '../../shared-core/physics/spectral-line.ts';
import { projectRoot } from './source-files.ts';

/** The table the program ships, as text and parsed. */
export const shippedLineTableText = readFileSync(join(projectRoot, 'assets/lines/lines.csv'), 'utf8');

export function shippedLineTable(): readonly SpectralLine[] {
  const table = readLineTable(shippedLineTableText);
  if (!table.ok) throw new Error(table.problem.found);
  return table.value;
}
