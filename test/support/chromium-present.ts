import { requireChromium } from './find-chromium.ts';

/**
 * Before the end-to-end tests: a browser is there, or the whole run stops with one line saying what to install.
 * Stopping here, not throwing, keeps that line from drowning in a stack trace.
 */
export function setup(): void {
  try {
    requireChromium();
  } catch (error) {
    process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
    process.stdout.write('0 passed, 1 failed\n');
    process.exit(1);
  }
}
