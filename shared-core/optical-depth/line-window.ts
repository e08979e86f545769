import { pixelAt } from '../axis/pixel-at.ts';
import type { CorrectedRecording } from '../noise/corrected-recording.ts';
import { noiseMemory } from '../noise/noise-memory.ts';

/** A weighted sum over pixels: the light of a line's core less the straight baseline under it. */
export interface LineWindow {
  readonly firstPx: number;
  /** 1 in the core; beside it what takes the baseline away; 0 where masked. */
  readonly weights: Float64Array;
  readonly coreFirstPx: number;
  /** Exclusive. */
  readonly coreEndPx: number;
  readonly sidePixels: readonly number[];
}

const leastSidePixels = 3;

/**
 * Pixels of a line: a core of `coreHalfNm` either side of the centre, and sides from `gapNm` beyond it to `reachNm`.
 *
 * The sides determine a straight baseline by unweighted least squares; its sum over the core is a sum over the side
 * pixels, so the whole is linear in the signal, and takes any straight background out exactly.
 *
 * @returns null where a core pixel is masked, or a side has fewer than three pixels
 * @source linear least squares: [Draper1998] ch. 1
 * @check  test/unit/optical-depth/line-window.test.ts
 */
export function lineWindow(
  wavelengthNm: Float64Array,
  masked: Uint8Array,
  centreNm: number,
  size: { readonly coreHalfNm: number; readonly sideFromNm: number; readonly reachNm: number },
): LineWindow | null {
  const centrePx = pixelAt(wavelengthNm, centreNm);
  const coreFirstPx = Math.min(centrePx - 1, pixelAt(wavelengthNm, centreNm - size.coreHalfNm));
  const coreEndPx = Math.max(centrePx + 1, pixelAt(wavelengthNm, centreNm + size.coreHalfNm)) + 1;
  const firstPx = pixelAt(wavelengthNm, centreNm - size.reachNm);
  const endPx = pixelAt(wavelengthNm, centreNm + size.reachNm) + 1;
  const sidePixels: number[] = [];
  let left = 0;
  for (let px = firstPx; px < endPx; px++) {
    const isCore = px >= coreFirstPx && px < coreEndPx;
    if (isCore && masked[px] === 1) return null;
    if (masked[px] === 1 || isCore || Math.abs(wavelengthNm[px]! - centreNm) < size.sideFromNm) continue;
    sidePixels.push(px);
    if (px < centrePx) left++;
  }
  if (left < leastSidePixels || sidePixels.length - left < leastSidePixels || coreFirstPx < firstPx)
    return null;
  const weights = new Float64Array(endPx - firstPx);
  const mean = sidePixels.reduce((sum, px) => sum + px, 0) / sidePixels.length;
  const spread = sidePixels.reduce((sum, px) => sum + (px - mean) * (px - mean), 0);
  const coreCount = coreEndPx - coreFirstPx;
  const coreMean = 0.5 * (coreFirstPx + coreEndPx - 1);
  for (let px = coreFirstPx; px < coreEndPx; px++) weights[px - firstPx] = 1;
  for (const px of sidePixels) {
    weights[px - firstPx] = -coreCount * (1 / sidePixels.length + ((coreMean - mean) * (px - mean)) / spread);
  }
  return { firstPx, weights, coreFirstPx, coreEndPx, sidePixels };
}

/** The sum over a window of any signal per pixel. */
export function windowSum({ firstPx, weights }: LineWindow, signal: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < weights.length; i++) sum += weights[i]! * signal[firstPx + i]!;
  return sum;
}

/** Variance of that sum, noise shared by neighbours taken into account. */
export function windowVariance(
  { firstPx, weights }: LineWindow,
  variance: Float64Array,
  correlation: readonly number[],
): number {
  let sum = 0;
  for (let i = 0; i < weights.length; i++) sum += weights[i]! * weights[i]! * variance[firstPx + i]!;
  return sum * Math.max(1, noiseMemory(correlation).varianceOfMean);
}

/** Mean over the sides. */
export function sideLevel({ sidePixels }: LineWindow, signal: Float64Array): number {
  return sidePixels.reduce((sum, px) => sum + signal[px]!, 0) / sidePixels.length;
}

/** Straight baseline at a pixel. */
export function baselineAt({ sidePixels }: LineWindow, signal: Float64Array): (px: number) => number {
  const n = sidePixels.length;
  const mean = sidePixels.reduce((sum, px) => sum + px, 0) / n;
  const level = sidePixels.reduce((sum, px) => sum + signal[px]!, 0) / n;
  let cross = 0;
  let spread = 0;
  for (const px of sidePixels) {
    cross += (px - mean) * (signal[px]! - level);
    spread += (px - mean) * (px - mean);
  }
  return (px) => level + (cross / spread) * (px - mean);
}

/** Variance of every pixel of a window from the light on it, counts^2; zero outside. */
export function pixelVariance(
  { netSignal, noise }: CorrectedRecording,
  window: LineWindow,
  variancePerSignal: number,
): Float64Array {
  const reference = noise.signalReference === 'zero' ? 0 : sideLevel(window, netSignal);
  const variance = new Float64Array(netSignal.length);
  for (let px = window.firstPx; px < window.firstPx + window.weights.length; px++) {
    variance[px] = noise.fixedVariance[px]! + variancePerSignal * Math.max(0, netSignal[px]! - reference);
  }
  return variance;
}
