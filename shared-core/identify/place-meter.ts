import { pixelAt } from '../axis/pixel-at.ts';
import type { CorrectedRecording } from '../noise/corrected-recording.ts';
import { median } from '../numeric/robust.ts';
import type { FeatureShape } from './emitters.ts';
import { kernelFamily, phaseCount, type KernelFamily } from './place-kernels.ts';
import { estimateWithGaps } from './estimate-with-gaps.ts';
import type { HydrogenLight } from './hydrogen-light.ts';
import type { Reading } from './reading.ts';

/** How much light there is at a place. */
export interface PlaceMeter {
  /**
   * Writes area and sigma of what has this shape at a place into `out`.
   * @returns false where the place lies outside, or under a line of hydrogen or a clipped pixel
   */
  readonly measure: (recordedNm: number, shape: FeatureShape, out: Reading) => boolean;
  /** At most so many standard deviations of light are at a place; not a number where `measure` would say nothing. */
  readonly glance: (recordedNm: number, shape: FeatureShape) => number;
  readonly recording: CorrectedRecording;
  readonly fwhmNm: number;
}

interface MeterInput {
  readonly recording: CorrectedRecording;
  readonly hydrogen: HydrogenLight;
  /** nm; of a narrow line, pixel included. */
  readonly fwhmNm: number;
  /** Counts^2 a count, as the line fit measured it. */
  readonly variancePerSignal: number;
}

/** Share by which the model of the hydrogen lines may miss them in their wings: own choice. */
const modelMiss = 0.02;
/** Places at which the noise model is held against the recording, in each quarter of its range. */
const probesPerQuarter = 48;
const quarterCount = 4;
/** The scatter of that many probes is itself good to about 15 %. */
const scatterAllowance = 1.15;

/**
 * Measures the light at given places by least squares on a straight baseline, with the noise from the noise model, and
 * never less noise than places all over the same quarter of the recording show.
 *
 * The fitted lines of hydrogen are subtracted where their model holds; their cores and clipped pixels are left out.
 *
 * @check test/unit/identify/place-meter.test.ts
 */
export function createPlaceMeter(input: MeterInput): PlaceMeter {
  const { recording, hydrogen, fwhmNm, variancePerSignal } = input;
  const { wavelengthNm, netSignal, noise } = recording;
  const { fixedVariance, signalReference, correlation } = noise;
  const { modelled, baseline, modelRun, excluded } = hydrogen;
  const n = netSignal.length;
  const scatter = new Float64Array(quarterCount).fill(1);
  const leastSigma = Math.sqrt(fixedVariance.reduce((least, each) => Math.min(least, each), Infinity));
  const lastFamily: Partial<Record<FeatureShape, { pixelNm: number; family: KernelFamily }>> = {};

  function familyOf(shape: FeatureShape, pixelNm: number): KernelFamily {
    const last = lastFamily[shape];
    if (last !== undefined && Math.abs(last.pixelNm - pixelNm) < 0.01 * pixelNm) return last.family;
    const family = kernelFamily(shape, fwhmNm / pixelNm, pixelNm);
    lastFamily[shape] = { pixelNm, family };
    return family;
  }

  function glance(recordedNm: number, shape: FeatureShape): number {
    const at = pixelAt(wavelengthNm, recordedNm);
    if (at < 3 || at > n - 4 || excluded[at] === 1) return NaN;
    const pixelNm = 0.5 * (wavelengthNm[at + 1]! - wavelengthNm[at - 1]!);
    const family = familyOf(shape, pixelNm);
    const first = at - family.before;
    const last = at + family.after;
    if (
      first < 0 ||
      last >= n ||
      modelRun[first]! > 0 ||
      modelRun[last]! > 0 ||
      hydrogen.excludedBefore[last + 1]! > hydrogen.excludedBefore[first]! ||
      signalReference === 'baseline' ||
      correlation.length > 0
    ) {
      const isMeasured = measure(recordedNm, shape, glanced);
      return isMeasured ? glanced.area / glanced.sigma : NaN;
    }
    const phase = phaseOf((recordedNm - wavelengthNm[at]!) / pixelNm);
    const weights = family.weights[phase]!;
    let area = 0;
    for (let k = 0, px = first; px <= last; k++, px++) area += weights[k]! * netSignal[px]!;
    return area / (leastSigma * family.norms[phase]!);
  }

  function measure(recordedNm: number, shape: FeatureShape, out: Reading): boolean {
    const at = pixelAt(wavelengthNm, recordedNm);
    if (at < 3 || at > n - 4 || excluded[at] === 1) return false;
    const pixelNm = 0.5 * (wavelengthNm[at + 1]! - wavelengthNm[at - 1]!);
    const offset = (recordedNm - wavelengthNm[at]!) / pixelNm;
    if (Math.abs(offset) > 1) return false;
    const family = familyOf(shape, pixelNm);
    const phase = phaseOf(offset);
    const first = at - family.before;
    const last = at + family.after;
    const isWhole = first >= 0 && last < n;
    const isResidual = isWhole && modelRun[first]! > 0 && modelRun[first] === modelRun[last];
    if (!isWhole || (!isResidual && hydrogen.excludedBefore[last + 1]! > hydrogen.excludedBefore[first]!)) {
      return measureWithGaps(family, phase, at, out);
    }
    const weights = family.weights[phase]!;
    let area = 0;
    let variance = 0;
    let lowest = Infinity;
    for (let k = 0, px = first; px <= last; k++, px++) {
      const w = weights[k]!;
      const value = netSignal[px]!;
      const left = isResidual ? value - modelled[px]! : value;
      if (value < lowest) lowest = value;
      const miss = isResidual ? modelMiss * (modelled[px]! - baseline[px]!) : 0;
      area += w * left;
      variance += w * w * (fixedVariance[px]! + variancePerSignal * Math.max(0, value) + miss * miss);
    }
    if (signalReference === 'baseline')
      variance = withoutBaseline(variance, weights, lowest, variancePerSignal);
    out.area = area;
    out.sigma = Math.sqrt(variance * memoryOf(weights, correlation)) * scatterAt(at);
    return true;
  }

  /** Near the ends, clipped pixels and lines of hydrogen that have no model: the same sum over the pixels that are left. */
  function measureWithGaps(family: KernelFamily, phase: number, at: number, out: Reading): boolean {
    const isOk = estimateWithGaps(recording, excluded, variancePerSignal, family, phase, at, out);
    if (isOk) out.sigma *= Math.sqrt(memoryOf(family.weights[phase]!, correlation)) * scatterAt(at);
    return isOk;
  }

  const scatterAt = (px: number): number =>
    scatter[Math.min(quarterCount - 1, Math.floor((quarterCount * px) / n))]!;

  calibrate();
  return { measure, glance, recording, fwhmNm };

  function calibrate(): void {
    const out = { area: 0, sigma: 0 };
    const found = new Float64Array(quarterCount);
    for (let quarter = 0; quarter < quarterCount; quarter++) {
      const sizes: number[] = [];
      for (let probe = 0; probe < probesPerQuarter; probe++) {
        const px = Math.floor((n * (quarter + (probe + 0.5) / probesPerQuarter)) / quarterCount);
        if (measure(wavelengthNm[px]!, 'line', out)) sizes.push(Math.abs(out.area) / out.sigma);
      }
      found[quarter] = sizes.length < 12 ? 1 : (normalPerMad * median(sizes)) / scatterAllowance;
    }
    for (let quarter = 0; quarter < quarterCount; quarter++) scatter[quarter] = Math.max(1, found[quarter]!);
  }
}

const phaseOf = (offsetPx: number): number =>
  Math.max(0, Math.min(phaseCount, Math.round((offsetPx + 0.5) * phaseCount)));

const glanced: Reading = { area: 0, sigma: 1 };

/** Median of |x| for a standard normal x, inverted. */
const normalPerMad = 1.482602218505602;

/** The fixed part was measured on the baseline: only light above it makes noise of its own. */
function withoutBaseline(variance: number, weights: Float64Array, lowest: number, perSignal: number): number {
  let norm = 0;
  for (let k = 0; k < weights.length; k++) norm += weights[k]! * weights[k]!;
  return variance - norm * perSignal * Math.max(0, lowest);
}

/** Variance of the sum in noise of this memory over that in white noise. */
function memoryOf(weights: Float64Array, correlation: readonly number[]): number {
  if (correlation.length === 0) return 1;
  let white = 0;
  let shared = 0;
  for (let k = 0; k < weights.length; k++) {
    white += weights[k]! * weights[k]!;
    for (let lag = 1; lag <= correlation.length && k + lag < weights.length; lag++)
      shared += 2 * correlation[lag - 1]! * weights[k]! * weights[k + lag]!;
  }
  return Math.max(0.05, 1 + shared / white);
}
