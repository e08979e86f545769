import { choleskyFactor, choleskyInverse, choleskySolve } from '../numeric/cholesky.ts';
import type { Ordinates } from './ordinates.ts';

/**
 * Quadratic term of the Boltzmann plot: ln(population) = a + b E + c (E - mean E)^2 by generalised least squares.
 *
 * @returns c per eV^2 and c over its standard uncertainty; null with fewer than three lines
 * @source added-variable test: N. R. Draper, H. Smith, Applied Regression Analysis, 3rd ed. (1998), ch. 12
 * @check  test/reference/boltzmann-fit.test.ts
 */
export function curvature(fit: Ordinates): { value: number; z: number } | null {
  const { ordinate, ordinateCovariance, upperEnergyEv } = fit;
  const n = ordinate.length;
  if (n < 3) return null;
  const factor = ordinateCovariance.slice();
  if (!choleskyFactor(factor, n)) return null;
  const mean = upperEnergyEv.reduce((sum, energy) => sum + energy, 0) / n;
  const columns = [
    new Float64Array(n).fill(1),
    upperEnergyEv.map((energy) => energy - mean),
    upperEnergyEv.map((energy) => (energy - mean) * (energy - mean)),
  ];
  const weighted = columns.map((column) => {
    const copy = column.slice();
    choleskySolve(factor, n, copy);
    return copy;
  });
  const normal = new Float64Array(9);
  const right = new Float64Array(3);
  for (let i = 0; i < 3; i++) {
    for (let k = 0; k < n; k++) {
      right[i] = right[i]! + weighted[i]![k]! * ordinate[k]!;
      for (let j = 0; j < 3; j++) normal[i * 3 + j] = normal[i * 3 + j]! + weighted[i]![k]! * columns[j]![k]!;
    }
  }
  if (!choleskyFactor(normal, 3)) return null;
  const covariance = choleskyInverse(normal, 3);
  choleskySolve(normal, 3, right);
  return { value: right[2]!, z: right[2]! / Math.sqrt(covariance[8]!) };
}
