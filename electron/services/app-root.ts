import { readFileSync } from 'node:fs';
import { join } from 'node:path';

/**
 * The folder that holds package.json, assets and out: the checkout, or the inside of the packaged app.
 * Sources (electron/services) and bundles (out/command-line, out/shared, ...) both lie two levels below it.
 */
export const appRoot = join(import.meta.dirname, '..', '..');

export const assetPath = (...parts: readonly string[]): string => join(appRoot, 'assets', ...parts);

/** The version that package.json states. */
export function programVersion(): string {
  const manifest: unknown = JSON.parse(readFileSync(join(appRoot, 'package.json'), 'utf8'));
  if (typeof manifest === 'object' && manifest !== null && 'version' in manifest) {
    if (typeof manifest.version === 'string') return manifest.version;
  }
  throw new Error('package.json states no version');
}
