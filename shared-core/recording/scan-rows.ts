import { longDecimal, powersOfTen } from './long-decimal.ts';
import type { Understood } from './recording.ts';

/** Which cells of a row are wanted and how they are written. Column indices are from 0; -1 is "none". */
export interface ScanPlan {
  readonly bytes: Uint8Array;
  readonly delimiter: Understood['delimiter'];
  readonly decimalMark: Understood['decimalMark'];
  readonly columnCount: number;
  readonly axisIndex: number;
  readonly signalIndex: number;
  readonly extraIndex: number;
}

/** Columns filled so far. The arrays may be longer than `rowCount` rows. */
export interface ScanColumns {
  axis: Float64Array;
  signal: Float64Array;
  extra: Float64Array;
  rowCount: number;
  /** Most digits seen after the decimal mark of an axis cell; 99 once one is written with an exponent. */
  axisDecimalCount: number;
}

/** `bad-row` stops at the first byte of a line that is no data row; `full` when `rowLimit` rows are there. */
export interface ScanStop {
  readonly reason: 'end' | 'bad-row' | 'full';
  readonly offset: number;
}

const FIRST_INEXACT = 9007199254740992;

const TAB = 9;
const LF = 10;
const CR = 13;
const BLANK = 32;
const QUOTE = 34;
const PLUS = 43;
const COMMA = 44;
const MINUS = 45;
const POINT = 46;
const SEMICOLON = 59;

const DELIMITER_BYTE = { comma: COMMA, semicolon: SEMICOLON, tab: TAB, blanks: BLANK } as const;

/**
 * Reads data rows from `from` on, straight from the bytes, until the end or a line that is no data row.
 *
 * A number whose digits make less than 2^53 is gathered as a whole number and scaled by one
 * exact power of ten, which rounds once and so gives the nearest double; up to 22 digits are gathered as two whole
 * numbers; any other goes through Number().
 * Quotes are passed over. Where comma is both delimiter and decimal mark, a comma between two digits belongs
 * to the number, once a number.
 *
 * @source [Clinger1990] (the exact fast path)
 * @check  test/unit/recording/scan-rows.test.ts
 */
export function scanRows(plan: ScanPlan, columns: ScanColumns, from: number, rowLimit: number): ScanStop {
  const { bytes, columnCount, axisIndex, signalIndex, extraIndex } = plan;
  const end = bytes.length;
  const delimiterByte = DELIMITER_BYTE[plan.delimiter];
  const byBlanks = plan.delimiter === 'blanks';
  const tabIsBlank = plan.delimiter !== 'tab';
  const decimalByte = plan.decimalMark === 'comma' ? COMMA : POINT;
  const commaIsBoth = delimiterByte === decimalByte;
  let { axis, signal, extra, rowCount, axisDecimalCount } = columns;
  let capacity = signal.length;
  // Only the columns that are wanted are given room, and the first call may find them without any.
  if (axisIndex >= 0 && axis.length < capacity) axis = longer(axis, capacity);
  if (extraIndex >= 0 && extra.length < capacity) extra = longer(extra, capacity);
  let p = from;
  let lineStart = from;
  let reason: ScanStop['reason'] = 'end';

  rows: while (p < end) {
    lineStart = p;
    let c = bytes[p]!;
    while (c === BLANK || (c === TAB && tabIsBlank)) c = bytes[++p]!;
    if (c === LF || c === CR) {
      p += 1;
      continue;
    }
    if (rowCount >= rowLimit) {
      reason = 'full';
      break;
    }
    if (rowCount >= capacity) {
      capacity = Math.min(rowLimit, Math.max(64, capacity * 2));
      if (axisIndex >= 0) axis = longer(axis, capacity);
      if (extraIndex >= 0) extra = longer(extra, capacity);
      signal = longer(signal, capacity);
    }
    let column = 0;
    let wantedCount = 0;
    for (;;) {
      while (c === BLANK || (c === TAB && tabIsBlank)) c = bytes[++p]!;
      if (column === axisIndex || column === signalIndex || column === extraIndex) {
        while (c === QUOTE || c === BLANK) c = bytes[++p]!;
        const cellStart = p;
        const negative = c === MINUS;
        if (negative || c === PLUS) c = bytes[++p]!;
        let mantissa = 0;
        let digitCount = 0;
        let fractionCount = 0;
        while (c >= 48 && c <= 57) {
          mantissa = mantissa * 10 + (c - 48);
          digitCount += 1;
          c = bytes[++p]!;
        }
        if (c === decimalByte) {
          let next = bytes[p + 1]!;
          if (!commaIsBoth || (next >= 48 && next <= 57)) {
            p += 1;
            while (next >= 48 && next <= 57) {
              mantissa = mantissa * 10 + (next - 48);
              fractionCount += 1;
              next = bytes[++p]!;
            }
            c = next;
          }
        }
        if (digitCount + fractionCount === 0) {
          reason = 'bad-row';
          break rows;
        }
        let exponent = 0;
        let hasExponent = false;
        if (c === 101 || c === 69 || c === 100 || c === 68) {
          let q = p + 1;
          let sign = bytes[q]!;
          if (sign === PLUS || sign === MINUS) q += 1;
          else sign = PLUS;
          let next = bytes[q]!;
          if (next < 48 || next > 57) {
            reason = 'bad-row';
            break rows;
          }
          while (next >= 48 && next <= 57) {
            if (exponent < 10_000) exponent = exponent * 10 + (next - 48);
            next = bytes[++q]!;
          }
          if (sign === MINUS) exponent = -exponent;
          hasExponent = true;
          p = q;
          c = next;
        }
        const scale = exponent - fractionCount;
        let value: number;
        // Below 2^53 no digit can have been rounded away on the way.
        if (mantissa < FIRST_INEXACT && scale <= 22 && scale >= -22) {
          value = scale < 0 ? mantissa / powersOfTen[-scale]! : mantissa * powersOfTen[scale]!;
          if (negative) value = -value;
        } else {
          value = longFromBytes(bytes, cellStart, p, scale);
          if (value - value !== 0) value = numberFromBytes(bytes, cellStart, p);
          if (value - value !== 0) {
            reason = 'bad-row';
            break rows;
          }
        }
        wantedCount += 1;
        if (column === axisIndex) {
          axis[rowCount] = value;
          if (hasExponent) axisDecimalCount = 99;
          else if (fractionCount > axisDecimalCount) axisDecimalCount = fractionCount;
        } else if (column === signalIndex) signal[rowCount] = value;
        else extra[rowCount] = value;
      } else {
        let isQuoted = false;
        while (c !== LF && c !== CR) {
          if (c === QUOTE) isQuoted = !isQuoted;
          else if (!isQuoted && (c === delimiterByte || (byBlanks && c === TAB))) break;
          c = bytes[++p]!;
        }
      }
      column += 1;
      const cellEnd = p;
      while (c === BLANK || c === QUOTE || (c === TAB && tabIsBlank)) c = bytes[++p]!;
      if (c === LF || c === CR) break;
      if (byBlanks) {
        if (p > cellEnd) continue;
        reason = 'bad-row';
        break rows;
      }
      if (c !== delimiterByte) {
        reason = 'bad-row';
        break rows;
      }
      c = bytes[++p]!;
      while (c === BLANK || (c === TAB && tabIsBlank)) c = bytes[++p]!;
      // A delimiter that ends the line leaves one empty cell, which nobody wants unless it is a wanted column.
      if ((c === LF || c === CR) && column === columnCount) break;
    }
    const wanted = (axisIndex >= 0 ? 1 : 0) + 1 + (extraIndex >= 0 ? 1 : 0);
    if (column !== columnCount || wantedCount !== wanted) {
      reason = 'bad-row';
      break;
    }
    rowCount += 1;
    p += 1;
  }
  columns.axis = axis;
  columns.signal = signal;
  columns.extra = extra;
  columns.rowCount = rowCount;
  columns.axisDecimalCount = axisDecimalCount;
  return { reason, offset: reason === 'end' ? end : lineStart };
}

function longer(array: Float64Array, length: number): Float64Array {
  const out = new Float64Array(length);
  out.set(array);
  return out;
}

/** A number of up to 22 significant digits, NaN where it has to be read as text; its exponent is in `scale`. */
function longFromBytes(bytes: Uint8Array, from: number, to: number, scale: number): number {
  if (scale > 0 || scale < -22) return NaN;
  let head = 0;
  let headCount = 0;
  let tail = 0;
  let tailCount = 0;
  const negative = bytes[from] === MINUS;
  for (let i = negative || bytes[from] === PLUS ? from + 1 : from; i < to; i += 1) {
    const c = bytes[i]!;
    if (c >= 48 && c <= 57) {
      if (headCount < 15) {
        head = head * 10 + (c - 48);
        if (head !== 0) headCount += 1;
      } else {
        tail = tail * 10 + (c - 48);
        tailCount += 1;
        if (tailCount > 7) return NaN;
      }
    } else if (c !== POINT && c !== COMMA) break;
  }
  const value = longDecimal(head, tail, tailCount, -scale);
  return negative ? -value : value;
}

function numberFromBytes(bytes: Uint8Array, from: number, to: number): number {
  let text = '';
  for (let i = from; i < to; i += 1) {
    const c = bytes[i]!;
    text += c === COMMA ? '.' : c === 100 || c === 68 ? 'e' : String.fromCharCode(c);
  }
  return Number(text);
}
