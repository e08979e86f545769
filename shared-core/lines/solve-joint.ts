import { choleskyFactor, choleskyInverse, choleskySolve, type RowStarts } from '../numeric/cholesky.ts';
import {
  minimise,
  type DampedEngine,
  type FitStatus,
  type IterationRule,
} from '../numeric/damped-iteration.ts';
import type { JointModel } from './joint-model.ts';
import { gasIndex, instrumentIndex, starkIndex, type Evaluation } from './joint-problem.ts';

export type { FitStatus };

export interface JointSolution {
  readonly status: FitStatus;
  /** All parameters, in the layout of joint-problem.ts. */
  readonly values: Float64Array;
  /** Full covariance over all parameters, row-major; rows of fixed parameters are zero. */
  readonly covariance: Float64Array;
  readonly chiSquare: number;
  readonly degreesOfFreedom: number;
  readonly evaluationCount: number;
}

/** Beyond the one at the start. */
const maxEvaluations = 149;
const maxReweighings = 8;
/** The step that should gain less chi-square than this is the last one: it moves nothing by more than 0.01 sigma. */
const gainTolerance = 1e-4;
/** The first weights are rough, so the first round need not be finer than what renewing them will move. */
const firstGainTolerance = 1;
/**
 * Renewed weights that moved the solution by less than a standard deviation are as good as the next would be: what
 * weights change is second order in what moves them.
 */
const settledGain = 1;
/** K: colder gas than liquid nitrogen cools a tube to is not looked for. */
const lowestGasKelvin = 70;

const heldRule: IterationRule = {
  firstDamping: 0,
  leastDamping: 1e-4,
  isLast: (promised) => promised < gainTolerance,
  resolution: () => gainTolerance,
  isSettled: () => true,
  maxRounds: 1,
  maxEvaluations,
};
const followingRule: IterationRule = {
  ...heldRule,
  isLast: (promised, round) => promised < (round === 0 ? firstGainTolerance : gainTolerance),
  isSettled: (gained, round) => round > 0 && gained < settledGain,
  maxRounds: maxReweighings,
};

/**
 * Damped least squares for the joint model, with weights from the model itself.
 *
 * The iteration of damped-iteration.ts on normal equations, which a block of pixels adds to without the Jacobian ever
 * being stored. Covariance: inverse of the weighted normal matrix, beliefs included.
 *
 * @param weights  'held' keeps the weights the model came with: where the noise is being measured on the residuals, weights
 *                 that follow the fit and a fit that follows the weights can run away together
 * @returns a status with every solution; only 'converged' values may be used
 * @source [Marquardt1963], [Wedderburn1974]
 * @check  test/property/joint-fit.test.ts
 */
export function solveJoint(model: JointModel, weights: 'from-model' | 'held'): JointSolution {
  const { active, values } = model;
  const size = active.length;
  let here = model.newEvaluation();
  let there = model.newEvaluation();
  const trial = Float64Array.from(values);
  const step = new Float64Array(size);
  const work = new Float64Array(size * size);
  const scale = new Float64Array(size);
  const engine: DampedEngine = {
    findStep: (damping) => dampedStep(model, here, damping, step, work, scale),
    tryStep: (length) => {
      const isHeld = applyStep(model, values, step, length, trial);
      model.evaluate(trial, there);
      return isHeld;
    },
    gain: () => here.objective - there.objective,
    accept: () => {
      values.set(trial);
      [here, there] = [there, here];
    },
    finish: () => {
      applyStep(model, values, step, 1, trial);
      values.set(trial);
    },
    reweigh: () => {
      model.reweigh();
      model.evaluate(values, here);
    },
  };
  model.evaluate(values, here);
  const outcome = minimise(engine, weights === 'held' ? heldRule : followingRule);
  // The model's arrays hold the point last tried, which was not the best one.
  if (outcome.status !== 'converged') model.evaluate(values, here);
  const covariance = fullCovariance(model, here, work, scale);
  const free = active.reduce((sum, index) => sum + (Number.isFinite(model.beliefs[index]!.sigma) ? 0 : 1), 0);
  return {
    status: covariance === null ? 'singular' : outcome.status,
    values,
    covariance: covariance ?? new Float64Array(values.length * values.length),
    chiSquare: here.chiSquare,
    degreesOfFreedom: model.pixelCount - free,
    evaluationCount: 1 + outcome.evaluationCount,
  };
}

/** Solves for the step; returns the chi-square it should gain, or null when the matrix is not positive definite. */
function dampedStep(
  { rowStarts }: JointModel,
  { normal, right }: Evaluation,
  damping: number,
  step: Float64Array,
  work: Float64Array,
  scale: Float64Array,
): number | null {
  const size = step.length;
  if (!scaledFactor(normal, damping, work, scale, rowStarts)) return null;
  for (let i = 0; i < size; i++) step[i] = right[i]! * scale[i]!;
  choleskySolve(work, size, step, rowStarts);
  let gain = 0;
  for (let i = 0; i < size; i++) {
    step[i] = step[i]! * scale[i]!;
    gain += step[i]! * right[i]!;
  }
  return gain;
}

/** Cholesky factor of the matrix scaled to unit diagonal, which makes the parameters' units irrelevant. */
function scaledFactor(
  normal: Float64Array,
  damping: number,
  work: Float64Array,
  scale: Float64Array,
  rowStarts: RowStarts,
): boolean {
  const size = scale.length;
  for (let i = 0; i < size; i++) {
    const diagonal = normal[i * size + i]!;
    if (!(diagonal > 0) || !Number.isFinite(diagonal)) return false;
    scale[i] = 1 / Math.sqrt(diagonal);
  }
  for (let i = 0; i < size; i++) {
    for (let j = rowStarts[i]!; j <= i; j++)
      work[i * size + j] = normal[i * size + j]! * scale[i]! * scale[j]!;
    work[i * size + i] = (1 + damping) * (1 + 1e-13);
  }
  return choleskyFactor(work, size, rowStarts);
}

/**
 * Takes the step, but no further than a width may go at once: the instrument width to half or double, the Stark width
 * to the lowest value that the profile allows. Says whether anything was held back.
 */
function applyStep(
  model: JointModel,
  values: Float64Array,
  step: Float64Array,
  length: number,
  trial: Float64Array,
): boolean {
  const { active } = model;
  let isHeld = false;
  trial.set(values);
  for (let i = 0; i < active.length; i++) {
    const parameter = active[i]!;
    const from = values[parameter]!;
    let to = from + length * step[i]!;
    if (parameter === instrumentIndex) to = Math.max(0.5 * from, Math.min(2 * from, to));
    if (parameter === gasIndex) to = Math.max(lowestGasKelvin, to);
    if (parameter === starkIndex) to = Math.max(-0.12 * values[instrumentIndex]!, to);
    if (to !== from + length * step[i]!) isHeld = true;
    trial[parameter] = to;
  }
  return isHeld;
}

function fullCovariance(
  { active, parameterCount, rowStarts }: JointModel,
  { normal }: Evaluation,
  work: Float64Array,
  scale: Float64Array,
): Float64Array | null {
  const size = active.length;
  if (!scaledFactor(normal, 0, work, scale, rowStarts)) return null;
  const inverse = choleskyInverse(work, size, rowStarts);
  const full = new Float64Array(parameterCount * parameterCount);
  for (let i = 0; i < size; i++) {
    for (let j = 0; j < size; j++) {
      full[active[i]! * parameterCount + active[j]!] = inverse[i * size + j]! * scale[i]! * scale[j]!;
    }
  }
  return full;
}
