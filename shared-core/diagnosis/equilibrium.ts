import {
  griemPartialEquilibriumDensity,
  lowestEquilibratedLevel,
  mcWhirterDensity,
  seriesLimitDensity,
} from '../physics/equilibrium.ts';
import { levelEnergyEv } from '../physics/hydrogen-levels.ts';
import { equilibriumElectronDensity } from '../physics/local-equilibrium.ts';
import type { Diagnosis } from './diagnosis.ts';
import type { Evidence } from './evidence.ts';
import { plain } from './plain-number.ts';

type Equilibrium = Diagnosis['equilibrium'];
type Status = Equilibrium['complete']['status'];

/** A series member counts as seen at this many sigma. */
const leastSeen = 5;
/** The relation of Inglis and Teller is good to this factor; forms in use differ by more. */
const seriesLimitFactor = 3;

/**
 * What the electron density says of equilibrium: partial (Griem) level by level, complete (McWhirter), the density that
 * equilibrium at the stated pressure would have (Saha), and the bound from the highest series member.
 *
 * The measured temperature stands in for the electrons'; the criteria go with its square root only.
 *
 * @source [Griem1963]; [McWhirter1965]; [Saha1920]; [Inglis1939]
 * @check  test/unit/diagnosis/equilibrium.test.ts
 */
export function equilibrium(evidence: Evidence): Equilibrium {
  const { density, temperature, fits } = evidence;
  const { kelvin } = temperature;
  const byLevel = new Map<number, string[]>();
  for (const { id, upperLevel } of fits.fits)
    byLevel.set(upperLevel, [...(byLevel.get(upperLevel) ?? []), id]);
  const levels = [...byLevel].map(([upperLevel, lineIds]) => {
    const needed = kelvin === null ? null : griemPartialEquilibriumDensity(upperLevel, kelvin);
    return { upperLevel, lineIds, neededPerCubicMetre: needed, status: statusOf(evidence, needed) };
  });
  const neededForAll = kelvin === null ? null : mcWhirterDensity(kelvin, levelEnergyEv(2));
  const lowest =
    kelvin === null || density.lowPerCubicMetre === null
      ? null
      : lowestEquilibratedLevel(density.lowPerCubicMetre, kelvin);
  return {
    densityStatus: density.status,
    lowestEquilibratedLevel: lowest,
    levels,
    complete: { neededPerCubicMetre: neededForAll, status: statusOf(evidence, neededForAll) },
    saha: saha(evidence),
    seriesLimit: seriesLimit(evidence),
    text: summary(evidence, lowest),
  };
}

function statusOf({ density }: Evidence, needed: number | null): Status {
  if (needed === null) return 'not-known';
  if (density.lowPerCubicMetre !== null && density.lowPerCubicMetre >= needed) return 'equilibrated';
  if (density.highPerCubicMetre !== null && density.highPerCubicMetre < needed) return 'not-equilibrated';
  return 'not-known';
}

function summary({ density, temperature }: Evidence, lowest: number | null): string {
  if (temperature.kelvin === null) return 'Without a temperature nothing can be said of equilibrium.';
  if (lowest !== null)
    return `Levels from n = ${String(lowest)} up are in equilibrium with the free electrons.`;
  if (density.status === 'measured')
    return 'The density holds no level in equilibrium with the free electrons.';
  return density.status === 'upper-limit'
    ? 'Only an upper limit of the density is known, and that shows no level to be in equilibrium.'
    : 'The density is not known, so no level is shown to be in equilibrium.';
}

const hydrogenNames = new Set(['', 'h2', 'd2', 'h', 'd', 'hd', 'hydrogen', 'deuterium']);

function saha({ bench, density, temperature }: Evidence): Equilibrium['saha'] {
  const pressurePa = bench.lamp?.pressurePa ?? null;
  const { kelvin, lowKelvin, highKelvin } = temperature;
  const none = (text: string): Equilibrium['saha'] => ({
    perCubicMetre: null,
    pressurePa,
    factor: null,
    lowFactor: null,
    highFactor: null,
    text,
  });
  if (kelvin === null || lowKelvin === null || highKelvin === null) return none('There is no temperature.');
  if (pressurePa === null) return none('The bench file states no pressure.');
  const gas = (bench.lamp?.gas ?? '').trim();
  if (!hydrogenNames.has(gas.toLowerCase())) {
    return none(`The sum holds for pure hydrogen, and the gas is ${gas}.`);
  }
  const perCubicMetre = equilibriumElectronDensity(kelvin, pressurePa);
  const would = `In complete equilibrium at ${plain(pressurePa, 3)} Pa and ${plain(kelvin, 3)} K, dissociation included, hydrogen would hold ${plain(perCubicMetre, 2)} electrons per m^3`;
  if (density.perCubicMetre === null) {
    return { ...none(`${would}; no measured density stands against that.`), perCubicMetre };
  }
  const factor = density.perCubicMetre / perCubicMetre;
  const lowFactor = density.lowPerCubicMetre! / equilibriumElectronDensity(highKelvin, pressurePa);
  const highFactor = density.highPerCubicMetre! / equilibriumElectronDensity(lowKelvin, pressurePa);
  const sense =
    lowFactor > 1
      ? 'the gas recombines, its pressure is another, or its electrons are hotter than this temperature'
      : highFactor < 1
        ? 'the gas is short of complete equilibrium'
        : 'the two agree';
  return {
    perCubicMetre,
    pressurePa,
    factor,
    lowFactor,
    highFactor,
    text: `${would}; measured is ${plain(factor, 2)} times that (${plain(lowFactor, 2)} to ${plain(highFactor, 2)}): ${sense}.`,
  };
}

function seriesLimit({ fits }: Evidence): Equilibrium['seriesLimit'] {
  const seen = fits.fits.filter((fit) => fit.status === 'converged' && fit.area > leastSeen * fit.areaSigma);
  const last = seen.reduce<(typeof seen)[number] | null>(
    (so, fit) => (so === null || fit.upperLevel > so.upperLevel ? fit : so),
    null,
  );
  if (last === null)
    return { highestLevel: null, lineId: null, highPerCubicMetre: null, text: 'No series member is seen.' };
  const highPerCubicMetre = seriesLimitFactor * seriesLimitDensity(last.upperLevel);
  return {
    highestLevel: last.upperLevel,
    lineId: last.id,
    highPerCubicMetre,
    text: `${last.id} is the highest member seen among those looked for, so the density lies below ${plain(highPerCubicMetre, 1)} per m^3 (a factor of ${String(seriesLimitFactor)} allowed; a coarse instrument merges the lines by itself, so this is a bound and no measurement).`,
  };
}
