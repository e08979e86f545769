import type { Additions, Companion } from './additions.ts';
import { createJointModel } from './joint-model.ts';
import { deuteriumIndex, lineBase, segmentBase, type JointProblem } from './joint-problem.ts';
import { noiseMemory } from '../noise/noise-memory.ts';
import type { SolvedFit } from './solved-fit.ts';

/** Standard deviations: light that is added when it is this plain; about ten places are looked at in a recording. */
const leastSignificance = 4;
/** A straight baseline is given up for a curved one at this significance: it costs the areas little. */
const leastCurvature = 3.3;
/** Below this a curvature is taken for noise, which the areas' own uncertainty holds already. */
const leastHint = 2;

interface Candidate {
  readonly z: number;
  /** Segment it changes; null when it changes all. */
  readonly segment: number | null;
  readonly add: (to: Additions) => Additions;
}

/**
 * The additions that the data of a fit ask for next, by the score test: the wider model is evaluated once at the fitted
 * values; each addition by itself would come to g/v with variance 1/v, g = g_k - b^T C g_0, v = N_kk - b^T C b,
 * where N and g are its normal matrix and gradient, b the row of the addition, C the covariance of the fit, and
 * z = g/sqrt(v). Light has to be positive. The plainest is taken, and others only where it does not reach, since one
 * neighbour left out raises the scores of all others at its place.
 *
 * @param wider  the same problem with everything in `possible` added
 * @returns what the fit should hold now; the same object as `present` when nothing more is asked for
 * @source [Rao1948]
 * @check  test/property/additions.test.ts
 */
export function nextAdditions(
  fit: SolvedFit,
  wider: JointProblem,
  present: Additions,
  possible: Additions,
): Additions {
  const score = scoreTest(fit, wider);
  const deuterium = score(deuteriumIndex);
  const known: Additions = {
    ...present,
    deuteriumIfFitted:
      possible.deuterium && !present.deuterium
        ? { ratio: deuterium.z * deuterium.sigma, ratioSigma: deuterium.sigma }
        : null,
  };
  const candidates: Candidate[] = [];
  if (possible.deuterium && !present.deuterium && deuterium.z > leastSignificance)
    candidates.push({ z: deuterium.z, segment: null, add: (to) => ({ ...to, deuterium: true }) });
  for (const companion of possible.companions) {
    if (has(present, companion)) continue;
    const line = wider.lines.findIndex(({ id }) => id === companion.line.id);
    const { z } = score(lineBase(line));
    if (z > leastSignificance)
      candidates.push({
        z,
        segment: wider.segments.findIndex(({ lines }) => lines.includes(line)),
        add: (to) => ({ ...to, companions: [...to.companions, companion] }),
      });
  }
  const left: { readonly z: number; readonly areaShift: Float64Array }[] = [];
  for (const segment of possible.curvedSegments) {
    if (present.curvedSegments.has(segment)) continue;
    const { z: signed, sigma, shiftOf } = score(segmentBase(wider.lines.length, segment) + 2);
    const z = Math.abs(signed);
    if (z > leastHint)
      left.push({
        z,
        areaShift: Float64Array.from(
          fit.problem.lines,
          (_, line) => signed * sigma * shiftOf(lineBase(line)),
        ),
      });
    if (z > leastCurvature)
      candidates.push({
        z,
        segment,
        add: (to) => ({ ...to, curvedSegments: new Set([...to.curvedSegments, segment]) }),
      });
  }
  candidates.sort((a, b) => b.z - a.z);
  const touched = new Set<number>();
  let result: Additions = { ...known, curvaturesLeftOut: left };
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

interface Score {
  readonly z: number;
  readonly sigma: number;
  /** By what a parameter of the fit would move for one unit of the addition. */
  readonly shiftOf: (parameter: number) => number;
}

const untold: Score = Object.freeze({ z: 0, sigma: Infinity, shiftOf: () => 0 });

/** Evaluates the wider model; the function returned scores one parameter of it. */
function scoreTest(fit: SolvedFit, wider: JointProblem) {
  const { problem, model, solution } = fit;
  // With nothing added yet it models the same light, so it may write where the fit wrote.
  const probe = createJointModel(wider, model);
  for (const [parameter, value] of carryValues(problem, wider, solution.values))
    probe.values[parameter] = value;
  const { normal, right } = evaluated(probe);
  const size = probe.active.length;
  const position = new Map(Array.from(probe.active, (parameter, index) => [parameter, index]));
  const toWider = widerNumbers(problem, wider);
  const rows = Array.from(model.active, (parameter) => position.get(toWider[parameter]!)!);
  // Where the fit itself misses by more than noise, so will every addition.
  const misfit = Math.sqrt(
    Math.max(1, solution.chiSquare / Math.max(1, solution.degreesOfFreedom)) *
      noiseMemory(problem.recording.noise.correlation).varianceOfMean,
  );
  return (parameter: number): Score => {
    const k = position.get(parameter);
    if (k === undefined) return untold;
    let gradient = right[k]!;
    let information = normal[k * size + k]!;
    // An addition shares pixels with few parameters: those of its own segments.
    const touched = rows.flatMap((row, i) => (normal[k * size + row] === 0 ? [] : [i]));
    for (const i of touched) {
      const from = model.active[i]! * model.parameterCount;
      const weight = normal[k * size + rows[i]!]!;
      for (const j of touched) {
        const reach = weight * solution.covariance[from + model.active[j]!]!;
        information -= reach * normal[k * size + rows[j]!]!;
        gradient -= reach * right[rows[j]!]!;
      }
    }
    if (!(information > 1e-9 * normal[k * size + k]!)) return untold;
    return {
      z: gradient / Math.sqrt(information) / misfit,
      sigma: misfit / Math.sqrt(information),
      shiftOf: (of) =>
        -touched.reduce(
          (sum, j) =>
            sum +
            solution.covariance[of * model.parameterCount + model.active[j]!]! * normal[k * size + rows[j]!]!,
          0,
        ),
    };
  };
}

function evaluated(probe: ReturnType<typeof createJointModel>) {
  const evaluation = probe.newEvaluation();
  probe.evaluate(probe.values, evaluation);
  return evaluation;
}

/** Number in `wider` of each parameter of `problem`; lines are known by their ids. */
function widerNumbers(problem: JointProblem, wider: JointProblem): Int32Array {
  const numbers = Int32Array.from(
    { length: segmentBase(problem.lines.length, problem.segments.length) },
    (_, i) => i,
  );
  for (const [index, { id }] of problem.lines.entries()) {
    const to = lineBase(wider.lines.findIndex((line) => line.id === id));
    for (let k = lineBase(index); k < lineBase(index + 1); k++) numbers[k] = to + k - lineBase(index);
  }
  const shift = segmentBase(wider.lines.length, 0) - segmentBase(problem.lines.length, 0);
  for (let k = segmentBase(problem.lines.length, 0); k < numbers.length; k++) numbers[k] = k + shift;
  return numbers;
}

/** The values of a fit as a start for a problem with further lines, those without light. */
export function carryValues(
  problem: JointProblem,
  wider: JointProblem,
  values: Float64Array,
): ReadonlyMap<number, number> {
  const start = new Map(Array.from(wider.lines.keys(), (line) => [lineBase(line), 0]));
  widerNumbers(problem, wider).forEach((parameter, index) => start.set(parameter, values[index]!));
  return start;
}
