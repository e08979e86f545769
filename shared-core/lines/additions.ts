import { toRecordedNm, toRegisteredNm } from '../axis/axis-polynomial.ts';
import { airToVacuumNm } from '../physics/air-index.ts';
import { dopplerFwhmNm } from '../physics/broadening.ts';
import type { WindowPlan } from './choose-windows.ts';
import { fixedAt, type JointLine } from './joint-problem.ts';
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

/** Lines known to lie within a bench instrument's width of a Balmer line; nm in standard air, sources in assets/lines. */
const knownCompanions: readonly {
  readonly hostId: string;
  readonly species: string;
  readonly airNm: number;
  readonly massU: number;
}[] = [
  { hostId: 'H-gamma', species: 'Hg I', airNm: 433.922, massU: 200.59 },
  { hostId: 'H-epsilon', species: 'Ca II', airNm: 396.847, massU: 40.078 },
  { hostId: 'H-8', species: 'He I', airNm: 388.865, massU: 4.0026 },
];

/** The bands of N2 under H-gamma and H-10: a head with a tail to the violet, drawn as sticks that fade. */
const knownBands = [
  { hostId: 'H-gamma', species: 'N2', airNm: 434.36 },
  { hostId: 'H-10', species: 'N2', airNm: 380.49 },
] as const;
/** nm: distance over which the tail of an N2 band fades by a factor e, a rough mean over 300 to 2000 K. */
const bandTailNm = 1.2;
const bandStickNm = 0.1;
const bandStickCount = 24;

/**
 * Everything that might lie under the lines of this plan.
 * @param misfits  lines that the plain fit misses: bands, which take long to draw, are looked for there only
 */
export function possibleAdditions(
  input: FitLinesInput,
  plan: WindowPlan,
  misfits: ReadonlySet<string>,
): Additions {
  const hosts = new Map(plan.lines.map((line) => [line.id, line]));
  const named = [
    ...knownCompanions.map((known) => ({ ...known, isBand: false })),
    ...knownBands
      .filter(({ hostId }) => misfits.has(hostId))
      .map((known) => ({ ...known, massU: 28.0134, isBand: true })),
  ]
    .filter(({ hostId }) => hosts.has(hostId))
    .map((known): Companion => {
      const referenceNm = input.recording.medium === 'air' ? known.airNm : airToVacuumNm(known.airNm);
      const nominalCentreNm = toRecordedNm(input.registration.map, referenceNm);
      return companion(known.hostId, known.species, referenceNm, nominalCentreNm, known.massU, known.isBand);
    });
  const unknown = [...plan.neighbours].flatMap(([hostId, recordedNm]) => {
    const host = hosts.get(hostId);
    if (host === undefined) return [];
    const near = [...named.map(({ line }) => line.nominalCentreNm), ...deuteriumPlaces(host)];
    if (near.some((nm) => Math.abs(nm - recordedNm) < 0.4 * input.search.fwhmNm)) return [];
    const referenceNm = toRegisteredNm(input.registration.map, recordedNm);
    return [companion(hostId, 'unknown', referenceNm, recordedNm, 28, false)];
  });
  return {
    deuterium: input.bench.analysis?.deuterium !== 'absent',
    deuteriumIfFitted: null,
    companions: [...named, ...unknown],
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
  massU: number,
  isBand: boolean,
): Companion {
  const doppler = dopplerFwhmNm(referenceNm, 1, massU);
  const shape = { dopplerSquaredNm2PerK: doppler * doppler, fixedSquaredNm2: 0, isDeuterium: false };
  const sticks = isBand
    ? bandWeights.map((weight, k) => ({ ...shape, shiftNm: -k * bandStickNm, weight }))
    : [{ ...shape, shiftNm: 0, weight: 1 }];
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
      centreDepartureNm: fixedAt(0),
      starkDeparture: fixedAt(0),
      widthDeparture: fixedAt(0),
    },
  };
}

const bandWeights: readonly number[] = (() => {
  const ratio = 1 - bandStickNm / bandTailNm;
  const weights = Array.from({ length: bandStickCount }).reduce<number[]>(
    (list) => [...list, (list.at(-1) ?? 1 / ratio) * ratio],
    [],
  );
  const sum = weights.reduce((total, weight) => total + weight, 0);
  return weights.map((weight) => weight / sum);
})();
