import type { JointProblem } from './joint-problem.ts';

/** Variance of every pixel inside the segments, from the light that a fit (or a first look) expects there. */
export function setVariance(
  { recording, segments, variancePerSignal, relativeMisfit }: JointProblem,
  expected: { readonly modelled: Float64Array; readonly baseline: Float64Array },
  variance: Float64Array,
): void {
  const { fixedVariance, signalReference } = recording.noise;
  for (const { firstPx, endPx } of segments) {
    for (let px = firstPx; px < endPx; px++) {
      const overBaseline = Math.max(0, expected.modelled[px]! - expected.baseline[px]!);
      const light = signalReference === 'zero' ? Math.max(0, expected.modelled[px]!) : overBaseline;
      const miss = relativeMisfit * overBaseline;
      variance[px] = fixedVariance[px]! + variancePerSignal * light + miss * miss;
    }
  }
}
