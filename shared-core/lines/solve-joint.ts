import { choleskyFactor, choleskyInverse, choleskySolve } from '../numeric/cholesky.ts';
import type { Evaluation, JointModel } from './joint-model.ts';
import { instrumentIndex, starkIndex } from './joint-problem.ts';

export type FitStatus = 'converged' | 'stalled' | 'iteration-limit' | 'singular';

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

const maxEvaluations = 60;
const maxReweighings = 8;
/** Chi-square still to be gained by a full step: 1e-7 is a 0.0003 sigma move. */
const gainTolerance = 1e-7;

/**
 * Damped least squares for the joint model, with weights from the model itself.
 *
 * Inside: Gauss-Newton steps with Marquardt damping at fixed weights. Outside: weights renewed from the fitted
 * model until they stop moving the solution, which solves sum (y - m)/V(m) dm = 0 (quasi-likelihood) and so is free
 * of the bias that weights from noisy data bring. Covariance: inverse of the weighted normal matrix, beliefs included.
 *
 * @returns a status with every solution; only 'converged' values may be used
 * @source D. W. Marquardt, J. SIAM 11, 431 (1963); reweighting: R. W. M. Wedderburn, Biometrika 61, 439 (1974)
 * @check  test/property/joint-fit.test.ts
 */
export function solveJoint(model: JointModel): JointSolution {
  const { active, values } = model;
  const size = active.length;
  let here = model.newEvaluation();
  let there = model.newEvaluation();
  const trial = Float64Array.from(values);
  const step = new Float64Array(size);
  const work = new Float64Array(size * size);
  const scale = new Float64Array(size);
  let status: FitStatus = 'iteration-limit';
  let evaluations = 1;
  model.evaluate(values, here);
  for (let round = 0; round < maxReweighings; round++) {
    let damping = 0;
    let gained = 0;
    status = 'iteration-limit';
    while (evaluations < maxEvaluations) {
      const predicted = dampedStep(here, damping, step, work, scale);
      if (predicted === null) {
        if (damping > 1e6) {
          status = 'singular';
          break;
        }
        damping = damping === 0 ? 1e-3 : damping * 10;
        continue;
      }
      if (predicted < gainTolerance && damping === 0) {
        status = 'converged';
        break;
      }
      const shortened = applyStep(model, values, step, trial);
      model.evaluate(trial, there);
      evaluations++;
      const gain = here.objective - there.objective;
      if (gain >= 0 || -gain < gainTolerance * Math.max(1, 1e-6 * here.objective)) {
        values.set(trial);
        [here, there] = [there, here];
        gained += Math.max(0, gain);
        damping = shortened || damping < 1e-4 ? 0 : damping * 0.1;
      } else {
        damping = damping === 0 ? 1e-3 : damping * 10;
        if (damping > 1e8) {
          status = 'stalled';
          model.evaluate(values, here);
          break;
        }
      }
    }
    if (status !== 'converged') break;
    if (round > 0 && gained < 1e-6) break;
    model.evaluate(values, here);
    model.reweigh();
    model.evaluate(values, here);
    evaluations++;
  }
  const covariance = fullCovariance(model, here, work, scale);
  if (covariance === null) status = 'singular';
  const free = active.reduce((sum, index) => sum + (Number.isFinite(model.beliefs[index]!.sigma) ? 0 : 1), 0);
  return {
    status,
    values,
    covariance: covariance ?? new Float64Array(values.length * values.length),
    chiSquare: here.chiSquare,
    degreesOfFreedom: model.pixelCount - free,
    evaluationCount: evaluations,
  };
}

/** Solves for the step; returns the chi-square it should gain, or null when the matrix is not positive definite. */
function dampedStep(
  { normal, right }: Evaluation,
  damping: number,
  step: Float64Array,
  work: Float64Array,
  scale: Float64Array,
): number | null {
  const size = step.length;
  if (!scaledFactor(normal, damping, work, scale)) return null;
  for (let i = 0; i < size; i++) step[i] = right[i]! * scale[i]!;
  choleskySolve(work, size, step);
  let gain = 0;
  for (let i = 0; i < size; i++) {
    step[i] = step[i]! * scale[i]!;
    gain += step[i]! * right[i]!;
  }
  return gain;
}

/** Cholesky factor of the matrix scaled to unit diagonal, which makes the parameters' units irrelevant. */
function scaledFactor(normal: Float64Array, damping: number, work: Float64Array, scale: Float64Array): boolean {
  const size = scale.length;
  for (let i = 0; i < size; i++) {
    const diagonal = normal[i * size + i]!;
    if (!(diagonal > 0) || !Number.isFinite(diagonal)) return false;
    scale[i] = 1 / Math.sqrt(diagonal);
  }
  for (let i = 0; i < size; i++) {
    for (let j = 0; j <= i; j++) work[i * size + j] = normal[i * size + j]! * scale[i]! * scale[j]!;
    work[i * size + i] = (1 + damping) * (1 + 1e-13);
  }
  return choleskyFactor(work, size);
}

/** Takes the step, shortened where it would carry a width out of its range; says whether it was shortened. */
function applyStep(model: JointModel, values: Float64Array, step: Float64Array, trial: Float64Array): boolean {
  const { active } = model;
  let length = 1;
  for (let i = 0; i < active.length; i++) {
    const parameter = active[i]!;
    const from = values[parameter]!;
    const to = from + step[i]!;
    if (parameter === instrumentIndex) {
      if (to < 0.5 * from) length = Math.min(length, (0.5 * from) / (from - to));
      if (to > 2 * from) length = Math.min(length, from / (to - from));
    }
    if (parameter === starkIndex) {
      const lowest = -0.12 * values[instrumentIndex]!;
      if (to < lowest) length = Math.min(length, Math.max(0, (from - lowest) / (from - to)));
    }
  }
  trial.set(values);
  for (let i = 0; i < active.length; i++) trial[active[i]!] = values[active[i]!]! + length * step[i]!;
  return length < 1;
}

function fullCovariance(
  { active, parameterCount }: JointModel,
  { normal }: Evaluation,
  work: Float64Array,
  scale: Float64Array,
): Float64Array | null {
  const size = active.length;
  if (!scaledFactor(normal, 0, work, scale)) return null;
  const inverse = choleskyInverse(work, size);
  const full = new Float64Array(parameterCount * parameterCount);
  for (let i = 0; i < size; i++) {
    for (let j = 0; j < size; j++) {
      full[active[i]! * parameterCount + active[j]!] = inverse[i * size + j]! * scale[i]! * scale[j]!;
    }
  }
  return full;
}
