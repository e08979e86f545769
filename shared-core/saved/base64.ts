/** Bytes as text, after RFC 4648 section 4, with padding; the same in every host. */
const alphabet = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/';

const valueOf = new Map([...alphabet].map((character, value) => [character, value]));

/** Groups per piece of text: long enough to be quick, short enough for one call of fromCharCode. */
const groupsPerPiece = 4096;

export function encodeBase64(bytes: Uint8Array): string {
  const pieces: string[] = [];
  for (let start = 0; start < bytes.length; start += 3 * groupsPerPiece) {
    pieces.push(encodePiece(bytes, start, Math.min(bytes.length, start + 3 * groupsPerPiece)));
  }
  return pieces.join('');
}

function encodePiece(bytes: Uint8Array, from: number, to: number): string {
  const codes: number[] = [];
  const push = (value: number): void => void codes.push(alphabet.charCodeAt(value & 63));
  for (let at = from; at < to; at += 3) {
    const a = bytes[at] ?? 0;
    const b = bytes[at + 1] ?? 0;
    const c = bytes[at + 2] ?? 0;
    push(a >> 2);
    push((a << 4) | (b >> 4));
    if (at + 1 < to) push((b << 2) | (c >> 6));
    if (at + 2 < to) push(c);
  }
  return String.fromCharCode(...codes) + '='.repeat((4 - (codes.length % 4)) % 4);
}

/** Null when the text is not canonical base64: a damaged file must not turn into other bytes in silence. */
export function decodeBase64(text: string): Uint8Array | null {
  if (text.length % 4 !== 0) return null;
  const padding = text.endsWith('==') ? 2 : text.endsWith('=') ? 1 : 0;
  const bytes = new Uint8Array((text.length / 4) * 3 - padding);
  let at = 0;
  for (let start = 0; start < text.length; start += 4) {
    const isLast = start + 4 === text.length;
    const kept = isLast ? 4 - padding : 4;
    let group = 0;
    for (let k = 0; k < 4; k += 1) {
      const value = k < kept ? valueOf.get(text.charAt(start + k)) : 0;
      if (value === undefined) return null;
      group = (group << 6) | value;
    }
    if ((group & ((1 << (8 * (4 - kept))) - 1)) !== 0) return null;
    for (let shift = 16; shift >= 0 && at < bytes.length; shift -= 8) {
      bytes[at] = (group >> shift) & 255;
      at += 1;
    }
  }
  return bytes;
}
