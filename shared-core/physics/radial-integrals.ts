import { exp, log } from '../numeric/portable-math.ts';

/** Squared radial integrals of all dipole transitions between two levels, a_0^2; entry l belongs to the pair l, l - 1. */
export interface RadialIntegrals {
  /** |<n l | r | n' l-1>|^2 for l = 1 to n'. */
  readonly upperAbove: Float64Array;
  /** |<n l-1 | r | n' l>|^2 for l = 1 to n' - 1. */
  readonly upperBelow: Float64Array;
}

/**
 * Squared radial integrals from the level n to the level n' < n, infinitely heavy nucleus, by recursion downwards in l:
 * 2 l A(n',l) R(n,l;n',l-1) = (2 l + 1) A(n,l+1) R(n,l+1;n',l) + A(n',l+1) R(n,l;n',l+1),
 * 2 l A(n,l) R(n,l-1;n',l) = A(n,l+1) R(n,l+1;n',l) + (2 l + 1) A(n',l+1) R(n,l;n',l+1), A(n,l) = sqrt(n^2 - l^2)/(n l),
 * from R(n,n';n',n'-1), known in closed form. Relative error below 1e-12 for n <= 50.
 *
 * @source [Infeld1951]; start value [Gordon1929]
 * @check  test/reference/hydrogen.test.ts
 */
export function radialIntegrals(upper: number, lower: number): RadialIntegrals {
  const a = (n: number, l: number): number => Math.sqrt(n * n - l * l) / (n * l);
  const upperAbove = new Float64Array(lower + 1);
  const upperBelow = new Float64Array(lower + 1);
  let above = exp(
    log(0.25) +
      0.5 * (logFactorial(upper + lower) - logFactorial(upper - lower - 1) - logFactorial(2 * lower - 1)) +
      (lower + 2) * log(4 * upper * lower) +
      (upper - lower - 2) * log(upper - lower) -
      (upper + lower + 2) * log(upper + lower),
  );
  let below = 0;
  upperAbove[lower] = above * above;
  for (let l = lower - 1; l >= 1; l--) {
    const nextAbove =
      ((2 * l + 1) * a(upper, l + 1) * above + (l + 1 < lower ? a(lower, l + 1) * below : 0)) /
      (2 * l * a(lower, l));
    const nextBelow =
      (a(upper, l + 1) * above + (l + 1 < lower ? (2 * l + 1) * a(lower, l + 1) * below : 0)) /
      (2 * l * a(upper, l));
    above = nextAbove;
    below = nextBelow;
    upperAbove[l] = above * above;
    upperBelow[l] = below * below;
  }
  return { upperAbove, upperBelow };
}

function logFactorial(k: number): number {
  let sum = 0;
  for (let i = 2; i <= k; i++) sum += log(i);
  return sum;
}
