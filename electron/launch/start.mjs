/**
 * `npm start`: the app in Electron's window; where Electron is not to be had, the same app in the browser.
 *   --browser    do not try Electron
 *   --electron   fail instead of falling back
 */
import { spawn } from 'node:child_process';
import { join } from 'node:path';
import { buildStale } from './build-layers.mjs';
import { electronBinary, fetchElectron } from './electron-binary.mjs';
import { allLayers, hasSources, root } from './stale.mjs';

const fetchLimitMs = Number(process.env['LAMPWRIGHT_FETCH_LIMIT_MS'] ?? 90_000);
const wanted = process.argv.slice(2);
const unknown = wanted.find((word) => word !== '--browser' && word !== '--electron');
if (unknown !== undefined) {
  console.error(`start knows --browser and --electron, not "${unknown}".`);
  process.exit(2);
}

if (hasSources()) await buildStale(allLayers);

const choice = await choose();
if ('path' in choice) run(choice.path, [root]);
else if (wanted.includes('--electron')) {
  console.error(`Electron cannot be used (${choice.reason}).`);
  process.exitCode = 1;
} else {
  if (!wanted.includes('--browser')) {
    console.error(`Electron not used (${choice.reason}); running in the browser instead.`);
  }
  run(process.execPath, [join(root, 'out', 'loopback', 'entry.cjs')]);
}

/** @returns {Promise<{ path: string } | { reason: string }>} */
async function choose() {
  if (wanted.includes('--browser')) return { reason: 'asked for the browser' };
  const isLinux = process.platform === 'linux';
  if (isLinux && !process.env['DISPLAY'] && !process.env['WAYLAND_DISPLAY']) return { reason: 'no display' };
  const path = electronBinary(root);
  if (path !== null) return { path };
  console.error('Fetching Electron, once ...');
  return fetchElectron(root, fetchLimitMs);
}

/**
 * Runs a host in the foreground and ends as it ends.
 * @param {string} command
 * @param {readonly string[]} args
 */
function run(command, args) {
  const child = spawn(command, args, { stdio: 'inherit' });
  for (const signal of /** @type {const} */ (['SIGINT', 'SIGTERM']))
    process.on(signal, () => child.kill(signal));
  child.on('error', (error) => {
    console.error(`Could not start ${command}: ${error.message}`);
    process.exitCode = 1;
  });
  child.on('exit', (status) => (process.exitCode = status ?? 1));
}
