import { minimise, type FitStatus, type IterationRule } from './damped-iteration.ts';
import { invariant } from '../result/result.ts';
import { createQrEngine, type ColumnScale } from './least-squares-engine.ts';
import type { LeastSquaresFit, LeastSquaresProblem } from './least-squares-problem.ts';
import { parameterCovariance } from './parameter-covariance.ts';
import { log } from './portable-math.ts';

export interface LeastSquaresSolution extends LeastSquaresFit {
  /** How the fit from each start ended, in the order of the starts. */
  readonly byStart: readonly { readonly status: FitStatus; readonly chiSquare: number }[];
}

interface Attempt {
  readonly fit: LeastSquaresFit;
  /** Chi-square + sum ln V, which compares solutions whose weights differ. */
  readonly deviance: number;
}

const epsilon = 2.220446049250313e-16;
/** A step that should gain less than this share of the objective moves nothing by more than 1e-9 of the noise it sees. */
const gainTolerance = 1e-18;
/** Renewed weights that gained less chi-square than this moved nothing by more than 0.001 of a standard deviation. */
const settledGain = 1e-6;
const maxReweighings = 50;
/** A curved valley that QR can follow may need thousands of short steps. */
const defaultEvaluations = 5000;

interface Manner {
  readonly firstDamping: number;
  readonly columnScale: ColumnScale;
}

const usual: Manner = { firstDamping: 0.01, columnScale: 'current' };
/** For a start from which the usual manner does not converge: short first steps, and no parameter gets loose. */
const cautious: Manner = { firstDamping: 100, columnScale: 'longest' };

/**
 * Nonlinear least squares, min sum (y - m)^2 / V, with analytic derivatives: Gauss-Newton steps with Marquardt damping on
 * QR factors of the scaled Jacobian (not on normal equations, which would square its condition number).
 *
 * Parameters may have bounds; V may follow the model; several starts are tried where one is not safe.
 *
 * @returns the best of all starts: a converged one, and of those the most likely. Only 'converged' values may be used
 * @source [Marquardt1963], [More1978]; V that follows m: [Wedderburn1974]
 * @check  test/reference/strd-nonlinear.test.ts, test/unit/numeric/damped-least-squares.test.ts
 */
export function fitNonlinear(problem: LeastSquaresProblem): LeastSquaresSolution {
  invariant(problem.starts.length > 0, 'a fit needs a start');
  const fits = problem.starts.map((start) => fitFrom(problem, start));
  const best = fits.reduce((least, fit) => (badness(fit) < badness(least) ? fit : least));
  return { ...best.fit, byStart: fits.map(({ fit: { status, chiSquare } }) => ({ status, chiSquare })) };
}

const badness = ({ fit, deviance }: Attempt): number => (fit.status === 'converged' ? deviance : Infinity);

function fitFrom(problem: LeastSquaresProblem, start: Float64Array): Attempt {
  const first = fitOnce(problem, start, usual);
  if (first.fit.status === 'converged') return first;
  const second = fitOnce(problem, start, cautious);
  const evaluationCount = first.fit.evaluationCount + second.fit.evaluationCount;
  const better = second.fit.status === 'converged' ? second : first;
  return { ...better, fit: { ...better.fit, evaluationCount } };
}

function fitOnce(
  problem: LeastSquaresProblem,
  start: Float64Array,
  { firstDamping, columnScale }: Manner,
): Attempt {
  const rows = problem.observed.length;
  const engine = createQrEngine(problem, start, columnScale);
  const isFollowed = typeof problem.variance === 'function';
  const rule: IterationRule = {
    firstDamping,
    leastDamping: 1e-10,
    isLast: (promised) => promised <= gainTolerance * engine.objective() + engine.rounding(),
    resolution: () =>
      4 * Math.sqrt(engine.objective() * engine.rounding()) +
      engine.rounding() +
      rows * epsilon * engine.objective(),
    isSettled: (gained, round) => !isFollowed || (round > 0 && gained < settledGain),
    maxRounds: isFollowed ? maxReweighings : 1,
    maxEvaluations: (problem.maxEvaluations ?? defaultEvaluations) - 1,
  };
  const outcome = Number.isNaN(engine.objective())
    ? { status: 'stalled' as const, evaluationCount: 0 }
    : rows < start.length
      ? { status: 'singular' as const, evaluationCount: 0 }
      : minimise(engine, rule);
  const covariance = parameterCovariance(engine.linearise());
  const isLost = outcome.status === 'converged' && covariance.matrix === null;
  return {
    deviance: engine.objective() + engine.variance.reduce((sum, variance) => sum + log(variance), 0),
    fit: {
      status: isLost ? 'singular' : outcome.status,
      values: engine.values(),
      covariance: covariance.matrix ?? new Float64Array(start.length * start.length),
      isHeld: covariance.isHeld,
      chiSquare: engine.objective(),
      degreesOfFreedom: rows - covariance.freeCount,
      evaluationCount: outcome.evaluationCount + 1,
    },
  };
}
