import { builtinModules } from 'node:module';
import { fileURLToPath } from 'node:url';

const here = (/** @type {string} */ path) => fileURLToPath(new URL(path, import.meta.url));

/**
 * Everything that runs in Node. CommonJS, because Electron's window system is not ready before its entry has
 * been evaluated: as CommonJS an await at the top level does not even build.
 *
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
    outDir: here('../out'),
    emptyOutDir: false,
    target: 'node20',
    minify: false,
    rollupOptions: {
      external: ['electron', ...builtinModules, /^node:/],
      input: {
        'desktop/entry': here('desktop/entry.ts'),
        'loopback/entry': here('loopback/entry.ts'),
        'command-line/entry': here('command-line/entry.ts'),
        'services/compute-worker': here('services/compute-worker.ts'),
      },
      // All two levels below the root: services/app-root.ts finds assets from there.
      output: { format: 'cjs', entryFileNames: '[name].cjs', chunkFileNames: 'shared/[name].cjs' },
    },
  },
};
