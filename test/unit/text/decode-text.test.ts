import { describe, expect, test } from 'vitest';
import { scannableText, textBetween, wholeText } from '../../../shared-core/text/decode-text.ts';
import { latin1, utf16 } from '../../support/text-file.ts';

// The reference is the platform's own encoder; the core has none and decodes by itself.
const utf8 = (text: string): Uint8Array => new TextEncoder().encode(text);
const sample = 'Wellenlänge (µm) Å − 10⁻⁶ 🔬\n400;1\n';

describe('the encoding is found', () => {
  test.each([
    ['utf-8', utf8(sample)],
    ['utf-8', utf8(`\ufeff${sample}`)],
    ['utf-16le', utf16(sample, 'le', true)],
    ['utf-16be', utf16(sample, 'be', true)],
  ] as const)('%s', (encoding, bytes) => {
    expect(scannableText(bytes).encoding).toBe(encoding);
    expect(wholeText(bytes)).toBe(sample);
  });

  test.each(['le', 'be'] as const)('UTF-16 %s without a mark, from its zero bytes', (order) => {
    const text = 'wavelength,counts\n400,1\n';
    expect(scannableText(utf16(text, order, false)).encoding).toBe(`utf-16${order}`);
    expect(wholeText(utf16(text, order, false))).toBe(text);
  });

  test('Latin-1 where UTF-8 does not fit', () => {
    const text = 'Longueur d’onde'.replace('’', "'") + ' (Å) é\n';
    expect(scannableText(latin1(text)).encoding).toBe('latin-1');
    expect(wholeText(latin1(text))).toBe(text);
  });

  test.each([
    ['a lone continuation byte', [0x41, 0x80, 0x42]],
    ['an overlong form', [0xc0, 0xaf]],
    ['a surrogate', [0xed, 0xa0, 0x80]],
    ['beyond the last code point', [0xf4, 0x90, 0x80, 0x80]],
    ['a sequence cut off', [0x41, 0xe2, 0x82]],
  ])('%s is no UTF-8', (_, bytes) => {
    expect(scannableText(Uint8Array.from(bytes)).encoding).toBe('latin-1');
  });
});

test('a lone surrogate becomes the replacement character', () => {
  expect(wholeText(utf16('a\ud800b\udc00', 'be', true))).toBe('a\ufffdb\ufffd');
});

test('an odd last byte of UTF-16 is left out', () => {
  expect(wholeText(Uint8Array.from([...utf16('ab', 'le', true), 0x63]))).toBe('ab');
});

test('the bytes always end with a line feed, and the file is known not to', () => {
  expect(scannableText(utf8('1'))).toMatchObject({ endsWithLineBreak: false, bytes: utf8('1\n') });
  expect(scannableText(utf8('1\n'))).toMatchObject({ endsWithLineBreak: true, bytes: utf8('1\n') });
  expect(scannableText(utf8('1\r')).endsWithLineBreak).toBe(true);
  expect(scannableText(new Uint8Array(0)).bytes).toEqual(utf8('\n'));
});

test('a stretch that starts inside a character shows the replacement character', () => {
  const text = scannableText(utf8('aÅb'));
  expect(textBetween(text, 2, 4)).toBe('\ufffdb');
});
