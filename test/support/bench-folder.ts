import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll } from 'vitest';
import { lampwright } from './command.ts';

/** A folder for the tests of one file, gone afterwards. */
export function temporaryFolder(): string {
  const folder = mkdtempSync(join(tmpdir(), 'lampwright-'));
  afterAll(() => rmSync(folder, { recursive: true, force: true }));
  return folder;
}

export function write(folder: string, name: string, content: string | Uint8Array): string {
  const path = join(folder, name);
  writeFileSync(path, content);
  return path;
}

/** A recording that can be diagnosed, made by the program itself with a fixed seed. */
export async function goodRecording(folder: string, name: string): Promise<string> {
  const path = join(folder, name);
  const made = await lampwright(
    'simulate',
    '--temperature',
    '6000',
    '--electron-density',
    '1e20',
    '--seed',
    '7',
    '--out',
    path,
  );
  if (made.status !== 0) throw new Error(made.error);
  return path;
}
