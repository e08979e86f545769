/**
 * Median of `values`, which are left as they are; NaN for an empty array. Mean of the middle two when even.
 * @check  test/unit/numeric/robust.test.ts
 */
export function median(values: ArrayLike<number>): number {
  const count = values.length;
  if (count === 0) return NaN;
  const work = new Float64Array(values);
  const middle = count >> 1;
  const upper = select(work, middle);
  if (count % 2 === 1) return upper;
  let lower = -Infinity;
  for (let i = 0; i < middle; i++) lower = Math.max(lower, work[i]!);
  return 0.5 * (lower + upper);
}

/**
 * Median absolute deviation from the median, scaled by 1.4826 to estimate a normal standard deviation.
 * @source [Hampel1974]
 * @check  test/unit/numeric/robust.test.ts
 */
export function scaledMad(values: ArrayLike<number>): number {
  const centre = median(values);
  return 1.482602218505602 * median(Float64Array.from(values, (value) => Math.abs(value - centre)));
}

/**
 * Quantile of `values` at 0 <= p <= 1, which are left as they are, linear between order statistics: the value at rank
 * (n - 1) p from 0. NaN for an empty array.
 * @source [Hyndman1996] definition 7
 * @check  test/unit/numeric/robust.test.ts
 */
export function quantile(values: ArrayLike<number>, p: number): number {
  const count = values.length;
  if (count === 0 || !(p >= 0 && p <= 1)) return NaN;
  const work = new Float64Array(values);
  const rank = (count - 1) * p;
  const below = Math.floor(rank);
  const lower = select(work, below);
  if (below === rank) return lower;
  let upper = Infinity;
  for (let i = below + 1; i < count; i++) upper = Math.min(upper, work[i]!);
  return lower + (rank - below) * (upper - lower);
}

/** Puts the k-th smallest (from 0) at index k, smaller ones before it, and returns it (Hoare's quickselect). */
function select(work: Float64Array, k: number): number {
  let left = 0;
  let right = work.length - 1;
  while (left < right) {
    const pivot = work[(left + right) >> 1]!;
    let i = left;
    let j = right;
    while (i <= j) {
      while (work[i]! < pivot) i++;
      while (work[j]! > pivot) j--;
      if (i <= j) {
        const swap = work[i]!;
        work[i] = work[j]!;
        work[j] = swap;
        i++;
        j--;
      }
    }
    if (k <= j) right = j;
    else if (k >= i) left = i;
    else break;
  }
  return work[k]!;
}
