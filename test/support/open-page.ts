import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import {
  type Browser,
  type BrowserContext,
  type BrowserContextOptions,
  chromium,
  type Page,
} from 'playwright-core';
import { startLoopback } from '../../electron/loopback/http-host.ts';
import { appRoot } from '../../electron/services/app-root.ts';
import { createHost } from '../../electron/services/host.ts';
import { requireChromium } from './find-chromium.ts';

/** The built page in a real browser, served by the real loopback host. */
export interface OpenPage {
  readonly page: Page;
  readonly context: BrowserContext;
  readonly address: string;
  /** Errors of the page and its console so far, content-policy violations among them. */
  readonly faults: readonly string[];
  close(): Promise<void>;
}

const flags = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];

export async function openPage(options: BrowserContextOptions = {}): Promise<OpenPage> {
  const logFolder = await mkdtemp(join(tmpdir(), 'lampwright-log-'));
  const host = createHost({ logFolder });
  const loopback = await startLoopback({ host, pageFolder: join(appRoot, 'out', 'renderer') });
  const browser: Browser = await chromium.launch({ executablePath: requireChromium(), args: flags });
  const context = await browser.newContext({ viewport: { width: 1280, height: 800 }, ...options });
  const page = await context.newPage();
  const faults: string[] = [];
  page.on('pageerror', (error) => faults.push(error.message));
  page.on('console', (message) => {
    if (message.type() === 'error') faults.push(message.text());
  });
  await page.goto(loopback.address);
  return {
    page,
    context,
    address: loopback.address,
    faults,
    async close() {
      await browser.close();
      await loopback.close();
      await host.close();
      await rm(logFolder, { recursive: true });
    },
  };
}
