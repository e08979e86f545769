import { applyQTransposed, qrFactor, solveUpper, type QrFactors } from './qr.ts';

/** Weighted residuals and their derivatives at one point, with the distance of each parameter to its bounds. */
export interface Linearisation {
  readonly rows: number;
  readonly columns: number;
  /** sqrt(w) d model / d parameter, column by column. */
  readonly jacobian: Float64Array;
  /** sqrt(w) (observed - model). */
  readonly residuals: Float64Array;
  /** Length that each column is divided by. */
  readonly scale: Float64Array;
  /** How far each parameter may fall (<= 0) and rise (>= 0). */
  readonly lowest: Float64Array;
  readonly highest: Float64Array;
}

interface FreePart {
  readonly columns: readonly number[];
  readonly factors: QrFactors;
}

export interface StepSolver {
  /** Writes the step; returns step times half gradient, or null when no unique step exists. */
  solve(damping: number, step: Float64Array): number | null;
}

/** Half the slope at which the objective falls when the parameter rises. */
function halfGradient({ rows, jacobian, residuals }: Linearisation, j: number): number {
  let sum = 0;
  for (let i = 0; i < rows; i++) sum += jacobian[j * rows + i]! * residuals[i]!;
  return sum;
}

/** Whether a parameter is on a bound and the data pull it further, or has no room at all. @check test/unit/numeric/bounded-step.test.ts */
export function isPressed(at: Linearisation, j: number): boolean {
  const pull = halfGradient(at, j);
  const isLow = at.lowest[j]! >= 0;
  const isHigh = at.highest[j]! <= 0;
  return (isLow && isHigh) || (isLow && pull < 0) || (isHigh && pull > 0);
}

/**
 * Solves min |r - J s|^2 + damping |D s|^2 for the step s with lowest <= s <= highest, by QR of the scaled Jacobian.
 *
 * Active set: parameters that the gradient presses against their bound stay there; the step goes towards the lowest point of
 * the others until one of them meets a bound and stays too, and so on. Every leg goes down, so the whole step does. The
 * factors are kept for further dampings at the same point.
 *
 * @source damping by appended rows [More1978]; active set: common practice for simple bounds
 * @check  test/unit/numeric/bounded-step.test.ts
 */
export function createStepSolver(at: Linearisation): StepSolver {
  const { rows, columns, jacobian, residuals, scale, lowest, highest } = at;
  const gradient = Float64Array.from({ length: columns }, (_, j) => halfGradient(at, j));
  const atStart = Array.from({ length: columns }, (_, j) => j).filter((j) => !isPressed(at, j));
  let kept: FreePart | null = null;

  function factored(free: readonly number[]): FreePart {
    if (kept !== null && kept.columns.join() === free.join()) return kept;
    const matrix = new Float64Array(rows * free.length);
    for (const [k, j] of free.entries()) {
      for (let i = 0; i < rows; i++) matrix[k * rows + i] = jacobian[j * rows + i]! / scale[j]!;
    }
    kept = { columns: free, factors: qrFactor(matrix, rows, free.length) };
    return kept;
  }

  function solve(damping: number, step: Float64Array): number | null {
    let free: readonly number[] = atStart;
    step.fill(0);
    for (;;) {
      const target = lowestWith(free, damping, step);
      if (target === null) return null;
      let share = 1;
      for (const [k, j] of free.entries()) share = Math.min(share, shareToBound(j, step[j]!, target[k]!));
      const blocked = free.filter((j, k) => shareToBound(j, step[j]!, target[k]!) <= share && share < 1);
      for (const [k, j] of free.entries()) step[j] = step[j]! + share * (target[k]! - step[j]!);
      for (const j of blocked)
        step[j] = step[j]! < 0.5 * (lowest[j]! + highest[j]!) ? lowest[j]! : highest[j]!;
      if (blocked.length === 0) break;
      free = free.filter((j) => !blocked.includes(j));
    }
    let promised = 0;
    for (let j = 0; j < columns; j++) promised += step[j]! * gradient[j]!;
    return promised;
  }

  /** The free parameters' best steps, the others keeping theirs. */
  function lowestWith(free: readonly number[], damping: number, step: Float64Array): Float64Array | null {
    const { factors } = factored(free);
    if (damping === 0 && factors.rank < free.length) return null;
    const rotated = residuals.slice();
    for (let j = 0; j < columns; j++) {
      if (free.includes(j) || step[j] === 0) continue;
      for (let i = 0; i < rows; i++) rotated[i] = rotated[i]! - step[j]! * jacobian[j * rows + i]!;
    }
    applyQTransposed(factors, rotated);
    const scaled = damping === 0 ? undamped(factors, rotated) : damped(factors, rotated, damping);
    if (!scaled.every(Number.isFinite)) return null;
    const target = new Float64Array(free.length);
    for (const [k, column] of factors.order.entries()) target[column] = scaled[k]! / scale[free[column]!]!;
    return target;
  }

  /** Share of the way from a step to another at which the parameter meets its bound; 1 or more when it does not. */
  function shareToBound(j: number, from: number, to: number): number {
    if (to < lowest[j]!) return Math.max(0, (lowest[j]! - from) / (to - from));
    if (to > highest[j]!) return Math.max(0, (highest[j]! - from) / (to - from));
    return 1;
  }
  return { solve };
}

function undamped(factors: QrFactors, rotated: Float64Array): Float64Array {
  const solution = rotated.slice(0, factors.columns);
  solveUpper(factors, solution);
  return solution;
}

/** The damped problem on R: [R; sqrt(damping) I] s = [Q^T r; 0]. */
function damped(
  { rows, columns: n, matrix }: QrFactors,
  rotated: Float64Array,
  damping: number,
): Float64Array {
  const appended = new Float64Array(2 * n * n);
  const right = new Float64Array(2 * n);
  const root = Math.sqrt(damping);
  for (let k = 0; k < n; k++) {
    for (let i = 0; i <= k; i++) appended[k * 2 * n + i] = matrix[k * rows + i]!;
    appended[k * 2 * n + n + k] = root;
    right[k] = rotated[k]!;
  }
  const factors = qrFactor(appended, 2 * n, n);
  applyQTransposed(factors, right);
  solveUpper(factors, right);
  const solution = new Float64Array(n);
  for (let k = 0; k < n; k++) solution[factors.order[k]!] = right[k]!;
  return solution;
}
