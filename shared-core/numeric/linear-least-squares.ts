import { compensatedDot } from './compensated-dot.ts';
import {
  applyQ,
  applyQTransposed,
  inverseOfNormal,
  qrFactor,
  solveUpper,
  solveUpperTransposed,
  type QrFactors,
} from './qr.ts';

export interface LinearProblem {
  /** Column by column, observations x parameters. */
  readonly design: Float64Array;
  readonly observed: Float64Array;
  /** 1 / variance of each observation; all 1 when absent. */
  readonly weights?: Float64Array;
  /** Whether the columns span a constant: R^2 is then measured about the mean, else about zero. */
  readonly hasIntercept: boolean;
}

export interface LinearFit {
  readonly values: Float64Array;
  /** (A^T W A)^-1, row-major: the covariance where the weights are known. */
  readonly covariance: Float64Array;
  /** Standard deviations from the covariance and the scatter of the residuals. */
  readonly deviations: Float64Array;
  /** Observed minus fitted. */
  readonly residuals: Float64Array;
  readonly chiSquare: number;
  readonly degreesOfFreedom: number;
  /** sqrt(chi-square / degrees of freedom); not a number without degrees of freedom. */
  readonly residualDeviation: number;
  readonly rSquared: number;
}

/** Every round gains the digits that the condition number leaves; when they are in, the rounds end. */
const maxRefinements = 10;

/**
 * Linear least squares, min sum w (y - A b)^2, by QR with scaled columns and iterative refinement.
 *
 * Refinement solves the augmented system r + A b = y, A^T r = 0 for corrections of parameters and residuals, with what
 * is left of both sides computed in twice the working precision.
 *
 * @returns null when there are fewer observations than parameters or the columns are dependent to working precision
 * @source QR: [Golub2013] section 5.3; refinement: [Bjorck1967]
 * @check  test/reference/strd-linear.test.ts, test/unit/numeric/linear-least-squares.test.ts
 */
export function fitLinear({ design, observed, weights, hasIntercept }: LinearProblem): LinearFit | null {
  const rows = observed.length;
  const columns = rows === 0 ? 0 : design.length / rows;
  const roots = weights === undefined ? null : weights.map(Math.sqrt);
  const scales = columnScales(design, rows, columns, roots);
  if (rows < columns || columns === 0 || scales.some((scale) => !(scale > 0))) return null;
  const matrix = design.map((value, at) => {
    const weighted = roots === null ? value : value * roots[at % rows]!;
    return weighted / scales[Math.floor(at / rows)]!;
  });
  const right = roots === null ? observed : observed.map((value, i) => value * roots[i]!);
  const factors = qrFactor(matrix.slice(), rows, columns);
  if (factors.rank < columns) return null;

  const { solution, residuals: weightedResiduals } = refine(matrix, right, factors);
  const values = solution.map((value, j) => value / scales[j]!);
  const covariance = inverseOfNormal(factors).map(
    (value, at) => value / (scales[Math.floor(at / columns)]! * scales[at % columns]!),
  );
  const chiSquare = sumOfSquares(weightedResiduals);
  const degreesOfFreedom = rows - columns;
  const residualDeviation = Math.sqrt(chiSquare / degreesOfFreedom);
  const deviations = values.map((_, j) => residualDeviation * Math.sqrt(covariance[j * columns + j]!));
  return {
    values,
    covariance,
    deviations,
    residuals: roots === null ? weightedResiduals : weightedResiduals.map((value, i) => value / roots[i]!),
    chiSquare,
    degreesOfFreedom,
    residualDeviation,
    rSquared: 1 - chiSquare / totalSquares(observed, weights, hasIntercept),
  };
}

/** Parameters of the scaled columns, and weighted residuals. */
function refine(
  matrix: Float64Array,
  right: Float64Array,
  factors: QrFactors,
): { solution: Float64Array; residuals: Float64Array } {
  const { rows, columns } = factors;
  // The residuals are carried as one more column with coefficient 1: [A r] (b, 1) = y, in one exact sum.
  const extended = new Float64Array(rows * (columns + 1));
  extended.set(matrix);
  const residuals = extended.subarray(rows * columns);
  const coefficients = new Float64Array(columns + 1);
  coefficients[columns] = -1;
  const missing = right.slice();
  const pull = new Float64Array(columns);
  let last = Infinity;
  for (let round = 0; round <= maxRefinements; round++) {
    const step = solveAugmented(factors, missing, pull);
    let size = 0;
    for (let j = 0; j < columns; j++) size = Math.max(size, Math.abs(step.values[j]!));
    // A correction that is no longer much smaller than the one before is rounding.
    if (!(size < 0.5 * last)) break;
    last = size;
    for (let j = 0; j < columns; j++) coefficients[j] = coefficients[j]! - step.values[j]!;
    for (let i = 0; i < rows; i++) residuals[i] = residuals[i]! + step.residuals[i]!;
    const negative = { values: coefficients, offset: 0, stride: 1 };
    for (let i = 0; i < rows; i++) {
      const row = { values: extended, offset: i, stride: rows };
      missing[i] = compensatedDot(right[i]!, row, negative, columns + 1);
    }
    const residual = { values: residuals, offset: 0, stride: 1 };
    for (let j = 0; j < columns; j++) {
      pull[j] = -compensatedDot(0, { values: matrix, offset: j * rows, stride: 1 }, residual, rows);
    }
  }
  return { solution: coefficients.subarray(0, columns).map((value) => -value), residuals: residuals.slice() };
}

/** Solves r + A b = missing, A^T r = pull for residuals r and values b. */
function solveAugmented(
  factors: QrFactors,
  missing: Float64Array,
  pull: Float64Array,
): { values: Float64Array; residuals: Float64Array } {
  const { columns, order } = factors;
  const along = Float64Array.from(order, (column) => pull[column]!);
  solveUpperTransposed(factors, along);
  const residuals = missing.slice();
  applyQTransposed(factors, residuals);
  const steps = Float64Array.from(along, (value, k) => residuals[k]! - value);
  solveUpper(factors, steps);
  residuals.set(along);
  applyQ(factors, residuals);
  const values = new Float64Array(columns);
  for (let k = 0; k < columns; k++) values[order[k]!] = steps[k]!;
  return { values, residuals };
}

/** Powers of two near the columns' lengths: dividing by them loses no digit. 0 where a column is empty or not finite. */
function columnScales(
  design: Float64Array,
  rows: number,
  columns: number,
  roots: Float64Array | null,
): Float64Array {
  return Float64Array.from({ length: columns }, (_, j) => {
    let largest = 0;
    let isFinite = true;
    for (let i = 0; i < rows; i++) {
      const size = Math.abs(design[j * rows + i]! * (roots?.[i] ?? 1));
      if (!Number.isFinite(size)) isFinite = false;
      if (size > largest) largest = size;
    }
    if (!isFinite || largest === 0) return 0;
    const scaled = Float64Array.from(
      { length: rows },
      (_, i) => (design[j * rows + i]! * (roots?.[i] ?? 1)) / largest,
    );
    return powerOfTwoBelow(largest * Math.sqrt(sumOfSquares(scaled)));
  });
}

function powerOfTwoBelow(value: number): number {
  let power = 1;
  while (power > value) power /= 2;
  while (power * 2 <= value) power *= 2;
  return power;
}

function sumOfSquares(values: Float64Array): number {
  let sum = 0;
  for (const value of values) sum += value * value;
  return sum;
}

function totalSquares(
  observed: Float64Array,
  weights: Float64Array | undefined,
  hasIntercept: boolean,
): number {
  let weight = 0;
  let sum = 0;
  for (let i = 0; i < observed.length; i++) {
    weight += weights?.[i] ?? 1;
    sum += (weights?.[i] ?? 1) * observed[i]!;
  }
  const mean = hasIntercept ? sum / weight : 0;
  let total = 0;
  for (let i = 0; i < observed.length; i++) {
    const departure = observed[i]! - mean;
    total += (weights?.[i] ?? 1) * departure * departure;
  }
  return total;
}
