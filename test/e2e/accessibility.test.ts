import AxeBuilder from '@axe-core/playwright';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { type OpenPage, openPage } from '../support/open-page.ts';
import { demoFile, openWithKeyboard, untilAnswered } from '../support/sheet-page.ts';

describe.each(['light', 'dark'] as const)('axe, %s theme', (colorScheme) => {
  let open: OpenPage;
  beforeAll(async () => {
    open = await openPage({ colorScheme, reducedMotion: 'reduce' });
    await untilAnswered(open.page, 't07-0411.csv');
  });
  afterAll(() => open.close());

  const violations = async (): Promise<string[]> => {
    const { violations: found } = await new AxeBuilder({ page: open.page }).analyze();
    return found.map(({ id, nodes }) => `${id}: ${nodes.map(({ html }) => html.slice(0, 120)).join(' | ')}`);
  };

  test('finds nothing on the Diagnose sheet', async () => {
    expect(await violations()).toEqual([]);
  });

  test('finds nothing with a refused recording and a problem on screen', async () => {
    const { page } = open;
    await openWithKeyboard(page, [demoFile('t07-0413.csv')]);
    await untilAnswered(page, 't07-0413.csv');
    expect(await page.locator('.answer-verdict').innerText()).toContain('not defensible');
    await openWithKeyboard(page, [{ name: 'empty.csv', mimeType: 'text/csv', buffer: Buffer.from('') }]);
    await page
      .getByText(/found an empty file/)
      .first()
      .waitFor();
    expect(await violations()).toEqual([]);
  });

  test('finds nothing in the Safety place', async () => {
    await open.page
      .getByRole('button', { name: 'Safety', exact: true })
      .or(open.page.getByRole('link', { name: 'Safety', exact: true }))
      .or(open.page.getByRole('tab', { name: 'Safety', exact: true }))
      .first()
      .click();
    await open.page
      .getByText(/local codes/i)
      .first()
      .waitFor();
    expect(await violations()).toEqual([]);
  });
});
