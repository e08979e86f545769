import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { startDesktop } from '../../electron/desktop/start-desktop.ts';
import { startLoopback } from '../../electron/loopback/http-host.ts';
import { appRoot } from '../../electron/services/app-root.ts';
import { createHost } from '../../electron/services/host.ts';
import { bridgeName, type HostBridge, newsChannel } from '../../shared-core/contract/bridge.ts';
import { double, ipcRenderer } from '../doubles/electron.ts';
import { enterLoopback } from './loopback-bridge.ts';

/** A running host seen from its page. */
export interface OpenHost {
  readonly bridge: HostBridge;
  close(): Promise<void>;
}

export async function openLoopbackHost(): Promise<OpenHost> {
  const logFolder = await mkdtemp(join(tmpdir(), 'lampwright-log-'));
  const host = createHost({ logFolder });
  const loopback = await startLoopback({ host, pageFolder: join(appRoot, 'out', 'renderer') });
  const session = await enterLoopback(loopback.address);
  return {
    bridge: session.bridge,
    async close() {
      session.close();
      await loopback.close();
      await host.close();
      await rm(logFolder, { recursive: true });
    },
  };
}

/** The desktop host and its preload script, on the stand-in for Electron. */
export async function openDesktopHost(): Promise<OpenHost> {
  double.reset();
  const started = startDesktop();
  double.state.fireReady();
  await started;
  await import('../../electron/desktop/preload/preload.ts');
  const bridge = double.state.exposed.get(bridgeName) as HostBridge;
  const window = double.state.windows[0];
  if (window === undefined) throw new Error('no window was opened');
  window.webContents.send = (channel, ...args) => {
    if (channel === newsChannel) ipcRenderer.emit(channel, ...args.map((arg) => structuredClone(arg)));
  };
  return {
    // The page listens first and has finished loading afterwards.
    bridge: {
      call: (name, input) => bridge.call(name, input),
      on(listener) {
        const stop = bridge.on(listener);
        window.webContents.emit('did-finish-load');
        return stop;
      },
    },
    async close() {
      double.state.windows[0]?.emit('closed');
      const { app } = await import('../doubles/electron.ts');
      app.emit('will-quit');
    },
  };
}
