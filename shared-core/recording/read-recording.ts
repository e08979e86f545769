import type { Bench } from '../bench/bench.ts';
import type { InputFile } from '../result/input-file.ts';
import { fail, type Note, type Problem, type Result } from '../result/result.ts';
import { makeAxis, type Axis } from './make-axis.ts';
import { recordingLimits } from './limits.ts';
import { makeRecording } from './make-recording.ts';
import { readTable, type TextTable } from './read-table.ts';
import type { Recording, Understood } from './recording.ts';

/**
 * Bytes of a text table in, Recording out: ascending wavelength in nm, signal as it stands in the file.
 * Layout, units and order are found from the file; what the bench file says of the axis goes before.
 */
export function readRecording(file: InputFile, bench: Bench, subject = 'recording'): Result<Recording> {
  const read = readTable({
    file,
    subject,
    wanted: subject === 'dark' ? 'dark' : 'recording',
    minimumRowCount: recordingLimits.minimumRowCount,
  });
  if (!read.ok) return read;
  const table = read.value;
  const made = makeAxis(table, bench);
  if (!made.ok) {
    const { rowIndex, ...facts } = made.fault;
    const lineNumber = rowIndex === null ? null : table.lineOf(rowIndex);
    return fail({ fileName: file.name, lineNumber, subject, ...facts } satisfies Problem);
  }
  const axis = made.value;
  return makeRecording({
    name: file.name,
    sha256: file.sha256,
    wavelengthNm: axis.wavelengthNm,
    signal: axis.isReversed ? table.signal.reverse() : table.signal,
    medium: axis.medium,
    understood: understoodFrom(table, axis),
    notes: [...table.notes, ...axis.notes, ...tableNotes(table)],
    subject,
  });
}

function understoodFrom(table: TextTable, axis: Axis): Understood {
  const { layout, choice } = table;
  return {
    encoding: table.text.encoding,
    delimiter: layout.delimiter,
    decimalMark: layout.decimalMark,
    headerLineCount: table.headerLineCount,
    columnCount: layout.columnCount,
    axisColumn: choice.axisIndex < 0 ? null : choice.axisIndex + 1,
    signalColumn: choice.signalIndex + 1,
    axisUnit: axis.unit,
    axisUnitFrom: axis.unitFrom,
    order: axis.order,
    skippedRowCount: table.skippedRowCount,
  };
}

function tableNotes({ layout, choice, skippedRowCount }: TextTable): Note[] {
  const notes: Note[] = [];
  if (choice.othersIgnored.length > 0) {
    const names = choice.othersIgnored.map((i) => {
      const header = layout.headers[i]!;
      return header === '' ? String(i + 1) : `${String(i + 1)} ("${header}")`;
    });
    notes.push({
      code: 'columns-ignored',
      text: `The signal was taken from column ${String(choice.signalIndex + 1)}; not used: column ${names.join(', ')}.`,
    });
  }
  if (skippedRowCount > 0) {
    notes.push({
      code: 'rows-skipped',
      text: `${String(skippedRowCount)} ${skippedRowCount === 1 ? 'line' : 'lines'} among or after the data rows held no data and ${skippedRowCount === 1 ? 'was' : 'were'} left out.`,
    });
  }
  return notes;
}
