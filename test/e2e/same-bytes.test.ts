import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { lampwright } from '../support/command.ts';
import { type OpenPage, openPage } from '../support/open-page.ts';
import { projectRoot } from '../support/source-files.ts';

let open: OpenPage;
beforeAll(async () => {
  open = await openPage({ acceptDownloads: true });
});
afterAll(() => open.close());

test('the window saves the diagnosis of the demo as the command prints it, byte for byte', async () => {
  const demo = join(projectRoot, 'assets', 'demo');
  const listed = JSON.parse((await lampwright('diagnose', demo, '--json')).out) as {
    recording: { name: string };
  }[];
  const recording = join(demo, listed[0]?.recording.name ?? '');
  const printed = await lampwright('diagnose', recording, '--bench', join(demo, 'bench.json'), '--json');

  const save = open.page.getByRole('button', { name: 'Save as JSON' });
  await save.waitFor();
  await expect.poll(() => save.isEnabled(), { timeout: 20_000 }).toBe(true);
  const [download] = await Promise.all([open.page.waitForEvent('download'), save.click()]);
  expect(readFileSync(await download.path(), 'utf8')).toBe(printed.out);
});

test('the page loads under the strict policy without a fault', () => {
  expect(open.faults).toEqual([]);
});
