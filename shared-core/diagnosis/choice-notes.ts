import { listNames, type Evidence } from './evidence.ts';
import { plain } from './plain-number.ts';

/** What the choices for judging the populations did, so that none of them acts in silence. */
export function choiceNotes(evidence: Evidence): string[] {
  return [wideningNote(evidence), levelsNote(evidence), correctionNote(evidence)].filter(
    (note) => note !== '',
  );
}

function wideningNote({ choices, temperature }: Evidence): string {
  if (choices.widening !== 'birge' || temperature.boltzmann === null) return '';
  const { birgeRatio, widening } = temperature;
  if (birgeRatio === null) return 'The interval was not widened: two lines show no scatter.';
  return widening > 1
    ? `The interval was widened by the Birge ratio ${plain(birgeRatio, 3)}, as chosen.`
    : `The interval was not widened: the Birge ratio is ${plain(birgeRatio, 2)}.`;
}

function levelsNote({ choices, belowEquilibrium, density }: Evidence): string {
  if (choices.levels !== 'equilibrated') return '';
  if (belowEquilibrium.length > 0) {
    return `${listNames(belowEquilibrium)} left out, as chosen: below the lowest level in equilibrium with the electrons.`;
  }
  return density.status === 'measured'
    ? 'No level was left out for want of equilibrium: all in use hold it, or fewer than two would remain.'
    : 'No level was left out for want of equilibrium: the density does not say which hold it.';
}

function correctionNote({ choices, selfAbsorption, isSelfAbsorptionApplied }: Evidence): string {
  if (choices.selfAbsorption !== 'correct') return '';
  if (isSelfAbsorptionApplied) {
    return `The temperature is corrected for self-absorption, as chosen: optical depth ${plain(selfAbsorption.opticalDepth ?? NaN, 2)} at the centre of H-alpha.`;
  }
  return selfAbsorption.status === 'suspected'
    ? 'No correction for self-absorption: no one depth fits the lines.'
    : 'No correction for self-absorption: none is seen or it cannot be tested.';
}
