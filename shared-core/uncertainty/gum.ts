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

export interface CombinedUncertainty {
  /** Of the result. */
  readonly standardUncertainty: number;
  readonly effectiveDegreesOfFreedom: number;
  /** Factor for the stated coverage. */
  readonly coverageFactor: number;
  readonly expandedUncertainty: number;
  /** Share of each component in the variance, in the order given. */
  readonly shares: readonly number[];
}

/**
 * Combines independent components: u^2 = sum (c_i u_i)^2; effective degrees of freedom u^4 / sum (c_i u_i)^4/nu_i; the
 * coverage factor is Student's t for them, cut to a whole number as the guide advises.
 *
 * @param coverage  0 to 1
 * @param correlations  further terms 2 r c_i c_j u_i u_j, by index
 * @source [JCGM2008] 5.1.2, 5.2.2, G.4.1
 * @check  test/reference/gum.test.ts (H.1, H.2)
 */
export function combineUncertainties(
  components: readonly UncertaintyComponent[],
  coverage: number,
  correlations: readonly { readonly i: number; readonly j: number; readonly r: number }[] = [],
): CombinedUncertainty {
  const parts = components.map(({ sensitivity, standardUncertainty }) => sensitivity * standardUncertainty);
  let variance = parts.reduce((sum, part) => sum + part * part, 0);
  for (const { i, j, r } of correlations) variance += 2 * r * parts[i]! * parts[j]!;
  variance = Math.max(0, variance);
  const freedom = effectiveDegreesOfFreedom(
    components.map(({ degreesOfFreedom }, index) => ({
      variance: parts[index]! * parts[index]!,
      degreesOfFreedom,
    })),
    variance,
  );
  const probability = 0.5 * (1 + coverage);
  const coverageFactor = Number.isFinite(freedom)
    ? studentTQuantile(probability, Math.max(1, Math.floor(freedom)))
    : normalQuantile(probability);
  const standardUncertainty = Math.sqrt(variance);
  return {
    standardUncertainty,
    effectiveDegreesOfFreedom: freedom,
    coverageFactor,
    expandedUncertainty: coverageFactor * standardUncertainty,
    shares: parts.map((part) => (variance > 0 ? (part * part) / variance : 0)),
  };
}

/**
 * Degrees of freedom of a sum of independent variances (Welch and Satterthwaite): V^2 / sum V_i^2/nu_i.
 * @returns Infinity where no part has finite degrees of freedom
 * @source [JCGM2008] G.4.1
 * @check  test/reference/gum.test.ts
 */
export function effectiveDegreesOfFreedom(
  parts: readonly { readonly variance: number; readonly degreesOfFreedom: number }[],
  total = parts.reduce((sum, { variance }) => sum + variance, 0),
): number {
  const doubt = parts.reduce(
    (sum, { variance, degreesOfFreedom }) =>
      Number.isFinite(degreesOfFreedom) ? sum + (variance * variance) / degreesOfFreedom : sum,
    0,
  );
  return doubt > 0 ? (total * total) / doubt : Infinity;
}
