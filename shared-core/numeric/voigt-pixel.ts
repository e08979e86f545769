import { faddeeva, type ComplexOut } from './faddeeva.ts';

/** FWHM of a Gaussian divided by its standard deviation: 2 sqrt(2 ln 2). */
export const gaussianFwhmPerSigma = 2.3548200450309493;

const sqrt2 = 1.4142135623730951;
const sqrtTwoPi = 2.5066282746310002;
const twoOverSqrtPi = 1.1283791670955126;

/** Gauss-Legendre nodes and weights on [-1, 1] (Abramowitz and Stegun, table 25.4), by number of nodes. */
const legendreRules: readonly { readonly nodes: readonly number[]; readonly weights: readonly number[] }[] = [
  { nodes: [-0.5773502691896257, 0.5773502691896257], weights: [1, 1] },
  {
    nodes: [-0.7745966692414834, 0, 0.7745966692414834],
    weights: [0.5555555555555556, 0.8888888888888888, 0.5555555555555556],
  },
  {
    nodes: [-0.8611363115940526, -0.3399810435848563, 0.3399810435848563, 0.8611363115940526],
    weights: [0.3478548451374538, 0.6521451548625461, 0.6521451548625461, 0.3478548451374538],
  },
  {
    nodes: [
      -0.932469514203152, -0.6612093864662645, -0.2386191860831969, 0.2386191860831969, 0.6612093864662645,
      0.932469514203152,
    ],
    weights: [
      0.1713244923791704, 0.3607615730481386, 0.467913934572691, 0.467913934572691, 0.3607615730481386,
      0.1713244923791704,
    ],
  },
];

/** Voigt profile of unit area, by full widths; the Lorentz width may be slightly negative (see voigtPixel). */
export interface VoigtShape {
  readonly centreNm: number;
  /** > 0. */
  readonly gaussianFwhmNm: number;
  /** >= -0.3 gaussianFwhmNm. */
  readonly lorentzianFwhmNm: number;
}

/** The part of a unit-area profile that falls on one pixel, with its derivatives. */
export interface PixelShare {
  share: number;
  /** Per nm of each parameter. */
  byCentre: number;
  byGaussianFwhm: number;
  byLorentzianFwhm: number;
}

const w: ComplexOut = { re: 0, im: 0 };

/**
 * Integral of a unit-area Voigt profile over the pixel [fromNm, toNm], with analytic derivatives.
 *
 * V(x) = Re w(z) / (s sqrt(2 pi)), z = (x - c + i g)/(s sqrt 2), s = Gaussian FWHM/2.3548, g = Lorentz FWHM/2;
 * w'(z) = -2 z w + 2 i/sqrt(pi) gives every derivative. Gauss-Legendre inside the pixel, with as many nodes as
 * the pixel is wide against the profile, so that the quadrature error stays below 1e-6 of the largest share.
 *
 * A slightly negative Lorentz width is the analytic continuation of the profile. Fits may pass through it, which
 * keeps an estimate near zero free of the bias that a wall at zero would cause; it never stands for a real width.
 *
 * @source Weideman series (faddeeva.ts); quadrature: Abramowitz and Stegun 25.4.29
 * @check  test/reference/voigt-pixel.test.ts
 */
export function voigtPixel(shape: VoigtShape, fromNm: number, toNm: number, out: PixelShare): void {
  const s = shape.gaussianFwhmNm / gaussianFwhmPerSigma;
  const g = shape.lorentzianFwhmNm / 2;
  const scale = 1 / (s * sqrt2);
  const y = g * scale;
  const smooth = s + 0.3 * Math.max(0, g);
  const widthNm = toNm - fromNm;
  const ratio = widthNm / smooth;
  const panels = ratio <= 2 ? 1 : Math.ceil(ratio / 2);
  const distance = Math.abs((fromNm + toNm) / 2 - shape.centreNm);
  const step = widthNm / panels;
  const perPanel = step / smooth;
  const far = distance > 7 * smooth + widthNm / 2;
  const rule =
    legendreRules[
      perPanel <= 0.25 || (far && perPanel <= 1.2) ? 0 : perPanel <= 0.55 ? 1 : perPanel <= 1.2 ? 2 : 3
    ]!;
  const { nodes, weights } = rule;
  let share = 0;
  let slope = 0;
  let slopeIm = 0;
  let stretch = 0;
  for (let panel = 0; panel < panels; panel++) {
    const middle = fromNm + (panel + 0.5) * step - shape.centreNm;
    for (let k = 0; k < nodes.length; k++) {
      const x = (middle + nodes[k]! * step * 0.5) * scale;
      faddeeva(x, y, w);
      const weight = weights[k]!;
      // w' = -2 z w + 2 i / sqrt(pi)
      const dRe = -2 * (x * w.re - y * w.im);
      const dIm = -2 * (x * w.im + y * w.re) + twoOverSqrtPi;
      share += weight * w.re;
      slope += weight * dRe;
      slopeIm += weight * dIm;
      stretch += weight * (x * dRe - y * dIm);
    }
  }
  const factor = (step * 0.5) / (s * sqrtTwoPi);
  share *= factor;
  out.share = share;
  out.byCentre = -slope * factor * scale;
  out.byLorentzianFwhm = -slopeIm * factor * scale * 0.5;
  out.byGaussianFwhm = -(share + stretch * factor) / s / gaussianFwhmPerSigma;
}

/**
 * FWHM of a Voigt profile, nm: 0.5346 fL + sqrt(0.2166 fL^2 + fG^2), both widths in nm, >= 0.
 * Relative error between -2.0e-4 and +2.4e-4.
 * @source J. J. Olivero, R. L. Longbothum, J. Quant. Spectrosc. Radiat. Transfer 17, 233 (1977)
 * @check  test/reference/voigt-pixel.test.ts
 */
export function voigtFwhmNm(gaussianFwhmNm: number, lorentzianFwhmNm: number): number {
  return (
    0.5346 * lorentzianFwhmNm +
    Math.sqrt(0.2166 * lorentzianFwhmNm * lorentzianFwhmNm + gaussianFwhmNm * gaussianFwhmNm)
  );
}
