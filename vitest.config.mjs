import { fileURLToPath } from 'node:url';
import { defineConfig } from 'vitest/config';

const here = (/** @type {string} */ path) => fileURLToPath(new URL(path, import.meta.url));

/** Three projects: pure computation, everything that runs in Node, and the page in a real browser. */
export default defineConfig({
  test: {
    reporters: ['default', './test/support/ci-line.ts'],
    projects: [
      {
        extends: true,
        test: {
          name: 'core',
          include: ['test/{unit,reference,property,architecture}/**/*.test.{ts,tsx}'],
          testTimeout: 60_000,
        },
      },
      {
        extends: true,
        resolve: { alias: { electron: here('./test/doubles/electron.ts') } },
        test: {
          name: 'hosts',
          include: ['test/{contract,services,desktop,loopback,launch,command-line,packaging}/**/*.test.ts'],
          globalSetup: ['./test/support/build-stale.ts'],
          testTimeout: 60_000,
          hookTimeout: 60_000,
        },
      },
      {
        extends: true,
        test: {
          name: 'e2e',
          include: ['test/e2e/**/*.test.ts'],
          globalSetup: ['./test/support/build-stale.ts', './test/support/chromium-present.ts'],
          testTimeout: 120_000,
          hookTimeout: 120_000,
          fileParallelism: false,
        },
      },
    ],
  },
});
