import { _electron } from 'playwright-core';
import { describe, expect, test } from 'vitest';
import { electronBinary } from '../../electron/launch/electron-binary.mjs';
import { projectRoot } from '../support/source-files.ts';

const binary = electronBinary(projectRoot);

describe.skipIf(binary === null)('the real Electron (skipped where its binary is not installed)', () => {
  test('opens the window with the page of the program in it', async () => {
    const app = await _electron.launch({ executablePath: binary ?? '', args: [projectRoot] });
    try {
      const page = await app.firstWindow();
      await page.waitForSelector('h1, h2, [role="main"], main');
      expect(page.url()).toBe('app://lampwright/index.html');
      expect(await page.evaluate(() => typeof (globalThis as { require?: unknown }).require)).toBe(
        'undefined',
      );
    } finally {
      await app.close();
    }
  });
});
