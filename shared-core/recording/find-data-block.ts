import { textBetween, type ScannableText } from '../text/decode-text.ts';

export interface Line {
  /** Offset of its first byte. */
  readonly offset: number;
  readonly text: string;
}

/** Where the numbers start: a sample of the first lines that hold nothing but numbers, and what precedes them. */
export interface DataBlock {
  readonly sample: readonly Line[];
  /** The last lines before the sample that are not blank, nearest last. */
  readonly preceding: readonly Line[];
}

const SAMPLE_LINE_COUNT = 64;
/** A preamble may hold a lone number, or a few; three lines of numbers in a row are a table. */
const RUN_THAT_IS_A_TABLE = 3;
const PRECEDING_LINE_COUNT = 4;
const LONGEST_ROW_BYTES = 65_536;

/** Finds the first three lines in a row that hold only numbers, or the longest shorter run; null when none do. */
export function findDataBlock(text: ScannableText): DataBlock | null {
  const { bytes } = text;
  let best: DataBlock | null = null;
  let sample: Line[] = [];
  let before: Line[] = [];
  let preceding: Line[] = [];
  for (let offset = text.from; offset < bytes.length;) {
    const end = lineEnd(bytes, offset);
    const first = firstInked(bytes, offset, end);
    if (first < end) {
      const isCandidate = startsNumber(bytes[first]!) && end - offset <= LONGEST_ROW_BYTES;
      const line = { offset, text: end - offset <= LONGEST_ROW_BYTES ? textBetween(text, offset, end) : '' };
      if (isCandidate && holdsOnlyNumbers(line.text)) {
        if (sample.length === 0) preceding = before.slice(-PRECEDING_LINE_COUNT);
        sample.push(line);
        if (sample.length >= SAMPLE_LINE_COUNT) return { sample, preceding };
      } else {
        if (sample.length >= RUN_THAT_IS_A_TABLE) return { sample, preceding };
        if (sample.length > (best?.sample.length ?? 0)) best = { sample, preceding };
        sample = [];
      }
      before.push(line);
      if (before.length > 64) before = before.slice(-PRECEDING_LINE_COUNT);
    }
    offset = end + 1;
  }
  if (sample.length > (best?.sample.length ?? 0)) best = { sample, preceding };
  return best;
}

/** Offset of the line break that ends the line holding `offset`. */
export function lineEnd(bytes: Uint8Array, offset: number): number {
  let end = offset;
  while (end < bytes.length && bytes[end] !== 10 && bytes[end] !== 13) end += 1;
  return end;
}

/**
 * 1-based number of the line that starts at `offset`. LF, CR LF and a lone CR each end a line; so does LF CR,
 * where the file uses that throughout.
 */
export function lineNumberAt(bytes: Uint8Array, offset: number): number {
  let lf = 0;
  let cr = 0;
  let crLf = 0;
  let lfCr = 0;
  for (let i = 0; i < offset; i += 1) {
    if (bytes[i] === 10) {
      lf += 1;
      if (bytes[i + 1] === 13 && bytes[i + 2] !== 10) lfCr += 1;
    } else if (bytes[i] === 13) {
      cr += 1;
      if (bytes[i + 1] === 10) crLf += 1;
    }
  }
  const alwaysLfCr = lf > 0 && lfCr === lf && crLf === 0;
  return 1 + (alwaysLfCr ? lf : lf + cr - crLf);
}

function firstInked(bytes: Uint8Array, from: number, end: number): number {
  let i = from;
  while (i < end && (bytes[i] === 32 || bytes[i] === 9)) i += 1;
  return i;
}

function startsNumber(byte: number): boolean {
  const isDigit = byte >= 48 && byte <= 57;
  // + - . , ; and the quote: an empty first cell starts with its delimiter.
  return isDigit || byte === 43 || byte === 45 || byte === 46 || byte === 34 || byte === 44 || byte === 59;
}

// Each part can match in one way only, so that a long line that is no table cannot make the search explode.
const NUMBERS_ONLY =
  /^[\s,;"]*[+-]?(?:\d+(?:\.\d*)?|\.\d+)(?:[eEdD][+-]?\d+)?(?:[\s,;"]+[+-]?(?:\d+(?:\.\d*)?|\.\d+)(?:[eEdD][+-]?\d+)?)*[\s,;"]*$/;

/** True when the line holds numbers and separators and nothing else, whatever the separators turn out to be. */
function holdsOnlyNumbers(line: string): boolean {
  return NUMBERS_ONLY.test(line);
}
