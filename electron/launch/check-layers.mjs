/** Checks the coarse layers, and that the checker really looked: it passes in silence when it cannot parse. */
import { spawnSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';

const root = fileURLToPath(new URL('../../', import.meta.url));
const run = spawnSync(
  process.execPath,
  ['node_modules/dependency-cruiser/bin/dependency-cruise.mjs', 'shared-core', 'electron', 'renderer'],
  { cwd: root, encoding: 'utf8' },
);
process.stdout.write(run.stdout);
process.stderr.write(run.stderr);
const count = Number(/\((\d+) modules/.exec(run.stdout)?.[1] ?? 0);
if (run.status === 0 && count === 0) console.error('The layer check looked at no module at all.');
process.exitCode = run.status === 0 && count > 0 ? 0 : 1;
