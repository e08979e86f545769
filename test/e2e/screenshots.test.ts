import { mkdirSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { openPage } from '../support/open-page.ts';
import { untilAnswered } from '../support/sheet-page.ts';
import { projectRoot } from '../support/source-files.ts';

const folder = join(projectRoot, 'test-results');
mkdirSync(folder, { recursive: true });

describe.each([
  [1280, 800],
  [1920, 1080],
] as const)('%d x %d', (width, height) => {
  test.each(['light', 'dark'] as const)(
    '%s: answer, recording and lines fit above the fold',
    async (colorScheme) => {
      const open = await openPage({ viewport: { width, height }, colorScheme });
      try {
        await untilAnswered(open.page, 't07-0411.csv');
        await open.page.waitForTimeout(400);
        await open.page.screenshot({ path: join(folder, `diagnose-${String(width)}-${colorScheme}.png`) });
        const box = await open.page.locator('.line-card').last().boundingBox();
        expect(box!.y + box!.height).toBeLessThanOrEqual(height);
      } finally {
        await open.close();
      }
    },
  );
});

test('nothing overflows sideways at 200 % zoom', async () => {
  const open = await openPage({ viewport: { width: 640, height: 400 } });
  try {
    await untilAnswered(open.page, 't07-0411.csv');
    const overflow = await open.page.evaluate(() => document.documentElement.scrollWidth - innerWidth);
    expect(overflow).toBeLessThanOrEqual(0);
  } finally {
    await open.close();
  }
});
