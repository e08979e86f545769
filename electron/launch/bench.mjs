/** `npm run bench`: bundles test/bench/run.ts the way the program is bundled, and runs it. */
import { spawnSync } from 'node:child_process';
import { join } from 'node:path';
import * as vite from 'vite';
import { config as nodeConfig } from '../vite.config.mjs';
import { root } from './stale.mjs';

const outDir = join(root, 'out', 'bench');
await vite.build({
  ...nodeConfig,
  root: join(root, 'test', 'bench'),
  build: {
    ...nodeConfig.build,
    outDir,
    rollupOptions: {
      ...nodeConfig.build.rollupOptions,
      input: { run: join(root, 'test', 'bench', 'run.ts') },
      output: { format: 'cjs', entryFileNames: '[name].cjs', codeSplitting: false },
    },
  },
});
const run = spawnSync(process.execPath, [join(outDir, 'run.cjs'), ...process.argv.slice(2)], {
  cwd: root,
  stdio: 'inherit',
});
process.exitCode = run.status ?? 1;
