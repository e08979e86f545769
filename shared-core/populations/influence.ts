import { fitStraightLine } from '../numeric/fit-straight-line.ts';
import { boltzmannEvPerK } from '../physics/constants.ts';
import type { BoltzmannFit } from './fit-boltzmann.ts';

export interface Influence {
  /** Position among the used lines. */
  readonly index: number;
  /** Change of 1/kT when the line is left out, over the standard uncertainty of that change. */
  readonly shiftSigma: number;
  /** Temperature without the line, K; null when it would not be positive. */
  readonly kelvinWithout: number | null;
}

/**
 * What each line does to the result: the slope without it against the slope with all.
 *
 * For an efficient estimate the variance of the change is the difference of the two variances.
 *
 * @source [Hausman1978] lemma 2.1
 * @check  test/reference/boltzmann-fit.test.ts
 */
export function influence({
  ordinate,
  ordinateCovariance,
  upperEnergyEv,
  line,
}: BoltzmannFit): readonly Influence[] {
  const n = ordinate.length;
  const result: Influence[] = [];
  for (let out = 0; out < n; out++) {
    const kept = [...ordinate.keys()].filter((i) => i !== out);
    const covariance = new Float64Array((n - 1) * (n - 1));
    for (const [row, i] of kept.entries()) {
      for (const [column, j] of kept.entries())
        covariance[row * (n - 1) + column] = ordinateCovariance[i * n + j]!;
    }
    const without = fitStraightLine(
      Float64Array.from(kept, (i) => upperEnergyEv[i]!),
      Float64Array.from(kept, (i) => ordinate[i]!),
      covariance,
    );
    if (without === null) continue;
    const variance = without.slopeVariance - line.slopeVariance;
    const change = without.slope - line.slope;
    result.push({
      index: out,
      shiftSigma: variance > 0 ? change / Math.sqrt(variance) : 0,
      kelvinWithout: without.slope < 0 ? -1 / (boltzmannEvPerK * without.slope) : null,
    });
  }
  return result;
}
