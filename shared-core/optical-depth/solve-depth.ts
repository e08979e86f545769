/** Depths beyond are not told apart by any of the measurements. */
export const largestDepth = 50;

/**
 * Depth at which a function that grows with the depth reaches a value, by halving.
 * @returns 0 where it is above at no depth, null where it is not reached within a depth of 50
 * @source bisection: common practice
 * @check  test/unit/optical-depth/slab.test.ts
 */
export function depthAt(growing: (peakDepth: number) => number, wanted: number): number | null {
  if (growing(0) >= wanted) return 0;
  let low = 0;
  let high = 0.01;
  while (growing(high) < wanted) {
    if (high >= largestDepth) return null;
    low = high;
    high = Math.min(largestDepth, 2 * high);
  }
  while (high - low > 1e-7 * high) {
    const middle = 0.5 * (low + high);
    if (growing(middle) < wanted) low = middle;
    else high = middle;
  }
  return 0.5 * (low + high);
}
