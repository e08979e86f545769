#!/usr/bin/env node
/** The `lampwright` command: builds what is stale, then runs. */
import { createRequire } from 'node:module';
import { hasSources, isStale } from './stale.mjs';

if (hasSources() && isStale('node')) {
  const { buildStale } = await import('./build-layers.mjs');
  await buildStale(['node']);
}
const { runCommandLine } = createRequire(import.meta.url)('../../out/command-line/entry.cjs');
process.exitCode = await runCommandLine(process.argv.slice(2));
