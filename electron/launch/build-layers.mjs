/** Builds layers, one process at a time: two commands started together must not write over each other. */
import { mkdirSync, rmSync, statSync } from 'node:fs';
import { join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { isStale, markBuilt, root } from './stale.mjs';

/** @typedef {import('./stale.mjs').Layer} Layer */

/** A lock older than this was left by a build that was killed. */
const lockLimitMs = 120_000;

/** @type {Record<Layer, string>} */
const configs = {
  node: '../vite.config.mjs',
  preload: '../desktop/preload/vite.config.mjs',
  renderer: '../../renderer/vite.config.mjs',
};

/**
 * Builds those of the layers that are stale, after waiting for any other build.
 * @param {readonly Layer[]} layers
 */
export async function buildStale(layers) {
  if (!layers.some(isStale)) return;
  const unlock = await lock();
  try {
    for (const layer of layers) if (isStale(layer)) await build(layer);
  } finally {
    unlock();
  }
}

/** @param {Layer} layer */
async function build(layer) {
  const began = new Date();
  const [vite, { config }] = await Promise.all([import('vite'), import(configs[layer])]);
  await vite.build(config);
  await markBuilt(layer, began);
}

async function lock() {
  const path = join(root, 'out', '.build-lock');
  mkdirSync(join(root, 'out'), { recursive: true });
  for (;;) {
    try {
      mkdirSync(path);
      return () => rmSync(path, { recursive: true, force: true });
    } catch (error) {
      if (!(error instanceof Error && 'code' in error && error.code === 'EEXIST')) throw error;
    }
    const age = Date.now() - (statSync(path, { throwIfNoEntry: false })?.mtimeMs ?? Date.now());
    if (age > lockLimitMs) rmSync(path, { recursive: true, force: true });
    await sleep(100);
  }
}
