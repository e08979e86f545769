import { buildStale } from '../../electron/launch/build-layers.mjs';
import { allLayers } from '../../electron/launch/stale.mjs';

/** Tests that start the built program must not test yesterday's. */
export async function setup(): Promise<void> {
  await buildStale(allLayers);
}
