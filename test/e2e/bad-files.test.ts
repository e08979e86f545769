import { afterAll, beforeAll, expect, test } from 'vitest';
import { type OpenPage, openPage } from '../support/open-page.ts';
import { demoFile, openWithKeyboard, shownTemperature, untilAnswered } from '../support/sheet-page.ts';

let open: OpenPage;
let before = '';
beforeAll(async () => {
  open = await openPage();
  await untilAnswered(open.page, 't07-0411.csv');
  // The demo keeps its own dark, response and bench: the person's files go with the person's recordings.
  await openWithKeyboard(
    open.page,
    ['t07-0412.csv', 'bench.json', 'response.csv', 'dark-16x.csv'].map(demoFile),
  );
  await untilAnswered(open.page, 't07-0412.csv');
  before = await shownTemperature(open.page);
});
afterAll(() => open.close());

const file = (name: string, content: string | Buffer) => ({
  name,
  mimeType: 'application/octet-stream',
  buffer: Buffer.from(content),
});

test.each([
  ['an empty file', file('nothing.csv', ''), /"nothing\.csv": expected .* found an empty file/],
  [
    'a picture',
    file('picture.csv', Buffer.from([0x89, 0x50, 0x4e, 0x47, 13, 10, 26, 10, 0, 0, 0, 1])),
    /"picture\.csv": expected a text table, found a PNG picture/,
  ],
  [
    'a bench file with an unknown field',
    file('bench.json', '{"schema":"lampwright.bench/1","detektor":{}}'),
    /"bench\.json".*detektor/s,
  ],
  [
    'a dark of another length',
    file('dark-short.csv', Array.from({ length: 30 }, (_, i) => `${String(400 + i)},1000`).join('\n')),
    /"dark-short\.csv": expected 3648 points .* found 30 points/,
  ],
])('%s gives one sentence and leaves the sheet as it was', async (_, bad, sentence) => {
  const { page } = open;
  await openWithKeyboard(page, [bad]);
  await expect.poll(() => page.locator('body').innerText(), { timeout: 15_000 }).toMatch(sentence);
  expect(await shownTemperature(page)).toBe(before);
  expect(open.faults).toEqual([]);
});
