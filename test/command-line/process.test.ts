import { spawn, spawnSync } from 'node:child_process';
import { cpSync, mkdirSync } from 'node:fs';
import { join } from 'node:path';
import { beforeAll, describe, expect, test } from 'vitest';
import { goodRecording, temporaryFolder } from '../support/bench-folder.ts';
import { lampwright } from '../support/command.ts';
import { projectRoot } from '../support/source-files.ts';

const command = join(projectRoot, 'electron', 'launch', 'lampwright.mjs');
const folder = temporaryFolder();
let good: string;

beforeAll(async () => {
  good = await goodRecording(folder, 'good.csv');
});

const start = (...words: string[]) =>
  spawnSync(process.execPath, [command, ...words], { encoding: 'utf8', cwd: folder });

describe('the built command', () => {
  test.each([
    [0, ['--version']],
    [0, ['diagnose', 'good.csv']],
    [1, ['diagnose', 'missing.csv']],
    [2, ['diagnose']],
  ])('ends with status %d for %j', (status, words) => {
    expect(start(...words).status).toBe(status);
  });

  test('prints what its sources print, byte for byte', async () => {
    expect(start('diagnose', 'good.csv', '--json').stdout).toBe(
      (await lampwright('diagnose', good, '--json')).out,
    );
  });

  test('ends quietly when its reader goes', async () => {
    const many = join(folder, 'many');
    mkdirSync(many);
    for (let index = 0; index < 40; index += 1) cpSync(good, join(many, `${String(100 + index)}.csv`));
    const child = spawn(process.execPath, [command, 'diagnose', many, '--ndjson']);
    let said = '';
    child.stderr.setEncoding('utf8').on('data', (text: string) => (said += text));
    child.stdout.once('data', () => child.stdout.destroy());
    const status = await new Promise((resolve) => child.on('close', resolve));
    expect(status).toBe(0);
    expect(said).toBe('');
  });

  test('shows each recording as it is done', async () => {
    const child = spawn(process.execPath, [command, 'diagnose', join(folder, 'many'), '--ndjson']);
    const pieces: number[] = [];
    child.stdout.on('data', () => pieces.push(performance.now()));
    await new Promise((resolve) => child.on('close', resolve));
    expect(pieces.length).toBeGreaterThan(3);
  });
});
