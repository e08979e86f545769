import type { InputFile } from '../result/input-file.ts';
import { fail, ok, type Note, type Problem, type Result } from '../result/result.ts';
import { scannableText, textBetween, type ScannableText } from '../text/decode-text.ts';
import { chooseColumns, type ColumnChoice, type ColumnsFor } from './choose-columns.ts';
import { foreignKind, foreignText, holdsControlCharacters } from './file-kind.ts';
import { lineEnd, lineNumberAt } from './find-data-block.ts';
import { recordingLimits } from './limits.ts';
import { excerpt, rowProblem } from './row-problem.ts';
import { scanRows, type ScanColumns, type ScanPlan } from './scan-rows.ts';
import { sniffLayout, type Layout } from './sniff-layout.ts';
import { splitDataRow } from './split-row.ts';

export interface TableRequest {
  readonly file: InputFile;
  /** "recording", "dark", "response table": for problem sentences. */
  readonly subject: string;
  readonly wanted: ColumnsFor;
  readonly minimumRowCount: number;
}

/** The wanted columns of a text table, in file order and in the units of the file. */
export interface TextTable {
  readonly text: ScannableText;
  readonly layout: Layout;
  readonly choice: ColumnChoice;
  /** Null when the file holds signal only. */
  readonly axis: Float64Array | null;
  readonly signal: Float64Array;
  readonly uncertainty: Float64Array | null;
  readonly headerLineCount: number;
  readonly skippedRowCount: number;
  readonly axisDecimalCount: number;
  readonly notes: readonly Note[];
  /** 1-based line of a row (from 0); slow, for problems only. */
  readonly lineOf: (rowIndex: number) => number;
}

/** Finds the layout of a text table and reads its rows; the first fault in it is a Problem. */
export function readTable(request: TableRequest): Result<TextTable> {
  const { file, subject } = request;
  const problem = (facts: Facts, lineNumber: number | null = null): Result<never> =>
    fail({ fileName: file.name, lineNumber, subject, ...facts });
  const refused = refuseBytes(file.bytes);
  if (refused !== null) return problem(refused);
  const text = scannableText(file.bytes);
  if (holdsControlCharacters(text.bytes)) return problem(notText('binary data'));
  const foreign = foreignText(headOf(text));
  if (foreign !== null) return problem(notText(foreign));
  const layout = sniffLayout(text);
  if (layout === null) return problem(noNumbers(text));
  if ('ambiguousAt' in layout) {
    return problem(
      {
        code: 'table.column-count',
        expected: 'columns that can be told apart',
        found: `commas both inside and between the numbers in ${excerpt(layout.line)}`,
        remedy: 'Export the file again with semicolons or tabs between the columns.',
      },
      lineNumberAt(text.bytes, layout.ambiguousAt),
    );
  }
  const result = readRows(request, text, layout);
  // Whole numbers in the sample leave the decimal mark open; a later row may show it to be the comma.
  if (!result.ok && layout.decimalMarkIsOpen) {
    const withComma = readRows(request, text, { ...layout, decimalMark: 'comma' });
    if (withComma.ok) return withComma;
  }
  return result;
}

type Facts = Pick<Problem, 'code' | 'expected' | 'found' | 'remedy'>;

interface Segment {
  readonly firstRow: number;
  readonly offset: number;
}

function readRows(request: TableRequest, text: ScannableText, layout: Layout): Result<TextTable> {
  const { bytes } = text;
  const choice = chooseColumns(layout, request.wanted);
  const { axisIndex, signalIndex, uncertaintyIndex } = choice;
  const plan: ScanPlan = { ...layout, bytes, axisIndex, signalIndex, extraIndex: uncertaintyIndex };
  const fileName = request.file.name;
  const problem = (facts: Facts, offset: number | null): Result<never> =>
    fail({
      fileName,
      lineNumber: offset === null ? null : lineNumberAt(bytes, offset),
      subject: request.subject,
      ...facts,
    });

  const estimate = Math.ceil((1.05 * (bytes.length - layout.firstRowOffset)) / layout.meanRowByteCount) + 16;
  const columns = emptyColumns(Math.min(estimate, recordingLimits.maximumRowCount));
  const segments: Segment[] = [{ firstRow: 0, offset: layout.firstRowOffset }];
  const notes: Note[] = [];
  let skippedRowCount = 0;
  for (let offset = layout.firstRowOffset; ;) {
    const stop = scanRows(plan, columns, offset, recordingLimits.maximumRowCount);
    if (stop.reason === 'end') break;
    if (stop.reason === 'full') return problem(tooManyRows, null);
    const end = lineEnd(bytes, stop.offset);
    const line = textBetween(text, stop.offset, end);
    if (/^\s*(#|%|\/\/)/.test(line)) {
      skippedRowCount += 1;
      offset = end + 1;
      if (segments.at(-1)!.firstRow === columns.rowCount) segments.pop();
      segments.push({ firstRow: columns.rowCount, offset });
      continue;
    }
    const isLastLine = end === bytes.length - 1;
    if (isLastLine && !text.endsWithLineBreak && isCutShort(line, layout)) {
      skippedRowCount += 1;
      notes.push({
        code: 'last-row-cut',
        text: `The last row, ${excerpt(line)}, is not complete and was left out; the file may have been cut off.`,
      });
      break;
    }
    const trailing = isText(line, layout, choice) ? trailingTextLines(plan, stop.offset) : null;
    if (trailing === null) return problem(rowProblem(line, layout, choice), stop.offset);
    skippedRowCount += trailing;
    break;
  }
  const { rowCount } = columns;
  if (rowCount < request.minimumRowCount) {
    return problem(
      {
        code: 'table.too-few-rows',
        expected: `at least ${String(request.minimumRowCount)} rows of numbers`,
        found: `${String(rowCount)} ${rowCount === 1 ? 'row' : 'rows'}`,
        remedy: 'Export the whole file again.',
      },
      null,
    );
  }
  return ok({
    text,
    layout,
    choice,
    axis: axisIndex < 0 ? null : columns.axis.slice(0, rowCount),
    signal: columns.signal.slice(0, rowCount),
    uncertainty: uncertaintyIndex < 0 ? null : columns.extra.slice(0, rowCount),
    headerLineCount: lineNumberAt(bytes, layout.firstRowOffset) - 1,
    skippedRowCount,
    axisDecimalCount: columns.axisDecimalCount,
    notes,
    lineOf: (rowIndex) => {
      const segment = segments.findLast(({ firstRow }) => firstRow <= rowIndex)!;
      const { offset } = scanRows(plan, emptyColumns(64), segment.offset, rowIndex - segment.firstRow);
      return lineNumberAt(bytes, offset);
    },
  });
}

function emptyColumns(capacity: number): ScanColumns {
  const [axis, signal] = [new Float64Array(capacity), new Float64Array(capacity)];
  return { axis, signal, extra: new Float64Array(0), rowCount: 0, axisDecimalCount: 0 };
}

function refuseBytes(bytes: Uint8Array): Facts | null {
  if (bytes.length === 0) {
    return {
      code: 'file.empty',
      expected: 'a table of numbers',
      found: 'an empty file',
      remedy: 'Export the file again.',
    };
  }
  if (bytes.length > recordingLimits.maximumByteCount) return tooManyBytes(bytes.length);
  const kind = foreignKind(bytes);
  return kind === null ? null : notText(kind);
}

function tooManyBytes(byteCount: number): Facts {
  const mebibytes = (count: number): string => `${String(Math.ceil(count / 1_048_576))} MiB`;
  return {
    code: 'file.too-large',
    expected: `at most ${mebibytes(recordingLimits.maximumByteCount)}`,
    found: mebibytes(byteCount),
    remedy: 'Export a single recording as a text table.',
  };
}

const tooManyRows: Facts = {
  code: 'file.too-large',
  expected: `at most ${String(recordingLimits.maximumRowCount)} rows`,
  found: 'more',
  remedy: 'Export a single recording as a text table.',
};

function notText(kind: string): Facts {
  return {
    code: 'file.not-text',
    expected: 'a text table',
    found: kind,
    remedy: 'Export the data as text (CSV) and choose that file.',
  };
}

const headOf = (text: ScannableText): string =>
  textBetween(text, text.from, Math.min(text.bytes.length, text.from + 200));

function noNumbers(text: ScannableText): Facts {
  const head = headOf(text).trim();
  const isEmpty = head === '' && text.bytes.length <= 200;
  return {
    code: isEmpty ? 'file.empty' : 'table.no-numbers',
    expected: isEmpty ? 'a table of numbers' : 'rows of numbers',
    found: isEmpty
      ? 'nothing but blank lines'
      : head.startsWith('<')
        ? 'a web page or other markup'
        : 'no row that holds only numbers',
    remedy: 'Export the data as text (CSV) with one row a pixel.',
  };
}

/** A line of words: its axis cell (or first cell) is neither a number nor empty. */
function isText(line: string, layout: Layout, choice: ColumnChoice): boolean {
  const cells = splitDataRow(line, layout.delimiter, layout.decimalMark);
  const text = cells[Math.max(0, choice.axisIndex)]?.text ?? cells[0]?.text ?? '';
  // "NaN" is a data row gone wrong, not a word.
  return /[^\d\s.,;+-]/.test(text) && !/^[\d.,+-]|^(nan|inf|null|n\/a)/i.test(text);
}

/** A half-written row: a column is missing or the last number stops in its middle. */
function isCutShort(line: string, layout: Layout): boolean {
  const cells = splitDataRow(line, layout.delimiter, layout.decimalMark);
  const start =
    layout.decimalMark === 'comma' ? /^[+-]?\d*,?\d*([eEdD][+-]?\d*)?$/ : /^[+-]?\d*\.?\d*([eEdD][+-]?\d*)?$/;
  const isNumberStart = cells.every((cell) => start.test(cell.text));
  return isNumberStart && cells.length <= layout.columnCount;
}

/** Counts the lines from `offset` to the end of the file; null when a data row stands among them. */
function trailingTextLines(plan: ScanPlan, offset: number): number | null {
  const { bytes } = plan;
  const trial = emptyColumns(1);
  let count = 0;
  for (let start = offset; start < bytes.length;) {
    const end = lineEnd(bytes, start);
    if (end > start) {
      scanRows({ ...plan, bytes: bytes.subarray(start, end + 1) }, trial, 0, 1);
      if (trial.rowCount > 0) return null;
      count += 1;
    }
    start = end + 1;
  }
  return count;
}
