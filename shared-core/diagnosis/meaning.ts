import { lowestEquilibratedLevel } from '../physics/equilibrium.ts';
import type { Diagnosis } from './diagnosis.ts';
import { usedFits, type Evidence } from './evidence.ts';

/**
 * What the temperature may be read as. Only a density measured high enough that every level in use is in partial
 * equilibrium with the free electrons makes it their temperature.
 *
 * @source criterion: H. R. Griem, Phys. Rev. 131, 1170 (1963); warning example: case B recombination populations,
 *         P. J. Storey, D. G. Hummer, Mon. Not. R. Astron. Soc. 272, 41 (1995), straight without a temperature
 * @check  test/unit/diagnosis/evidence-cases.test.ts
 */
export function meaning(evidence: Evidence): Diagnosis['meaning'] {
  const { temperature, density } = evidence;
  const kelvin = temperature.kelvin;
  const levels = usedFits(evidence).map(({ upperLevel }) => upperLevel);
  const reminder = 'A straight plot alone proves nothing: a recombining gas shows one too.';
  if (kelvin === null || levels.length === 0) {
    return {
      kind: 'distribution-temperature',
      lowestEquilibratedLevel: null,
      text: 'There is no temperature to interpret.',
    };
  }
  const lowest =
    density.status === 'measured' && density.lowPerCubicMetre !== null
      ? lowestEquilibratedLevel(density.lowPerCubicMetre, kelvin)
      : null;
  if (lowest !== null && Math.min(...levels) >= lowest) {
    return {
      kind: 'electron-temperature',
      lowestEquilibratedLevel: lowest,
      text: `At this density levels from n = ${String(lowest)} up are in equilibrium with the electrons, so it may be read as the electron temperature.`,
    };
  }
  const why =
    lowest === null
      ? 'The density does not show that the levels in use are in equilibrium with the electrons'
      : `Only levels from n = ${String(lowest)} up are in equilibrium with the electrons, and lower ones are in use`;
  return {
    kind: 'distribution-temperature',
    lowestEquilibratedLevel: lowest,
    text: `${why}: it describes the populations of these levels and nothing more. ${reminder}`,
  };
}
