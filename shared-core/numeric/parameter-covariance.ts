import { isPressed, type Linearisation } from './bounded-step.ts';
import { inverseOfNormal, qrFactor } from './qr.ts';

export interface ParameterCovariance {
  /** (J^T J)^-1 of the weighted Jacobian, row-major, zero in rows of held parameters; null when the data do not determine it. */
  readonly matrix: Float64Array | null;
  readonly isHeld: readonly boolean[];
  readonly freeCount: number;
}

/**
 * Covariance of the parameters that no bound holds, those that one does being known: (J^T W J)^-1 of the free ones.
 *
 * @source [Golub2013] section 5.3.8
 * @check  test/reference/strd-nonlinear.test.ts, test/unit/numeric/damped-least-squares.test.ts
 */
export function parameterCovariance(at: Linearisation): ParameterCovariance {
  const { rows, columns, jacobian } = at;
  const isHeld = Array.from({ length: columns }, (_, j) => isPressed(at, j));
  const free = isHeld.flatMap((held, j) => (held ? [] : [j]));
  const covariance = new Float64Array(columns * columns);
  const outcome = (matrix: Float64Array | null): ParameterCovariance => ({
    matrix,
    isHeld,
    freeCount: free.length,
  });
  const lengths = free.map((j) => {
    let sum = 0;
    for (let i = j * rows; i < (j + 1) * rows; i++) sum += jacobian[i]! * jacobian[i]!;
    return Math.sqrt(sum);
  });
  if (rows < free.length || lengths.some((length) => !(length > 0 && length < Infinity)))
    return outcome(null);
  const matrix = new Float64Array(rows * free.length);
  for (const [k, j] of free.entries()) {
    for (let i = 0; i < rows; i++) matrix[k * rows + i] = jacobian[j * rows + i]! / lengths[k]!;
  }
  const factors = qrFactor(matrix, rows, free.length);
  if (factors.rank < free.length) return outcome(null);
  const inverse = inverseOfNormal(factors);
  for (const [k, j] of free.entries()) {
    for (const [l, m] of free.entries())
      covariance[j * columns + m] = inverse[k * free.length + l]! / (lengths[k]! * lengths[l]!);
  }
  return outcome(covariance);
}
