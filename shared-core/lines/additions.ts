import { toRecordedNm, toRegisteredNm } from '../axis/axis-polynomial.ts';
import { airToVacuumNm } from '../physics/air-index.ts';
import { dopplerFwhmNm } from '../physics/broadening.ts';
import type { WindowPlan } from './choose-windows.ts';
import { fixedAt, type JointLine, type Stick } from './joint-problem.ts';
import type { FitLinesInput } from './solved-fit.ts';

/** What a joint fit may hold beyond the Balmer lines on straight baselines. */
export interface Additions {
  readonly deuterium: boolean;
  /** What the D/H ratio would come to if it were fitted, when it is not; null when it was not asked for. */
  readonly deuteriumIfFitted: { readonly ratio: number; readonly ratioSigma: number } | null;
  readonly companions: readonly Companion[];
  /** Segments whose baseline is curved. */
  readonly curvedSegments: ReadonlySet<number>;
  /** For each segment left straight: how plain its curvature is, and what fitting it would do to each line's area. */
  readonly curvaturesLeftOut: readonly { readonly z: number; readonly areaShift: Float64Array }[];
}

/** A line of something else under or beside a Balmer line. */
export interface Companion {
  readonly hostId: string;
  readonly species: string;
  readonly line: JointLine;
}

export const noAdditions: Additions = Object.freeze({
  deuterium: false,
  deuteriumIfFitted: null,
  companions: [],
  curvedSegments: new Set<number>(),
  curvaturesLeftOut: [],
});

/** Light of another species at a known place under a Balmer line. */
interface KnownCompanion {
  readonly hostId: string;
  readonly species: string;
  /** nm in standard air; sources in assets/lines. */
  readonly airNm: number;
  readonly sticks: readonly Stick[];
}

/** Lines known to lie within a bench instrument's width of a Balmer line. */
const knownLines: readonly KnownCompanion[] = [
  { hostId: 'H-gamma', species: 'Hg I', airNm: 433.922, sticks: [narrowStick(433.922, 200.59)] },
  { hostId: 'H-epsilon', species: 'Ca II', airNm: 396.847, sticks: [narrowStick(396.847, 40.078)] },
  { hostId: 'H-8', species: 'He I', airNm: 388.865, sticks: [narrowStick(388.865, 4.0026)] },
];

/** The bands of N2 under H-gamma and H-10: a head with a tail to the violet, drawn as sticks that fade. */
const knownBands: readonly KnownCompanion[] = [
  { hostId: 'H-gamma', species: 'N2', airNm: 434.36, sticks: bandSticks(434.36, 28.0134) },
  { hostId: 'H-10', species: 'N2', airNm: 380.49, sticks: bandSticks(380.49, 28.0134) },
];

function narrowStick(nm: number, massU: number): Stick {
  const doppler = dopplerFwhmNm(nm, 1, massU);
  return {
    shiftNm: 0,
    weight: 1,
    dopplerSquaredNm2PerK: doppler * doppler,
    fixedSquaredNm2: 0,
    isDeuterium: false,
  };
}

/**
 * Sticks every 0.1 nm to the violet of a head, each 8 % fainter than the one before: the tail falls by a factor e over
 * 1.2 nm, a rough mean over 300 to 2000 K (own choice, from memory of such bands).
 */
function bandSticks(headNm: number, massU: number): readonly Stick[] {
  const spacingNm = 0.1;
  const fading = 1 - spacingNm / 1.2;
  const strengths = [1];
  while (strengths.length < 24) strengths.push(strengths.at(-1)! * fading);
  const sum = strengths.reduce((total, strength) => total + strength, 0);
  return strengths.map((strength, k) => ({
    ...narrowStick(headNm, massU),
    shiftNm: -k * spacingNm,
    weight: strength / sum,
  }));
}

/**
 * Everything that might lie under the lines of this plan.
 * @param misfits  lines that the plain fit misses: bands, which take long to draw, are looked for there only
 */
export function possibleAdditions(
  input: FitLinesInput,
  plan: WindowPlan,
  misfits: ReadonlySet<string>,
): Additions {
  const { map } = input.registration;
  const companions: Companion[] = [];
  for (const host of plan.lines) {
    const known = misfits.has(host.id) ? [...knownLines, ...knownBands] : knownLines;
    for (const { hostId, species, airNm, sticks } of known) {
      if (hostId !== host.id) continue;
      const referenceNm = input.recording.medium === 'air' ? airNm : airToVacuumNm(airNm);
      companions.push(companion(hostId, species, referenceNm, toRecordedNm(map, referenceNm), sticks));
    }
    const recordedNm = plan.neighbours.get(host.id);
    if (recordedNm === undefined) continue;
    const named = companions.map(({ line }) => line.nominalCentreNm).concat(deuteriumPlaces(host));
    if (named.some((nm) => Math.abs(nm - recordedNm) < 0.4 * input.search.fwhmNm)) continue;
    const referenceNm = toRegisteredNm(map, recordedNm);
    companions.push(companion(host.id, 'unknown', referenceNm, recordedNm, [narrowStick(referenceNm, 28)]));
  }
  return {
    deuterium: input.bench.analysis?.deuterium !== 'absent',
    deuteriumIfFitted: null,
    companions,
    curvedSegments: new Set(plan.segments.keys()),
    curvaturesLeftOut: [],
  };
}

/** Where the deuterium lines beside a Balmer line lie, nm on the recorded axis. */
export const deuteriumPlaces = ({ nominalCentreNm, sticks }: JointLine): number[] =>
  sticks.filter(({ isDeuterium }) => isDeuterium).map(({ shiftNm }) => nominalCentreNm + shiftNm);

function companion(
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
      id: `${species} at ${hostId}`,
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
