import { cpSync, existsSync, mkdirSync, readFileSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import { basename, join } from 'node:path';
import { beforeAll, describe, expect, test } from 'vitest';
import { type Diagnosis, diagnosisSchema } from '../../shared-core/diagnosis/diagnosis.ts';
import { recordingToCsv } from '../../shared-core/recording/write-csv.ts';
import { goodRecording, temporaryFolder, write } from '../support/bench-folder.ts';
import { simulateRecording } from '../../shared-core/simulation/simulate-recording.ts';
import { lampwright } from '../support/command.ts';
import { readCsv } from '../support/read-csv.ts';
import { pseudoVoigt, referenceLamp } from '../support/reference-lamp.ts';
import { drawPair, pairDetector, pairMeans } from '../support/simulate-pair.ts';

const folder = temporaryFolder();
let one: string;
let two: string;

beforeAll(async () => {
  one = await goodRecording(folder, 'one.csv');
  two = await goodRecording(folder, 'two.csv');
});

const parse = (text: string): Diagnosis => diagnosisSchema.parse(JSON.parse(text));

describe('--json', () => {
  test('prints one object for one file', async () => {
    const ran = await lampwright('diagnose', one, '--json');
    expect(ran).toMatchObject({ status: 0, error: '' });
    expect(parse(ran.out).recording.name).toBe('one.csv');
    expect(ran.out.endsWith('}\n')).toBe(true);
  });

  test('prints an array in input order for several files', async () => {
    const ran = await lampwright('diagnose', two, one, '--json');
    const list = JSON.parse(ran.out) as Diagnosis[];
    expect(list.map(({ recording }) => recording.name)).toEqual(['two.csv', 'one.csv']);
  });

  test('prints an array for a folder, sorted by name, without what is no recording', async () => {
    const batch = join(folder, 'batch');
    mkdirSync(join(batch, 'inner.csv'), { recursive: true });
    for (const name of ['b.txt', 'a.csv', 'C.dat', '.hidden.csv', 'd.csv.part', 'e.tmp', 'f.png']) {
      cpSync(one, join(batch, name));
    }
    const ran = await lampwright('diagnose', batch, '--json');
    expect(ran.status).toBe(0);
    const list = JSON.parse(ran.out) as Diagnosis[];
    expect(list.map(({ recording }) => recording.name)).toEqual(['C.dat', 'a.csv', 'b.txt']);
  });

  test('prints the same bytes each time, and the same object alone as in a list', async () => {
    const first = await lampwright('diagnose', one, '--json');
    const again = await lampwright('diagnose', one, '--json');
    const list = await lampwright('diagnose', one, two, '--json');
    expect(again.out).toBe(first.out);
    expect(list.out).toContain(first.out.trimEnd());
  });
});

test('--ndjson prints one object a line, equal to --json', async () => {
  const ran = await lampwright('diagnose', one, two, '--ndjson');
  const lines = ran.out.trimEnd().split('\n');
  expect(lines.map((line) => parse(line).recording.name)).toEqual(['one.csv', 'two.csv']);
  const json = await lampwright('diagnose', one, '--json');
  expect(JSON.stringify(JSON.parse(json.out))).toBe(lines[0]);
});

test('--csv prints a head and a row a recording, with the numbers of --json', async () => {
  const ran = await lampwright('diagnose', one, two, '--csv');
  const rows = readCsv(ran.out);
  const diagnosis = parse((await lampwright('diagnose', one, '--json')).out);
  expect(rows.map((row) => row['recording'])).toEqual(['one.csv', 'two.csv']);
  expect(Number(rows[0]?.['kelvin'])).toBe(diagnosis.temperature.kelvin);
  expect(rows[0]?.['verdict']).toBe(diagnosis.verdict);
  expect(rows[0]?.['sha256']).toBe(diagnosis.recording.sha256);
});

test('a name that a spreadsheet would compute is defused in --csv', async () => {
  const sly = join(folder, '=1+1.csv');
  cpSync(one, sly);
  const ran = await lampwright('diagnose', sly, '--csv');
  expect(readCsv(ran.out)[0]?.['recording']).toBe("'=1+1.csv");
});

describe('for people', () => {
  test('one recording is a sheet with the answer, every line and the verdict', async () => {
    const ran = await lampwright('diagnose', one);
    const diagnosis = parse((await lampwright('diagnose', one, '--json')).out);
    expect(ran.status).toBe(0);
    expect(ran.out).toContain(`Verdict      ${diagnosis.verdict}`);
    for (const line of diagnosis.lines) expect(ran.out).toMatch(new RegExp(`^${line.id} `, 'm'));
    for (const row of ran.out.split('\n')) expect(row).toBe(row.trimEnd());
  });

  test('several are a row each', async () => {
    const ran = await lampwright('diagnose', one, two);
    const rows = ran.out.trimEnd().split('\n');
    expect(rows).toHaveLength(3);
    expect(rows[1]?.startsWith('one.csv')).toBe(true);
  });
});

/** A pair written to files; returns their paths. */
function pairFiles(into: string): Record<'alone' | 'mirror' | 'source' | 'through', string> {
  const means = pairMeans({
    column: 1e16,
    gasKelvin: 800,
    lorentzNm: () => 0.002,
    instrumentFwhmNm: 0.18,
    thinElectrons: ({ upperLevel }) => 300_000 * [1, 0.25, 0.1, 0.05, 0.03][upperLevel - 3]!,
    continuumElectrons: 100,
    mirrorGain: 0.8,
    sourceElectrons: 200_000,
  });
  const counts = drawPair(means, 3);
  const written = (part: keyof typeof counts): string =>
    write(into, `${part}.csv`, recordingToCsv({ wavelengthNm: means.wavelengthNm, signal: counts[part] }));
  return {
    alone: written('alone'),
    mirror: written('mirror'),
    source: written('source'),
    through: written('through'),
  };
}
const pairBench = { detector: pairDetector, lamp: { gasTemperatureK: 800, pathLengthMm: 10 } };

test('--profile measures the instrument on a lamp with sharp lines, and the sheet says with what result', async () => {
  const lamp = referenceLamp(() => pseudoVoigt(0.18, 0.1));
  const path = write(folder, 'mercury-pencil.csv', recordingToCsv(lamp));
  const simulated = simulateRecording({ bench: {}, kelvin: 6000, electronsPerCubicMetre: 1e20, seed: 4 });
  const tube = write(folder, 'tube-beside-lamp.csv', recordingToCsv(simulated));
  const ran = await lampwright('diagnose', tube, '--profile', path);
  expect(ran).toMatchObject({ status: 0, error: '' });
  expect(ran.out).toContain('Instrument profile from 6 lines of mercury-pencil.csv: FWHM 0.1');
});

describe('--mirror, --source and --through', () => {
  let files: ReturnType<typeof pairFiles>;
  let benchPath: string;
  beforeAll(() => {
    const own = join(folder, 'pair-files');
    mkdirSync(own);
    files = pairFiles(own);
    benchPath = write(own, 'bench.json', JSON.stringify(pairBench));
  });

  test('measure the optical depth, and the sheet says what they show', async () => {
    const words = ['--mirror', files.mirror, '--source', files.source, '--through', files.through];
    const ran = await lampwright('diagnose', files.alone, '--bench', benchPath, ...words);
    expect(ran).toMatchObject({ status: 0, error: '' });
    expect(ran.out).toMatch(/\nOptical depth\n {2}H-alpha grows /);
    expect(ran.out).toContain('in the light of the source');
  });

  test('a source without the recording through the tube is noted', async () => {
    const ran = await lampwright('diagnose', files.alone, '--source', files.source, '--json');
    expect(ran.status).toBe(0);
    expect(parse(ran.out).notes.join(' ')).toContain('absorption needs');
  });

  test('another axis is one clear sentence, and status 1', async () => {
    const ran = await lampwright('diagnose', files.alone, '--mirror', write(folder, 'short.csv', shortTable));
    expect(ran.status).toBe(1);
    expect(ran.errorLines).toHaveLength(1);
    expect(ran.error).toContain('Cannot use the mirror recording "short.csv"');
  });

  test('a mirror recording that is not there is named', async () => {
    const ran = await lampwright('diagnose', files.alone, '--mirror', join(folder, 'nowhere.csv'));
    expect(ran.status).toBe(1);
    expect(ran.error).toContain('mirror recording');
  });

  test.each(['--mirror', '--source', '--through'])('%s wants a path', async (option) => {
    expect((await lampwright('diagnose', files.alone, option, '')).status).toBe(2);
  });
});

const shortTable = Array.from(
  { length: 50 },
  (_, px) => `${String(400 + px)},${String(1000 + (px % 5))}`,
).join('\n');

describe('the bench file', () => {
  const bench = { schema: 'lampwright.bench/1', name: 'Bench 3' };

  test('of a folder is used for the folder, and its dark and response are no recordings', async () => {
    const own = join(folder, 'own');
    mkdirSync(own);
    cpSync(one, join(own, 'lamp.csv'));
    cpSync(one, join(own, 'dark.csv'));
    writeFileSync(join(own, 'response.csv'), 'nm,response\n300,1\n800,1\n');
    const named = { ...bench, dark: { file: 'dark.csv' }, response: { file: 'response.csv' } };
    writeFileSync(join(own, 'bench.json'), JSON.stringify(named));
    const list = JSON.parse((await lampwright('diagnose', own, '--json')).out) as Diagnosis[];
    expect(list.map(({ recording }) => recording.name)).toEqual(['lamp.csv']);
    expect(list[0]?.inputs).toMatchObject({ dark: { name: 'dark.csv' }, response: { name: 'response.csv' } });
  });

  test('beside a recording that is named itself is not used, and the sheet says so', async () => {
    const path = join(folder, 'own', 'lamp.csv');
    const ran = await lampwright('diagnose', path, '--json');
    expect(parse(ran.out).inputs).toEqual({
      bench: null,
      dark: null,
      response: null,
      profile: null,
      mirror: null,
      source: null,
      through: null,
    });
    expect((await lampwright('diagnose', path)).out).toContain('was not used; give it with --bench.');
  });

  test('given by --bench finds its files beside itself, from wherever the command runs', async () => {
    const benchPath = join(folder, 'own', 'bench.json');
    const given = await lampwright('diagnose', one, '--bench', benchPath, '--json');
    expect(parse(given.out).inputs.dark?.name).toBe('dark.csv');
  });

  test('names mirror, source and through recordings, which are no recordings of the folder either', async () => {
    const pair = join(folder, 'pair');
    mkdirSync(pair);
    const { mirror, source, through } = pairFiles(pair);
    cpSync(join(pair, 'alone.csv'), join(pair, 'lamp.csv'));
    rmSync(join(pair, 'alone.csv'));
    const named = {
      ...bench,
      ...pairBench,
      mirror: { file: basename(mirror) },
      absorption: { sourceFile: basename(source), throughFile: basename(through) },
    };
    writeFileSync(join(pair, 'bench.json'), JSON.stringify(named));
    const list = JSON.parse((await lampwright('diagnose', pair, '--json')).out) as Diagnosis[];
    expect(list.map(({ recording }) => recording.name)).toEqual(['lamp.csv']);
    expect(list[0]?.opticalDepths.filter(({ lineId }) => lineId === 'H-alpha')).toMatchObject([
      { method: 'mirror', status: 'measured' },
      { method: 'absorption', status: 'measured' },
    ]);
  });

  test('yields to --dark and --response', async () => {
    const own = join(folder, 'own');
    const otherDark = join(folder, 'other-dark.csv');
    cpSync(join(own, 'dark.csv'), otherDark);
    const ran = await lampwright('diagnose', own, '--dark', otherDark, '--json');
    const list = JSON.parse(ran.out) as Diagnosis[];
    expect(list.at(-1)?.inputs.dark?.name).toBe('other-dark.csv');
  });

  test('--dark inside the folder is no recording of it', async () => {
    const plain = join(folder, 'plain');
    mkdirSync(plain);
    cpSync(one, join(plain, 'lamp.csv'));
    cpSync(one, join(plain, 'night.csv'));
    const ran = await lampwright('diagnose', plain, '--dark', join(plain, 'night.csv'), '--json');
    const list = JSON.parse(ran.out) as Diagnosis[];
    expect(list.map(({ recording }) => recording.name)).toEqual(['lamp.csv']);
  });
});

describe('--report', () => {
  test('writes one HTML file that stands alone', async () => {
    const path = join(folder, 'report.html');
    const ran = await lampwright('diagnose', one, '--report', path, '--json');
    expect(ran.status).toBe(0);
    const html = readFileSync(path, 'utf8');
    expect(html.toLowerCase().startsWith('<!doctype html>')).toBe(true);
    expect(html).not.toMatch(/<script|src="http|href="http[^"]*\.(css|js)/);
    expect(html).toContain(parse(ran.out).verdict);
  });

  test('into a folder writes one a recording, called after it', async () => {
    const reports = join(folder, 'reports');
    mkdirSync(reports);
    const twin = join(folder, 'twin');
    mkdirSync(twin);
    cpSync(one, join(twin, 'one.csv'));
    expect((await lampwright('diagnose', one, two, join(twin, 'one.csv'), '--report', reports)).status).toBe(
      0,
    );
    expect(readdirSync(reports).sort()).toEqual(['one.csv-2.html', 'one.csv.html', 'two.csv.html']);
  });

  test('that cannot be written is status 1 with the reason, and the result is still printed', async () => {
    const ran = await lampwright('diagnose', one, '--report', join(folder, 'missing', 'a.html'), '--json');
    expect(ran.status).toBe(1);
    expect(ran.errorLines).toHaveLength(1);
    expect(ran.error).toContain('no such file');
    expect(parse(ran.out).recording.name).toBe('one.csv');
  });

  test('leaves no temporary file behind', () => {
    expect(readdirSync(folder).filter((name) => name.endsWith('.tmp'))).toEqual([]);
    expect(existsSync(write(folder, basename('end.txt'), ''))).toBe(true);
  });
});

test('--monte-carlo checks the interval, in JSON and in the sheet, the same each time', async () => {
  const ran = await lampwright('diagnose', one, '--json', '--monte-carlo');
  const { monteCarlo, temperature } = parse(ran.out);
  expect(monteCarlo).toMatchObject({ seed: 1, coverage: temperature.coverage });
  expect(monteCarlo!.trials).toBeGreaterThanOrEqual(20_000);
  expect(monteCarlo!.lowKelvin!).toBeLessThan(monteCarlo!.medianKelvin!);
  expect(monteCarlo!.medianKelvin!).toBeLessThan(monteCarlo!.highKelvin!);
  const again = await lampwright('diagnose', one, '--json', '--monte-carlo');
  expect(again.out).toBe(ran.out);
  const sheet = await lampwright('diagnose', one, '--monte-carlo');
  expect(sheet.out.replace(/\s+/g, ' ')).toContain(monteCarlo!.text);
  const plain = await lampwright('diagnose', one, '--json');
  expect(parse(plain.out).monteCarlo).toBeNull();
});
