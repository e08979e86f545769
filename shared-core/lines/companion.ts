import { dopplerFwhmNm } from '../physics/broadening.ts';
import { fixedAt, type JointLine, type Stick } from './joint-problem.ts';

/** Species of a line beside a Balmer line that has no name here: its wing, or all of it, is fitted along. */
export const neighbourSpecies = 'neighbour';

/** A line of something else under or beside a Balmer line. */
export interface Companion {
  readonly hostId: string;
  readonly species: string;
  readonly line: JointLine;
}

/** A line as the instrument alone draws it, but for its Doppler width. */
export function narrowStick(nm: number, massU: number): Stick {
  const doppler = dopplerFwhmNm(nm, 1, massU);
  return {
    shiftNm: 0,
    weight: 1,
    dopplerSquaredNm2PerK: doppler * doppler,
    fixedSquaredNm2: 0,
    isDeuterium: false,
  };
}

export function companionAt(
  hostId: string,
  species: string,
  referenceNm: number,
  nominalCentreNm: number,
  sticks: readonly Stick[],
): Companion {
  return {
    hostId,
    species,
    line: {
      id: `${species} ${referenceNm} at ${hostId}`,
      referenceNm,
      nominalCentreNm,
      sticks,
      starkRatio: 0,
      fixedLorentzianFwhmNm: 0,
      centreDepartureNm: held,
      starkDeparture: held,
      widthDeparture: held,
    },
  };
}

const held = fixedAt(0);
