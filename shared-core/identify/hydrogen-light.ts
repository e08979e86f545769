import { pixelAt } from '../axis/pixel-at.ts';
import type { LineFits } from '../lines/line-fit.ts';
import type { CorrectedRecording } from '../noise/corrected-recording.ts';
import { voigtFwhmNm } from '../numeric/voigt-pixel.ts';

/** Where hydrogen shines: what is known of its light, and pixels that say nothing of anything else. */
export interface HydrogenLight {
  /** Fitted signal and the baseline in it, defined inside the runs; of length n. */
  readonly modelled: Float64Array;
  readonly baseline: Float64Array;
  /** Number of the run of fitted pixels that a pixel belongs to, from 1; 0 outside. */
  readonly modelRun: Uint8Array;
  /** 1 in the cores of hydrogen lines, at clipped pixels and beside them. */
  readonly excluded: Uint8Array;
  /** Excluded pixels before each; length n + 1. */
  readonly excludedBefore: Int32Array;
}

/** A hydrogen line that may be in the range, fitted or not. */
export interface HydrogenPlace {
  readonly id: string;
  readonly upperLevel: number;
  readonly recordedNm: number;
}

/** Half-width of the core in widths of the line: a fitted line is subtracted outside it, others only left out. */
const coreWidths = 1.5;
/** Around a clipped line the detector itself is disturbed. */
const clippedWidths = 6;

/** @param fwhmNm  of a narrow line, pixel included */
export function hydrogenLight(
  recording: CorrectedRecording,
  fits: LineFits,
  places: readonly HydrogenPlace[],
  fwhmNm: number,
): HydrogenLight {
  const { wavelengthNm, clipped } = recording;
  const n = wavelengthNm.length;
  const excluded = new Uint8Array(n);
  const modelRun = new Uint8Array(n);
  const exclude = (centreNm: number, halfNm: number): void => {
    if (centreNm + halfNm < wavelengthNm[0]! || centreNm - halfNm > wavelengthNm[n - 1]!) return;
    excluded.fill(1, pixelAt(wavelengthNm, centreNm - halfNm), pixelAt(wavelengthNm, centreNm + halfNm) + 1);
  };
  if (fits.modelled.length === n) {
    for (const { firstPx, endPx } of fits.windows) modelRun.fill(1, firstPx, endPx);
  }
  for (const { id, upperLevel, recordedNm } of places) {
    const fit = fits.fits.find((each) => each.id === id);
    if (fits.obstacles.get(id)?.kind === 'clipped') exclude(recordedNm, clippedWidths * fwhmNm);
    else if (fit === undefined) exclude(recordedNm, coreWidths * expectedWidthNm(fits, upperLevel, fwhmNm));
    else {
      const stark = Math.max(0, fit.lorentzianFwhmNm);
      exclude(fit.recordedCentreNm, coreWidths * Math.max(fwhmNm, voigtFwhmNm(fit.gaussianFwhmNm, stark)));
    }
  }
  for (let px = 0; px < n; px++) {
    if (clipped[px] === 1) excluded.fill(1, Math.max(0, px - 2), Math.min(n, px + 3));
  }
  const excludedBefore = new Int32Array(n + 1);
  let run = 0;
  for (let px = 0; px < n; px++) {
    excludedBefore[px + 1] = excludedBefore[px]! + excluded[px]!;
    if (modelRun[px] === 0) continue;
    if (px === 0 || modelRun[px - 1] === 0) run++;
    modelRun[px] = run;
  }
  return { modelled: fits.modelled, baseline: fits.baseline, modelRun, excluded, excludedBefore };
}

/** Stark widths of the Balmer series grow about as the square of the upper level; the highest fitted line sets the scale. */
function expectedWidthNm(fits: LineFits, upperLevel: number, fwhmNm: number): number {
  const last = fits.fits.reduce<LineFits['fits'][number] | null>(
    (a, b) => (a === null || b.upperLevel > a.upperLevel ? b : a),
    null,
  );
  if (last === null) return fwhmNm;
  const growth = (upperLevel * upperLevel) / (last.upperLevel * last.upperLevel);
  return voigtFwhmNm(fwhmNm, Math.min(2, Math.max(0, last.lorentzianFwhmNm * growth)));
}
