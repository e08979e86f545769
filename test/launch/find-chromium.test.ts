import { chmodSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, expect, test } from 'vitest';
import { findChromium } from '../support/find-chromium.ts';

let folder: string;
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'lampwright-path-'));
});
afterEach(() => rmSync(folder, { recursive: true }));

function program(name: string, mode = 0o755): string {
  const path = join(folder, name);
  writeFileSync(path, '');
  chmodSync(path, mode);
  return path;
}

test('takes the browser that LAMPWRIGHT_CHROMIUM names before any other', () => {
  const named = program('my-browser');
  program('chromium');
  expect(findChromium({ PATH: folder, LAMPWRIGHT_CHROMIUM: named })).toBe(named);
});

test('does not fall back when LAMPWRIGHT_CHROMIUM names nothing', () => {
  program('chromium');
  expect(findChromium({ PATH: folder, LAMPWRIGHT_CHROMIUM: join(folder, 'missing') })).toBeNull();
});

test.each(['chromium', 'chromium-browser', 'google-chrome', 'msedge', 'brave-browser'])(
  'finds %s on PATH',
  (name) => {
    const path = program(name);
    expect(findChromium({ PATH: `/nowhere:${folder}` }, 'linux')).toBe(path);
  },
);

test('passes over a file that cannot be run, and says null when there is none', () => {
  program('chromium', 0o644);
  expect(findChromium({ PATH: folder }, 'linux')).toBeNull();
});
