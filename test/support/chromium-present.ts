import { requireChromium } from './find-chromium.ts';

/** Before the end-to-end tests: a browser is there, or the run stops with one line saying what to install. */
export function setup(): void {
  requireChromium();
}
