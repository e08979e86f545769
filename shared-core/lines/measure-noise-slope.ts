import type { JointModel } from './joint-model.ts';
import type { JointProblem } from './joint-problem.ts';

/**
 * Counts of variance per count of light that make the fit's chi-square equal its degrees of freedom.
 *
 * Used when the gain is not known: fixed noise comes from the baseline, what the lines scatter beyond it is put
 * down to a variance that grows with the signal. Misfit of the profile is thereby counted as noise, which widens
 * the uncertainties and never narrows them. Returns 0 when the fixed noise already explains the residuals.
 *
 * @returns counts, >= 0
 * @check test/unit/lines/measure-noise-slope.test.ts
 */
export function measureNoiseSlope(problem: JointProblem, model: JointModel, degreesOfFreedom: number): number {
  const { netSignal, noise } = problem.recording;
  const chiSquareAt = (slope: number): number => {
    let sum = 0;
    for (const segment of problem.segments) {
      for (let px = segment.firstPx; px < segment.endPx; px++) {
        if (problem.masked[px] === 1) continue;
        const residual = netSignal[px]! - model.modelled[px]!;
        const light = Math.max(0, model.modelled[px]! - model.baseline[px]!);
        sum += (residual * residual) / (noise.fixedVariance[px]! + slope * light);
      }
    }
    return sum;
  };
  if (degreesOfFreedom <= 0 || chiSquareAt(0) <= degreesOfFreedom) return 0;
  let low = 0;
  let high = 1e-6;
  while (chiSquareAt(high) > degreesOfFreedom && high < 1e12) high *= 4;
  for (let i = 0; i < 50; i++) {
    const middle = 0.5 * (low + high);
    if (chiSquareAt(middle) > degreesOfFreedom) low = middle;
    else high = middle;
  }
  return high;
}
