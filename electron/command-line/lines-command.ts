import { problemSentence } from '../../shared-core/result/result.ts';
import { loadLineTable } from '../services/line-table.ts';
import { alignColumns } from './align.ts';
import { type ListedLine, listedLines } from './listed-lines.ts';
import type { Output } from './output.ts';
import type { ExitStatus } from './exit-status.ts';
import { numberOption, readWords, UsageFault } from './usage.ts';

const range = { min: 1, max: 100_000, unit: 'nm' };

/** `lampwright lines`: hydrogen and the shipped table, or the part between two wavelengths. */
export async function linesCommand(words: readonly string[], output: Output): Promise<ExitStatus> {
  const { values, positionals } = readWords(words, {
    from: { type: 'string' },
    to: { type: 'string' },
    json: { type: 'boolean' },
  });
  if (positionals[0] !== undefined) throw new UsageFault(`lines takes no "${positionals[0]}".`);
  const fromNm = values.from === undefined ? 0 : numberOption('from', values.from, range);
  const toNm = values.to === undefined ? Infinity : numberOption('to', values.to, range);
  if (fromNm > toNm) throw new UsageFault('--from lies above --to.');

  const table = await loadLineTable();
  if (!table.ok) {
    output.complain(problemSentence(table.problem));
    return 1;
  }
  const lines = listedLines(table.value).filter(
    (line) => line.wavelengthAirNm >= fromNm && line.wavelengthAirNm <= toNm,
  );
  if (values.json === true) await output.print(`${JSON.stringify(lines, null, 2)}\n`);
  else await output.print(tableOf(lines));
  return 0;
}

function tableOf(lines: readonly ListedLine[]): string {
  const head = ['nm in air', 'species', 'kind', 'use', 'what it means at the bench'];
  const rows = lines.map((line) => [
    line.wavelengthAirNm.toFixed(4),
    line.ionStage === 'mol' ? line.species : `${line.species} ${line.ionStage}`,
    line.kind,
    line.use,
    line.meaning,
  ]);
  return `${alignColumns([head, ...rows], ['right', 'left', 'left', 'left', 'left']).join('\n')}\n`;
}
