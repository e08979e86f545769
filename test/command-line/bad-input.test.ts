import { mkdirSync, truncateSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { beforeAll, describe, expect, test } from 'vitest';
import type { Diagnosis } from '../../shared-core/diagnosis/diagnosis.ts';
import { goodRecording, temporaryFolder, write } from '../support/bench-folder.ts';
import { lampwright } from '../support/command.ts';
import { projectRoot } from '../support/source-files.ts';

const folder = temporaryFolder();
let good: string;

beforeAll(async () => {
  good = await goodRecording(folder, 'good.csv');
});

const rows = (...values: (string | number)[][]): string => values.map((row) => row.join(',')).join('\n');
const ramp = (count: number, row: (index: number) => (string | number)[]): string =>
  rows(...Array.from({ length: count }, (_, index) => row(index)));

/** The first bytes of a PNG file, then noise that is no text. */
const picture = Uint8Array.from([
  0x89,
  0x50,
  0x4e,
  0x47,
  0x0d,
  0x0a,
  0x1a,
  0x0a,
  ...Array.from({ length: 500 }, (_, i) => (i * 97) % 256),
]);

const badRecordings: readonly (readonly [what: string, content: string | Uint8Array, found: RegExp])[] = [
  ['an empty file', '', /found an empty file/],
  ['a picture renamed', picture, /found .*(picture|PNG|image|not text|binary)/i],
  ['no numeric column', ramp(40, (i) => [`a${String(i)}`, 'b']), /found .+/],
  ['one column', ramp(40, (i) => [1000 + i * 1.5]), /found .+/],
  ['NaN in the signal', ramp(40, (i) => [400 + i, i === 20 ? 'NaN' : 100]), /line 21.*NaN/],
  ['an infinity in the signal', ramp(40, (i) => [400 + i, i === 20 ? 'inf' : 100]), /line 21.*inf/],
  ['a wavelength twice', ramp(40, (i) => [400 + (i === 20 ? 19 : i), 100]), /line 21/],
  ['wavelengths that turn back', ramp(40, (i) => [400 + (i < 20 ? i : 40 - i * 1.01), 100]), /line 2\d/],
  ['too few rows', ramp(3, (i) => [400 + i, 100]), /found .+/],
];

describe('a bad recording', () => {
  test.each(badRecordings)(
    '(%s) is one sentence and status 1, and the others of the batch are done',
    async (what, content, found) => {
      const bad = write(folder, `${what.replaceAll(' ', '-')}.csv`, content);
      const ran = await lampwright('diagnose', bad, good, '--ndjson');
      expect(ran.status).toBe(1);
      expect(ran.errorLines).toHaveLength(1);
      expect(ran.errorLines[0]).toMatch(found);
      expect(ran.errorLines[0]).toMatch(
        /^Cannot use the recording ".+": expected .+, found .+\. \S.+\.$|^Cannot use the recording ".+", line \d+: expected .+, found .+\. \S.+\.$/,
      );
      expect(ran.errorLines[0]).toContain(bad);
      expect(ran.out.trimEnd().split('\n')).toHaveLength(1);
      expect(ran.out).toContain('"name":"good.csv"');
    },
  );

  test('of 2 GB is refused without being read', async () => {
    const big = write(folder, 'big.csv', '');
    truncateSync(big, 2 * 1024 ** 3);
    const began = performance.now();
    const ran = await lampwright('diagnose', big);
    expect(performance.now() - began).toBeLessThan(500);
    expect(ran.status).toBe(1);
    expect(ran.error).toContain('expected at most 64 MiB, found 2048 MiB, which was not read');
  });

  test('that is not there is named with its path', async () => {
    const ran = await lampwright('diagnose', join(folder, 'missing.csv'), good, '--ndjson');
    expect(ran.status).toBe(1);
    expect(ran.error).toContain(`"${join(folder, 'missing.csv')}"`);
    expect(ran.out).toContain('"name":"good.csv"');
  });

  test('alone leaves standard output empty', async () => {
    const ran = await lampwright('diagnose', join(folder, 'missing.csv'), '--json');
    expect(ran.out).toBe('');
  });

  test('in a list leaves valid JSON', async () => {
    const ran = await lampwright(
      'diagnose',
      join(folder, 'missing.csv'),
      join(folder, 'missing-too.csv'),
      '--json',
    );
    expect(JSON.parse(ran.out)).toEqual([]);
    expect(ran.errorLines).toHaveLength(2);
  });
});

test('a folder without recordings says what endings it looked for', async () => {
  const empty = join(folder, 'empty');
  mkdirSync(empty);
  const ran = await lampwright('diagnose', empty, good, '--ndjson');
  expect(ran.status).toBe(1);
  expect(ran.error).toContain('.csv, .txt, .tsv, .dat or .asc');
  expect(ran.out).toContain('"name":"good.csv"');
});

describe('a bad companion', () => {
  const fails = async (...words: string[]): Promise<string> => {
    const ran = await lampwright('diagnose', good, ...words, '--json');
    expect(ran.status).toBe(1);
    expect(ran.errorLines).toHaveLength(1);
    expect(ran.out).toBe('');
    return ran.error;
  };

  test('response that does not cover a line', async () => {
    const table = write(folder, 'short-response.csv', 'nm,response\n600,1\n640,1\n700,1\n');
    expect(await fails('--response', table)).toMatch(
      /response table "short-response\.csv": expected rows that reach H-\w+ at \d+\.\d nm, found 600\.0 to 700\.0 nm/,
    );
  });

  test('dark of another length', async () => {
    const dark = write(
      folder,
      'short-dark.csv',
      ramp(40, (i) => [400 + i, 100]),
    );
    expect(await fails('--dark', dark)).toMatch(
      /Cannot use the dark "short-dark\.csv": expected \d+ .+, found 40/,
    );
  });

  test('dark that is not there', async () => {
    expect(await fails('--dark', join(folder, 'no-dark.csv'))).toContain('Cannot use the dark "no-dark.csv"');
  });

  test('bench file with an unknown field', async () => {
    const bench = write(folder, 'typo.json', '{\n  "lamp": {\n    "presurePa": 3\n  }\n}\n');
    expect(await fails('--bench', bench)).toMatch(/bench file "typo\.json", line 3: .*presurePa/);
  });

  test('bench file that is no JSON', async () => {
    const bench = write(folder, 'broken.json', '{\n  "lamp": {,\n}\n');
    expect(await fails('--bench', bench)).toMatch(/bench file "broken\.json", line 2/);
  });

  test('bench file that names a dark that is not there', async () => {
    const bench = write(folder, 'names.json', '{"dark": {"file": "gone.csv"}}');
    expect(await fails('--bench', bench)).toContain('Cannot use the dark "gone.csv"');
  });

  test('bench file of a folder is one complaint, however many recordings the folder holds', async () => {
    const batch = join(folder, 'bad-bench');
    mkdirSync(batch);
    await goodRecording(batch, 'a.csv');
    await goodRecording(batch, 'b.csv');
    writeFileSync(join(batch, 'bench.json'), '{"colour": "red"}');
    const ran = await lampwright('diagnose', batch, good, '--ndjson');
    expect(ran.status).toBe(1);
    expect(ran.errorLines).toHaveLength(1);
    expect(ran.out.trimEnd().split('\n')).toHaveLength(1);
  });
});

test('the demo folder is diagnosed as it stands, without its dark and response', async () => {
  const ran = await lampwright('diagnose', join(projectRoot, 'assets', 'demo'), '--json');
  expect(ran).toMatchObject({ status: 0, error: '' });
  const list = JSON.parse(ran.out) as Diagnosis[];
  expect(list.map(({ recording, verdict }) => [recording.name, verdict])).toEqual([
    ['t07-0411.csv', 'sound'],
    ['t07-0412.csv', 'use with care'],
    ['t07-0413.csv', 'not defensible'],
  ]);
});
