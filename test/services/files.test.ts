import { createHash } from 'node:crypto';
import {
  chmodSync,
  mkdirSync,
  readFileSync,
  readdirSync,
  statSync,
  symlinkSync,
  truncateSync,
} from 'node:fs';
import { join, posix } from 'node:path';
import { describe, expect, test } from 'vitest';
import { atomicWrite } from '../../electron/services/atomic-write.ts';
import { findRecordings, looksLikeRecording } from '../../electron/services/find-recordings.ts';
import { recordingsInFolder } from '../../electron/services/folder-with-bench.ts';
import { safePath } from '../../electron/services/page-files.ts';
import { readInputFile } from '../../electron/services/read-input-file.ts';
import { maxFileBytes } from '../../shared-core/contract/limits.ts';
import { temporaryFolder, write } from '../support/bench-folder.ts';

const folder = temporaryFolder();

describe('reading an input file', () => {
  test('gives its bytes, its name and its hash', async () => {
    const path = write(folder, 'a.csv', 'abc');
    const file = await readInputFile(path, 'recording');
    // The hash of "abc" is the first test vector of FIPS 180-4.
    expect(file).toEqual({
      ok: true,
      value: {
        name: 'a.csv',
        bytes: new TextEncoder().encode('abc'),
        sha256: 'ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad',
      },
    });
  });

  test.each([
    [maxFileBytes, true],
    [maxFileBytes + 1, false],
  ])('of %d bytes: taken is %s', async (size, isTaken) => {
    const path = write(folder, 'sized.csv', '');
    truncateSync(path, size);
    const file = await readInputFile(path, 'recording');
    expect(file.ok).toBe(isTaken);
    if (!file.ok) expect(file.problem.code).toBe('file.too-large');
  });

  test.each([
    ['a folder', folder, 'a folder'],
    ['nothing', join(folder, 'nothing'), 'no such file'],
    ['a device', '/dev/null', 'a device or pipe'],
    ['a path through a file', join(folder, 'a.csv', 'b.csv'), 'a path through something that is no folder'],
    ['a name that is too long', join(folder, 'a'.repeat(300)), 'a name that is too long'],
  ])('refuses %s and says what it found', async (_what, path, found) => {
    const file = await readInputFile(path, 'dark');
    expect(file.ok ? null : file.problem).toMatchObject({ code: 'file.unreadable', subject: 'dark', found });
  });

  test('follows a link to a file', async () => {
    symlinkSync(join(folder, 'a.csv'), join(folder, 'link.csv'));
    const file = await readInputFile(join(folder, 'link.csv'), 'recording');
    expect(file.ok && file.value.name).toBe('link.csv');
  });
});

describe('writing a file whole or not at all', () => {
  test('replaces the old content and leaves nothing else', async () => {
    const own = join(folder, 'write');
    mkdirSync(own);
    const path = write(own, 'a.txt', 'old');
    await atomicWrite(path, 'new');
    expect(readFileSync(path, 'utf8')).toBe('new');
    expect(readdirSync(own)).toEqual(['a.txt']);
  });

  test('keeps the old content when the new cannot be put there', async () => {
    const own = join(folder, 'kept');
    mkdirSync(join(own, 'target', 'full'), { recursive: true });
    await expect(atomicWrite(join(own, 'target'), 'new')).rejects.toThrow(/EISDIR|EPERM|ENOTEMPTY|EEXIST/);
    expect(readdirSync(own)).toEqual(['target']);
    expect(readdirSync(join(own, 'target'))).toEqual(['full']);
  });

  test('never shows a part of the new content to a reader', async () => {
    const path = write(folder, 'watched.txt', 'x'.repeat(1_000_000));
    const sizes = new Set<number>();
    const write100 = (async () => {
      for (let round = 0; round < 20; round += 1) await atomicWrite(path, 'y'.repeat(2_000_000));
    })();
    let isDone = false;
    void write100.finally(() => (isDone = true));
    while (!isDone) {
      sizes.add(statSync(path).size);
      await new Promise((resolve) => setImmediate(resolve));
    }
    await write100;
    sizes.add(statSync(path).size);
    expect([...sizes].filter((size) => size !== 1_000_000 && size !== 2_000_000)).toEqual([]);
    expect(sizes.has(2_000_000)).toBe(true);
  });
});

describe('finding recordings', () => {
  test.each([
    ['a.csv', true],
    ['A.CSV', true],
    ['a.txt', true],
    ['a.tsv', true],
    ['a.dat', true],
    ['a.asc', true],
    ['.a.csv', false],
    ['a.csv.part', false],
    ['a.csv.tmp', false],
    ['a.png', false],
    ['a', false],
    ['bench.json', false],
  ])('%s is taken: %s', (name, isTaken) => {
    expect(looksLikeRecording(name)).toBe(isTaken);
  });

  test('sorts by the codes of the characters, whatever the language of the machine', async () => {
    const own = join(folder, 'sorted');
    mkdirSync(own);
    for (const name of ['b.csv', 'ä.csv', 'B.csv', 'a10.csv', 'a2.csv']) write(own, name, '');
    expect(await findRecordings(own)).toEqual(['B.csv', 'a10.csv', 'a2.csv', 'b.csv', 'ä.csv']);
  });

  test('in a folder with a bench file that cannot be used leaves out nothing', async () => {
    const own = join(folder, 'odd-bench');
    mkdirSync(own);
    write(own, 'dark.csv', '');
    write(own, 'bench.json', '{');
    const found = await recordingsInFolder(own);
    expect(found.ok && found.value.recordings).toEqual([join(own, 'dark.csv')]);
  });

  test('in a folder that cannot be listed is a problem', async () => {
    const found = await recordingsInFolder(join(folder, 'nowhere'));
    expect(found.ok ? '' : found.problem.found).toBe('no such file');
  });
});

test('a path of the page stays inside its folder for 10 000 odd paths', () => {
  const pieces = ['..', '.', '/', '%2e', '%2f', '%5c', '\\', 'a', '%00', ':', '~', '%', 'index.html'];
  let state = 1;
  const next = (): number => (state = (state * 48271) % 2147483647);
  for (let round = 0; round < 10_000; round += 1) {
    const path = `/${Array.from({ length: 1 + (next() % 7) }, () => pieces[next() % pieces.length]).join('')}`;
    const safe = safePath('/srv/page', path);
    if (safe === null) continue;
    expect(posix.normalize(safe)).toBe(safe);
    expect(safe.startsWith('/srv/page/')).toBe(true);
  }
  expect(safePath('/srv/page', '/')).toBe('/srv/page/index.html');
  expect(safePath('/srv/page', '/assets/a-1.js')).toBe('/srv/page/assets/a-1.js');
});

test('a file without permission says so (root reads everything, so only as another user)', async () => {
  const path = write(folder, 'closed.csv', 'abc');
  chmodSync(path, 0o000);
  const file = await readInputFile(path, 'recording');
  if (process.getuid?.() === 0) {
    expect(file.ok && createHash('sha256').update(file.value.bytes).digest('hex')).toBe(
      file.ok && file.value.sha256,
    );
  } else expect(file.ok ? '' : file.problem.found).toBe('no permission');
});
