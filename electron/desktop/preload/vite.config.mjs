import { fileURLToPath } from 'node:url';

const here = (/** @type {string} */ path) => fileURLToPath(new URL(path, import.meta.url));

/**
 * One file whose only require is electron: a sandboxed preload can load nothing else.
 * @satisfies {import('vite').InlineConfig}
 */
export const config = {
  configFile: false,
  root: here('.'),
  logLevel: 'warn',
  publicDir: false,
  ssr: { noExternal: true },
  build: {
    ssr: true,
    outDir: here('../../../out/preload'),
    emptyOutDir: false,
    target: 'node20',
    minify: false,
    rollupOptions: {
      external: ['electron'],
      input: here('preload.ts'),
      output: { format: 'cjs', entryFileNames: 'preload.cjs', codeSplitting: false },
    },
  },
};
