import type { Diagnosis } from '../../shared-core/diagnosis/diagnosis.ts';
import { densityPhrase, temperaturePhrase } from './text-phrases.ts';

/** Widths, fixed before the first result so that each row can be shown as it is done. */
export interface SummaryColumns {
  readonly nameWidth: number;
}

const verdictWidth = 'not defensible'.length;
const temperatureWidth = 34;
const densityWidth = 58;

export const summaryColumns = (names: readonly string[]): SummaryColumns => ({
  nameWidth: Math.max('Recording'.length, ...names.map((name) => name.length)),
});

export const summaryHead = (columns: SummaryColumns): string =>
  row(columns, ['Recording', 'Verdict', 'Temperature', 'Electron density', 'Why']);

export const summaryRow = (diagnosis: Diagnosis, columns: SummaryColumns): string =>
  row(columns, [
    diagnosis.recording.name,
    diagnosis.verdict,
    temperaturePhrase(diagnosis),
    densityPhrase(diagnosis),
    diagnosis.verdictText,
  ]);

function row({ nameWidth }: SummaryColumns, cells: readonly string[]): string {
  const widths = [nameWidth, verdictWidth, temperatureWidth, densityWidth];
  const padded = cells.map((cell, column) => cell.padEnd(widths[column] ?? 0));
  return `${padded.join('  ').trimEnd()}\n`;
}
