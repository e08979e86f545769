/** Finds Electron's binary, or has Electron's own installer fetch it within a time limit. */
import { spawn } from 'node:child_process';
import { accessSync, constants, readFileSync } from 'node:fs';
import { join } from 'node:path';

/**
 * Never through require('electron'): where the binary is missing, that starts a download without a limit.
 * @param {string} root
 * @returns {string | null}
 */
export function electronBinary(root) {
  try {
    const folder = join(root, 'node_modules', 'electron');
    const name = readFileSync(join(folder, 'path.txt'), 'utf8').trim();
    const path = join(process.env['ELECTRON_OVERRIDE_DIST_PATH'] ?? join(folder, 'dist'), name);
    accessSync(path, constants.X_OK);
    return path;
  } catch {
    return null;
  }
}

/**
 * @param {string} root
 * @param {number} limitMs
 * @returns {Promise<{ path: string } | { reason: string }>}
 */
export async function fetchElectron(root, limitMs) {
  const reason = await runInstaller(join(root, 'node_modules', 'electron', 'install.js'), limitMs);
  const path = electronBinary(root);
  return path === null ? { reason: reason ?? 'its installer left no binary' } : { path };
}

/**
 * @param {string} script
 * @param {number} limitMs
 * @returns {Promise<string | null>} the reason why it failed
 */
function runInstaller(script, limitMs) {
  return new Promise((resolve) => {
    const child = spawn(process.execPath, [script], { stdio: ['ignore', 'ignore', 'pipe'] });
    let said = '';
    child.stderr.setEncoding('utf8').on('data', (text) => (said += text));
    const timer = setTimeout(() => {
      child.kill('SIGKILL');
      resolve(`no answer in ${String(limitMs / 1000)} s`);
    }, limitMs);
    child.on('error', (error) => resolve(error.message));
    child.on('close', (status) => {
      clearTimeout(timer);
      resolve(status === 0 ? null : firstLine(said));
    });
  });
}

/** @param {string} text */
function firstLine(text) {
  const lines = text.split('\n').map((line) => line.trim());
  return (
    lines.find((line) => /error/i.test(line)) ?? lines.find((line) => line !== '') ?? 'its installer failed'
  );
}
