import type { CorrectedRecording } from '../noise/corrected-recording.ts';
import { median } from '../numeric/robust.ts';

/** A bump that stands out of the noise, on the recorded axis. */
export interface Peak {
  /** nm, recorded axis; sub-pixel. */
  readonly recordedNm: number;
  /** Detection statistic: matched-filter output over its standard deviation. */
  readonly signalToNoise: number;
  /** Signal above the surroundings at the top, signal units. */
  readonly height: number;
  readonly hasClipping: boolean;
}

export interface PeakSearch {
  /** The strongest, strongest first. */
  readonly peaks: readonly Peak[];
  /** Those beyond the strongest, as many again at most. */
  readonly fainter: readonly Peak[];
  /** nm; full width at half maximum of the strong lines of this recording, pixel included. */
  readonly fwhmNm: number;
}

const threshold = 4;
const maxPeakCount = 60;
/** Of the height that the filter makes of a peak: a line shows two thirds of it or more, the shoulder of a dip none. */
const leastRise = 0.25;

/**
 * Finds emission peaks by a zero-sum matched filter, so that any straight background drops out.
 *
 * The filter is a Gaussian of the line width less its mean over +-3 widths; its output divided by its standard
 * deviation from the noise model is the signal-to-noise of a line of that width. Local maxima above 4 are kept,
 * the strongest 60 at most; the filter's answer beside a line in absorption is none of them.
 *
 * @param knownFwhmNm  nm; instrument width from the bench file, or null to measure it on the strongest peak
 * @source matched filtering of a known pulse in white noise: [Turin1960]
 * @check  test/unit/axis/find-peaks.test.ts
 */
export function findPeaks(recording: CorrectedRecording, knownFwhmNm: number | null): PeakSearch {
  const strongest = strongestWidthNm(recording);
  const fwhmNm =
    knownFwhmNm === null ? strongest : Math.max(knownFwhmNm, Math.min(strongest, 4 * knownFwhmNm));
  const { wavelengthNm, netSignal, clipped } = recording;
  const n = netSignal.length;
  const pixelNm = (wavelengthNm[n - 1]! - wavelengthNm[0]!) / (n - 1);
  const kernel = zeroSumKernel(Math.max(1.5, fwhmNm / pixelNm));
  const half = (kernel.length - 1) / 2;
  const statistic = matchedFilter(recording, kernel);
  const peaks: Peak[] = [];
  for (let i = Math.max(1, half); i < n - Math.max(1, half); i++) {
    const here = statistic[i]!;
    if (here < threshold || here < statistic[i - 1]! || here <= statistic[i + 1]!) continue;
    const reach = Math.max(1, Math.round(fwhmNm / pixelNm / 2));
    if (!isHighestNearby(statistic, i, reach) || isShoulderOfDip(netSignal, kernel, i, reach)) continue;
    peaks.push(describePeak(recording, statistic, i, fwhmNm / pixelNm, clipped));
  }
  peaks.sort((a, b) => b.signalToNoise - a.signalToNoise);
  return {
    peaks: peaks.slice(0, maxPeakCount),
    fainter: peaks.slice(maxPeakCount, 2 * maxPeakCount),
    fwhmNm,
  };
}

/**
 * Filter output over its standard deviation, per pixel; 0 near the ends. The variance is only summed where the output
 * could reach the threshold at all; elsewhere the value is an upper bound below the threshold.
 */
function matchedFilter({ netSignal, noise }: CorrectedRecording, kernel: Float64Array): Float64Array {
  const n = netSignal.length;
  const half = (kernel.length - 1) / 2;
  const { fixedVariance, variancePerSignal } = noise;
  let lowest = Infinity;
  for (let i = 0; i < n; i++) lowest = Math.min(lowest, fixedVariance[i]!);
  let norm = 0;
  for (let k = 0; k < kernel.length; k++) norm += kernel[k]! * kernel[k]!;
  const leastSigma = Math.sqrt(lowest * norm);
  const statistic = new Float64Array(n);
  for (let i = half; i < n - half; i++) {
    // Symmetric: one multiplication serves both sides.
    let sum = kernel[half]! * netSignal[i]!;
    for (let k = 1; k <= half; k++) sum += kernel[half + k]! * (netSignal[i - k]! + netSignal[i + k]!);
    if (sum < threshold * leastSigma) {
      statistic[i] = leastSigma > 0 ? sum / leastSigma : 0;
      continue;
    }
    let variance = 0;
    for (let k = 0; k < kernel.length; k++) {
      const at = i + k - half;
      variance +=
        kernel[k]! * kernel[k]! * (fixedVariance[at]! + variancePerSignal * Math.max(0, netSignal[at]!));
    }
    statistic[i] = variance > 0 ? sum / Math.sqrt(variance) : 0;
  }
  return statistic;
}

function isHighestNearby(statistic: Float64Array, at: number, reach: number): boolean {
  for (let i = Math.max(0, at - reach); i <= Math.min(statistic.length - 1, at + reach); i++) {
    if (statistic[i]! > statistic[at]!) return false;
  }
  return true;
}

/** A zero-sum filter also answers beside a dip. There the signal itself does not rise above its surroundings. */
function isShoulderOfDip(netSignal: Float64Array, kernel: Float64Array, at: number, reach: number): boolean {
  const half = (kernel.length - 1) / 2;
  let output = 0;
  let norm = 0;
  for (let k = 0; k < kernel.length; k++) {
    output += kernel[k]! * netSignal[at + k - half]!;
    norm += kernel[k]! * kernel[k]!;
  }
  const mean = (values: Float64Array): number =>
    values.reduce((sum, value) => sum + value, 0) / values.length;
  const top = mean(netSignal.subarray(at - reach, at + reach + 1));
  const level = median(netSignal.subarray(at - half, at + half + 1));
  return top - level < leastRise * (output / norm);
}

/** Position by the centroid of what stands above half the height, which holds for flat, clipped tops as well. */
function describePeak(
  { wavelengthNm, netSignal }: CorrectedRecording,
  statistic: Float64Array,
  at: number,
  fwhmPx: number,
  clipped: Uint8Array,
): Peak {
  const reach = Math.max(2, Math.round(2 * fwhmPx));
  const from = Math.max(0, at - reach);
  const to = Math.min(netSignal.length - 1, at + reach);
  let top = -Infinity;
  let floor = Infinity;
  let topIndex = at;
  for (let i = from; i <= to; i++) {
    if (Math.abs(i - at) <= Math.max(1, fwhmPx) && netSignal[i]! > top) {
      top = netSignal[i]!;
      topIndex = i;
    }
    floor = Math.min(floor, netSignal[i]!);
  }
  const half = floor + 0.5 * (top - floor);
  let weighted = 0;
  let total = 0;
  let hasClipping = false;
  let left = topIndex;
  let right = topIndex;
  while (left > from && netSignal[left - 1]! > half) left--;
  while (right < to && netSignal[right + 1]! > half) right++;
  for (let i = Math.max(0, left - 1); i <= Math.min(netSignal.length - 1, right + 1); i++) {
    const above = Math.max(0, netSignal[i]! - floor - 0.25 * (top - floor));
    weighted += above * wavelengthNm[i]!;
    total += above;
    if (clipped[i] === 1) hasClipping = true;
  }
  return {
    recordedNm: total > 0 ? weighted / total : wavelengthNm[at]!,
    signalToNoise: statistic[at]!,
    height: top - floor,
    hasClipping,
  };
}

function zeroSumKernel(fwhmPx: number): Float64Array {
  const half = Math.max(3, Math.ceil(2.5 * fwhmPx));
  const kernel = new Float64Array(2 * half + 1);
  let sum = 0;
  for (let k = -half; k <= half; k++) {
    // Any bell shape serves for detection; this one needs no transcendental function.
    const u = (2 * k) / fwhmPx;
    const bell = 1 / ((1 + 0.4142 * u * u) * (1 + 0.4142 * u * u));
    kernel[k + half] = bell;
    sum += bell;
  }
  for (let k = 0; k < kernel.length; k++) kernel[k] = kernel[k]! - sum / kernel.length;
  return kernel;
}

/** FWHM of the highest unclipped peak (of the highest at all when every one is clipped), by half-height crossings. */
function strongestWidthNm(recording: CorrectedRecording): number {
  const { netSignal, clipped } = recording;
  let top = -1;
  let topAnyhow = 1;
  for (let i = 1; i < netSignal.length - 1; i++) {
    if (netSignal[i]! < netSignal[i - 1]! || netSignal[i]! < netSignal[i + 1]!) continue;
    if (netSignal[i]! > netSignal[topAnyhow]!) topAnyhow = i;
    if ((top < 0 || netSignal[i]! > netSignal[top]!) && !nearClipping(clipped, i)) top = i;
  }
  return halfHeightWidthNm(recording, top < 0 ? topAnyhow : top);
}

/** Full width at half maximum of the peak whose top is pixel `top`, nm, by straight-line crossings; >= 1.2 pixels. */
export function halfHeightWidthNm({ wavelengthNm, netSignal }: CorrectedRecording, top: number): number {
  const n = netSignal.length;
  const reach = 60;
  let floor = Infinity;
  for (let i = Math.max(0, top - reach); i <= Math.min(n - 1, top + reach); i++) {
    floor = Math.min(floor, netSignal[i]!);
  }
  const half = floor + 0.5 * (netSignal[top]! - floor);
  let left = top;
  let right = top;
  while (left > 0 && netSignal[left]! > half) left--;
  while (right < n - 1 && netSignal[right]! > half) right++;
  const leftNm = crossing(wavelengthNm, netSignal, left, left + 1, half);
  const rightNm = crossing(wavelengthNm, netSignal, right - 1, right, half);
  const pixelNm = (wavelengthNm[n - 1]! - wavelengthNm[0]!) / (n - 1);
  return Math.max(1.2 * pixelNm, rightNm - leftNm);
}

function nearClipping(clipped: Uint8Array, at: number): boolean {
  for (let i = Math.max(0, at - 8); i <= Math.min(clipped.length - 1, at + 8); i++) {
    if (clipped[i] === 1) return true;
  }
  return false;
}

function crossing(x: Float64Array, y: Float64Array, a: number, b: number, level: number): number {
  const span = y[b]! - y[a]!;
  return span === 0 ? x[a]! : x[a]! + ((level - y[a]!) / span) * (x[b]! - x[a]!);
}
