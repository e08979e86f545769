import { faddeeva, type ComplexOut } from './faddeeva.ts';

/** FWHM of a Gaussian divided by its standard deviation: 2 sqrt(2 ln 2). */
export const gaussianFwhmPerSigma = 2.3548200450309493;

const sqrt2 = 1.4142135623730951;
const sqrtTwoPi = 2.5066282746310002;
const sqrtPi = 1.772453850905516;
const twoOverSqrtPi = 1.1283791670955126;

/** Voigt profile of unit area, by full widths; the Lorentz width may be slightly negative (see fillVoigtRun). */
export interface VoigtShape {
  readonly centreNm: number;
  /** > 0. */
  readonly gaussianFwhmNm: number;
  /** >= -0.3 gaussianFwhmNm. */
  readonly lorentzianFwhmNm: number;
}

/**
 * Numbers that fillVoigtRun writes for every pixel: the share of the profile, and its derivatives per nm of centre,
 * Gaussian FWHM and Lorentz FWHM, in this order.
 */
export const voigtRunStride = 4;

/**
 * Weights of the two-point Hermite rule with derivatives up to order m at both ends:
 * c_j = (m+1)! (2m+1-j)! / ((j+1)! (m-j)! (2m+2)!).
 */
function hermiteWeights(m: number): Float64Array {
  const factorial = (k: number): number => (k < 2 ? 1 : k * factorial(k - 1));
  return Float64Array.from(
    { length: m + 1 },
    (_, j) =>
      (factorial(m + 1) * factorial(2 * m + 1 - j)) /
      (factorial(j + 1) * factorial(m - j) * factorial(2 * m + 2)),
  );
}

/** Order of the rule by the width of a pixel (in sqrt2 sigma, or in what the Lorentz part smooths it to): error below 1e-6. */
const rules = [1, 3, 5, 7].map((order, index) => ({
  order,
  widest: [0.088, 0.59, 1.19, 1.77][index]!,
  weights: hermiteWeights(order),
}));
const lowestRule = rules[0]!;
/** Far from the real axis high derivatives lose their digits to the recursion, and the profile is smooth anyway. */
const smoothRules = rules.slice(0, 2);

const w: ComplexOut = { re: 0, im: 0 };
/** Derivatives of w at the two ends of a pixel, real parts: [end][order]. */
const ends = [new Float64Array(8), new Float64Array(8)] as const;

/**
 * Writes `weight` times a unit-area Voigt profile, integrated over each of the pixels firstPx to endPx - 1, to `out`.
 *
 * V(x) = Re w(z) / (s sqrt(2 pi)), z = (x - c + i g)/(s sqrt 2), s = Gaussian FWHM/2.3548, g = Lorentz FWHM/2. The
 * derivatives of the integral are exact differences between the two edges, for dV/dc = -dV/dx, dV/ds = s d2V/dx2 and
 * dV/dg = -d(Im w)/dx / (s sqrt(2 pi)). The integral itself is the two-point Hermite rule on w and its derivatives,
 * w(n+1) = -2 (z w(n) + n w(n-1)); neighbouring pixels share their edge, so a pixel costs one value of w. The order
 * follows the width of the pixel against the profile; the error stays below 1e-6 of the largest share.
 *
 * A slightly negative Lorentz width is the analytic continuation of the profile. Fits may pass through it, which
 * keeps an estimate near zero free of the bias that a wall at zero would cause; it never stands for a real width.
 *
 * @param edgeNm  nm, increasing; pixel px reaches from edgeNm[px] to edgeNm[px + 1]
 * @param out     (endPx - firstPx) x voigtRunStride or longer; begins with pixel firstPx
 * @source [Weideman1994] for w (faddeeva.ts); two-point Hermite rule: [Davis1984] sec. 2.12
 * @check  test/reference/voigt-pixel.test.ts
 */
export function fillVoigtRun(
  shape: VoigtShape,
  weight: number,
  edgeNm: Float64Array,
  firstPx: number,
  endPx: number,
  out: Float64Array,
): void {
  const s = shape.gaussianFwhmNm / gaussianFwhmPerSigma;
  const scale = 1 / (s * sqrt2);
  const y = (shape.lorentzianFwhmNm / 2) * scale;
  const widest = widestPixel(edgeNm, firstPx, endPx) * scale;
  const smooth = Math.max(1, 0.55 * y);
  const choice = smooth > 3.5 ? smoothRules : rules;
  const rule = choice.find((candidate) => widest <= candidate.widest * smooth) ?? choice.at(-1)!;
  const { order, weights } = rule;
  const panels = Math.max(1, Math.ceil(widest / (rule.widest * smooth)));
  // Beyond, the profile is a smooth wing and the lowest rule serves.
  const nearSquared = Math.max(49, (64 * widest * widest) / (panels * panels));
  const perHeight = weight / (s * sqrtTwoPi);
  const perShare = weight / sqrtPi;
  const perWidth = weight / (2 * s * sqrtPi * gaussianFwhmPerSigma);

  let from = 0;
  let t = (edgeNm[firstPx]! - shape.centreNm) * scale;
  let wasNear = t * t + y * y < nearSquared;
  fillEnd(t, y, wasNear ? order : 1, ends[0]);
  let im = w.im;
  for (let px = firstPx; px < endPx; px++) {
    const begin = t;
    const imBegin = im;
    const reBegin = ends[from]![0]!;
    const slopeBegin = ends[from]![1]!;
    const end = (edgeNm[px + 1]! - shape.centreNm) * scale;
    let sum = 0;
    for (let panel = 1; panel <= panels; panel++) {
      const next = panel === panels ? end : begin + ((end - begin) * panel) / panels;
      const isNear = next * next + y * y < nearSquared;
      const to = 1 - from;
      fillEnd(next, y, isNear ? order : 1, ends[to]!);
      const bothNear = isNear && wasNear;
      sum += hermite(
        ends[from]!,
        ends[to]!,
        next - t,
        bothNear ? order : 1,
        bothNear ? weights : lowestRule.weights,
      );
      t = next;
      wasNear = isNear;
      from = to;
    }
    im = w.im;
    const at = (px - firstPx) * voigtRunStride;
    out[at] = perShare * sum;
    out[at + 1] = -perHeight * (ends[from]![0]! - reBegin);
    out[at + 2] = perWidth * (ends[from]![1]! - slopeBegin);
    out[at + 3] = -0.5 * perHeight * (im - imBegin);
  }
}

/** Real parts of w and its derivatives up to `order` >= 1 at t + i y; w itself stays in `w`. */
function fillEnd(t: number, y: number, order: number, end: Float64Array): void {
  faddeeva(t, y, w);
  let re0 = w.re;
  let im0 = w.im;
  let re1 = -2 * (t * re0 - y * im0);
  let im1 = -2 * (t * im0 + y * re0) + twoOverSqrtPi;
  end[0] = re0;
  end[1] = re1;
  for (let n = 1; n < order; n++) {
    const re2 = -2 * (t * re1 - y * im1 + n * re0);
    const im2 = -2 * (t * im1 + y * re1 + n * im0);
    end[n + 1] = re2;
    re0 = re1;
    im0 = im1;
    re1 = re2;
    im1 = im2;
  }
}

function hermite(
  a: Float64Array,
  b: Float64Array,
  width: number,
  order: number,
  weights: Float64Array,
): number {
  let power = width;
  let sum = 0;
  for (let j = 0; j <= order; j += 2) {
    sum += weights[j]! * power * (a[j]! + b[j]!);
    power *= width;
    sum += weights[j + 1]! * power * (a[j + 1]! - b[j + 1]!);
    power *= width;
  }
  return sum;
}

function widestPixel(edgeNm: Float64Array, firstPx: number, endPx: number): number {
  let widest = 0;
  for (let px = firstPx; px < endPx; px++) widest = Math.max(widest, edgeNm[px + 1]! - edgeNm[px]!);
  return widest;
}
