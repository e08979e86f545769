import { mkdirSync } from 'node:fs';
import { join } from 'node:path';
import { expect, test } from 'vitest';
import { temporaryFolder, write } from '../support/bench-folder.ts';
import { lampwright } from '../support/command.ts';

const folder = temporaryFolder();
mkdirSync(join(folder, 'several'));
write(folder, 'several/a.csv', '1,2\n');
write(folder, 'several/b.csv', '1,2\n');
const simulate = ['simulate', '--temperature', '6000', '--electron-density', '1e20'];

test.each([
  ['no command', []],
  ['an unknown command', ['diagnoze', 'a.csv']],
  ['a name every object has', ['toString']],
  ['no recording', ['diagnose']],
  ['an empty path', ['diagnose', '']],
  ['an unknown option', ['diagnose', 'a.csv', '--jsn']],
  ['an option without its value', ['diagnose', 'a.csv', '--bench']],
  ['a value where none belongs', ['diagnose', 'a.csv', '--json=yes']],
  ['two formats', ['diagnose', 'a.csv', '--json', '--csv']],
  ['an empty value', ['diagnose', 'a.csv', '--dark', '']],
  ['a report as PDF', ['diagnose', 'a.csv', '--report', 'a.pdf']],
  ['a report of another kind', ['diagnose', 'a.csv', '--report', 'a.docx']],
  ['one report for several recordings', ['diagnose', join(folder, 'several'), '--report', 'a.html']],
  ['no temperature', ['simulate', '--electron-density', '1e20', '--out', 'a.csv']],
  [
    'a temperature that is no number',
    ['simulate', '--temperature', 'hot', '--electron-density', '1e20', '--out', 'a'],
  ],
  [
    'a temperature below any plasma',
    ['simulate', '--temperature', '0', '--electron-density', '1e20', '--out', 'a'],
  ],
  [
    'an infinite density',
    ['simulate', '--temperature', '6000', '--electron-density', 'Infinity', '--out', 'a'],
  ],
  ['a negative number', ['simulate', '--temperature', '-5', '--electron-density', '1e20', '--out', 'a']],
  ['a broken count', [...simulate, '--count', '1.5', '--out', 'a']],
  ['no place to write to', simulate],
  ['a path too many', [...simulate, '--out', 'a', 'b']],
  ['lines that end before they begin', ['lines', '--from', '700', '--to', '400']],
  ['a wavelength that is none', ['lines', '--from', 'blue']],
  ['a word that lines does not know', ['lines', 'mercury']],
  ['--version with more', ['--version', 'x']],
])('refuses %s with status 2 and one line', async (_what, words) => {
  const ran = await lampwright(...words);
  expect(ran.status).toBe(2);
  expect(ran.errorLines).toHaveLength(1);
  expect(ran.errorLines[0]).toMatch(/^lampwright: .+\. "lampwright --help" shows the usage\.$/);
  expect(ran.out).toBe('');
});

test('says that PDF is not there and HTML is', async () => {
  const { error } = await lampwright('diagnose', 'a.csv', '--report', 'a.PDF');
  expect(error).toContain('reports as PDF are not there yet; HTML is');
});

test('shows the usage when asked, whatever else is said', async () => {
  const help = await lampwright('--help');
  expect(help).toMatchObject({ status: 0, error: '' });
  for (const word of ['diagnose', 'simulate', 'lines', '--ndjson', 'bench.json', 'Exit status']) {
    expect(help.out).toContain(word);
  }
  expect((await lampwright('diagnose', '--help')).out).toBe(help.out);
});

test('states its version', async () => {
  expect(await lampwright('--version')).toMatchObject({ status: 0, out: 'lampwright 0.1.0\n' });
});
