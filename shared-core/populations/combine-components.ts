import { combineUncertainties, type CombinedUncertainty } from '../uncertainty/gum.ts';
import type { ErrorComponent } from './error-component.ts';
import type { BoltzmannFit } from './fit-boltzmann.ts';

/**
 * What each cause does to 1/(kT): its variance is g^T V g, g the gain of the slope on each ordinate.
 * @source [JCGM2008] 5.1.2 and 5.2.2
 * @check  test/unit/diagnosis/evidence-cases.test.ts
 */
export function combineComponents(
  { line: { slopeGain } }: BoltzmannFit,
  components: readonly ErrorComponent[],
  coverage: number,
): CombinedUncertainty {
  const n = slopeGain.length;
  const parts = components.map(({ label, covariance, degreesOfFreedom }) => {
    let variance = 0;
    for (let i = 0; i < n; i++) {
      for (let j = 0; j < n; j++) variance += slopeGain[i]! * slopeGain[j]! * covariance[i * n + j]!;
    }
    return {
      name: label,
      standardUncertainty: Math.sqrt(Math.max(0, variance)),
      sensitivity: 1,
      degreesOfFreedom: degreesOfFreedom ?? Infinity,
    };
  });
  return combineUncertainties(parts, coverage);
}
