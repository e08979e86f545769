import { drawChiSquare } from '../numeric/chi-square-draw.ts';
import { choleskyFactor } from '../numeric/cholesky.ts';
import { exp } from '../numeric/portable-math.ts';
import type { Random } from '../numeric/random.ts';
import type { BoltzmannInput } from './boltzmann-input.ts';
import { createBoltzmannWorkspace, iterateBoltzmann } from './boltzmann-iteration.ts';
import type { BoltzmannFit } from './fit-boltzmann.ts';
import { fitOpticalDepth } from './optical-depth.ts';
import type { AbsorbedPlot } from './temperature.ts';

/**
 * Draws of 1/(kT), per eV: the areas with their noise, times exp of the relative errors of calibration, fitted anew.
 *
 * 1/T is drawn and not T: it stays finite where a draw has no positive temperature, and its interval turned over is that of
 * T. Allocates nothing a draw. A draw whose iteration did not settle would stay where it stood; none did in a million.
 *
 * @param noiseDegreesOfFreedom  null where the noise counts as known
 * @returns a function that draws once; null where a covariance has no factor
 * @source [JCGM101] 7.3: the model evaluated for each draw of its inputs
 * @check  test/property/temperature-monte-carlo.test.ts
 */
export function inverseTemperatureDraws(
  problem: BoltzmannInput,
  fit: BoltzmannFit,
  noiseDegreesOfFreedom: number | null,
): ((random: Random) => number) | null {
  const drawAreas = areaDraws(problem, noiseDegreesOfFreedom);
  if (drawAreas === null) return null;
  const n = problem.area.length;
  const drawn: BoltzmannInput = { ...problem, area: new Float64Array(n) };
  const work = createBoltzmannWorkspace(n);
  return (random) => {
    drawAreas(random, drawn.area);
    work.slope = -fit.inverseKtPerEv;
    work.intercept = fit.line.intercept;
    iterateBoltzmann(drawn, work);
    return -work.slope;
  };
}

/**
 * The same where the temperature is corrected for self-absorption: depth and temperature fitted anew to each draw.
 * @returns a function that draws once, NaN where the depth of a draw is out of bounds; null as above
 * @check  test/property/temperature-monte-carlo.test.ts
 */
export function absorbedTemperatureDraws(
  { problem, absorption, start }: AbsorbedPlot,
  noiseDegreesOfFreedom: number | null,
): ((random: Random) => number) | null {
  const drawAreas = areaDraws(problem, noiseDegreesOfFreedom);
  if (drawAreas === null) return null;
  const drawn: BoltzmannInput = { ...problem, area: new Float64Array(problem.area.length) };
  return (random) => {
    drawAreas(random, drawn.area);
    return fitOpticalDepth(drawn, absorption, start)?.inverseKtPerEv ?? NaN;
  };
}

/**
 * Draws of the areas: multivariate normal noise, times exp of multivariate normal relative errors. Noise that was measured
 * on the residuals is Student's: normal, over the root of chi-square per degree of freedom.
 * @source [JCGM101] 6.4.8 (multivariate normal by the Cholesky factor), 6.4.9 (scaled and shifted t)
 * @check  test/property/temperature-monte-carlo.test.ts
 */
function areaDraws(
  problem: BoltzmannInput,
  noiseDegreesOfFreedom: number | null,
): ((random: Random, area: Float64Array) => void) | null {
  const n = problem.area.length;
  const noise = lowerFactor(problem.areaCovariance, n);
  const relative = lowerFactor(problem.relativeCovariance, n);
  if (noise === null || relative === null) return null;
  const normals = new Float64Array(2 * n);
  return (random, area) => {
    for (let i = 0; i < 2 * n; i++) normals[i] = random.normal();
    const spread =
      noiseDegreesOfFreedom === null
        ? 1
        : Math.sqrt(noiseDegreesOfFreedom / drawChiSquare(random, noiseDegreesOfFreedom));
    for (let i = 0; i < n; i++) {
      let error = 0;
      let factor = 0;
      for (let k = 0; k <= i; k++) {
        error += noise[i * n + k]! * normals[k]!;
        factor += relative[i * n + k]! * normals[n + k]!;
      }
      area[i] = (problem.area[i]! + spread * error) * exp(factor);
    }
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
