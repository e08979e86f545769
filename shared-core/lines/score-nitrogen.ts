import type { Companion } from './companion.ts';
import { roughShareColumn, rotationalKelvins, type BandPlace } from './nitrogen-bands.ts';
import type { Estimate, Score, SegmentColumn } from './score-column.ts';
import type { SolvedFit } from './solved-fit.ts';

/** Below this with the first rotational temperature the others are not tried: none would make it plain. */
const leastFirstLook = 1.5;

/** How plainly bands of N2 lie under the lines, all together, with the rotational temperature that suits them best. */
export interface NitrogenScore {
  readonly z: number;
  readonly estimates: readonly Estimate[];
  /** Every band, also those that do not show by themselves: where one is, the others are. */
  readonly companions: readonly Companion[];
}

/**
 * Scores the bands of N2. Their strengths against each other are not assumed, so their scores are added: for n bands the
 * sum over sqrt(n) is a standard deviate where there is no nitrogen. Where something else explains the light of a segment
 * better, it does not count.
 *
 * @param rivals  the plainest other explanation of a segment's light, standard deviations
 * @source sum of standard deviates: [Stouffer1949]
 * @check  test/property/molecular-background.test.ts
 */
export function scoreNitrogen(
  fit: SolvedFit,
  places: readonly BandPlace[],
  score: (parts: readonly SegmentColumn[]) => Score,
  rivals: (segment: number) => number,
): NitrogenScore {
  let best: NitrogenScore = { z: 0, estimates: [], companions: [] };
  if (places.length === 0) return best;
  for (const index of rotationalKelvins.keys()) {
    if (index === 1 && best.z < leastFirstLook) break;
    let sum = 0;
    const estimates: Estimate[] = [];
    for (const { segment, companions } of places) {
      const values = roughShareColumn(
        fit.problem,
        fit.solution.values,
        companions[index]!.line,
        fit.problem.segments[segment]!,
      );
      const { z, sigma, shiftOf } = score([{ segment, values }]);
      if (z < rivals(segment)) continue;
      sum += z;
      estimates.push({ amount: z * sigma, shiftOf });
    }
    const z = sum / Math.sqrt(places.length);
    if (z > best.z) best = { z, estimates, companions: places.map(({ companions }) => companions[index]!) };
  }
  return best;
}
