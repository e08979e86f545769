/** Type-checks every run-time with its own tsconfig; `npm run typecheck`. */
import { spawnSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';

const root = fileURLToPath(new URL('../../', import.meta.url));
const projects = [
  'shared-core',
  'electron',
  'electron/desktop',
  'electron/desktop/preload',
  'electron/launch',
  'renderer',
  'test',
];

let failed = 0;
for (const project of projects) {
  const run = spawnSync(process.execPath, ['node_modules/typescript/bin/tsc', '-p', project], {
    cwd: root,
    stdio: 'inherit',
  });
  console.log(`${run.status === 0 ? 'ok  ' : 'FAIL'} ${project}`);
  if (run.status !== 0) failed += 1;
}
process.exitCode = failed === 0 ? 0 : 1;
