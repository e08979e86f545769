/**
 * Probability that chance alone explains at least `count` of the features 1..n, each with its own probability:
 * upper tail of the Poisson-binomial distribution, by its recursion.
 * @source Y. H. Wang, Statistica Sinica 3, 295 (1993)
 * @check  test/unit/identify/chance.test.ts
 */
export function chanceOfAtLeast(count: number, probabilities: readonly number[]): number {
  // upTo[k]: probability of exactly k so far, for k < count; the last cell holds count and more.
  const upTo = new Float64Array(count + 1);
  upTo[0] = 1;
  for (const p of probabilities) {
    upTo[count] = upTo[count]! + (count > 0 ? upTo[count - 1]! * p : 0);
    for (let k = count - 1; k > 0; k--) upTo[k] = upTo[k]! * (1 - p) + upTo[k - 1]! * p;
    if (count > 0) upTo[0] = upTo[0] * (1 - p);
  }
  return upTo[count]!;
}
