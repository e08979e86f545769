import { toRecordedNm, toRegisteredNm } from '../axis/axis-polynomial.ts';
import type { AxisRegistration } from '../axis/register-axis.ts';
import { airToVacuumNm } from '../physics/air-index.ts';
import type { WindowPlan } from './choose-windows.ts';
import { companionAt, narrowStick, neighbourSpecies, type Companion } from './companion.ts';
import type { JointLine, Stick } from './joint-problem.ts';
import { nitrogenPlaces, type BandPlace } from './nitrogen-bands.ts';
import type { FitLinesInput } from './solved-fit.ts';

/** What a joint fit may hold beyond the Balmer lines on straight baselines. */
export interface Additions {
  readonly deuterium: boolean;
  /** What the D/H ratio would come to if it were fitted, when it is not; null when it was not asked for. */
  readonly deuteriumIfFitted: { readonly ratio: number; readonly ratioSigma: number } | null;
  readonly companions: readonly Companion[];
  /** Segments whose baseline is curved. */
  readonly curvedSegments: ReadonlySet<number>;
  /** What is hinted at but not fitted: how plain it is, and what fitting it would do to each line's area. */
  readonly leftOut: readonly { readonly z: number; readonly areaShift: Float64Array }[];
}

export const noAdditions: Additions = Object.freeze({
  deuterium: false,
  deuteriumIfFitted: null,
  companions: [],
  curvedSegments: new Set<number>(),
  leftOut: [],
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

/** What may be added. */
export interface PossibleAdditions {
  readonly deuterium: boolean;
  readonly companions: readonly Companion[];
  readonly nitrogen: readonly BandPlace[];
  /** Where the axis puts a line that the residuals show. */
  readonly map: AxisRegistration['map'];
  readonly curvedSegments: readonly number[];
}

/** Everything that might lie under the lines of this plan. */
export function possibleAdditions(input: FitLinesInput, plan: WindowPlan): PossibleAdditions {
  const { map } = input.registration;
  const companions: Companion[] = [];
  for (const host of plan.lines) {
    for (const { hostId, species, airNm, sticks } of knownLines) {
      if (hostId !== host.id) continue;
      const referenceNm = input.recording.medium === 'air' ? airNm : airToVacuumNm(airNm);
      companions.push(companionAt(hostId, species, referenceNm, toRecordedNm(map, referenceNm), sticks));
    }
    for (const { lineId, recordedNm } of plan.maskedPeaks) {
      if (lineId !== host.id) continue;
      const referenceNm = toRegisteredNm(map, recordedNm);
      companions.push(
        companionAt(lineId, neighbourSpecies, referenceNm, recordedNm, [narrowStick(referenceNm, 28)]),
      );
    }
    const recordedNm = plan.neighbours.get(host.id);
    if (recordedNm === undefined) continue;
    const named = companions
      .filter(({ species }) => species !== neighbourSpecies)
      .map(({ line }) => line.nominalCentreNm)
      .concat(deuteriumPlaces(host));
    if (named.some((nm) => Math.abs(nm - recordedNm) < 0.4 * input.search.fwhmNm)) continue;
    const referenceNm = toRegisteredNm(map, recordedNm);
    companions.push(companionAt(host.id, 'unknown', referenceNm, recordedNm, [narrowStick(referenceNm, 28)]));
  }
  return {
    deuterium: input.bench.analysis?.deuterium !== 'absent',
    companions,
    nitrogen: nitrogenPlaces(input, plan, input.search.fwhmNm),
    map,
    curvedSegments: [...plan.segments.keys()],
  };
}

/** Where the deuterium lines beside a Balmer line lie, nm on the recorded axis. */
export const deuteriumPlaces = ({ nominalCentreNm, sticks }: JointLine): number[] =>
  sticks.filter(({ isDeuterium }) => isDeuterium).map(({ shiftNm }) => nominalCentreNm + shiftNm);
