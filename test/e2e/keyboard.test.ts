import { readFileSync } from 'node:fs';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { createRandom } from '../../shared-core/numeric/random.ts';
import { type OpenPage, openPage } from '../support/open-page.ts';
import { demoFile, openWithKeyboard, shownTemperature, tabTo, untilAnswered } from '../support/sheet-page.ts';

/** The recording with 0.6 of its light added, as a mirror behind a thin tube does: the light is spread anew by noise. */
function withMirror(path: string): Buffer {
  const [head, ...rows] = readFileSync(path, 'utf8').trim().split('\n');
  const random = createRandom(5);
  const seen = rows.map((row) => {
    const [nm, counts] = row.split(',');
    const more = 1.6 * (Number(counts) - 1000);
    const noise = Math.sqrt(Math.max(0, more) / 5 + 6) * random.normal();
    return `${nm!},${String(Math.max(0, Math.min(65_535, Math.round(1000 + more + noise))))}`;
  });
  return Buffer.from([head, ...seen].join('\n'));
}

let open: OpenPage;
beforeAll(async () => {
  open = await openPage({ acceptDownloads: true });
  await untilAnswered(open.page, 't07-0411.csv');
});
afterAll(() => open.close());

describe('the whole job by keyboard alone', () => {
  let before = '';
  let savedPath = '';

  test('files are opened with Ctrl+O and take their roles', async () => {
    const { page } = open;
    await openWithKeyboard(
      page,
      ['t07-0412.csv', 'dark-16x.csv', 'response.csv', 'bench.json'].map(demoFile),
    );
    await untilAnswered(page, 't07-0412.csv');
    expect(await page.locator('.answer-verdict').innerText()).toContain('use with care');
    expect(await page.locator('.answer-why').innerText()).toContain('H-alpha clipped');
    before = await shownTemperature(page);
    expect(before).toMatch(/^\d{4}K$/);
  });

  test('a line is left out with Space and the answer follows; undo and redo bring both back', async () => {
    const { page } = open;
    await tabTo(page, 'Use Hδ');
    await page.keyboard.press('Space');
    await expect.poll(() => page.getByRole('switch', { name: 'Use Hδ' }).isChecked()).toBe(false);
    await untilAnswered(page, 't07-0412.csv');
    await expect.poll(() => shownTemperature(page)).not.toBe(before);
    const without = await shownTemperature(page);
    expect(await page.getByText('switched off by hand').count()).toBeGreaterThan(0);
    await page.keyboard.press('Control+z');
    await expect.poll(() => shownTemperature(page)).toBe(before);
    await page.keyboard.press('Control+Shift+z');
    await expect.poll(() => shownTemperature(page)).toBe(without);
    await page.keyboard.press('Control+z');
    await expect.poll(() => shownTemperature(page)).toBe(before);
  });

  test('the interval is checked by Monte Carlo from the keyboard, and undo drops it', async () => {
    const { page } = open;
    await tabTo(page, 'Check the interval by Monte Carlo');
    await page.keyboard.press('Enter');
    const drop = page.getByRole('button', { name: 'Drop the Monte Carlo check' });
    await expect.poll(() => drop.count(), { timeout: 20_000 }).toBe(1);
    expect(await page.locator('.second-opinion').innerText()).toMatch(/^\d+ Monte Carlo trials .+ Seed 1\./);
    await page.keyboard.press('Control+z');
    await expect.poll(() => drop.count()).toBe(0);
    await expect.poll(() => shownTemperature(page)).toBe(before);
  });

  test('how the populations are judged is chosen with Space, and undone', async () => {
    const { page } = open;
    const name = 'Widen the interval by the Birge ratio when the points scatter more than they should';
    await tabTo(page, name);
    await page.keyboard.press('Space');
    await expect.poll(() => page.getByRole('checkbox', { name }).isChecked()).toBe(true);
    await expect
      .poll(() => page.getByText(/Birge ratio is|by the Birge ratio \d/).count())
      .toBeGreaterThan(0);
    await page.keyboard.press('Control+z');
    await expect.poll(() => page.getByRole('checkbox', { name }).isChecked()).toBe(false);
    await expect.poll(() => shownTemperature(page)).toBe(before);
  });

  test('the recording is zoomed, panned, read and shown whole again with keys', async () => {
    const { page } = open;
    const chart = page.getByRole('slider', { name: 'Cursor on the recording' });
    await chart.focus();
    await page.keyboard.press('PageDown');
    await expect.poll(() => chart.getAttribute('aria-valuetext')).toMatch(/nm/);
    const first = await chart.getAttribute('aria-valuenow');
    await page.keyboard.press('Shift+ArrowRight');
    await expect.poll(() => chart.getAttribute('aria-valuenow')).not.toBe(first);
    for (const key of ['+', '+', 'ArrowRight', '-', 'l', 'l', 'Home']) await page.keyboard.press(key);
    expect(await chart.getAttribute('aria-valuetext')).toMatch(/counts/);
  });

  test('a mirror recording is added, measures the optical depth, and goes again', async () => {
    const { page } = open;
    await openWithKeyboard(page, [
      { name: 'mirror-0412.csv', mimeType: 'text/csv', buffer: withMirror(demoFile('t07-0412.csv')) },
    ]);
    const section = page.getByRole('region', { name: 'Optical depth' });
    await section.waitFor({ timeout: 30_000 });
    expect(await section.getByRole('row').count()).toBe(6);
    // The demo clips H-alpha; what the mirror adds to H-beta is what it adds to the thin lines.
    expect(await section.getByText('clipped in one of the recordings').count()).toBe(1);
    expect(await section.getByRole('row', { name: /Hβ/ }).innerText()).toMatch(/mirror.*1\.6.*< 0\.\d/s);
    const overflow = await page.evaluate(() => document.documentElement.scrollWidth - innerWidth);
    expect(overflow).toBeLessThanOrEqual(0);
    await tabTo(page, 'Remove mirror mirror-0412.csv');
    await page.keyboard.press('Enter');
    await expect.poll(() => section.count()).toBe(0);
    await untilAnswered(page, 't07-0412.csv');
    await expect.poll(() => shownTemperature(page)).toBe(before);
  });

  test('report, diagnosis and JSON are saved', async () => {
    const { page } = open;
    await tabTo(page, 'Save report');
    const [report] = await Promise.all([page.waitForEvent('download'), page.keyboard.press('Enter')]);
    const html = readFileSync(await report.path(), 'utf8');
    expect(report.suggestedFilename()).toMatch(/\.html$/);
    expect(html).toContain('<svg');
    expect(html).toContain('t07-0412.csv');
    expect(html).not.toContain('<script');
    const [saved] = await Promise.all([page.waitForEvent('download'), page.keyboard.press('Control+s')]);
    savedPath = `${await saved.path()}.json`;
    await saved.saveAs(savedPath);
    const content = JSON.parse(readFileSync(savedPath, 'utf8')) as { schema: string };
    expect(content.schema).toBe('lampwright.saved-diagnosis/1');
    await tabTo(page, 'Save as JSON');
    const [json] = await Promise.all([page.waitForEvent('download'), page.keyboard.press('Enter')]);
    const diagnosis = JSON.parse(readFileSync(await json.path(), 'utf8')) as { schema: string };
    expect(diagnosis.schema).toBe('lampwright.diagnosis/1');
  });

  test('the saved diagnosis is opened again and found to give the same numbers', async () => {
    const { page } = open;
    await openWithKeyboard(page, [savedPath]);
    const messages = page.getByRole('region', { name: 'Messages' });
    await expect.poll(() => messages.innerText(), { timeout: 20_000 }).toMatch(/same|identical/i);
    expect(await shownTemperature(page)).toBe(before);
  });

  test('the Safety place is reached and left, and no fault came up on the way', async () => {
    const { page } = open;
    await tabTo(page, 'Safety');
    await page.keyboard.press('Enter');
    await page
      .getByText(/local codes/i)
      .first()
      .waitFor();
    await tabTo(page, 'Diagnose');
    await page.keyboard.press('Enter');
    await untilAnswered(page, 't07-0412.csv');
    expect(open.faults).toEqual([]);
  });
});
