import { faddeeva } from '../numeric/faddeeva.ts';
import { exp } from '../numeric/portable-math.ts';

/** What a homogeneous slab lets out of a line, as a function of its optical depth at the centre. */
export interface CurveOfGrowth {
  /** Share of the line's area that leaves, and how it falls with the depth; `opticalDepth` > -3, may be negative. */
  readonly escapeAt: (opticalDepth: number) => { readonly share: number; readonly slope: number };
  /** Peak of the profile of unit area, per unit of the widths. */
  readonly peak: number;
}

const twoSqrtLn2 = 1.6651092223153956;
const inverseSqrtPi = 0.5641895835477563;
const twoOverPi = 0.6366197723675814;
/** Steps of the rule in u, x = sinh u: better than 1e-6 of the share up to a depth of 50, whatever the shape. */
const stepU = 0.125;
const lastU = 20;

/**
 * Curve of growth of a Voigt line in a homogeneous slab: share(tau) = Integral (1 - exp(-tau p)) / (tau Integral p), p
 * the profile over its peak.
 *
 * By the trapezoidal rule in u with x = s sinh u, which reaches far enough for the wings of a Lorentz shape. Both
 * integrals come from the same nodes, so share(0) = 1. Negative depths continue the function analytically, for fits.
 *
 * @param gaussianFwhm    of the absorbing atoms, without the instrument; any unit, >= 0
 * @param lorentzianFwhm  same unit, >= 0; the two not both 0
 * @source [Ladenburg1913]; trapezoidal rule: [Trefethen2014]
 * @check  test/reference/curve-of-growth.test.ts
 */
export function curveOfGrowth(gaussianFwhm: number, lorentzianFwhm: number): CurveOfGrowth {
  const { profile, weight, peak } = nodes(gaussianFwhm, lorentzianFwhm);
  const moment = (power: number): number => {
    let sum = 0;
    for (let i = 0; i < profile.length; i++) {
      let term = weight[i]!;
      for (let k = 0; k < power; k++) term *= profile[i]!;
      sum += term;
    }
    return sum;
  };
  const total = moment(1);
  const second = moment(2) / total;
  const third = moment(3) / total;
  return {
    peak,
    escapeAt(opticalDepth) {
      if (Math.abs(opticalDepth) < 1e-3) {
        // The quotient would lose digits to cancellation where three terms of the series are exact to 1e-10.
        return {
          share: 1 - opticalDepth * (second / 2 - (opticalDepth * third) / 6),
          slope: -second / 2 + (opticalDepth * third) / 3,
        };
      }
      let absorbed = 0;
      let left = 0;
      for (let i = 0; i < profile.length; i++) {
        const depth = opticalDepth * profile[i]!;
        // In the wings 1 - exp would leave rounding errors, which the growing weights would blow up.
        const lost = Math.abs(depth) < 1e-4 ? depth * (1 - (depth / 2) * (1 - depth / 3)) : 1 - exp(-depth);
        absorbed += weight[i]! * lost;
        left += weight[i]! * profile[i]! * (1 - lost);
      }
      const share = absorbed / (opticalDepth * total);
      return { share, slope: (left / total - share) / opticalDepth };
    },
  };
}

function nodes(
  gaussianFwhm: number,
  lorentzianFwhm: number,
): { readonly profile: Float64Array; readonly weight: Float64Array; readonly peak: number } {
  const count = Math.round(lastU / stepU) + 1;
  const profile = new Float64Array(count);
  const weight = new Float64Array(count);
  const isLorentz = gaussianFwhm <= 1e-3 * lorentzianFwhm;
  // Unit of x: 1/e half-width of the Gauss part, or half-width of the Lorentz shape when that is larger.
  const ratio = isLorentz ? 0 : (lorentzianFwhm / gaussianFwhm) * (twoSqrtLn2 / 2);
  const stretch = isLorentz ? 1 : Math.max(1, ratio);
  const w = { re: 0, im: 0 };
  let peak = 1;
  if (!isLorentz) {
    faddeeva(0, ratio, w);
    peak = w.re;
  }
  for (let i = 0; i < count; i++) {
    const grow = exp(i * stepU);
    const x = (stretch * (grow - 1 / grow)) / 2;
    weight[i] = ((grow + 1 / grow) / 2) * (i === 0 ? 0.5 : 1);
    if (isLorentz) profile[i] = 1 / (1 + x * x);
    else if (ratio === 0) profile[i] = exp(-x * x);
    else {
      faddeeva(x, ratio, w);
      profile[i] = Math.max(0, w.re / peak);
    }
  }
  return {
    profile,
    weight,
    peak: isLorentz ? twoOverPi / lorentzianFwhm : (twoSqrtLn2 * inverseSqrtPi * peak) / gaussianFwhm,
  };
}
