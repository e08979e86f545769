import { noiseMemory } from '../noise/noise-memory.ts';
import type { Additions, PossibleAdditions } from './additions.ts';
import type { Companion } from './companion.ts';
import { lineBase } from './joint-problem.ts';
import { residualLine } from './residual-line.ts';
import { scoreNitrogen } from './score-nitrogen.ts';
import { baselineTerm, shareColumn } from './segment-basis.ts';
import { scoreColumn, type Estimate, type Score, type SegmentColumn } from './score-column.ts';
import type { SolvedFit } from './solved-fit.ts';

/** Standard deviations: light that is added when it is this plain; about ten places are looked at in a recording. */
const leastSignificance = 4;
/** For a line anywhere beside: some hundred places are looked at. */
const leastResidual = 5;
/** A straight baseline is given up for a curved one at this significance: it costs the areas little. */
const leastCurvature = 3.3;
/** Below this an addition is taken for noise, which the areas' own uncertainty holds already. */
const leastHint = 2;

interface Candidate {
  readonly z: number;
  /** Segment it changes; null when it changes all. */
  readonly segment: number | null;
  readonly add: (to: Additions) => Additions;
}

/**
 * The additions that the data of a fit ask for next, each scored by itself. Light has to be positive. The plainest is
 * taken, and others only where it does not reach, since one neighbour left out raises the scores of all at its place.
 *
 * @returns what the fit should hold now; nothing but `present` with its scores when nothing more is asked for
 * @check  test/property/additions.test.ts
 */
export function nextAdditions(fit: SolvedFit, present: Additions, possible: PossibleAdditions): Additions {
  const { problem, solution } = fit;
  // Where the fit itself misses by more than noise, or noise is shared by neighbours, so will every addition.
  const misfit = Math.sqrt(
    Math.max(1, solution.chiSquare / Math.max(1, solution.degreesOfFreedom)) *
      noiseMemory(problem.recording.noise.correlation).varianceOfMean,
  );
  const score = (parts: readonly SegmentColumn[]): Score => scoreColumn(fit, parts, misfit);
  const candidates: Candidate[] = [];
  let deuteriumIfFitted: Additions['deuteriumIfFitted'] = null;
  if (possible.deuterium && !present.deuterium) {
    const { z, sigma } = score(deuteriumColumns(fit));
    deuteriumIfFitted = { ratio: z * sigma, ratioSigma: sigma };
    if (z > leastSignificance)
      candidates.push({ z, segment: null, add: (to) => ({ ...to, deuterium: true }) });
  }
  const leftOut: { readonly z: number; readonly areaShift: Float64Array }[] = [];
  const leaveOut = (z: number, estimates: readonly Estimate[]): void => {
    const shift = (parameter: number): number =>
      estimates.reduce((sum, { amount, shiftOf }) => sum + amount * shiftOf(parameter), 0);
    leftOut.push({ z, areaShift: Float64Array.from(problem.lines, (_, line) => shift(lineBase(line))) });
  };
  for (const companion of possible.companions) {
    if (has(present, companion)) continue;
    const segment = problem.segments.findIndex(({ lines }) =>
      lines.some((line) => problem.lines[line]!.id === companion.hostId),
    );
    const { z, sigma, shiftOf } = score([{ segment, values: companionColumn(fit, companion, segment) }]);
    if (z > leastSignificance)
      candidates.push({
        z,
        segment,
        add: (to) => ({ ...to, companions: [...to.companions, companion] }),
      });
    else if (z > leastHint) leaveOut(z, [{ amount: z * sigma, shiftOf }]);
  }
  for (const segment of problem.segments.keys()) {
    const companion = residualLine(fit, possible.map, segment, leastResidual * misfit);
    if (companion === null || has(present, companion)) continue;
    const { z } = score([{ segment, values: companionColumn(fit, companion, segment) }]);
    if (z > leastResidual)
      candidates.push({
        z,
        segment,
        add: (to) => ({ ...to, companions: [...to.companions, companion] }),
      });
  }
  for (const segment of possible.curvedSegments) {
    if (present.curvedSegments.has(segment)) continue;
    const { z: signed, sigma, shiftOf } = score([{ segment, values: curvatureColumn(fit, segment) }]);
    const z = Math.abs(signed);
    if (z > leastHint) leaveOut(z, [{ amount: signed * sigma, shiftOf }]);
    if (z > leastCurvature)
      candidates.push({
        z,
        segment,
        add: (to) => ({ ...to, curvedSegments: new Set([...to.curvedSegments, segment]) }),
      });
  }
  if (!present.companions.some(({ species }) => species === 'N2')) {
    const rivals = (segment: number): number =>
      Math.max(0, ...candidates.filter((each) => each.segment === segment).map((each) => each.z));
    const { z, estimates, companions } = scoreNitrogen(fit, possible.nitrogen, score, rivals);
    if (z > leastSignificance)
      candidates.push({
        z,
        segment: null,
        add: (to) => ({ ...to, companions: [...to.companions, ...companions] }),
      });
    else if (z > leastHint) leaveOut(z, estimates);
  }
  return addPlainest({ ...present, deuteriumIfFitted, leftOut }, candidates);
}

function addPlainest(present: Additions, candidates: Candidate[]): Additions {
  candidates.sort((a, b) => b.z - a.z);
  const touched = new Set<number>();
  let result = present;
  for (const { segment, add } of candidates) {
    if (segment === null ? touched.size > 0 : touched.has(segment)) continue;
    result = add(result);
    if (segment === null) break;
    touched.add(segment);
  }
  return result;
}

const has = ({ companions }: Additions, { line }: Companion): boolean =>
  companions.some((present) => present.line.id === line.id);

/** Light per unit of the D/H ratio: every line's area on its deuterium sticks; lines below 2 % of the brightest tell nothing. */
function deuteriumColumns({ problem, solution }: SolvedFit): SegmentColumn[] {
  const areaOf = (line: number): number => solution.values[lineBase(line)]!;
  const brightest = Math.max(...Array.from(problem.lines.keys(), areaOf));
  const isTelling = (line: number): boolean => areaOf(line) > 0.02 * brightest;
  return problem.segments.flatMap((segment, index) => {
    const telling = segment.lines.filter(isTelling);
    if (telling.length === 0) return [];
    const values = new Float64Array(segment.endPx - segment.firstPx);
    for (const line of telling) {
      const area = areaOf(line);
      const share = shareColumn(problem, solution.values, problem.lines[line]!, segment, {
        isDeuterium: true,
      });
      for (let i = 0; i < values.length; i++) values[i] = values[i]! + area * share[i]!;
    }
    return [{ segment: index, values }];
  });
}

const companionColumn = (
  { problem, solution }: SolvedFit,
  { line }: Companion,
  segment: number,
): Float64Array =>
  shareColumn(problem, solution.values, line, problem.segments[segment]!, { isDeuterium: false });

const curvatureColumn = ({ problem }: SolvedFit, index: number): Float64Array => {
  const segment = problem.segments[index]!;
  return Float64Array.from({ length: segment.endPx - segment.firstPx }, (_, i) =>
    baselineTerm(segment, 2, i),
  );
};
