import { log } from '../numeric/portable-math.ts';
import type { JointModel } from './joint-model.ts';
import type { JointProblem } from './joint-problem.ts';

/**
 * -2 ln likelihood of the residuals, Gaussian with the variance used as weight: sum of r^2/V + ln V. Dimensionless;
 * only differences between models of the same pixels mean anything.
 * @check test/property/joint-fit.test.ts
 */
export function logLikelihoodDeviance(problem: JointProblem, model: JointModel): number {
  let sum = 0;
  for (const segment of problem.segments) {
    for (let px = segment.firstPx; px < segment.endPx; px++) {
      if (problem.masked[px] === 1) continue;
      const residual = problem.recording.netSignal[px]! - model.modelled[px]!;
      sum += (residual * residual) / model.variance[px]! + log(model.variance[px]!);
    }
  }
  return sum;
}
