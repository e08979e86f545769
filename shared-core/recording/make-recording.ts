import { fail, ok, type Note, type Problem, type Result } from '../result/result.ts';
import { recordingLimits } from './limits.ts';
import type { Recording, Understood } from './recording.ts';

export interface RecordingParts {
  readonly name: string;
  readonly sha256: string;
  /** nm, strictly increasing, at least 8 points, finite. */
  readonly wavelengthNm: Float64Array;
  /** As recorded, same length, finite. */
  readonly signal: Float64Array;
  readonly medium: 'air' | 'vacuum';
  /** What was read; a recording that no table held says so by leaving this out. */
  readonly understood?: Understood;
  readonly notes?: readonly Note[];
  /** What the file was wanted for, for the problem sentence. */
  readonly subject?: string;
  /** 1-based line of a point in the file, where there is a file. */
  readonly lineOf?: (pointIndex: number) => number;
}

/** What a table with one header line of "wavelength_nm,signal_counts" would be understood as. */
export const plainTable: Understood = Object.freeze({
  encoding: 'utf-8',
  delimiter: 'comma',
  decimalMark: 'point',
  headerLineCount: 1,
  columnCount: 2,
  axisColumn: 1,
  signalColumn: 2,
  axisUnit: 'nm',
  axisUnitFrom: 'header',
  order: 'ascending',
  skippedRowCount: 0,
});

/** The only constructor of a Recording: checks its invariants and answers a Problem where one is broken. */
export function makeRecording(parts: RecordingParts): Result<Recording> {
  const { name, sha256, wavelengthNm, signal, medium } = parts;
  const problem = (
    code: Problem['code'],
    pointIndex: number | null,
    facts: Pick<Problem, 'expected' | 'found' | 'remedy'>,
  ): Result<never> =>
    fail({
      code,
      fileName: name === '' ? null : name,
      lineNumber: pointIndex === null ? null : (parts.lineOf?.(pointIndex) ?? null),
      subject: parts.subject ?? 'recording',
      ...facts,
    });

  const count = wavelengthNm.length;
  if (signal.length !== count) {
    return problem('table.column-count', null, {
      expected: 'one signal value for each wavelength',
      found: `${String(count)} wavelengths and ${String(signal.length)} signal values`,
      remedy: 'Export the recording again.',
    });
  }
  if (count < recordingLimits.minimumRowCount) {
    return problem('table.too-few-rows', null, {
      expected: `at least ${String(recordingLimits.minimumRowCount)} rows of wavelength and signal`,
      found: `${String(count)} ${count === 1 ? 'row' : 'rows'}`,
      remedy: 'Export the whole recording again.',
    });
  }
  for (let i = 0; i < count; i += 1) {
    const nm = wavelengthNm[i]!;
    const value = signal[i]!;
    if (!Number.isFinite(nm) || !Number.isFinite(value)) {
      return problem('table.not-finite', i, {
        expected: 'numbers only',
        found: `${String(Number.isFinite(nm) ? value : nm)} as a ${Number.isFinite(nm) ? 'signal' : 'wavelength'}`,
        remedy: 'Remove the row or export the recording again.',
      });
    }
    if (i > 0 && nm <= wavelengthNm[i - 1]!) {
      const isEqual = nm === wavelengthNm[i - 1];
      return problem(isEqual ? 'axis.duplicate' : 'axis.not-monotonic', i, {
        expected: 'wavelengths that always increase',
        found: isEqual
          ? `${String(nm)} nm twice`
          : `${String(nm)} nm after ${String(wavelengthNm[i - 1])} nm`,
        remedy: 'Keep one recording in a file, with each wavelength once.',
      });
    }
  }
  return ok({
    name,
    sha256,
    wavelengthNm,
    signal,
    medium,
    understood: parts.understood ?? plainTable,
    notes: parts.notes ?? [],
  });
}
