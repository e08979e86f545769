import { fillVoigtRun, voigtRunStride, type VoigtShape } from './voigt-run.ts';

/** The part of a unit-area profile that falls on one pixel, with its derivatives. */
export interface PixelShare {
  share: number;
  /** Per nm of each parameter. */
  byCentre: number;
  byGaussianFwhm: number;
  byLorentzianFwhm: number;
}

const run = new Float64Array(voigtRunStride);
const edgeNm = new Float64Array(2);

/**
 * Integral of a unit-area Voigt profile over the one pixel [fromNm, toNm], with analytic derivatives. Where many
 * neighbouring pixels are wanted, fillVoigtRun does it in half the time.
 *
 * @source see fillVoigtRun
 * @check  test/reference/voigt-pixel.test.ts
 */
export function voigtPixel(shape: VoigtShape, fromNm: number, toNm: number, out: PixelShare): void {
  edgeNm[0] = fromNm;
  edgeNm[1] = toNm;
  fillVoigtRun(shape, 1, edgeNm, 0, 1, run);
  out.share = run[0]!;
  out.byCentre = run[1]!;
  out.byGaussianFwhm = run[2]!;
  out.byLorentzianFwhm = run[3]!;
}

/**
 * FWHM of a Voigt profile, nm: 0.5346 fL + sqrt(0.2166 fL^2 + fG^2), both widths in nm, >= 0.
 * Relative error between -2.0e-4 and +2.4e-4.
 * @source [Olivero1977]
 * @check  test/reference/voigt-pixel.test.ts
 */
export function voigtFwhmNm(gaussianFwhmNm: number, lorentzianFwhmNm: number): number {
  return (
    0.5346 * lorentzianFwhmNm +
    Math.sqrt(0.2166 * lorentzianFwhmNm * lorentzianFwhmNm + gaussianFwhmNm * gaussianFwhmNm)
  );
}
