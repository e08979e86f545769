import { choleskyFactor, choleskySolve } from '../numeric/cholesky.ts';
import { exp } from '../numeric/portable-math.ts';
import { expectedAreaCovariance, type BoltzmannInput } from './boltzmann-input.ts';

/** Arrays of one iteration, so that ten thousand of them allocate nothing; `intercept` and `slope` are the line so far. */
export interface BoltzmannWorkspace {
  intercept: number;
  slope: number;
  readonly expectedArea: Float64Array;
  readonly ordinate: Float64Array;
  readonly covariance: Float64Array;
  readonly factor: Float64Array;
  readonly ones: Float64Array;
  readonly energies: Float64Array;
}

export function createBoltzmannWorkspace(n: number): BoltzmannWorkspace {
  const row = (): Float64Array => new Float64Array(n);
  return {
    intercept: 0,
    slope: 0,
    expectedArea: row(),
    ordinate: row(),
    covariance: new Float64Array(n * n),
    factor: new Float64Array(n * n),
    ones: row(),
    energies: row(),
  };
}

const maxIterations = 60;
/** Change of any ln(area) below which the line stands. */
const settled = 1e-11;

/**
 * Goes from the line in the workspace to the fixed point of the linearised Boltzmann plot (see fitBoltzmann).
 * @returns whether it settled; null where the covariance has no factor
 * @source iteratively reweighted linearisation: [McCullagh1989] sec. 2.5; generalised least squares: [Aitken1936]
 * @check  test/reference/boltzmann-fit.test.ts
 */
export function iterateBoltzmann(input: BoltzmannInput, work: BoltzmannWorkspace): boolean | null {
  const { areaPerPopulation, upperEnergyEv, area } = input;
  const n = area.length;
  let meanEnergyEv = 0;
  for (let i = 0; i < n; i++) meanEnergyEv += upperEnergyEv[i]! / n;
  for (let round = 0; round < maxIterations; round++) {
    for (let i = 0; i < n; i++) {
      const lnPopulation = work.intercept + work.slope * upperEnergyEv[i]!;
      const expected = areaPerPopulation[i]! * exp(lnPopulation);
      work.expectedArea[i] = expected;
      work.ordinate[i] = lnPopulation + (area[i]! - expected) / expected;
    }
    fillCovariance(input, work);
    work.factor.set(work.covariance);
    if (!choleskyFactor(work.factor, n)) return null;
    const change = improveLine(work, upperEnergyEv, meanEnergyEv);
    if (change < settled) return true;
  }
  return false;
}

function fillCovariance(input: BoltzmannInput, { expectedArea, covariance }: BoltzmannWorkspace): void {
  const n = expectedArea.length;
  for (let i = 0; i < n; i++) {
    for (let j = 0; j <= i; j++) {
      const value =
        expectedAreaCovariance(input, i, j, expectedArea[i]!) / (expectedArea[i]! * expectedArea[j]!) +
        input.relativeCovariance[i * n + j]!;
      covariance[i * n + j] = value;
      covariance[j * n + i] = value;
    }
  }
}

/** Generalised straight line through the ordinates, energies from their mean; returns the largest change of any ln(area). */
function improveLine(work: BoltzmannWorkspace, upperEnergyEv: Float64Array, meanEnergyEv: number): number {
  const { ordinate, factor, ones, energies } = work;
  const n = ordinate.length;
  for (let i = 0; i < n; i++) {
    ones[i] = 1;
    energies[i] = upperEnergyEv[i]! - meanEnergyEv;
  }
  choleskySolve(factor, n, ones);
  choleskySolve(factor, n, energies);
  let s0 = 0;
  let s1 = 0;
  let s2 = 0;
  let y0 = 0;
  let y1 = 0;
  for (let i = 0; i < n; i++) {
    const energy = upperEnergyEv[i]! - meanEnergyEv;
    s0 += ones[i]!;
    s1 += energies[i]!;
    s2 += energies[i]! * energy;
    y0 += ones[i]! * ordinate[i]!;
    y1 += energies[i]! * ordinate[i]!;
  }
  const determinant = s0 * s2 - s1 * s1;
  const slope = (s0 * y1 - s1 * y0) / determinant;
  const intercept = (s2 * y0 - s1 * y1) / determinant - slope * meanEnergyEv;
  // At most a factor e a round in any expected area: keeps a poor start from overflowing.
  let change = 0;
  for (let i = 0; i < n; i++)
    change = Math.max(
      change,
      Math.abs(intercept - work.intercept + (slope - work.slope) * upperEnergyEv[i]!),
    );
  const length = change > 1 ? 1 / change : 1;
  work.intercept += length * (intercept - work.intercept);
  work.slope += length * (slope - work.slope);
  return change;
}
