import { chiSquareUpperTail } from '../numeric/distributions.ts';
import { lowestEquilibratedLevel } from '../physics/equilibrium.ts';
import { matchCaseB } from '../populations/case-b-match.ts';
import { curvature } from '../populations/curvature.ts';
import { leastBend } from './checks/population-checks.ts';
import type { Diagnosis } from './diagnosis.ts';
import { usedFits, type Evidence } from './evidence.ts';
import { plain } from './plain-number.ts';

/**
 * What the temperature may be read as. Only a density measured high enough that every level in use is in partial
 * equilibrium with the free electrons, on a plot that is straight, makes it their temperature.
 *
 * @source criterion: [Griem1963]; warning example: case B recombination populations, straight without a temperature,
 *         [Storey1995]
 * @check  test/unit/diagnosis/meaning.test.ts
 */
export function meaning(evidence: Evidence): Diagnosis['meaning'] {
  const { temperature, density } = evidence;
  const kelvin = temperature.kelvin;
  const levels = usedFits(evidence).map(({ upperLevel }) => upperLevel);
  if (kelvin === null || levels.length === 0) {
    return {
      kind: 'distribution-temperature',
      lowestEquilibratedLevel: null,
      text: 'There is no temperature to interpret.',
    };
  }
  const lowest =
    density.lowPerCubicMetre === null ? null : lowestEquilibratedLevel(density.lowPerCubicMetre, kelvin);
  const isEquilibrated = lowest !== null && Math.min(...levels) >= lowest;
  const bend = bendText(evidence);
  if (isEquilibrated && bend === '') {
    return {
      kind: 'electron-temperature',
      lowestEquilibratedLevel: lowest,
      text: `At this density levels from n = ${String(lowest)} up are in equilibrium with the electrons, so it may be read as the electron temperature.`,
    };
  }
  const why = isEquilibrated
    ? `Levels from n = ${String(lowest)} up should be in equilibrium with the electrons, but the plot is not that of one temperature`
    : lowest === null
      ? 'The density does not show that the levels in use are in equilibrium with the electrons'
      : `Only levels from n = ${String(lowest)} up are in equilibrium with the electrons, and lower ones are in use`;
  const parts = [
    `${why}: it describes the populations of these levels and nothing more.`,
    bend,
    recombinationText(evidence),
  ];
  return {
    kind: 'distribution-temperature',
    lowestEquilibratedLevel: lowest,
    text: parts.filter((part) => part !== '').join(' '),
  };
}

/** Two groups of electrons, or two places of different temperature, bend the plot. */
function bendText({ temperature }: Evidence): string {
  const { boltzmann } = temperature;
  if (boltzmann === null || boltzmann.line.degreesOfFreedom < 1) return '';
  const bend = curvature(boltzmann);
  if (bend !== null && bend.z > leastBend) {
    return `The plot bends up at its ends (${plain(bend.z, 2)} sigma): no single temperature describes it, as where two groups of electrons or a hot and a cool zone emit together.`;
  }
  if (bend !== null && bend.z < -leastBend) {
    return `The plot bends down at its ends (${plain(-bend.z, 2)} sigma): no single temperature describes it, as where H-alpha is absorbed in the tube.`;
  }
  const { chiSquare, degreesOfFreedom } = boltzmann.line;
  return chiSquareUpperTail(chiSquare, degreesOfFreedom) < 1e-3
    ? 'The populations do not lie on a line, so no temperature describes them.'
    : '';
}

function recombinationText({ temperature, fittedLines }: Evidence): string {
  const { boltzmann, used } = temperature;
  const match =
    boltzmann === null
      ? null
      : matchCaseB(
          boltzmann,
          used.map((index) => fittedLines[index]!),
        );
  return match === null
    ? 'A straight plot alone proves nothing: a recombining gas shows one too.'
    : `A straight plot alone proves nothing: these lines are just as strong in a recombining gas of ${plain(match.kelvin, 2)} K (case B), which has no such temperature.`;
}
