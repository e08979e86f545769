import { type ChildProcess, spawn } from 'node:child_process';
import { createServer } from 'node:http';
import { chmodSync, mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import type { AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, describe, expect, test } from 'vitest';
import { electronBinary, fetchElectron } from '../../electron/launch/electron-binary.mjs';
import { openerFor } from '../../electron/loopback/open-browser.ts';
import { projectRoot } from '../support/source-files.ts';

const children: ChildProcess[] = [];
const folders: string[] = [];
afterEach(() => {
  for (const child of children.splice(0)) child.kill('SIGTERM');
  for (const folder of folders.splice(0)) rmSync(folder, { recursive: true });
});

interface Said {
  out: string;
  error: string;
}

/** Starts the launcher without a screen and waits until `isEnough` of what it says, or until it ends. */
function start(args: string[], isEnough: (said: Said) => boolean): Promise<Said & { status: number | null }> {
  const { DISPLAY: _display, WAYLAND_DISPLAY: _wayland, ...environment } = process.env;
  const child = spawn(process.execPath, ['electron/launch/start.mjs', ...args], {
    cwd: projectRoot,
    env: environment,
  });
  children.push(child);
  const said = { out: '', error: '' };
  return new Promise((resolve) => {
    const look = (): void => {
      if (isEnough(said)) resolve({ ...said, status: null });
    };
    child.stdout.setEncoding('utf8').on('data', (text: string) => {
      said.out += text;
      look();
    });
    child.stderr.setEncoding('utf8').on('data', (text: string) => {
      said.error += text;
      look();
    });
    child.on('close', (status) => resolve({ ...said, status }));
  });
}

const isLinux = process.platform === 'linux';

describe.skipIf(!isLinux)('npm start without a screen (a Linux matter)', () => {
  test('says in one line why it is not Electron, and gives an address that answers', async () => {
    const said = await start([], ({ out }) => out.includes('\n'));
    expect(said.error.trim()).toBe('Electron not used (no display); running in the browser instead.');
    const address = /http:\/\/127\.0\.0\.1:\d+\/\?t=\S+/.exec(said.out)?.[0] ?? '';
    expect((await fetch(address, { redirect: 'manual' })).status).toBe(303);
  });

  test('fails with one line when Electron is asked for', async () => {
    const said = await start(['--electron'], () => false);
    expect(said.status).toBe(1);
    expect(said.error.trim()).toBe('Electron cannot be used (no display).');
  });
});

test('npm start refuses an option it does not know', async () => {
  const said = await start(['--elektron'], () => false);
  expect(said.status).toBe(2);
  expect(said.error).toContain('"--elektron"');
});

describe('looking for Electron', () => {
  /** A project folder with an Electron package whose installer is `installer`. */
  function project(installer: string): string {
    const root = mkdtempSync(join(tmpdir(), 'lampwright-electron-'));
    folders.push(root);
    const folder = join(root, 'node_modules', 'electron');
    mkdirSync(join(folder, 'dist'), { recursive: true });
    writeFileSync(join(folder, 'package.json'), '{"type":"commonjs"}');
    writeFileSync(join(folder, 'install.js'), installer);
    return root;
  }

  test('finds a binary that is there and can be run', () => {
    const root = project('');
    const folder = join(root, 'node_modules', 'electron');
    expect(electronBinary(root)).toBeNull();
    writeFileSync(join(folder, 'path.txt'), 'electron');
    writeFileSync(join(folder, 'dist', 'electron'), '');
    chmodSync(join(folder, 'dist', 'electron'), 0o755);
    expect(electronBinary(root)).toBe(join(folder, 'dist', 'electron'));
  });

  test("gives the installer's own reason", async () => {
    const root = project(
      "console.error('TypeError: fetch failed\\n    at somewhere'); process.exitCode = 1;",
    );
    expect(await fetchElectron(root, 10_000)).toEqual({ reason: 'TypeError: fetch failed' });
  });

  test('ends an installer that does not answer within the limit', async () => {
    const server = createServer(() => undefined);
    await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
    const { port } = server.address() as AddressInfo;
    const root = project(`require('node:http').get('http://127.0.0.1:${String(port)}/');`);
    const began = Date.now();
    expect(await fetchElectron(root, 500)).toEqual({ reason: 'no answer in 0.5 s' });
    expect(Date.now() - began).toBeLessThan(5_000);
    server.closeAllConnections();
    server.close();
  });

  test('takes what the installer fetched', async () => {
    const root = project(`
      const { writeFileSync } = require('node:fs');
      writeFileSync(__dirname + '/path.txt', 'electron');
      writeFileSync(__dirname + '/dist/electron', '', { mode: 0o755 });`);
    expect(await fetchElectron(root, 10_000)).toEqual({
      path: join(root, 'node_modules', 'electron', 'dist', 'electron'),
    });
  });
});

describe('opening a browser', () => {
  test('is not tried on Linux without a screen', () => {
    expect(openerFor('linux', {})).toBeNull();
  });

  test.each([
    ['linux', { DISPLAY: ':0' }, 'xdg-open'],
    ['linux', { WAYLAND_DISPLAY: 'wayland-0' }, 'xdg-open'],
    ['darwin', {}, 'open'],
    ['win32', {}, 'rundll32'],
  ] as const)('on %s with %j goes through %s, never through a shell', (platform, environment, command) => {
    expect(openerFor(platform, environment)?.command).toBe(command);
  });
});
