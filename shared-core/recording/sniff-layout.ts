import type { ScannableText } from '../text/decode-text.ts';
import { findDataBlock, type Line } from './find-data-block.ts';
import { cellNumber, splitDataRow, splitRow, type DecimalMark, type Delimiter } from './split-row.ts';

/** How a text table is laid out, found from its first rows. */
export interface Layout {
  readonly delimiter: Delimiter;
  readonly decimalMark: DecimalMark;
  /** True when no row of the sample shows which sign is the decimal mark. */
  readonly decimalMarkIsOpen: boolean;
  readonly columnCount: number;
  readonly firstRowOffset: number;
  readonly meanRowByteCount: number;
  /** Header text of each column, lower case, from the lines above it; '' where there is none. */
  readonly headers: readonly string[];
  /** The last line before the data, whole, lower case: units may stand in a line that does not split into cells. */
  readonly headerLine: string;
  /** sampleColumns[column][row]; null for a cell that holds no number. */
  readonly sampleColumns: readonly (readonly (number | null)[])[];
}

/** The comma is decimal mark and delimiter at once in a way that no rule can take apart. */
export interface AmbiguousCommas {
  readonly ambiguousAt: number;
  readonly line: string;
}

/** Finds delimiter, decimal mark, columns and first data row; null when no line holds only numbers. */
export function sniffLayout(text: ScannableText): Layout | AmbiguousCommas | null {
  const block = findDataBlock(text);
  if (block === null) return null;
  const marks = sniffMarks(block.sample, block.preceding);
  if ('ambiguousAt' in marks) return marks;
  const { delimiter, decimalMark } = marks;
  const rows = block.sample.map((line) => splitDataRow(line.text, delimiter, decimalMark));
  const rawColumnCount = mostCommon(rows.map((cells) => cells.length));
  const start = rows.findIndex((cells) => cells.length === rawColumnCount);
  const dataRows = rows.slice(start);
  let columnCount = rawColumnCount;
  while (columnCount > 1 && dataRows.every((cells) => (cells[columnCount - 1]?.text ?? '') === ''))
    columnCount -= 1;
  const sampleColumns = Array.from({ length: columnCount }, (_, column) =>
    dataRows.map((cells) => cellNumber(cells[column]?.text ?? '', decimalMark)),
  );
  const above = [...block.preceding, ...block.sample.slice(0, start)];
  const firstRow = firstDataRow(above, block.sample[start]!, sampleColumns[0]!, { ...marks, columnCount });
  return {
    ...marks,
    columnCount,
    firstRowOffset: firstRow.offset,
    meanRowByteCount: meanRowByteCount(block.sample.slice(start), text.bytes.length),
    headers: headersOf(above.slice(0, firstRow.aboveCount), delimiter, columnCount),
    headerLine: (above[firstRow.aboveCount - 1]?.text ?? '').toLowerCase(),
    sampleColumns,
  };
}

function meanRowByteCount(sample: readonly Line[], byteCount: number): number {
  const [first, last] = [sample[0]!, sample.at(-1)!];
  return sample.length < 2 ? Math.max(2, byteCount) : (last.offset - first.offset) / (sample.length - 1);
}

interface Marks {
  readonly delimiter: Delimiter;
  readonly decimalMark: DecimalMark;
  readonly decimalMarkIsOpen: boolean;
}

function sniffMarks(sample: readonly Line[], preceding: readonly Line[]): Marks | AmbiguousCommas {
  const lines = sample.map((line) => line.text.trim());
  const most = (pattern: RegExp): boolean =>
    lines.reduce((count, line) => count + (pattern.test(line) ? 1 : 0), 0) * 5 >= lines.length * 4;
  const hasComma = lines.some((line) => line.includes(','));
  const hasPoint = lines.some((line) => line.includes('.'));
  const byPoint = (delimiter: Delimiter): Marks => ({
    delimiter,
    decimalMark: 'point',
    decimalMarkIsOpen: false,
  });
  const byEither = (delimiter: Delimiter): Marks => ({
    delimiter,
    decimalMark: hasComma && !hasPoint ? 'comma' : 'point',
    decimalMarkIsOpen: !hasComma && !hasPoint,
  });
  if (most(/;/)) return byEither('semicolon');
  if (most(/\S\s*\t/)) return byEither('tab');
  const hasInnerBlank = most(/\S\s+\S/);
  if (!hasComma) return byEither('blanks');
  if (hasPoint) return byPoint(hasInnerBlank && !most(/,/) ? 'blanks' : 'comma');
  const joined = lines.some((line) => /\d,\d/.test(line));
  if (hasInnerBlank) {
    if (!lines.some((line) => /,\s|\s,/.test(line))) return byEither('blanks');
    return joined ? { delimiter: 'comma', decimalMark: 'comma', decimalMarkIsOpen: false } : byPoint('comma');
  }
  return sniffCommaOnly(lines, sample, preceding);
}

/** Only commas: plain columns, one column with decimal commas, or commas as both. */
function sniffCommaOnly(
  lines: readonly string[],
  sample: readonly Line[],
  preceding: readonly Line[],
): Marks | AmbiguousCommas {
  const columns: Marks = { delimiter: 'comma', decimalMark: 'point', decimalMarkIsOpen: false };
  const both: Marks = { delimiter: 'comma', decimalMark: 'comma', decimalMarkIsOpen: false };
  const oneColumn: Marks = { delimiter: 'blanks', decimalMark: 'comma', decimalMarkIsOpen: false };
  const quoted = lines.map((line) => splitRow(line, 'comma'));
  if (quoted.some((cells) => cells.some((cell) => cell.isQuoted && cell.text.includes(',')))) {
    return quoted.every((cells) => cells.length === 1) ? oneColumn : both;
  }
  const pieces = quoted.map((cells) => cells.map((cell) => cell.text));
  const pieceCounts = pieces.map((row) => row.length);
  const headerCellCount = splitRow(preceding.at(-1)?.text ?? '', 'comma').length;
  const least = Math.min(...pieceCounts);
  const largest = Math.max(...pieceCounts);
  if (headerCellCount >= 2 && headerCellCount === mostCommon(pieceCounts)) return columns;
  if (largest <= 2) {
    if (headerCellCount >= 2 || mostlyOneWay(pieces.map((row) => Number(row[0])))) return columns;
    return oneColumn;
  }
  if (least === largest && (largest === 3 || largest === 4)) {
    return headerCellCount === 2 || joinsBetter(pieces) ? both : columns;
  }
  const modal = mostCommon(pieceCounts);
  const modalShare = pieceCounts.filter((count) => count === modal).length / pieceCounts.length;
  if (modalShare >= 0.8 && !joinsBetter(pieces)) return columns;
  const index = pieceCounts.findIndex((count) => count !== modal);
  const line = sample[Math.max(0, index)]!;
  return { ambiguousAt: line.offset, line: line.text.trim() };
}

/** Whether the first two pieces read as one decimal number make a better axis than the first piece alone. */
function joinsBetter(pieces: readonly (readonly string[])[]): boolean {
  const whole = pieces.map((row) => Number(row[0]));
  const together = pieces.map((row) => Number(`${row[0] ?? ''}.${row[1] ?? ''}`));
  if (!together.every(Number.isFinite) || !mostlyOneWay(together)) return false;
  return !mostlyOneWay(whole) || unevenness(together) < 0.5 * unevenness(whole);
}

/** Spread of the steps relative to their mean: near 0 for an axis. */
function unevenness(values: readonly number[]): number {
  const steps = values.slice(1).map((value, i) => value - values[i]!);
  const mean = steps.reduce((sum, step) => sum + step, 0) / Math.max(1, steps.length);
  const spread = steps.reduce((sum, step) => sum + Math.abs(step - mean), 0) / Math.max(1, steps.length);
  return mean === 0 ? Infinity : spread / Math.abs(mean);
}

/** True when nearly all steps go one way: a faulty row or two do not make an axis anything else. */
export function mostlyOneWay(values: readonly number[]): boolean {
  let up = 0;
  let down = 0;
  for (let i = 1; i < values.length; i += 1) {
    if (values[i]! > values[i - 1]!) up += 1;
    else if (values[i]! < values[i - 1]!) down += 1;
  }
  const stepCount = values.length - 1;
  return stepCount - Math.max(up, down) <= Math.max(1, 0.1 * stepCount);
}

function mostCommon(counts: readonly number[]): number {
  const tally = new Map<number, number>();
  for (const count of counts) tally.set(count, (tally.get(count) ?? 0) + 1);
  return [...tally].reduce((best, entry) => (entry[1] > best[1] ? entry : best))[0];
}

/**
 * A row with a bad signal cell (NaN, text) just above the sample is no header: its first cell continues the axis.
 * Taking such rows into the data makes the reader say what is wrong with them.
 */
function firstDataRow(
  above: readonly Line[],
  firstOfSample: Line,
  axisSample: readonly (number | null)[],
  layout: { delimiter: Delimiter; decimalMark: DecimalMark; columnCount: number },
): { offset: number; aboveCount: number } {
  const [a, b] = [axisSample[0] ?? null, axisSample[1] ?? null];
  let first = { offset: firstOfSample.offset, aboveCount: above.length };
  if (a === null || b === null) return first;
  const step = b - a;
  for (let i = above.length - 1; i >= 0; i -= 1) {
    const line = above[i]!;
    const cells = splitDataRow(line.text, layout.delimiter, layout.decimalMark);
    const value = cellNumber(cells[0]?.text ?? '', layout.decimalMark);
    const stepsBack = value === null ? 0 : (a - value) / step;
    if (cells.length < layout.columnCount || !(stepsBack > 0 && stepsBack < 2 * (above.length - i) + 1))
      continue;
    first = { offset: line.offset, aboveCount: i };
  }
  return first;
}

function headersOf(above: readonly Line[], delimiter: Delimiter, columnCount: number): readonly string[] {
  const headers = Array.from({ length: columnCount }, () => '');
  if (columnCount < 2) return headers;
  for (const line of above) {
    const cells = splitRow(line.text.replace(/^\s*(#|%|\/\/|!)+\s*/, ''), delimiter);
    const used = cells.at(-1)?.text === '' ? cells.length - 1 : cells.length;
    if (used !== columnCount || cells.every((cell) => cellNumber(cell.text, 'point') !== null)) continue;
    for (let i = 0; i < columnCount; i += 1)
      headers[i] = `${headers[i]!} ${cells[i]!.text.toLowerCase()}`.trim();
  }
  return headers;
}
