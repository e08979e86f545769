import type { InputFile } from '../../shared-core/result/input-file.ts';

/** An input file from text (as UTF-8) or bytes. */
export function textFile(content: string | Uint8Array, name = 'tube.csv'): InputFile {
  const bytes = typeof content === 'string' ? new TextEncoder().encode(content) : content;
  return { name, bytes, sha256: '0'.repeat(64) };
}

/** Characters up to U+00FF as one byte each. */
export const latin1 = (text: string): Uint8Array =>
  Uint8Array.from(text, (character) => character.charCodeAt(0));

/** UTF-16 code units, little-endian or big-endian, with or without a byte-order mark. */
export function utf16(text: string, order: 'le' | 'be', mark: boolean): Uint8Array {
  const units = [
    ...(mark ? [0xfeff] : []),
    ...Array.from({ length: text.length }, (_, i) => text.charCodeAt(i)),
  ];
  return Uint8Array.from(
    units.flatMap((unit) => (order === 'le' ? [unit & 255, unit >> 8] : [unit >> 8, unit & 255])),
  );
}
