import { verifications, type SpectralLine } from '../physics/spectral-line.ts';
import { cellNumber, splitRow } from '../recording/split-row.ts';
import { fail, ok, type Result } from '../result/result.ts';

const columns = [
  'species',
  'ion_stage',
  'wavelength_air_nm',
  'wavelength_tolerance_nm',
  'transition_probability_per_s',
  'upper_energy_ev',
  'upper_weight',
  'lower_energy_ev',
  'relative_strength',
  'kind',
  'shading',
  'transition',
  'use',
  'meaning',
  'source',
  'verified',
] as const;
type Column = (typeof columns)[number];
const shadings = ['violet', 'red', 'none'] as const;

/** The table of impurity and calibration lines from its CSV text; the columns are named in the first line. */
export function readLineTable(csvText: string): Result<readonly SpectralLine[]> {
  const [head = '', ...rows] = csvText.replace(/^\ufeff/, '').split(/\r?\n/);
  const names = splitRow(head, 'comma').map(({ text }) => text);
  const missing = columns.find((name) => !names.includes(name));
  if (missing !== undefined) return refuse(1, `a column "${missing}"`, `the columns ${names.join(', ')}`);
  const lines: SpectralLine[] = [];
  for (const [index, row] of rows.entries()) {
    if (row.trim() === '') continue;
    const cells = splitRow(row, 'comma').map(({ text }) => text);
    if (cells.length !== names.length) {
      return refuse(index + 2, `${String(names.length)} cells`, `${String(cells.length)} cells`);
    }
    const line = toLine((name) => cells[names.indexOf(name)] ?? '');
    if (line === null)
      return refuse(
        index + 2,
        'a wavelength with its tolerance, a kind, a use and how it was verified',
        `"${row.slice(0, 80)}"`,
      );
    lines.push(line);
  }
  return lines.length > 0 ? ok(lines) : refuse(2, 'at least one line', 'none');
}

function toLine(cell: (name: Column) => string): SpectralLine | null {
  const wavelengthAirNm = cellNumber(cell('wavelength_air_nm'), 'point');
  const kind = cell('kind');
  const use = cell('use');
  const wavelengthToleranceNm = cellNumber(cell('wavelength_tolerance_nm'), 'point');
  const verified = verifications.find((each) => each === cell('verified'));
  if (wavelengthAirNm === null || wavelengthToleranceNm === null || cell('species') === '') return null;
  if (verified === undefined) return null;
  if (kind !== 'line' && kind !== 'bandhead') return null;
  const shading = shadings.find((each) => each === cell('shading')) ?? null;
  if ((shading === null) !== (kind === 'line')) return null;
  if (use !== 'impurity' && use !== 'calibration' && use !== 'both') return null;
  return {
    species: cell('species'),
    ionStage: cell('ion_stage'),
    wavelengthAirNm,
    wavelengthToleranceNm,
    transitionProbabilityPerS: cellNumber(cell('transition_probability_per_s'), 'point'),
    upperEnergyEv: cellNumber(cell('upper_energy_ev'), 'point'),
    upperWeight: cellNumber(cell('upper_weight'), 'point'),
    lowerEnergyEv: cellNumber(cell('lower_energy_ev'), 'point'),
    relativeStrength: cellNumber(cell('relative_strength'), 'point'),
    kind,
    shading,
    transition: cell('transition'),
    use,
    meaning: cell('meaning'),
    source: cell('source'),
    verified,
  };
}

function refuse(lineNumber: number, expected: string, found: string): Result<never> {
  return fail({
    code: 'table.no-numbers',
    fileName: 'lines.csv',
    lineNumber,
    subject: 'line table',
    expected,
    found,
    remedy: 'The installation is damaged: install the program again.',
  });
}
