/** Splits a double into halves of 26 bits, whose products are exact. */
const splitter = 134217729;

/** Part of a vector: elements offset, offset + stride, ... */
export interface Slice {
  readonly values: Float64Array;
  readonly offset: number;
  readonly stride: number;
}

/**
 * start + sum over i of a_i b_i as if computed in twice the working precision and rounded once.
 *
 * Every product and sum is split into its rounded value and its exact error, and the errors are summed too. Elements
 * below 1e290, since the splitting multiplies by 2^27.
 *
 * @source [Ogita2005] algorithm 5.3 (Dot2), with Dekker's product for want of a fused multiply-add
 * @check  test/unit/numeric/compensated-dot.test.ts
 */
export function compensatedDot(start: number, a: Slice, b: Slice, length: number): number {
  let high = start;
  let low = 0;
  for (let i = 0; i < length; i++) {
    const x = a.values[a.offset + i * a.stride]!;
    const y = b.values[b.offset + i * b.stride]!;
    const product = x * y;
    const xTop = splitter * x - (splitter * x - x);
    const yTop = splitter * y - (splitter * y - y);
    const xRest = x - xTop;
    const yRest = y - yTop;
    const productError = xRest * yRest - (product - xTop * yTop - xRest * yTop - xTop * yRest);
    const sum = high + product;
    const back = sum - high;
    low += high - (sum - back) + (product - back) + productError;
    high = sum;
  }
  return high + low;
}
