import { join } from 'node:path';
import type { FileChooser, Page } from 'playwright-core';
import { expect } from 'vitest';
import { projectRoot } from './source-files.ts';

/** Paths of the demo's files. */
export const demoFile = (name: string): string => join(projectRoot, 'assets', 'demo', name);

/** The temperature as the answer strip shows it, thin spaces turned into nothing. */
export async function shownTemperature(page: Page): Promise<string> {
  const text = await page.locator('.answer-value').first().innerText();
  return text.replace(/[\s\u202f]/g, '');
}

/** Waits until the answer on screen belongs to the named recording and is not being recomputed. */
export async function untilAnswered(page: Page, name: string): Promise<void> {
  await page
    .locator(`section.answer[aria-busy="false"] h2:has-text("${name}")`)
    .waitFor({ state: 'attached', timeout: 30_000 });
}

/** Presses Tab, then Shift+Tab, until the element that has the focus has this accessible name; `limit` presses each way. */
export async function tabTo(page: Page, name: string, limit = 80): Promise<void> {
  for (let press = 0; press < 2 * limit; press++) {
    await page.keyboard.press(press < limit ? 'Tab' : 'Shift+Tab');
    const focused = await page.evaluate(() => {
      const element = document.activeElement;
      if (element === null) return '';
      const label = element instanceof HTMLInputElement ? element.labels?.[0]?.textContent : undefined;
      return element.getAttribute('aria-label') ?? label ?? element.textContent ?? '';
    });
    if (focused.trim() === name) return;
  }
  expect.fail(`no element called "${name}" can be reached with Tab`);
}

/** Opens files with Ctrl+O, as a person at the keyboard does. */
export async function openWithKeyboard(
  page: Page,
  files: Parameters<FileChooser['setFiles']>[0],
): Promise<void> {
  const waiting = page.waitForEvent('filechooser');
  // The browser must have been told to hand the dialog over before the key goes down.
  await page.waitForTimeout(150);
  await page.keyboard.press('Control+o');
  await (await waiting).setFiles(files);
}
