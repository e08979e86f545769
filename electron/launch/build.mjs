/** `npm run build` builds everything anew; with --stale only what has changed. */
import { rmSync } from 'node:fs';
import { join } from 'node:path';
import { buildStale } from './build-layers.mjs';
import { allLayers, root } from './stale.mjs';

if (!process.argv.includes('--stale')) rmSync(join(root, 'out'), { recursive: true, force: true });
await buildStale(allLayers);
