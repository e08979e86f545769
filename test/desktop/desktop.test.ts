import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { runInNewContext } from 'node:vm';
import { beforeEach, describe, expect, test } from 'vitest';
import { answerPage } from '../../electron/desktop/app-protocol.ts';
import { isOurPage } from '../../electron/desktop/ipc-host.ts';
import { startDesktop } from '../../electron/desktop/start-desktop.ts';
import { appRoot } from '../../electron/services/app-root.ts';
import { bridgeName, callChannel } from '../../shared-core/contract/bridge.ts';
import { double } from '../doubles/electron.ts';

const ourFrame = { url: 'app://lampwright/index.html', parent: null };

async function started(): Promise<void> {
  const start = startDesktop();
  double.state.fireReady();
  await start;
}

beforeEach(() => double.reset());

describe('start-up', () => {
  test('does nothing that needs a ready app before it is ready', async () => {
    const start = startDesktop();
    expect(double.state.isSandboxEnabled).toBe(true);
    expect(double.state.schemes.map(({ scheme }) => scheme)).toEqual(['app']);
    expect(double.state.windows).toHaveLength(0);
    double.state.fireReady();
    await start;
    expect(double.state.windows).toHaveLength(1);
  });

  test('gives way to a program that is open already', async () => {
    double.state.hasLock = false;
    await startDesktop();
    expect(double.state.hasQuit).toBe(true);
    expect(double.state.windows).toHaveLength(0);
  });

  test('registers one channel', async () => {
    await started();
    expect([...double.state.ipcHandlers.keys()]).toEqual([callChannel]);
  });
});

describe('the window', () => {
  test('is sandboxed, isolated and without Node', async () => {
    await started();
    expect(double.state.windows[0]?.options.webPreferences).toMatchObject({
      sandbox: true,
      contextIsolation: true,
      nodeIntegration: false,
      webviewTag: false,
    });
  });

  test('loads the page of the program and never leaves it', async () => {
    await started();
    const window = double.state.windows[0];
    expect(window?.loadedUrls).toEqual(['app://lampwright/index.html']);
    for (const name of ['will-navigate', 'will-redirect', 'will-attach-webview']) {
      let isPrevented = false;
      window?.webContents.emit(name, { preventDefault: () => (isPrevented = true) }, 'https://evil.example');
      expect(isPrevented, name).toBe(true);
    }
    expect(window?.webContents.windowOpen?.({ url: 'https://evil.example' })).toEqual({ action: 'deny' });
  });

  test.each([
    ['media', false],
    ['geolocation', false],
    ['notifications', false],
    ['clipboard-read', false],
    ['openExternal', false],
    ['clipboard-sanitized-write', true],
  ])('asking for %s is granted: %s', async (permission, isGranted) => {
    await started();
    let answer: boolean | null = null;
    double.state.permissionRequest?.(null, permission, (isAllowed) => (answer = isAllowed));
    expect(answer).toBe(isGranted);
    expect(double.state.permissionCheck?.(null, permission)).toBe(isGranted);
    expect(double.state.devicePermission?.()).toBe(false);
  });
});

describe('a call', () => {
  test('from our page is answered', async () => {
    await started();
    expect(await double.invoke(callChannel, ourFrame, 'app.info', {})).toMatchObject({ ok: true });
  });

  test.each([
    ['a foreign page', { url: 'https://evil.example/', parent: null }],
    ['a host that begins like ours', { url: 'app://lampwright.evil/', parent: null }],
    ['another scheme', { url: 'http://lampwright/', parent: null }],
    ['a file', { url: 'file:///lampwright/index.html', parent: null }],
    ['no address', { url: '', parent: null }],
    ['a frame inside our page', { url: 'app://lampwright/index.html', parent: ourFrame }],
    ['a frame that is gone', null],
  ])('from %s is refused aloud', async (_who, frame) => {
    await started();
    expect(await double.invoke(callChannel, frame, 'app.info', {})).toMatchObject({
      ok: false,
      problem: { code: 'service.refused' },
    });
    expect(isOurPage(frame as Parameters<typeof isOurPage>[0])).toBe(false);
  });

  test('with a name that is no text is refused', async () => {
    await started();
    for (const name of [undefined, null, 7, {}, []]) {
      expect(await double.invoke(callChannel, ourFrame, name, {})).toMatchObject({ ok: false });
    }
  });
});

describe('app://', () => {
  const pageFolder = join(appRoot, 'out', 'renderer');
  const get = (url: string, method = 'GET'): Promise<Response> => answerPage(pageFolder, { method, url });

  test.each([
    ['app://lampwright/../../package.json', 404],
    ['app://lampwright/%2e%2e/%2e%2e/package.json', 404],
    ['app://lampwright/..%2f..%2fpackage.json', 404],
    ['app://lampwright/nothing.js', 404],
    ['app://elsewhere/index.html', 403],
  ])('answers %s with %d', async (url, status) => {
    expect((await get(url)).status).toBe(status);
  });

  test('serves by GET only, under the strict policy', async () => {
    expect((await get('app://lampwright/index.html', 'POST')).status).toBe(403);
    const { headers } = await get('app://lampwright/nothing.js');
    expect(headers.get('content-security-policy')).toContain("default-src 'none'");
  });
});

describe('the built preload script', () => {
  test('requires electron alone and gives the page two functions', () => {
    const code = readFileSync(join(appRoot, 'out', 'preload', 'preload.cjs'), 'utf8');
    const required: string[] = [];
    const exposed: [string, object][] = [];
    runInNewContext(code, {
      exports: {},
      module: { exports: {} },
      require: (name: string) => {
        required.push(name);
        return {
          contextBridge: { exposeInMainWorld: (key: string, api: object) => exposed.push([key, api]) },
          ipcRenderer: {},
        };
      },
    });
    expect(required).toEqual(['electron']);
    expect(exposed.map(([name, api]) => [name, Object.keys(api).sort()])).toEqual([
      [bridgeName, ['call', 'on']],
    ]);
  });
});
