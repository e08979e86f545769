import { toRecordedNm, toRegisteredNm } from '../axis/axis-polynomial.ts';
import { airToVacuumNm } from '../physics/air-index.ts';
import { dopplerFwhmNm } from '../physics/broadening.ts';
import type { WindowPlan } from './choose-windows.ts';
import { createJointModel } from './joint-model.ts';
import {
  deuteriumIndex,
  fixedAt,
  lineBase,
  segmentBase,
  type JointLine,
  type JointProblem,
} from './joint-problem.ts';
import type { FitLinesInput, SolvedFit } from './solved-fit.ts';

/** What a joint fit may hold beyond the Balmer lines on straight baselines. */
export interface Additions {
  readonly deuterium: boolean;
  /** Standard uncertainty that the D/H ratio would have if it were fitted. */
  readonly deuteriumSigma: number;
  readonly companions: readonly Companion[];
  /** Segments whose baseline is curved. */
  readonly curvedSegments: ReadonlySet<number>;
}

/** A line of something else under or beside a Balmer line. */
export interface Companion {
  readonly hostId: string;
  readonly species: string;
  readonly line: JointLine;
}

export const noAdditions: Additions = Object.freeze({
  deuterium: false,
  deuteriumSigma: Infinity,
  companions: [],
  curvedSegments: new Set<number>(),
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

/** Standard deviations: light that is added when it is this plain; about ten places are looked at in a recording. */
const leastSignificance = 4;
/** A straight baseline is given up for a curved one at this significance: it costs the areas little. */
const leastCurvature = 3.3;

/** Everything that might lie under the lines of this plan. */
export function possibleAdditions(input: FitLinesInput, plan: WindowPlan): Additions {
  const hosts = new Map(plan.lines.map((line) => [line.id, line]));
  const named = [
    ...knownCompanions.map((known) => ({ ...known, isBand: false })),
    ...knownBands.map((known) => ({ ...known, massU: 28.0134, isBand: true })),
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
    deuteriumSigma: Infinity,
    companions: [...named, ...unknown],
    curvedSegments: new Set(plan.segments.keys()),
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
      id: `${species} ${referenceNm.toFixed(2)}`,
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

/**
 * Which of the possible additions the data of a fit ask for, by the score test: the wider model is evaluated once at
 * the fitted values; each addition by itself would come to e = (g_k - b^T C g)/v with variance 1/v, v = N_kk - b^T C b,
 * where N and g are its normal matrix and gradient, b the row of the addition, C the covariance of the fit. Light has to
 * be positive.
 *
 * @param wider  the same problem with everything in `possible` added
 * @source [Rao1948]
 * @check  test/property/additions.test.ts
 */
export function neededAdditions(fit: SolvedFit, wider: JointProblem, possible: Additions): Additions {
  const { problem, model, solution } = fit;
  // With nothing added yet it models the same light, so it may write where the fit wrote.
  const probe = createJointModel(wider, model);
  const at = carryValues(problem, wider, solution.values);
  for (const [parameter, value] of at) probe.values[parameter] = value;
  const evaluation = probe.newEvaluation();
  probe.evaluate(probe.values, evaluation);
  const size = probe.active.length;
  const position = new Map([...probe.active].map((parameter, index) => [parameter, index]));
  const rows = Array.from(model.active, (parameter) =>
    position.get(widerParameter(problem, wider, parameter))!,
  );
  const misfit = Math.sqrt(Math.max(1, solution.chiSquare / Math.max(1, solution.degreesOfFreedom)));
  const score = (parameter: number): { readonly z: number; readonly sigma: number } => {
    const k = position.get(parameter);
    if (k === undefined) return { z: 0, sigma: Infinity };
    let gradient = evaluation.right[k]!;
    let information = evaluation.normal[k * size + k]!;
    // An addition shares pixels with few parameters: those of its own segments.
    const touched = rows.flatMap((row, i) => (evaluation.normal[k * size + row] === 0 ? [] : [i]));
    for (const i of touched) {
      const from = model.active[i]! * model.parameterCount;
      const weight = evaluation.normal[k * size + rows[i]!]!;
      for (const j of touched) {
        const covariance = solution.covariance[from + model.active[j]!]!;
        information -= weight * covariance * evaluation.normal[k * size + rows[j]!]!;
        gradient -= weight * covariance * evaluation.right[rows[j]!]!;
      }
    }
    if (!(information > 0)) return { z: 0, sigma: Infinity };
    return { z: gradient / Math.sqrt(information) / misfit, sigma: misfit / Math.sqrt(information) };
  };
  const deuterium = score(deuteriumIndex);
  const firstCompanion = wider.lines.length - possible.companions.length;
  return {
    deuterium: deuterium.z > leastSignificance,
    deuteriumSigma: deuterium.sigma,
    companions: possible.companions.filter(
      (_, index) => score(lineBase(firstCompanion + index)).z > leastSignificance,
    ),
    curvedSegments: new Set(
      [...possible.curvedSegments].filter(
        (s) => Math.abs(score(segmentBase(wider.lines.length, s) + 2).z) > leastCurvature,
      ),
    ),
  };
}

/** Number in `wider` of a parameter of `problem`, whose lines are the first of the wider one's. */
function widerParameter(problem: JointProblem, wider: JointProblem, parameter: number): number {
  const firstSegment = segmentBase(problem.lines.length, 0);
  return parameter < firstSegment
    ? parameter
    : segmentBase(wider.lines.length, 0) + (parameter - firstSegment);
}

/** The values of a fit as a start for a problem with further lines. */
export function carryValues(
  problem: JointProblem,
  wider: JointProblem,
  values: Float64Array,
): ReadonlyMap<number, number> {
  const start = new Map<number, number>();
  values.forEach((value, parameter) => start.set(widerParameter(problem, wider, parameter), value));
  for (let line = problem.lines.length; line < wider.lines.length; line++) start.set(lineBase(line), 0);
  return start;
}
