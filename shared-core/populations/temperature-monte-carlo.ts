import { choleskyFactor } from '../numeric/cholesky.ts';
import { exp } from '../numeric/portable-math.ts';
import type { Random } from '../numeric/random.ts';
import type { BoltzmannInput } from './boltzmann-input.ts';
import { createBoltzmannWorkspace, iterateBoltzmann } from './boltzmann-iteration.ts';
import type { BoltzmannFit } from './fit-boltzmann.ts';

/**
 * Draws of 1/(kT), per eV: the areas with their noise, times exp of the relative errors of calibration, fitted anew.
 *
 * 1/T is drawn and not T: it stays finite where a draw has no positive temperature, and its interval turned over is that of
 * T. Allocates nothing a draw.
 *
 * @returns a function that draws once; null where a covariance has no factor
 * @source [JCGM101] 6.4.8 (multivariate normal by the Cholesky factor)
 * @check  test/property/temperature-monte-carlo.test.ts
 */
export function inverseTemperatureDraws(
  problem: BoltzmannInput,
  fit: BoltzmannFit,
): ((random: Random) => number) | null {
  const n = problem.area.length;
  const noise = lowerFactor(problem.areaCovariance, n);
  const relative = lowerFactor(problem.relativeCovariance, n);
  if (noise === null || relative === null) return null;
  const area = new Float64Array(n);
  const drawn: BoltzmannInput = { ...problem, area };
  const work = createBoltzmannWorkspace(n);
  const normals = new Float64Array(2 * n);
  return (random) => {
    for (let i = 0; i < 2 * n; i++) normals[i] = random.normal();
    for (let i = 0; i < n; i++) {
      let error = 0;
      let factor = 0;
      for (let k = 0; k <= i; k++) {
        error += noise[i * n + k]! * normals[k]!;
        factor += relative[i * n + k]! * normals[n + k]!;
      }
      area[i] = (problem.area[i]! + error) * exp(factor);
    }
    work.slope = -fit.inverseKtPerEv;
    work.intercept = fit.line.intercept;
    iterateBoltzmann(drawn, work);
    return -work.slope;
  };
}

/** Lower Cholesky factor of a covariance that may be zero, of few ranks, or both: a trace of its own diagonal is added. */
function lowerFactor(covariance: Float64Array, n: number): Float64Array | null {
  const factor = covariance.slice();
  let largest = 0;
  for (let i = 0; i < n; i++) largest = Math.max(largest, factor[i * n + i]!);
  if (largest === 0) return new Float64Array(n * n);
  for (let i = 0; i < n; i++) factor[i * n + i] = factor[i * n + i]! * (1 + 1e-10) + 1e-12 * largest;
  return choleskyFactor(factor, n) ? factor : null;
}
