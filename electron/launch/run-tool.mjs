/** Bundles one TypeScript program of test/ the way the product is bundled, and runs it: `node electron/launch/run-tool.mjs FILE [words]`. */
import { spawnSync } from 'node:child_process';
import { basename, dirname, join } from 'node:path';
import * as vite from 'vite';
import { config as nodeConfig } from '../vite.config.mjs';
import { root } from './stale.mjs';

const [file, ...words] = process.argv.slice(2);
if (file === undefined) {
  console.error('Name the TypeScript file to run.');
  process.exit(2);
}
const name = basename(file, '.ts');
const outDir = join(root, 'out', 'tools');
await vite.build({
  ...nodeConfig,
  root: dirname(join(root, file)),
  build: {
    ...nodeConfig.build,
    outDir,
    emptyOutDir: false,
    rollupOptions: {
      ...nodeConfig.build.rollupOptions,
      input: { [name]: join(root, file) },
      output: { format: 'cjs', entryFileNames: '[name].cjs', codeSplitting: false },
    },
  },
});
const run = spawnSync(process.execPath, [join(outDir, `${name}.cjs`), ...words], {
  cwd: root,
  stdio: 'inherit',
});
process.exitCode = run.status ?? 1;
