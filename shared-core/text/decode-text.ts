export type TextEncodingName = 'utf-8' | 'utf-16le' | 'utf-16be' | 'latin-1';

/** Bytes in which every ASCII character is one byte, so that tables can be scanned without making strings. */
export interface ScannableText {
  /** What the file was written in. */
  readonly encoding: TextEncodingName;
  /** UTF-8 or Latin-1; always ends with a line feed, so that a scanner needs no end test inside a line. */
  readonly bytes: Uint8Array;
  /** First byte after a byte-order mark. */
  readonly from: number;
  /** Whether the file itself ended with a line break. */
  readonly endsWithLineBreak: boolean;
}

const LF = 10;
const CR = 13;

/** Finds the encoding from the byte-order mark, else from the zero bytes, else from whether UTF-8 fits. */
export function scannableText(raw: Uint8Array): ScannableText {
  const [b0, b1, b2] = [raw[0], raw[1], raw[2]];
  if (b0 === 0xff && b1 === 0xfe) return finish('utf-16le', utf16ToUtf8(raw, 2, 0), 0);
  if (b0 === 0xfe && b1 === 0xff) return finish('utf-16be', utf16ToUtf8(raw, 2, 1), 0);
  const bare = bareUtf16(raw);
  if (bare !== null) return finish(bare, utf16ToUtf8(raw, 0, bare === 'utf-16be' ? 1 : 0), 0);
  if (b0 === 0xef && b1 === 0xbb && b2 === 0xbf) return finish('utf-8', raw, 3);
  return finish(isUtf8(raw) ? 'utf-8' : 'latin-1', raw, 0);
}

/** The characters of a stretch of bytes. */
export function textBetween(text: ScannableText, from: number, to: number): string {
  const { bytes } = text;
  const latin1 = text.encoding === 'latin-1';
  let out = '';
  for (let i = from; i < to;) {
    const byte = bytes[i]!;
    if (byte < 0x80 || latin1) {
      out += String.fromCharCode(byte);
      i += 1;
      continue;
    }
    const length = sequenceLength(bytes, i, to);
    out += length === 0 ? '\ufffd' : String.fromCodePoint(codePointAt(bytes, i, length));
    i += Math.max(1, length);
  }
  return out;
}

/** The whole file as a string; for small files such as the bench file. */
export function wholeText(raw: Uint8Array): string {
  const text = scannableText(raw);
  return textBetween(text, text.from, text.endsWithLineBreak ? text.bytes.length : text.bytes.length - 1);
}

function finish(encoding: TextEncodingName, bytes: Uint8Array, from: number): ScannableText {
  const last = bytes[bytes.length - 1];
  if (last === LF) return { encoding, bytes, from, endsWithLineBreak: true };
  const padded = new Uint8Array(bytes.length + 1);
  padded.set(bytes);
  padded[bytes.length] = LF;
  return { encoding, bytes: padded, from, endsWithLineBreak: last === CR };
}

/** ASCII text in UTF-16 without a mark shows as a zero in nearly every second byte. */
function bareUtf16(raw: Uint8Array): 'utf-16le' | 'utf-16be' | null {
  const length = Math.min(raw.length, 1024) & ~1;
  if (length < 4) return null;
  let evenZeros = 0;
  let oddZeros = 0;
  for (let i = 0; i < length; i += 2) {
    if (raw[i] === 0) evenZeros += 1;
    if (raw[i + 1] === 0) oddZeros += 1;
  }
  const most = 0.9 * (length / 2);
  if (oddZeros >= most && evenZeros === 0) return 'utf-16le';
  if (evenZeros >= most && oddZeros === 0) return 'utf-16be';
  return null;
}

function utf16ToUtf8(raw: Uint8Array, from: number, highFirst: 0 | 1): Uint8Array {
  const unitCount = (raw.length - from) >> 1;
  const out = new Uint8Array(unitCount * 3);
  const unitAt = (i: number): number =>
    raw[from + 2 * i + highFirst]! | (raw[from + 2 * i + 1 - highFirst]! << 8);
  let n = 0;
  for (let i = 0; i < unitCount; i += 1) {
    let code = unitAt(i);
    if (code >= 0xd800 && code < 0xe000) {
      const low = i + 1 < unitCount ? unitAt(i + 1) : 0;
      const paired = code < 0xdc00 && low >= 0xdc00 && low < 0xe000;
      code = paired ? 0x10000 + ((code - 0xd800) << 10) + (low - 0xdc00) : 0xfffd;
      if (paired) i += 1;
    }
    if (code < 0x80) out[n++] = code;
    else if (code < 0x800) {
      out[n++] = 0xc0 | (code >> 6);
      out[n++] = 0x80 | (code & 63);
    } else if (code < 0x10000) {
      out[n++] = 0xe0 | (code >> 12);
      out[n++] = 0x80 | ((code >> 6) & 63);
      out[n++] = 0x80 | (code & 63);
    } else {
      // Two units make four bytes, so three bytes a unit are always room enough.
      out[n++] = 0xf0 | (code >> 18);
      out[n++] = 0x80 | ((code >> 12) & 63);
      out[n++] = 0x80 | ((code >> 6) & 63);
      out[n++] = 0x80 | (code & 63);
    }
  }
  return out.subarray(0, n);
}

/** Looks at the head of the file only: a stray byte far down is met, and named, where the table is read. */
function isUtf8(raw: Uint8Array): boolean {
  const length = Math.min(raw.length, 16_384);
  for (let i = 0; i < length;) {
    if (raw[i]! < 0x80) {
      i += 1;
      continue;
    }
    const sequence = sequenceLength(raw, i, raw.length);
    if (sequence === 0) return false;
    i += sequence;
  }
  return true;
}

/** Length of the UTF-8 sequence that starts at `i`, 0 when it is none. */
function sequenceLength(bytes: Uint8Array, i: number, end: number): number {
  const lead = bytes[i]!;
  const length = lead < 0x80 ? 1 : lead < 0xc2 ? 0 : lead < 0xe0 ? 2 : lead < 0xf0 ? 3 : lead < 0xf5 ? 4 : 0;
  if (i + length > end) return 0;
  for (let k = 1; k < length; k += 1) if ((bytes[i + k]! & 0xc0) !== 0x80) return 0;
  if (length >= 3) {
    const code = codePointAt(bytes, i, length);
    if (code > 0x10ffff || (code >= 0xd800 && code < 0xe000) || code < (length === 3 ? 0x800 : 0x10000))
      return 0;
  }
  return length;
}

function codePointAt(bytes: Uint8Array, i: number, length: number): number {
  let code = length === 1 ? bytes[i]! : bytes[i]! & (0xff >> (length + 1));
  for (let k = 1; k < length; k += 1) code = (code << 6) | (bytes[i + k]! & 63);
  return code;
}
