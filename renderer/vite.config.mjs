import react from '@vitejs/plugin-react';
import { fileURLToPath } from 'node:url';

const here = (/** @type {string} */ path) => fileURLToPath(new URL(path, import.meta.url));

/**
 * The page: the same files for the Electron window and for the browser.
 * @satisfies {import('vite').InlineConfig}
 */
export const config = {
  configFile: false,
  root: here('.'),
  base: './',
  logLevel: 'warn',
  plugins: [react()],
  worker: { format: 'es' },
  build: {
    outDir: here('../out/renderer'),
    emptyOutDir: true,
    target: 'es2022',
    // The content policy allows neither inline scripts nor fonts and images in data addresses.
    modulePreload: { polyfill: false },
    assetsInlineLimit: 0,
    chunkSizeWarningLimit: 1500,
  },
};
