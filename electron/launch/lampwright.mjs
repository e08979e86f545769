#!/usr/bin/env node
/** The `lampwright` command: builds what is stale, then runs. */
import { createRequire } from 'node:module';
import { hasSources, isStale } from './stale.mjs';

if (hasSources() && isStale('node')) {
  try {
    const { buildStale } = await import('./build-layers.mjs');
    await buildStale(['node']);
  } catch (error) {
    const isBare = error instanceof Error && 'code' in error && error.code === 'ERR_MODULE_NOT_FOUND';
    console.error(
      isBare
        ? 'lampwright is not set up yet: run "npm ci" in its folder once.'
        : 'lampwright could not be built from its sources: run "npm run build" in its folder to see why.',
    );
    process.exit(1);
  }
}
const { runCommandLine } = createRequire(import.meta.url)('../../out/command-line/entry.cjs');
process.exitCode = await runCommandLine(process.argv.slice(2));
