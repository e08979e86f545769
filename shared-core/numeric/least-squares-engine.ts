import { createStepSolver, type Linearisation, type StepSolver } from './bounded-step.ts';
import type { DampedEngine } from './damped-iteration.ts';
import type { LeastSquaresProblem } from './least-squares-problem.ts';

/** 'current': lengths of the Jacobian's columns here; 'longest': the longest seen, so that no parameter gets loose. */
export type ColumnScale = 'current' | 'longest';

export interface QrEngine extends DampedEngine {
  readonly values: () => Float64Array;
  readonly objective: () => number;
  readonly variance: Float64Array;
  /** Square sum of the rounding errors of the weighted residuals: no fit can see less. */
  readonly rounding: () => number;
  readonly linearise: () => Linearisation;
}

interface Point {
  values: Float64Array;
  modelled: Float64Array;
  objective: number;
}

const epsilon = 2.220446049250313e-16;

/**
 * The engine of damped-iteration.ts for a Jacobian that is stored: steps by QR, bounds, weights that may follow the model.
 * A start outside the bounds is moved onto them.
 *
 * @source scaling by the longest columns: [More1978]
 * @check  test/unit/numeric/damped-least-squares.test.ts
 */
export function createQrEngine(
  problem: LeastSquaresProblem,
  start: Float64Array,
  columnScale: ColumnScale,
): QrEngine {
  const { model, observed, precision = epsilon } = problem;
  const rows = observed.length;
  const columns = start.length;
  const inside = (j: number, value: number): number =>
    Math.max(problem.lowest?.[j] ?? -Infinity, Math.min(problem.highest?.[j] ?? Infinity, value));
  const variance = new Float64Array(rows).fill(1);
  if (problem.variance instanceof Float64Array) variance.set(problem.variance);

  const newPoint = (): Point => ({
    values: start.map((value, j) => inside(j, value)),
    modelled: new Float64Array(rows),
    objective: NaN,
  });
  let here = newPoint();
  let there = newPoint();
  const step = new Float64Array(columns);
  const scale = new Float64Array(columns);
  let rounding = 0;
  /** Null when the point or the weights have changed since. */
  let solver: StepSolver | null = null;

  function evaluate(point: Point): void {
    model.evaluate(point.values, point.modelled);
    let sum = 0;
    for (let i = 0; i < rows; i++) {
      const residual = observed[i]! - point.modelled[i]!;
      sum += (residual * residual) / variance[i]!;
    }
    point.objective = Number.isFinite(sum) ? sum : NaN;
  }

  function moveBy(point: Point, length: number): boolean {
    let isHeld = false;
    for (let j = 0; j < columns; j++) {
      const wanted = here.values[j]! + length * step[j]!;
      point.values[j] = inside(j, wanted);
      if (point.values[j] !== wanted) isHeld = true;
    }
    evaluate(point);
    return isHeld;
  }

  function reweigh(): void {
    if (typeof problem.variance === 'function') problem.variance(here.modelled, variance);
    evaluate(here);
    solver = null;
  }

  function linearise(): Linearisation {
    const jacobian = new Float64Array(rows * columns);
    model.differentiate(here.values, jacobian);
    const residuals = new Float64Array(rows);
    rounding = 0;
    for (let i = 0; i < rows; i++) {
      const weight = 1 / Math.sqrt(variance[i]!);
      residuals[i] = (observed[i]! - here.modelled[i]!) * weight;
      const error = precision * Math.max(Math.abs(observed[i]!), Math.abs(here.modelled[i]!)) * weight;
      rounding += error * error;
      for (let j = 0; j < columns; j++) jacobian[j * rows + i] = jacobian[j * rows + i]! * weight;
    }
    for (let j = 0; j < columns; j++) {
      const length = columnLength(jacobian, rows, j);
      if (columnScale === 'current' || length > scale[j]!) scale[j] = length;
    }
    return {
      rows,
      columns,
      jacobian,
      residuals,
      scale: scale.map((length) => (length > 0 ? length : 1)),
      lowest: here.values.map((value, j) => inside(j, -Infinity) - value),
      highest: here.values.map((value, j) => inside(j, Infinity) - value),
    };
  }

  evaluate(here);
  if (typeof problem.variance === 'function') reweigh();
  return {
    values: () => here.values,
    objective: () => here.objective,
    variance,
    rounding: () => rounding,
    linearise,
    findStep: (damping) => (solver ??= createStepSolver(linearise())).solve(damping, step),
    tryStep: (length) => moveBy(there, length),
    gain: () => here.objective - there.objective,
    accept: () => {
      [here, there] = [there, here];
      solver = null;
    },
    finish: () => {
      moveBy(here, 1);
      solver = null;
    },
    reweigh,
  };
}

function columnLength(matrix: Float64Array, rows: number, j: number): number {
  let sum = 0;
  for (let i = j * rows; i < (j + 1) * rows; i++) sum += matrix[i]! * matrix[i]!;
  return Math.sqrt(sum);
}
