import { fitLinearModel } from '../numeric/fit-linear-model.ts';
import { exp, log } from '../numeric/portable-math.ts';
import type { LineAbsorption } from '../physics/balmer-absorption.ts';
import type { CurveOfGrowth } from '../physics/curve-of-growth.ts';
import { expectedAreaCovariance, type BoltzmannInput } from './boltzmann-input.ts';

export interface OpticalDepthFit {
  /** At the centre of H-alpha; may be negative within its uncertainty. */
  readonly opticalDepth: number;
  readonly opticalDepthSigma: number;
  /** 1/(kT), per eV, of the populations behind the absorption. */
  readonly inverseKtPerEv: number;
  readonly inverseKtSigmaPerEv: number;
  readonly chiSquare: number;
  readonly degreesOfFreedom: number;
  /** Share of each line's light that leaves, and d ln(share)/d(depth of H-alpha). */
  readonly share: Float64Array;
  readonly logSlope: Float64Array;
}

const maxRounds = 80;
/** The function is continued below zero depth, so that noise on a thin line is not cut off; further is no absorption. */
const leastDepth = -2;
const largestDepth = 1e3;

/**
 * Temperature and optical depth of H-alpha together: area_i = a_i exp(c - E_i/kT) share_i(tau q_i), by generalised least
 * squares over all lines, iterated as fitBoltzmann is.
 *
 * @param absorption  of each line, same order
 * @returns null with fewer than three lines, or when the fit does not settle between the depths -2 and 1000
 * @source curve of growth: [Ladenburg1913]; iteration: [McCullagh1989] sec. 2.5
 * @check  test/unit/populations/optical-depth.test.ts
 */
export function fitOpticalDepth(
  input: BoltzmannInput,
  absorption: readonly LineAbsorption[],
  start: {
    readonly lnPopulationAtMean: number;
    readonly inverseKtPerEv: number;
    readonly opticalDepth: number;
  },
): OpticalDepthFit | null {
  const { area, areaPerPopulation, upperEnergyEv, relativeCovariance } = input;
  const n = area.length;
  if (n < 3) return null;
  const meanEv = upperEnergyEv.reduce((sum, energy) => sum + energy, 0) / n;
  const ones = new Float64Array(n).fill(1);
  const energies = upperEnergyEv.map((energy) => meanEv - energy);
  let { lnPopulationAtMean: level, inverseKtPerEv: inverseKt, opticalDepth: depth } = start;
  const share = new Float64Array(n);
  const logSlope = new Float64Array(n);
  const expected = new Float64Array(n);
  const misfit = new Float64Array(n);
  const covariance = new Float64Array(n * n);
  // On the flat part of the curve of growth full steps may leap to and fro for ever: a leap back halves the next.
  let relaxation = 1;
  let previousByDepth = 0;
  for (let round = 0; round < maxRounds; round++) {
    for (const [i, { curve, relativeDepth }] of absorption.entries()) {
      const escape = curve.escapeAt(depth * relativeDepth);
      share[i] = escape.share;
      logSlope[i] = (relativeDepth * escape.slope) / escape.share;
      expected[i] = areaPerPopulation[i]! * exp(level + inverseKt * energies[i]!) * escape.share;
      misfit[i] = (area[i]! - expected[i]) / expected[i];
    }
    for (let i = 0; i < n; i++) {
      for (let j = 0; j < n; j++) {
        covariance[i * n + j] =
          expectedAreaCovariance(input, i, j, expected[i]!) / (expected[i]! * expected[j]!) +
          relativeCovariance[i * n + j]!;
      }
    }
    const step = fitLinearModel([ones, energies, logSlope], misfit, covariance);
    if (step === null) return null;
    const [byLevel, byInverseKt, byDepth] = step.values as unknown as [number, number, number];
    let change = 0;
    for (let i = 0; i < n; i++) {
      change = Math.max(change, Math.abs(byLevel + byInverseKt * energies[i]! + byDepth * logSlope[i]!));
    }
    if (change < 1e-10) {
      return {
        opticalDepth: depth,
        opticalDepthSigma: Math.sqrt(step.covariance[8]!),
        inverseKtPerEv: inverseKt,
        inverseKtSigmaPerEv: Math.sqrt(step.covariance[4]!),
        chiSquare: step.chiSquare,
        degreesOfFreedom: step.degreesOfFreedom,
        share,
        logSlope,
      };
    }
    const leapsBack = byDepth * previousByDepth < 0 && Math.abs(byDepth) > 0.5 * Math.abs(previousByDepth);
    relaxation = leapsBack ? 0.5 * relaxation : Math.min(1, 1.3 * relaxation);
    previousByDepth = byDepth;
    const largest = Math.max(0.5, 0.5 * Math.abs(depth));
    const length = Math.min(relaxation, 1 / change, largest / Math.abs(byDepth));
    level += length * byLevel;
    inverseKt += length * byInverseKt;
    depth = Math.max(leastDepth, depth + length * byDepth);
    if (depth > largestDepth) return null;
  }
  return null;
}

/**
 * Depth at which -ln(share) is `deficit`: the inverse of the curve of growth, by Newton steps kept inside a bracket.
 * @returns null beyond a depth of 1000
 * @check test/unit/populations/optical-depth.test.ts
 */
export function depthOfDeficit(curve: CurveOfGrowth, deficit: number): number | null {
  let low = leastDepth;
  let high = largestDepth;
  if (-log(curve.escapeAt(high).share) <= deficit) return null;
  if (-log(curve.escapeAt(low).share) >= deficit) return low;
  let depth = Math.max(0, Math.min(high, 3 * deficit));
  for (let round = 0; round < 100; round++) {
    const { share, slope } = curve.escapeAt(depth);
    const beyond = -log(share) - deficit;
    if (beyond > 0) high = depth;
    else low = depth;
    const newton = depth + (beyond * share) / slope;
    const next = newton > low && newton < high ? newton : 0.5 * (low + high);
    if (Math.abs(next - depth) < 1e-12 * (1 + Math.abs(depth))) return next;
    depth = next;
  }
  return depth;
}
