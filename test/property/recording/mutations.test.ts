import { describe, expect, test } from 'vitest';
import { createRandom } from '../../../shared-core/numeric/random.ts';
import { readRecording } from '../../../shared-core/recording/read-recording.ts';
import { recordingToCsv } from '../../../shared-core/recording/write-csv.ts';
import { textFile } from '../../support/text-file.ts';

const rows = Array.from(
  { length: 60 },
  (_, i) => [(400 + 0.37 * i).toFixed(3), String(1000 + ((i * 7919) % 613))] as const,
);
const layouts: Readonly<Record<string, string>> = {
  commas: `wavelength_nm,counts\n${rows.map((row) => row.join(',')).join('\n')}\n`,
  'decimal commas': `nm;Signal\r\n${rows.map(([nm, counts]) => `${nm.replace('.', ',')};${counts},5`).join('\r\n')}\r\n`,
  'tabs under a header': `Date: today\nScans: 4\n>>> data\n${rows.map((row) => row.join('\t')).join('\n')}\n`,
  blanks: rows.map((row) => `  ${row.join('   ')}`).join('\n'),
  quoted: `"nm","counts"\n${rows.map(([nm, counts]) => `"${nm}","${counts}"`).join('\n')}\n`,
};
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

describe.each(Object.entries(layouts))('damaged files with %s', (_, text) => {
  test('are read or refused with a whole sentence, and never throw', () => {
    const random = createRandom(20261);
    const good = new TextEncoder().encode(text);
    let refused = 0;
    for (let index = 0; index < mutationCount / 5; index++) {
      const result = readRecording(textFile(mutate(good, random)), {});
      if (result.ok) {
        const { wavelengthNm, signal } = result.value;
        expect(signal).toHaveLength(wavelengthNm.length);
        expect(
          wavelengthNm.every((nm, i) => Number.isFinite(nm) && (i === 0 || nm > wavelengthNm[i - 1]!)),
        ).toBe(true);
        expect(signal.every(Number.isFinite)).toBe(true);
      } else {
        refused++;
        const { expected, found, remedy } = result.problem;
        for (const part of [expected, found, remedy]) expect(part.length).toBeGreaterThan(2);
      }
    }
    // Damage that is never noticed, or always fatal, would mean that the faults are not what they seem.
    expect(refused).toBeGreaterThan(20);
    expect(refused).toBeLessThan(mutationCount / 5);
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
