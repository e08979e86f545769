/** `npm run dev`: the page with hot reload, the browser host behind it, built and started anew on every change. */
import { spawn } from 'node:child_process';
import { join } from 'node:path';
import * as vite from 'vite';
import { config as nodeConfig } from '../vite.config.mjs';
import { config as rendererConfig } from '../../renderer/vite.config.mjs';
import { root } from './stale.mjs';

const hostPort = 5179;
const hostAddress = `http://127.0.0.1:${String(hostPort)}`;
const proxied = { target: hostAddress, changeOrigin: true };
const page = await vite.createServer({
  ...rendererConfig,
  server: {
    fs: { allow: [root] },
    host: '127.0.0.1',
    port: 5178,
    strictPort: true,
    proxy: { '/call/': proxied, '/news': proxied },
  },
});
await page.listen();

/** @type {import('node:child_process').ChildProcess | null} */
let host = null;
let isFirst = true;

/** The old host gives up its port before the new one asks for it. */
async function restartHost() {
  const old = host;
  if (old !== null && old.exitCode === null) {
    const gone = new Promise((resolve) => old.once('exit', resolve));
    old.kill('SIGTERM');
    await gone;
  }
  host = spawn(process.execPath, [join(root, 'out', 'loopback', 'entry.cjs')], {
    stdio: 'inherit',
    env: {
      ...process.env,
      LAMPWRIGHT_DEV_ORIGIN: 'http://127.0.0.1:5178',
      LAMPWRIGHT_DEV_PORT: String(hostPort),
      LAMPWRIGHT_OPEN: isFirst ? 'yes' : 'no',
    },
  });
  isFirst = false;
}

const watcher = await vite.build({ ...nodeConfig, build: { ...nodeConfig.build, watch: {} } });
if ('on' in watcher) {
  watcher.on('event', (event) => {
    if (event.code === 'END') void restartHost();
  });
}
process.on('SIGINT', () => {
  host?.kill('SIGTERM');
  process.exit(0);
});
