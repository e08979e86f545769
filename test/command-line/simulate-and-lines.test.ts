import { mkdirSync, readFileSync, readdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { expect, test } from 'vitest';
import type { Diagnosis } from '../../shared-core/diagnosis/diagnosis.ts';
import { temporaryFolder } from '../support/bench-folder.ts';
import { lampwright } from '../support/command.ts';

const folder = temporaryFolder();
const at = (...more: string[]): string[] => [
  'simulate',
  '--temperature',
  '7000',
  '--electron-density',
  '5e20',
  ...more,
];

test('the same seed gives the same file, another seed another', async () => {
  const read = async (name: string, seed: string): Promise<string> => {
    expect((await lampwright(...at('--seed', seed, '--out', join(folder, name)))).status).toBe(0);
    return readFileSync(join(folder, name), 'utf8');
  };
  const first = await read('a.csv', '5');
  expect(await read('b.csv', '5')).toBe(first);
  expect(await read('c.csv', '6')).not.toBe(first);
});

test('--count fills a folder, whose first file is that of the seed alone', async () => {
  const many = join(folder, 'many');
  const ran = await lampwright(...at('--seed', '5', '--count', '3', '--out', many));
  expect(ran.status).toBe(0);
  expect(readdirSync(many)).toEqual(['simulated-0001.csv', 'simulated-0002.csv', 'simulated-0003.csv']);
  expect(readFileSync(join(many, 'simulated-0001.csv'), 'utf8')).toBe(
    readFileSync(join(folder, 'a.csv'), 'utf8'),
  );
});

test('deuterium and optical depth that are asked for are found by the diagnosis', async () => {
  const bench = join(folder, 'known.json');
  writeFileSync(join(folder, 'flat.csv'), 'nm,response,sigma\n350,1,0.01\n720,1,0.01\n');
  writeFileSync(
    bench,
    JSON.stringify({
      lamp: { gasTemperatureK: 1000 },
      detector: { offsetCounts: 1000, gainElectronsPerCount: 5, readNoiseElectrons: 12 },
      instrument: { fwhmNm: 0.18, fwhmSigmaNm: 0.004 },
      response: { file: 'flat.csv' },
    }),
  );
  const out = join(folder, 'mixed.csv');
  const diagnoseWith = async (...more: string[]): Promise<Diagnosis> => {
    await lampwright(...at('--bench', bench, ...more, '--out', out));
    return JSON.parse((await lampwright('diagnose', out, '--bench', bench, '--json')).out) as Diagnosis;
  };
  const mixed = await diagnoseWith('--deuterium', '0.2');
  expect(mixed.deuterium.lowFraction!).toBeLessThan(0.2);
  expect(mixed.deuterium.highFraction!).toBeGreaterThan(0.2);
  expect((await diagnoseWith('--optical-depth', '3')).selfAbsorption.status).toBe('suspected');
  expect((await lampwright(...at('--deuterium', '1', '--out', out))).status).toBe(2);
});

test('a place that cannot be written is status 1 with the reason', async () => {
  const ran = await lampwright(...at('--out', join(folder, 'missing', 'a.csv')));
  expect(ran.status).toBe(1);
  expect(ran.errorLines).toHaveLength(1);
  expect(ran.error).toContain('no such file');
  mkdirSync(join(folder, 'a-folder'));
  expect((await lampwright(...at('--out', join(folder, 'a-folder')))).status).toBe(1);
});

test('a bench file with a misspelt field is status 1', async () => {
  const bench = join(folder, 'bench.json');
  writeFileSync(bench, '{"lampp": {}}');
  const ran = await lampwright(...at('--bench', bench, '--out', join(folder, 'd.csv')));
  expect(ran.status).toBe(1);
  expect(ran.error).toContain('lampp');
});

test.each([
  ['photon', 'counts'],
  ['energy', 'counts'],
  ['photon', 'energy'],
])(
  'what is simulated with a bench (response per %s, signal %s) is found again with it',
  async (per, signal) => {
    const own = join(folder, `${per}-${signal}`);
    mkdirSync(own);
    const response = Array.from(
      { length: 41 },
      (_, i) => `${String(350 + 10 * i)},${String(1 + 0.1 * i)},0.01`,
    );
    writeFileSync(join(own, 'response.csv'), `nm,response,sigma\n${response.join('\n')}\n`);
    writeFileSync(
      join(own, 'bench.json'),
      JSON.stringify({
        detector: { signal },
        response: { file: 'response.csv', per, correlationLengthNm: 80 },
      }),
    );
    const out = join(own, 'lamp.csv');
    const bench = join(own, 'bench.json');
    expect((await lampwright(...at('--bench', bench, '--out', out))).error).toBe('');
    const ran = await lampwright('diagnose', out, '--bench', bench, '--json');
    const { temperature } = JSON.parse(ran.out) as Diagnosis;
    expect(temperature.status).toBe('measured');
    expect(temperature.responseCorrected).toBe(true);
    const { kelvin, sigmaKelvin } = temperature;
    expect(Math.abs((kelvin ?? 0) - 7000)).toBeLessThan(4 * (sigmaKelvin ?? 0));
    expect(sigmaKelvin).toBeLessThan(500);
  },
);

test('lines lists the table, or the part between two wavelengths', async () => {
  const all = JSON.parse((await lampwright('lines', '--json')).out) as {
    id: string | null;
    wavelengthAirNm: number;
  }[];
  const some = JSON.parse(
    (await lampwright('lines', '--from', '400', '--to', '500', '--json')).out,
  ) as typeof all;
  expect(all.length).toBeGreaterThan(150);
  expect(all.map((line) => line.wavelengthAirNm)).toEqual(
    all.map((line) => line.wavelengthAirNm).sort((a, b) => a - b),
  );
  // H-beta by J. Reader, Appl. Spectrosc. 58, 1469 (2004).
  expect(all.find((line) => line.id === 'H-beta')?.wavelengthAirNm).toBeCloseTo(486.1325, 3);
  expect(some).toEqual(all.filter((line) => line.wavelengthAirNm >= 400 && line.wavelengthAirNm <= 500));
  const text = (await lampwright('lines', '--from', '400', '--to', '500')).out.trimEnd().split('\n');
  expect(text).toHaveLength(some.length + 1);
  expect(text.join('\n')).toContain('435.83');
});
