import { constants } from '../../physics/constants.ts';
import { defaultGasTemperatureK } from '../../physics/line-widths.ts';
import type { Check } from '../diagnosis.ts';
import { equilibrium } from '../equilibrium.ts';
import { listNames, usedFits, type Evidence } from '../evidence.ts';
import { plain } from '../plain-number.ts';

/** Whether levels in equilibrium with the electrons and levels below them carry one temperature together. */
export function partialEquilibriumCheck(evidence: Evidence): Check | null {
  const { temperature, density } = evidence;
  if (temperature.kelvin === null) return null;
  const { lowestEquilibratedLevel: lowest, levels, text } = equilibrium(evidence);
  const used = usedFits(evidence);
  const below = lowest === null ? [] : used.filter(({ upperLevel }) => upperLevel < lowest);
  const first = Math.min(...used.map(({ upperLevel }) => upperLevel));
  const facts = {
    lowestEquilibratedLevel: lowest,
    levelsBelow: below.map(({ id }) => id).join(' '),
    densityStatus: density.status,
    neededPerCubicMetre: levels.find(({ upperLevel }) => upperLevel === first)?.neededPerCubicMetre ?? null,
  };
  const needed =
    facts.neededPerCubicMetre === null
      ? ''
      : ` For n = ${String(first)} it would take ${plain(facts.neededPerCubicMetre, 2)} electrons per m^3.`;
  const isMixed = below.length > 0 && below.length < used.length;
  return {
    id: 'partial-equilibrium',
    verdict: isMixed ? 'use with care' : 'sound',
    facts,
    text: isMixed
      ? `${text} ${listNames(below.map(({ id }) => id))} ${below.length === 1 ? 'starts' : 'start'} below that and ${below.length === 1 ? 'shares' : 'share'} in the temperature.`
      : `${text}${lowest === null || below.length > 0 ? needed : ''}`,
    remedy: isMixed
      ? 'Leave the lower levels out (analysis.levels "equilibrated") and see whether the temperature moves.'
      : '',
  };
}

/** Whether measured density, stated pressure and temperature can hold together. */
export function sahaCheck(evidence: Evidence): Check | null {
  const { density, temperature, bench } = evidence;
  const { saha } = equilibrium(evidence);
  if (saha.factor === null || saha.pressurePa === null || temperature.kelvin === null) return null;
  const gasKelvin = bench.lamp?.gasTemperatureK ?? defaultGasTemperatureK;
  // Electrons and ions alone must not press more than the lamp does.
  const leastPa = density.lowPerCubicMetre! * constants.boltzmann.value * (temperature.kelvin + gasKelvin);
  const isPossible = leastPa <= saha.pressurePa;
  return {
    id: 'saha-consistency',
    verdict: isPossible ? 'sound' : 'use with care',
    facts: {
      perCubicMetre: saha.perCubicMetre,
      factor: saha.factor,
      lowFactor: saha.lowFactor,
      highFactor: saha.highFactor,
      pressurePa: saha.pressurePa,
      leastPressurePa: leastPa,
    },
    text: isPossible
      ? saha.text
      : `Electrons and ions of the measured density press with ${plain(leastPa, 2)} Pa, more than the ${plain(saha.pressurePa, 3)} Pa stated.`,
    remedy: isPossible
      ? ''
      : 'Check lamp.pressurePa and the instrument width: what counts as Stark width may be the instrument.',
  };
}
