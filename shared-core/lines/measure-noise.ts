import { leverages } from './leverages.ts';
import type { SolvedFit } from './solved-fit.ts';

export interface MeasuredNoise {
  /** Counts of variance per count of light. */
  readonly variancePerSignal: number;
  /** Share of the light by which the profile misses a pixel, 1 sigma. */
  readonly relativeMisfit: number;
}

const roundCount = 6;
/** A pixel that the fit all but passes through says nothing about noise. */
const highestLeverage = 0.95;
/**
 * Beyond this a line would lose its weight against the baseline and the fit its hold on the line; what a worse
 * profile misses widens the line by its own chi-square instead.
 */
const highestMisfit = 0.1;

/**
 * The noise that grows with the light, measured on the residuals of a fit: V = fixed + a L + (m L)^2; used when the
 * gain is not known.
 *
 * Photon noise and a profile that misses the line both grow with the light L, one like its root and one like itself;
 * faint and bright lines together tell them apart. Squared residuals, each divided by 1 - leverage for the freedom
 * the fit took, are fitted by fixed + a L + m^2 L^2 with weights 1/V^2, a and m^2 not negative, repeated with the new V.
 *
 * @returns a (counts, >= 0) and m (0 to 0.1)
 * @source iterated weighted least squares on squared residuals: [Davidian1987]; leverage: [Belsley1980] sec. 2.1
 * @check  test/unit/lines/measure-noise.test.ts
 */
export function measureNoise(fit: SolvedFit): MeasuredNoise {
  const { problem, model } = fit;
  const { netSignal, noise } = problem.recording;
  const leverage = leverages(fit);
  const excess: number[] = [];
  const light: number[] = [];
  const fixed: number[] = [];
  for (const { firstPx, endPx } of problem.segments) {
    for (let px = firstPx; px < endPx; px++) {
      if (problem.masked[px] === 1 || leverage[px]! > highestLeverage) continue;
      const residual = netSignal[px]! - model.modelled[px]!;
      excess.push((residual * residual) / (1 - leverage[px]!) - noise.fixedVariance[px]!);
      light.push(Math.max(0, model.modelled[px]! - model.baseline[px]!));
      fixed.push(noise.fixedVariance[px]!);
    }
  }
  let a = problem.variancePerSignal;
  let m2 = problem.relativeMisfit * problem.relativeMisfit;
  for (let round = 0; round < roundCount; round++) {
    let s11 = 0;
    let s12 = 0;
    let s22 = 0;
    let r1 = 0;
    let r2 = 0;
    for (let i = 0; i < light.length; i++) {
      const l = light[i]!;
      const variance = fixed[i]! + a * l + m2 * l * l;
      const weight = 1 / (variance * variance);
      s11 += weight * l * l;
      s12 += weight * l * l * l;
      s22 += weight * l * l * l * l;
      r1 += weight * l * excess[i]!;
      r2 += weight * l * l * excess[i]!;
    }
    const determinant = s11 * s22 - s12 * s12;
    const both = determinant > 0;
    a = both ? (r1 * s22 - r2 * s12) / determinant : -1;
    m2 = both ? (r2 * s11 - r1 * s12) / determinant : -1;
    if (a < 0) {
      a = 0;
      m2 = s22 > 0 ? Math.max(0, r2 / s22) : 0;
    } else if (m2 < 0) {
      m2 = 0;
      a = s11 > 0 ? Math.max(0, r1 / s11) : 0;
    }
  }
  return { variancePerSignal: a, relativeMisfit: Math.min(highestMisfit, Math.sqrt(m2)) };
}
