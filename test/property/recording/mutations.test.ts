import { describe, expect, test } from 'vitest';
import type { Bench } from '../../../shared-core/bench/bench.ts';
import { createRandom } from '../../../shared-core/numeric/random.ts';
import { readRecording } from '../../../shared-core/recording/read-recording.ts';
import { recordingToCsv } from '../../../shared-core/recording/write-csv.ts';
import { problemSentence } from '../../../shared-core/result/result.ts';
import { latin1, textFile, utf16 } from '../../support/text-file.ts';

const rows = Array.from(
  { length: 60 },
  (_, i) => [(400 + 0.37 * i).toFixed(3), String(1000 + ((i * 7919) % 613))] as const,
);
const comma = (text: string): string => text.replace('.', ',');
const lines = (write: (nm: string, counts: string) => string): string =>
  rows.map(([nm, counts]) => write(nm, counts)).join('\n');
const bench: Bench = { axis: { coefficientsNm: [400, 0.37] } };

const layouts: Readonly<Record<string, { content: string | Uint8Array; bench?: Bench }>> = {
  commas: { content: `wavelength_nm,counts\n${lines((nm, counts) => `${nm},${counts}`)}\n` },
  'decimal commas': {
    content: `nm;Signal\r\n${lines((nm, counts) => `${comma(nm)};${counts},5\r`)}\n`,
  },
  'commas as marks and between': {
    content: `nm,Signal\n${lines((nm, counts) => `${comma(nm)},${counts},5`)}\n`,
  },
  'tabs under a header': {
    content: `Date: today\nScans: 4\n>>> data\n${lines((nm, counts) => `${nm}\t${counts}`)}\n`,
  },
  blanks: { content: lines((nm, counts) => `  ${nm}   ${counts}`) },
  quotes: { content: `"nm","counts"\n${lines((nm, counts) => `"${nm}","${counts}"`)}\n` },
  'four columns': {
    content: `pixel,nm,dark,counts\n${rows.map(([nm, counts], i) => `${String(i)},${nm},9,${counts}`).join('\n')}\n`,
  },
  'falling wavenumbers and exponents': {
    content: `cm-1\tcounts\n${lines((nm, counts) => `${(1e7 / Number(nm)).toExponential(12)}\t${counts}`)}\n`,
  },
  'signal only': { content: `counts\n${lines((_, counts) => counts)}\n`, bench },
  'pixel numbers': {
    content: rows.map(([, counts], i) => `${String(i + 1)};${counts}`).join('\n'),
    bench,
  },
  'UTF-16': { content: utf16(`nm;counts\n${lines((nm, counts) => `${nm};${counts}`)}\n`, 'le', true) },
  'Latin-1': {
    content: latin1(`Å\tIntensité\n${lines((nm, counts) => `${(10 * Number(nm)).toFixed(2)}\t${counts}`)}\n`),
  },
};
const layoutCount = Object.keys(layouts).length;
const mutationCount = 2000;

/** One to six random faults: a byte changed, a stretch removed, doubled or put elsewhere, the end cut off. */
function mutate(bytes: Uint8Array, random: ReturnType<typeof createRandom>): Uint8Array {
  let current = [...bytes];
  const pick = (count: number): number => Math.floor(random.uniform() * count);
  for (let fault = 0; fault <= pick(6); fault++) {
    const at = pick(current.length);
    const length = 1 + pick(30);
    const kind = pick(5);
    if (kind === 0) current[at] = pick(256);
    if (kind === 1) current.splice(at, length);
    if (kind === 2) current.splice(at, 0, ...current.slice(at, at + length));
    if (kind === 3) current.splice(pick(current.length), 0, ...current.splice(at, length));
    if (kind === 4) current = current.slice(0, Math.max(1, at));
  }
  return Uint8Array.from(current);
}

describe.each(Object.entries(layouts))('damaged files with %s', (_, { content, bench: own = {} }) => {
  test('are whole before they are damaged', () => {
    const result = readRecording(textFile(content), own);
    expect(result.ok && result.value.signal.length).toBe(rows.length);
  });

  test('are read or refused with a whole sentence, and never throw', () => {
    const random = createRandom(20261);
    const good = textFile(content).bytes;
    const rounds = Math.ceil(mutationCount / layoutCount);
    let refused = 0;
    for (let index = 0; index < rounds; index++) {
      const result = readRecording(textFile(mutate(good, random)), own);
      if (result.ok) {
        const { wavelengthNm, signal } = result.value;
        expect(signal).toHaveLength(wavelengthNm.length);
        expect(
          wavelengthNm.every((nm, i) => Number.isFinite(nm) && (i === 0 || nm > wavelengthNm[i - 1]!)),
        ).toBe(true);
        expect(signal.every(Number.isFinite)).toBe(true);
      } else {
        refused++;
        const { problem } = result;
        expect(problemSentence(problem)).toMatch(
          /^Cannot use the recording .+: expected .+, found .+\. .+\.$/s,
        );
        if (problem.lineNumber !== null) expect(problem.lineNumber).toBeGreaterThan(0);
      }
    }
    // Damage that is never noticed, or always fatal, would mean that the faults are not what they seem.
    expect(refused).toBeGreaterThan(20);
    expect(refused).toBeLessThan(rounds);
  });
});

test('what is written is what is read', () => {
  const random = createRandom(7);
  for (let round = 0; round < 20; round++) {
    const count = 8 + Math.floor(random.uniform() * 200);
    const wavelengthNm = Float64Array.from({ length: count }, (_, i) => 300 + i * 1.7 + random.uniform());
    const signal = wavelengthNm.map(() => 1e5 * random.normal());
    const result = readRecording(textFile(recordingToCsv({ wavelengthNm, signal })), {});
    if (!result.ok) throw new Error(result.problem.code);
    expect([...result.value.signal]).toEqual([...signal]);
    expect([...result.value.wavelengthNm]).toEqual([...wavelengthNm]);
  }
});

test('the layout makes no difference to the numbers', () => {
  const random = createRandom(11);
  const pick = <T>(from: readonly T[]): T => from[Math.floor(random.uniform() * from.length)]!;
  for (let round = 0; round < 300; round++) {
    const count = 8 + Math.floor(random.uniform() * 120);
    const nmDigits = pick([2, 3, 5]);
    const countDigits = pick([1, 2, 6]);
    const first = 200 + 400 * random.uniform();
    const table = Array.from({ length: count }, (_, i) => [
      (first + i * 1.3 + 0.5 * random.uniform()).toFixed(nmDigits),
      (1000 * random.normal()).toFixed(countDigits),
    ]);
    const [delimiter, mark] = pick([
      [',', '.'],
      [';', '.'],
      [';', ','],
      ['\t', '.'],
      ['\t', ','],
      ['   ', '.'],
      ['  ', ','],
      [', ', '.'],
    ] as const);
    const header = pick([
      '',
      `Wavelength (nm)${delimiter === '  ' || delimiter === '   ' ? '  ' : delimiter}Counts\n`,
    ]);
    const body = (random.uniform() < 0.5 ? table : table.toReversed())
      .map((row) => row.map((cell) => cell.replace('.', mark)).join(delimiter))
      .join('\n');
    const text = `${pick(['', 'Taken today\nLamp: 7\n'])}${header}${body}${pick(['', '\n', '\n\n'])}`;
    const lineBreak = pick(['\n', '\r\n', '\r']);
    const whole = text.replaceAll('\n', lineBreak);
    const content = pick([whole, `\ufeff${whole}`, utf16(whole, 'le', true), utf16(whole, 'be', false)]);
    const result = readRecording(textFile(content), { axis: { unit: 'nm' } });
    if (!result.ok) throw new Error(`${problemSentence(result.problem)}\n${text.slice(0, 200)}`);
    expect([...result.value.wavelengthNm]).toEqual(table.map(([nm]) => Number(nm)));
    expect([...result.value.signal]).toEqual(table.map(([, counts]) => Number(counts)));
  }
});
