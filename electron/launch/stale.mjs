/** Which layers have sources newer than what was built of them. Only stats files: a few milliseconds. */
import { mkdirSync, readdirSync, statSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

export const root = fileURLToPath(new URL('../../', import.meta.url));

/** @typedef {'node' | 'preload' | 'renderer'} Layer */

/** @type {Record<Layer, readonly string[]>} */
const sources = {
  node: [
    'shared-core',
    'electron/services',
    'electron/desktop',
    'electron/loopback',
    'electron/command-line',
    'electron/vite.config.mjs',
    'package-lock.json',
  ],
  preload: ['shared-core/contract', 'electron/desktop/preload', 'package-lock.json'],
  renderer: ['shared-core', 'renderer', 'package-lock.json'],
};

/** @type {readonly Layer[]} */
export const allLayers = ['node', 'preload', 'renderer'];

/** True in a checkout; the packaged app has no sources and is never stale. */
export function hasSources() {
  return statSync(join(root, 'shared-core'), { throwIfNoEntry: false }) !== undefined;
}

/** @param {Layer} layer */
export function isStale(layer) {
  const built = statSync(stampOf(layer), { throwIfNoEntry: false })?.mtimeMs ?? 0;
  return sources[layer].some((path) => newest(join(root, path)) > built);
}

/**
 * Marks a layer as built from what lay there when its build began: what changed since is newer.
 * @param {Layer} layer
 * @param {Date} began
 */
export async function markBuilt(layer, began) {
  mkdirSync(join(root, 'out'), { recursive: true });
  writeFileSync(stampOf(layer), '');
  const { utimes } = await import('node:fs/promises');
  await utimes(stampOf(layer), began, began);
}

/** @param {Layer} layer */
const stampOf = (layer) => join(root, 'out', `.built-${layer}`);

/**
 * Latest change of a file, or of a folder and all below it. Folders count, as a deleted file shows only there.
 * @param {string} path
 * @returns {number}
 */
function newest(path) {
  const stat = statSync(path, { throwIfNoEntry: false });
  if (stat === undefined) return 0;
  if (!stat.isDirectory()) return stat.mtimeMs;
  return readdirSync(path).reduce((latest, name) => Math.max(latest, newest(join(path, name))), stat.mtimeMs);
}
