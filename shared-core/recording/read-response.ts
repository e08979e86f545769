import type { Bench } from '../bench/bench.ts';
import type { InputFile } from '../result/input-file.ts';
import { fail, ok, type Problem, type Result } from '../result/result.ts';
import { recordingLimits } from './limits.ts';
import { makeAxis } from './make-axis.ts';
import { readTable, type TextTable } from './read-table.ts';
import type { ResponseTable } from './recording.ts';

const SUBJECT = 'response table';

/**
 * Bytes of a response table in: wavelength, relative response (> 0) and, where given, the relative standard
 * uncertainty of each point (a column that its header gives in % is divided by 100).
 */
export function readResponse(file: InputFile, bench: Bench): Result<ResponseTable> {
  const problem = (facts: Omit<Problem, 'fileName' | 'subject'>): Result<never> =>
    fail({ fileName: file.name, subject: SUBJECT, ...facts });
  const read = readTable({
    file,
    subject: SUBJECT,
    wanted: 'response',
    minimumRowCount: recordingLimits.minimumResponseRowCount,
  });
  if (!read.ok) return read;
  const table = read.value;
  if (table.axis === null) {
    return problem({
      code: 'table.one-column',
      lineNumber: null,
      expected: 'columns of wavelength and response',
      found: 'one column of numbers',
      remedy: 'Add the wavelength of each row as the first column.',
    });
  }
  const bad = firstBadValue(table);
  if (bad !== null) {
    const { rowIndex, ...facts } = bad;
    return problem({ code: 'response.bad-value', lineNumber: table.lineOf(rowIndex), ...facts });
  }
  // The bench file speaks of the recordings: its unit and pixel coefficients do not hold for a table of its own.
  const made = makeAxis(
    table,
    bench.axis?.medium === undefined ? {} : { axis: { medium: bench.axis.medium } },
  );
  if (!made.ok) {
    const { rowIndex, ...facts } = made.fault;
    return problem({ lineNumber: rowIndex === null ? null : table.lineOf(rowIndex), ...facts });
  }
  const { wavelengthNm, isReversed } = made.value;
  const relativeSigma = relativeSigmaOf(table);
  return ok({
    name: file.name,
    sha256: file.sha256,
    wavelengthNm,
    response: isReversed ? table.signal.reverse() : table.signal,
    relativeSigma: isReversed ? (relativeSigma?.reverse() ?? null) : relativeSigma,
  });
}

function isInPercent({ layout, choice }: TextTable): boolean {
  return choice.uncertaintyIndex >= 0 && /%|percent/.test(layout.headers[choice.uncertaintyIndex]!);
}

function relativeSigmaOf(table: TextTable): Float64Array | null {
  if (table.uncertainty === null || !isInPercent(table)) return table.uncertainty;
  return table.uncertainty.map((value) => value / 100);
}

function firstBadValue(
  table: TextTable,
): { rowIndex: number; expected: string; found: string; remedy: string } | null {
  const responseAt = table.signal.findIndex((value) => !(value > 0));
  if (responseAt >= 0) {
    return {
      rowIndex: responseAt,
      expected: 'a response above 0',
      found: String(table.signal[responseAt]),
      remedy: 'Leave out the wavelengths at which the spectrometer sees nothing.',
    };
  }
  const largest = isInPercent(table) ? 100 : 1;
  const sigmaAt = table.uncertainty?.findIndex((value) => !(value >= 0 && value <= largest)) ?? -1;
  if (sigmaAt < 0) return null;
  return {
    rowIndex: sigmaAt,
    expected: `a relative standard uncertainty from 0 to ${String(largest)}${isInPercent(table) ? ' %' : ''}`,
    found: String(table.uncertainty?.[sigmaAt]),
    remedy: isInPercent(table)
      ? 'Correct the uncertainty column.'
      : 'Divide an absolute uncertainty by the response; mark one in percent with % in the header.',
  };
}
