import { afterAll, beforeAll, expect, test } from 'vitest';
import { type OpenPage, openPage } from '../support/open-page.ts';
import { shownTemperature, untilAnswered } from '../support/sheet-page.ts';

let open: OpenPage;
beforeAll(async () => {
  open = await openPage();
});
afterAll(() => open.close());

test('the first start shows the demo recording already diagnosed, the whole argument of it', async () => {
  const { page } = open;
  await untilAnswered(page, 't07-0411.csv');
  expect(Number(await shownTemperature(page).then((text) => text.replace('K', '')))).toBeGreaterThan(6000);
  expect(await page.locator('.answer-verdict').innerText()).toContain('sound');
  expect(await page.getByRole('switch').count()).toBe(5);
  for (const heading of [
    'Recording',
    'Lines',
    'Populations',
    'Can it be trusted?',
    'What limits it?',
    'What else is in the tube?',
    'Cautions',
    'How it was computed',
  ]) {
    await page.getByRole('heading', { name: heading, exact: false }).first().waitFor();
  }
  expect(await page.getByText('spectral response').count()).toBeGreaterThan(0);
  expect(await page.getByText('not a safety device').count()).toBeGreaterThan(0);
  expect(open.faults).toEqual([]);
});
