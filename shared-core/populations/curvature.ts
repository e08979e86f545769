import { fitLinearModel } from '../numeric/fit-linear-model.ts';
import type { Ordinates } from './ordinates.ts';

/**
 * Quadratic term of the Boltzmann plot: ln(population) = a + b E + c (E - mean E)^2 by generalised least squares.
 *
 * @returns c per eV^2 and c over its standard uncertainty; null with fewer than three lines
 * @source [Draper1998] ch. 12: added-variable test
 * @check  test/reference/boltzmann-fit.test.ts
 */
export function curvature(fit: Ordinates): { value: number; sigma: number; z: number } | null {
  const { ordinate, ordinateCovariance, upperEnergyEv } = fit;
  const n = ordinate.length;
  if (n < 3) return null;
  const mean = upperEnergyEv.reduce((sum, energy) => sum + energy, 0) / n;
  const model = fitLinearModel(
    [
      new Float64Array(n).fill(1),
      upperEnergyEv.map((energy) => energy - mean),
      upperEnergyEv.map((energy) => (energy - mean) * (energy - mean)),
    ],
    ordinate,
    ordinateCovariance,
  );
  if (model === null) return null;
  const value = model.values[2]!;
  const sigma = Math.sqrt(model.covariance[8]!);
  return { value, sigma, z: value / sigma };
}
