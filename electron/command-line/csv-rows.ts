import Papa from 'papaparse';
import type { Diagnosis } from '../../shared-core/diagnosis/diagnosis.ts';

type Cell = string | number | boolean | null;

/** Columns of `--csv`, in order. Numbers are those of `--json`; an absent value is an empty cell. */
const columns: readonly (readonly [name: string, cell: (diagnosis: Diagnosis) => Cell])[] = [
  ['recording', (d) => d.recording.name],
  ['sha256', (d) => d.recording.sha256],
  ['verdict', (d) => d.verdict],
  ['temperatureStatus', (d) => d.temperature.status],
  ['kelvin', (d) => d.temperature.kelvin],
  ['sigmaKelvin', (d) => d.temperature.sigmaKelvin],
  ['lowKelvin', (d) => d.temperature.lowKelvin],
  ['highKelvin', (d) => d.temperature.highKelvin],
  ['coverage', (d) => d.temperature.coverage],
  ['responseCorrected', (d) => d.temperature.responseCorrected],
  ['meaning', (d) => d.meaning.kind],
  ['electronDensityStatus', (d) => d.electronDensity.status],
  ['perCubicMetre', (d) => d.electronDensity.perCubicMetre],
  ['lowPerCubicMetre', (d) => d.electronDensity.lowPerCubicMetre],
  ['highPerCubicMetre', (d) => d.electronDensity.highPerCubicMetre],
  ['electronDensityLine', (d) => d.electronDensity.line],
  ['axisStatus', (d) => d.axis.status],
  ['axisOffsetNm', (d) => d.axis.offsetNm],
  ['axisStretch', (d) => d.axis.stretch],
  [
    'usedLines',
    (d) =>
      d.lines
        .filter((line) => line.used)
        .map((line) => line.id)
        .join(' '),
  ],
  ['impurities', (d) => [...new Set(d.impurities.map((found) => found.species))].join(' ')],
  ['why', (d) => d.verdictText],
];

export const csvHead = csvLine(columns.map(([name]) => name));

export function csvRow(diagnosis: Diagnosis): string {
  return csvLine(columns.map(([, cell]) => cell(diagnosis)));
}

/** A cell that a spreadsheet would take for a formula gets a quote mark before it. */
function csvLine(cells: readonly Cell[]): string {
  return `${Papa.unparse([[...cells]], { newline: '\n', escapeFormulae: true })}\n`;
}
