import { normalQuantile, studentTQuantile } from '../numeric/distributions.ts';

/** One cause of uncertainty of a measured quantity. */
export interface UncertaintyComponent {
  readonly name: string;
  /** Of the input, in its own unit. */
  readonly standardUncertainty: number;
  /** Change of the result per unit of the input. */
  readonly sensitivity: number;
  /** Infinity where the standard uncertainty counts as known. */
  readonly degreesOfFreedom: number;
}

/** What is known of two components together, by index. */
export interface PairOfComponents {
  readonly i: number;
  readonly j: number;
  /** -1 to 1. */
  readonly correlation?: number;
  /** Second derivative of the result by both inputs, for a result that bends; i may equal j. */
  readonly secondDerivative?: number;
}

export interface CombinedUncertainty {
  /** Of the result. */
  readonly standardUncertainty: number;
  readonly effectiveDegreesOfFreedom: number;
  /** Factor for the stated coverage. */
  readonly coverageFactor: number;
  readonly expandedUncertainty: number;
  /**
   * Share of each component in the variance, in the order given; a covariance is divided evenly between the two, so that
   * all add up to 1 but for second-order terms. Negative where a component cancels others.
   */
  readonly shares: readonly number[];
}

/**
 * Combines components: u^2 = sum_i (c_i u_i)^2 + 2 sum_{i<j} r_ij c_i u_i c_j u_j, with effective degrees of freedom
 * u^4 / sum (c_i u_i)^4/nu_i.
 *
 * Second derivatives f_ij add (f_ij u_i u_j)^2 for i < j and (f_ii u_i^2)^2/2: the second-order terms of a product of
 * normal, independent inputs, third derivatives being zero.
 *
 * @param coverage  0 to 1
 * @source [JCGM2008] 5.1.2 with its note, 5.2.2, G.4.1
 * @check  test/reference/gum.test.ts (H.1, H.2)
 */
export function combineUncertainties(
  components: readonly UncertaintyComponent[],
  coverage: number,
  pairs: readonly PairOfComponents[] = [],
): CombinedUncertainty {
  const parts = components.map(({ sensitivity, standardUncertainty }) => sensitivity * standardUncertainty);
  const variances = parts.map((part) => part * part);
  let secondOrder = 0;
  for (const { i, j, correlation = 0, secondDerivative = 0 } of pairs) {
    const covariance = correlation * parts[i]! * parts[j]!;
    variances[i] = variances[i]! + covariance;
    variances[j] = variances[j]! + covariance;
    const bend = secondDerivative * components[i]!.standardUncertainty * components[j]!.standardUncertainty;
    secondOrder += (i === j ? 0.5 : 1) * bend * bend;
  }
  const firstOrder = variances.reduce((sum, value) => sum + value, 0);
  const variance = Math.max(0, firstOrder + secondOrder);
  const standardUncertainty = Math.sqrt(variance);
  let doubt = 0;
  for (const [index, { degreesOfFreedom }] of components.entries()) {
    const square = parts[index]! * parts[index]!;
    if (Number.isFinite(degreesOfFreedom)) doubt += (square * square) / degreesOfFreedom;
  }
  // Of the first-order variance: the formula knows no second-order terms.
  const effectiveDegreesOfFreedom = doubt > 0 ? (firstOrder * firstOrder) / doubt : Infinity;
  const factor = coverageFactor(coverage, effectiveDegreesOfFreedom);
  return {
    standardUncertainty,
    effectiveDegreesOfFreedom,
    coverageFactor: factor,
    expandedUncertainty: factor * standardUncertainty,
    shares: variances.map((value) => (variance > 0 ? value / variance : 0)),
  };
}

/** Beyond, Student's t differs from the normal quantile by less than 0.02 %. */
const asGoodAsKnown = 10_000;

/**
 * Factor k for which the interval of +-k standard uncertainties holds the stated coverage: Student's t for the effective
 * degrees of freedom, cut to a whole number.
 *
 * @param coverage  0 to 1
 * @param effectiveDegreesOfFreedom  > 0; Infinity where all standard uncertainties count as known
 * @source [JCGM2008] G.3.2, G.4.1, G.6.4
 * @check  test/reference/gum.test.ts
 */
export function coverageFactor(coverage: number, effectiveDegreesOfFreedom: number): number {
  const probability = 0.5 * (1 + coverage);
  return effectiveDegreesOfFreedom > asGoodAsKnown
    ? normalQuantile(probability)
    : studentTQuantile(probability, Math.max(1, Math.floor(effectiveDegreesOfFreedom)));
}
