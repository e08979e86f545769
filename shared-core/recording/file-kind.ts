const MAGIC: readonly (readonly [string, readonly number[]])[] = [
  ['a PNG picture', [0x89, 0x50, 0x4e, 0x47]],
  ['a JPEG picture', [0xff, 0xd8, 0xff]],
  ['a GIF picture', [0x47, 0x49, 0x46, 0x38]],
  ['a TIFF picture', [0x49, 0x49, 0x2a, 0x00]],
  ['a TIFF picture', [0x4d, 0x4d, 0x00, 0x2a]],
  ['a PDF document', [0x25, 0x50, 0x44, 0x46]],
  ['a ZIP archive or a spreadsheet workbook', [0x50, 0x4b, 0x03, 0x04]],
  ['a spreadsheet workbook or another binary document', [0xd0, 0xcf, 0x11, 0xe0]],
  ['a gzip archive', [0x1f, 0x8b]],
  ['a 7-Zip archive', [0x37, 0x7a, 0xbc, 0xaf]],
  ['an HDF5 file', [0x89, 0x48, 0x44, 0x46]],
  ['an SQLite database', [0x53, 0x51, 0x4c, 0x69, 0x74, 0x65]],
  ['a program', [0x7f, 0x45, 0x4c, 0x46]],
  // "SIMPLE  =": the opening word its standard requires.
  ['a FITS file', [0x53, 0x49, 0x4d, 0x50, 0x4c, 0x45, 0x20, 0x20, 0x3d]],
];

/** What a file that is no text table looks like from its first bytes, or null when it may be one. */
export function foreignKind(bytes: Uint8Array): string | null {
  for (const [kind, magic] of MAGIC) if (magic.every((byte, i) => bytes[i] === byte)) return kind;
  return null;
}

const TEXT_KINDS: readonly (readonly [string, RegExp])[] = [
  // Its first label is TITLE; case and blanks in a label do not count, and comments start with $$. Each part can match
  // in one way only, so that no head of a file can make the search explode.
  ['a JCAMP-DX file', /^\s*(?:\$\$[^\r\n]*[\r\n]\s*)*##\s*title\s*=/i],
  // A header such as "[Data]" is none: what opens JSON here is a field, a list of lists, or a bracket alone in its line.
  ['a JSON file', /^\s*(?:\{\s*["}]|\[\s*[[{]|\[[ \t]*[\r\n])/],
];

/** What kind of text that is no table starts like this, or null when it may be a table. */
export function foreignText(head: string): string | null {
  return TEXT_KINDS.find(([, start]) => start.test(head))?.[0] ?? null;
}

/** True when control characters that no text holds stand among the first bytes (after decoding). */
export function holdsControlCharacters(bytes: Uint8Array): boolean {
  const length = Math.min(bytes.length, 8192);
  let count = 0;
  for (let i = 0; i < length; i += 1) {
    const byte = bytes[i]!;
    if (byte === 0) return true;
    // Tab, LF, VT, FF, CR and the end-of-file mark of old systems are met in text.
    if (byte < 9 || (byte > 13 && byte < 32 && byte !== 26)) count += 1;
  }
  return count > 2;
}
