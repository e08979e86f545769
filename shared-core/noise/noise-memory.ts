/** Sums over the autocorrelation of a stationary noise, r_1, r_2, ...; 1 each for white noise. */
export interface NoiseMemory {
  /** 1 + 2 sum r_k: variance of the mean of many points over that of as many independent ones. */
  readonly varianceOfMean: number;
  /** 1 + 2 sum r_k^2: variance of a chi-square over that for independent points. */
  readonly varianceOfChiSquare: number;
}

/**
 * How much less a run of correlated points tells than as many independent ones.
 * @source [Box2015] sec. 2.1 and 7.2
 * @check  test/unit/noise/noise-correlation.test.ts
 */
export function noiseMemory(correlation: readonly number[]): NoiseMemory {
  let linear = 1;
  let squared = 1;
  for (const r of correlation) {
    linear += 2 * r;
    squared += 2 * r * r;
  }
  return { varianceOfMean: Math.max(0.1, linear), varianceOfChiSquare: squared };
}
