import { log } from '../numeric/portable-math.ts';
import { poseBoltzmann, type PopulationInput } from './pose-boltzmann.ts';

/** Two lines from one upper level: their areas test the response and nothing else. */
export interface BranchingPair {
  readonly upperLevel: number;
  /** Ids, the line of longer wavelength first. */
  readonly lineIds: readonly [string, string];
  /** Area over (transition probability x response) of the first over that of the second: 1 when the response is right. */
  readonly ratio: number;
  readonly sigma: number;
  /** ln(ratio) over its standard uncertainty. */
  readonly z: number;
}

/**
 * Branching ratios of the fitted lines that share an upper level, such as a Paschen line and the Balmer line of the same n.
 *
 * area_i/(A_i R_i) (times lambda for energy) is the population of the level, whichever line it is read from.
 *
 * @param eligible  indices into the fits: converged, unclipped, covered by the response table
 * @source [Wiese1968]: branching-ratio method of response calibration
 * @check  test/unit/populations/branching.test.ts
 */
export function branchingPairs(
  input: PopulationInput,
  eligible: readonly number[],
): readonly BranchingPair[] {
  const result: BranchingPair[] = [];
  for (const [at, i] of eligible.entries()) {
    for (const j of eligible.slice(at + 1)) {
      if (input.lines[i]!.upperLevel !== input.lines[j]!.upperLevel) continue;
      const pair = [i, j].sort(
        (a, b) => input.lines[b]!.wavelengthVacuumNm - input.lines[a]!.wavelengthVacuumNm,
      ) as [number, number];
      const found = branchingPair(input, pair);
      if (found !== null) result.push(found);
    }
  }
  return result;
}

function branchingPair(input: PopulationInput, pair: readonly [number, number]): BranchingPair | null {
  const { problem } = poseBoltzmann(input, pair);
  const [areaA, areaB] = problem.area as unknown as [number, number];
  if (!(areaA > 0 && areaB > 0)) return null;
  const [perA, perB] = problem.areaPerPopulation as unknown as [number, number];
  const relative = (i: number, j: number, areas: number): number =>
    problem.areaCovariance[2 * i + j]! / areas + problem.relativeCovariance[2 * i + j]!;
  const sigma = Math.sqrt(
    relative(0, 0, areaA * areaA) + relative(1, 1, areaB * areaB) - 2 * relative(0, 1, areaA * areaB),
  );
  const ratio = (areaA * perB) / (areaB * perA);
  return {
    upperLevel: input.lines[pair[0]]!.upperLevel,
    lineIds: [input.fits.fits[pair[0]]!.id, input.fits.fits[pair[1]]!.id],
    ratio,
    sigma: ratio * sigma,
    z: log(ratio) / sigma,
  };
}
