import { choleskyFactor, choleskyInverse, choleskySolve } from '../numeric/cholesky.ts';
import type { JointModel } from './joint-model.ts';
import { gasIndex, instrumentIndex, starkIndex, type Evaluation } from './joint-problem.ts';

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

const maxEvaluations = 150;
const maxReweighings = 8;
/** The step that should gain less chi-square than this is the last one: it moves nothing by more than 0.01 sigma. */
const gainTolerance = 1e-4;
/** The first weights are rough, so the first round need not be fine. */
const firstGainTolerance = 0.05;
/**
 * Renewed weights that moved the solution by less than a standard deviation are as good as the next would be: what
 * weights change is second order in what moves them.
 */
const settledGain = 1;
/** K: colder gas than liquid nitrogen cools a tube to is not looked for. */
const lowestGasKelvin = 70;

/**
 * Damped least squares for the joint model, with weights from the model itself.
 *
 * Inside: Gauss-Newton steps with Marquardt damping at fixed weights. Outside: weights renewed from the fitted
 * model until they stop moving the solution, which solves sum (y - m)/V(m) dm = 0 (quasi-likelihood) and so is free
 * of the bias that weights from noisy data bring. Covariance: inverse of the weighted normal matrix, beliefs included.
 *
 * @param weights  'held' keeps the weights the model came with: where the noise is being measured on the residuals, weights
 *                 that follow the fit and a fit that follows the weights can run away together
 * @returns a status with every solution; only 'converged' values may be used
 * @source D. W. Marquardt, J. SIAM 11, 431 (1963); reweighting: R. W. M. Wedderburn, Biometrika 61, 439 (1974)
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
  let status: FitStatus = 'iteration-limit';
  let evaluations = 1;
  model.evaluate(values, here);
  for (let round = 0; round < maxReweighings; round++) {
    const tolerance = round === 0 && weights === 'from-model' ? firstGainTolerance : gainTolerance;
    let damping = 0;
    let stretch = 1;
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
      if (damping === 0 && predicted < tolerance) {
        // Too small to be worth checking: taken as it is, and the next round starts from there.
        applyStep(model, values, step, 1, trial);
        values.set(trial);
        status = 'converged';
        break;
      }
      const isHeld = applyStep(model, values, step, stretch, trial);
      model.evaluate(trial, there);
      evaluations++;
      const gain = here.objective - there.objective;
      if (gain < -gainTolerance) {
        stretch = 1;
        damping = damping === 0 ? 1e-3 : damping * 10;
        if (damping > 1e8) {
          status = 'stalled';
          model.evaluate(values, here);
          break;
        }
        continue;
      }
      values.set(trial);
      [here, there] = [there, here];
      gained += gain;
      stretch = isHeld ? 1 : betterLength(stretch, predicted, gain);
      damping = damping < 1e-4 ? 0 : damping * 0.1;
    }
    if (status !== 'converged' || weights === 'held' || (round > 0 && gained < settledGain)) break;
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
function scaledFactor(
  normal: Float64Array,
  damping: number,
  work: Float64Array,
  scale: Float64Array,
): boolean {
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

/**
 * Length at which the next step is tried. Along a step the objective is a parabola with slope -2 predicted at its
 * start; one gain fixes it and so its lowest point. Large residuals make Gauss-Newton steps too short, often by the
 * same factor again and again; this finds the factor. For a good model the answer is 1.
 */
function betterLength(length: number, predicted: number, gain: number): number {
  const bend = 2 * predicted * length - gain;
  if (!(bend > 0)) return 4;
  const best = (predicted * length * length) / bend;
  return best > 1.3 ? Math.min(8, best) : 1;
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
