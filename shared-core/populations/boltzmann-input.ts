/** The lines of a Boltzmann plot; arrays of equal length n >= 2. */
export interface BoltzmannInput {
  /** Line areas; may be negative where a line is lost in the noise. */
  readonly area: Float64Array;
  /** Covariance of the areas, row-major n x n, area^2. */
  readonly areaCovariance: Float64Array;
  /** Variance that each unit of the line's own area brings, area units: 1/gain for counts; 0 when not known. */
  readonly variancePerArea: number;
  /** Area that one unit of population per sublevel gives: response x weight x transition probability (x photon energy). */
  readonly areaPerPopulation: Float64Array;
  /** eV above the ground level. */
  readonly upperEnergyEv: Float64Array;
  /** Covariance of ln(area) errors that do not come from noise (response, axis), row-major n x n. */
  readonly relativeCovariance: Float64Array;
}

/**
 * Covariance of the areas had the line the area the fit expects: its own shot noise grows with its light. Without this
 * a line that fluctuated low would look better measured than one that fluctuated high, and pull the result down.
 */
export function expectedAreaCovariance(
  { area, areaCovariance, variancePerArea }: BoltzmannInput,
  i: number,
  j: number,
  expected: number,
): number {
  const fitted = areaCovariance[i * area.length + j]!;
  if (i !== j) return fitted;
  return Math.max(0.25 * fitted, fitted + variancePerArea * (expected - Math.max(0, area[i]!)));
}
