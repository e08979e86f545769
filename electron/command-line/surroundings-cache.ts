import type { Surroundings } from '../../shared-core/pipeline/diagnose-files.ts';
import type { Problem, Result } from '../../shared-core/result/result.ts';
import { loadSurroundings, type SurroundingPaths } from '../services/load-surroundings.ts';

type Around =
  | { readonly ok: true; readonly value: Surroundings }
  /** `isNew` on the first time only: one bad bench file is one complaint, not one a recording. */
  | { readonly ok: false; readonly problem: Problem; readonly isNew: boolean };

/** Bench, dark and response are read and parsed once a bench file, not once a recording. */
export function createSurroundingsCache(given: Omit<SurroundingPaths, 'bench'>): {
  of(bench: string | null): Promise<Around>;
} {
  const known = new Map<string | null, Result<Surroundings>>();
  return {
    async of(bench) {
      const before = known.get(bench);
      const { dark, response, profile, mirror, source, through } = given;
      const loaded =
        before ?? (await loadSurroundings({ bench, dark, response, profile, mirror, source, through }));
      known.set(bench, loaded);
      return loaded.ok ? loaded : { ...loaded, isNew: before === undefined };
    },
  };
}
