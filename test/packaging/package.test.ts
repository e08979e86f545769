import { spawn, spawnSync } from 'node:child_process';
import { mkdirSync, readdirSync, writeFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { dirname, join } from 'node:path';
import { beforeAll, describe, expect, test } from 'vitest';
import { temporaryFolder } from '../support/bench-folder.ts';
import { enterLoopback } from '../support/loopback-bridge.ts';
import { projectRoot } from '../support/source-files.ts';
import { fuseWire, readAsar, readFuses } from './read-package.ts';

/**
 * Packs the program around a stand-in for Electron's binary: no network is needed, and archive, file rules and
 * fuses are really made. Packing runs on Linux only; the installers of other systems need tools from the network.
 */
const isLinux = process.platform === 'linux';

describe.skipIf(!isLinux)('the packaged program (packed on Linux only)', () => {
  const folder = temporaryFolder();
  const packed = join(folder, 'release', 'linux-unpacked');
  const extracted = join(folder, 'extracted');
  let files: Map<string, Uint8Array>;

  beforeAll(() => {
    const stub = join(folder, 'electron');
    mkdirSync(join(stub, 'resources'), { recursive: true });
    mkdirSync(join(stub, 'locales'));
    writeFileSync(join(stub, 'electron'), fuseWire, { mode: 0o755 });
    writeFileSync(join(stub, 'version'), '45.5.0');
    writeFileSync(join(stub, 'LICENSE'), 'stand-in');
    writeFileSync(join(stub, 'LICENSES.chromium.html'), 'stand-in');
    for (const language of ['en-US', 'de']) writeFileSync(join(stub, 'locales', `${language}.pak`), '');
    const builder = join(projectRoot, 'node_modules', 'electron-builder', 'cli.js');
    const run = spawnSync(
      process.execPath,
      [
        builder,
        '--linux',
        'dir',
        `-c.electronDist=${stub}`,
        `-c.directories.output=${join(folder, 'release')}`,
      ],
      { cwd: projectRoot, encoding: 'utf8' },
    );
    if (run.status !== 0) throw new Error(run.stdout + run.stderr);
    files = readAsar(join(packed, 'resources', 'app.asar'));
    for (const [name, bytes] of files) {
      mkdirSync(dirname(join(extracted, name)), { recursive: true });
      writeFileSync(join(extracted, name), bytes);
    }
  }, 120_000);

  test('holds what it runs on, and no sources, packages or maps', () => {
    const names = [...files.keys()];
    for (const name of [
      'package.json',
      'LICENSE',
      'electron/launch/main.cjs',
      'out/desktop/entry.cjs',
      'out/loopback/entry.cjs',
      'out/command-line/entry.cjs',
      'out/services/compute-worker.cjs',
      'out/preload/preload.cjs',
      'out/renderer/index.html',
      'assets/lines/lines.csv',
      'assets/demo/bench.json',
    ]) {
      expect(names).toContain(name);
    }
    expect(
      names.filter((name) => /\.tsx?$|\.map$|node_modules|^test\/|out\/bench|\.built-/.test(name)),
    ).toEqual([]);
  });

  test('has the fuses blown that would let others run it as their own', () => {
    expect(readFuses(join(packed, 'lampwright'))).toMatchObject({
      runAsNode: false,
      nodeOptions: false,
      nodeCliInspect: false,
      embeddedAsarIntegrity: true,
      onlyLoadAppFromAsar: true,
      grantFileProtocolExtraPrivileges: false,
    });
  });

  test('carries one language of the browser', () => {
    expect(readdirSync(join(packed, 'locales'))).toEqual(['en-US.pak']);
  });

  test('is complete: the command runs from it alone', () => {
    const script = `require(${JSON.stringify(join(extracted, 'out/command-line/entry.cjs'))})
      .runCommandLine(['diagnose', ${JSON.stringify(join(extracted, 'assets/demo'))}, '--ndjson'])
      .then((status) => process.exit(status));`;
    const run = spawnSync(process.execPath, ['-e', script], { cwd: folder, encoding: 'utf8' });
    expect(run.stderr).toBe('');
    expect(run.status).toBe(0);
    expect(run.stdout).toContain('"schema":"lampwright.diagnosis/1"');
  });

  test('is complete: the browser host runs from it alone', async () => {
    const child = spawn(process.execPath, [join(extracted, 'out/loopback/entry.cjs')], {
      cwd: folder,
      env: { ...process.env, LAMPWRIGHT_OPEN: 'no' },
    });
    try {
      const address = await new Promise<string>((resolve, reject) => {
        let said = '';
        child.stdout.setEncoding('utf8').on('data', (text: string) => {
          said += text;
          const found = /http:\S+/.exec(said)?.[0];
          if (found !== undefined) resolve(found);
        });
        child.on('close', () => reject(new Error(`the host ended: ${said}`)));
      });
      const session = await enterLoopback(address);
      expect(await session.bridge.call('demo.open', {})).toMatchObject({ ok: true });
      const page = await fetch(session.origin, { headers: { cookie: session.cookie } });
      expect(page.status).toBe(200);
      session.close();
    } finally {
      child.kill('SIGTERM');
    }
  });

  test('begins at one file that opens the window, or runs a command given to it', () => {
    const begin = (words: string[]): string => {
      const script = `
        const Module = require('node:module');
        const load = Module._load;
        Module._load = (name, ...rest) => {
          if (name === 'electron') return { app: { exit: (status) => process.exit(status) } };
          if (name.endsWith('desktop/entry.cjs')) { console.log('window'); return {}; }
          return load(name, ...rest);
        };
        process.argv = ['lampwright', ...${JSON.stringify(words)}];
        require(${JSON.stringify(join(extracted, 'electron/launch/main.cjs'))});`;
      return spawnSync(process.execPath, ['-e', script], { encoding: 'utf8' }).stdout;
    };
    expect(begin([])).toBe('window\n');
    expect(begin(['--version'])).toBe('lampwright 0.1.0\n');
    expect(begin(['--enable-features=Whatever'])).toBe('window\n');
  });
});

test('the configuration for the installers of all systems is valid, and a misspelt key is not', async () => {
  const require = createRequire(import.meta.url);
  const builderPath = createRequire(require.resolve('electron-builder/package.json'));
  const { getConfig, validateConfiguration } = builderPath('app-builder-lib/out/util/config/config.js') as {
    getConfig: (folder: string, path: string, given: null) => Promise<object>;
    validateConfiguration: (config: object, logger: object) => Promise<void>;
  };
  const logger = { isEnabled: false, add: () => undefined };
  const config = await getConfig(projectRoot, join(projectRoot, 'electron-builder.yml'), null);
  await expect(validateConfiguration(config, logger)).resolves.toBeUndefined();
  await expect(validateConfiguration({ ...config, nsis: { oneclick: true } }, logger)).rejects.toThrow(
    'configuration.nsis',
  );
});
