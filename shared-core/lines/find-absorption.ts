import { chiSquareUpperTail } from '../numeric/distributions.ts';
import type { CorrectedRecording } from '../noise/corrected-recording.ts';
import { noiseMemory } from '../noise/noise-memory.ts';
import { pixelAt } from '../axis/pixel-at.ts';
import type { LineObstacle } from './line-fit.ts';

/** Light that is missing where a line should stand. */
export type AbsorptionFinding = Extract<LineObstacle, { kind: 'absorption' | 'self-reversal' }>;

/** A line as it was fitted, with the fit around it; arrays are per pixel of the recording. */
export interface FittedPlace {
  readonly recording: Pick<CorrectedRecording, 'wavelengthNm' | 'netSignal' | 'clipped' | 'noise'>;
  readonly modelled: Float64Array;
  readonly baseline: Float64Array;
  /** Counts^2; pixels outside the fit hold 0 and are passed over. */
  readonly variance: Float64Array;
  readonly centreNm: number;
  /** FWHM of the line as the model has it, pixel included, nm. */
  readonly fwhmNm: number;
}

/** What is missing must be this many standard uncertainties, so that a thousand recordings of ten lines give no false one. */
const leastSignificance = 5;
/** A dip belongs to the line whose middle it sits in: H and D side by side leave a dip between them. */
const middleWidths = 0.25;
const coreWidths = 1;
const windowWidths = 4;
/** Below this many core pixels no dip can be told from a pixel's noise. */
const leastCorePixels = 3;
const misfitPValue = 1e-3;

/**
 * Recognises light taken out at a line: a line in absorption (less light in its core than its baseline), and a
 * self-reversed line (a dip in the middle of an emission line, between two shoulders, where the fitted single peak has
 * none).
 *
 * Absorption: sum over one width either side of (signal - baseline) below -5 sigma. Self-reversal: the lowest pixels of
 * the middle lie 5 sigma below both shoulders, and 5 sigma below the model: what the model itself shows as two peaks
 * (isotopes, fine structure) is no reversal, nor is a flat top. Correlated noise and misfit widen sigma.
 *
 * @returns null where nothing is missing, or too few pixels are left to tell
 * @source significance of a sum and of a difference of pixels: own; self-reversal: [Mitchell1934] ch. 3
 * @check  test/unit/lines/find-absorption.test.ts
 */
export function findAbsorption(place: FittedPlace): AbsorptionFinding | null {
  const core = usable(place, coreWidths);
  if (core.length < leastCorePixels) return null;
  const memory = noiseMemory(place.recording.noise.correlation);
  return (
    missingBelowBaseline(place, core, memory.varianceOfMean) ??
    missingInTheMiddle(place, core, memory.varianceOfMean)
  );
}

function missingBelowBaseline(
  place: FittedPlace,
  core: readonly number[],
  varianceOfMean: number,
): AbsorptionFinding | null {
  const { recording, baseline, variance } = place;
  let missing = 0;
  let square = 0;
  let level = 0;
  let deepest = 0;
  for (const px of core) {
    const below = baseline[px]! - recording.netSignal[px]!;
    missing += below;
    square += variance[px]!;
    level += baseline[px]!;
    deepest = Math.max(deepest, below);
  }
  // The baseline comes from the rest of the window, and is uncertain as that is short.
  const around = usable(place, windowWidths).length - core.length;
  square *= (1 + core.length / Math.max(1, around)) * varianceOfMean * misfit(place);
  const significance = missing / Math.sqrt(square);
  if (!(significance > leastSignificance)) return null;
  const perPixel = level / core.length;
  return { kind: 'absorption', depthFraction: perPixel > deepest ? deepest / perPixel : null, significance };
}

/** Chi-square per pixel of the window where chance does not explain it, else 1. */
function misfit(place: FittedPlace): number {
  const { recording, modelled, variance } = place;
  const window = usable(place, windowWidths);
  let chiSquare = 0;
  for (const px of window) {
    const residual = recording.netSignal[px]! - modelled[px]!;
    chiSquare += (residual * residual) / variance[px]!;
  }
  const reduced = chiSquare / window.length;
  return reduced > 1 && chiSquareUpperTail(chiSquare, window.length) < misfitPValue ? reduced : 1;
}

function missingInTheMiddle(
  place: FittedPlace,
  core: readonly number[],
  varianceOfMean: number,
): AbsorptionFinding | null {
  const { recording, modelled, baseline, variance, centreNm, fwhmNm } = place;
  const { netSignal, wavelengthNm } = recording;
  const reachNm = middleWidths * fwhmNm;
  // Pixels wider than that: the one the centre falls on.
  const middle = core.filter((px) => Math.abs(wavelengthNm[px]! - centreNm) <= reachNm);
  const nearest = pixelAt(wavelengthNm, centreNm);
  if (middle.length === 0 && core.includes(nearest)) middle.push(nearest);
  if (middle.length === 0) return null;
  const bottom = middle.reduce((so, px) => (netSignal[px]! < netSignal[so]! ? px : so));
  const left = highest(
    netSignal,
    core.filter((px) => px < bottom),
  );
  const right = highest(
    netSignal,
    core.filter((px) => px > bottom),
  );
  if (left === null || right === null) return null;
  const shoulder = netSignal[left]! < netSignal[right]! ? left : right;
  const dip = netSignal[shoulder]! - netSignal[bottom]!;
  const dipSigma = Math.sqrt(variance[shoulder]! + variance[bottom]!);
  const belowModel = modelled[bottom]! - netSignal[bottom]!;
  const modelSigma = Math.sqrt(variance[bottom]! * Math.max(1, varianceOfMean));
  const significance = Math.min(dip / dipSigma, belowModel / modelSigma);
  if (!(significance > leastSignificance)) return null;
  const height = netSignal[shoulder]! - baseline[bottom]!;
  return { kind: 'self-reversal', dipFraction: Math.min(1, dip / height), significance };
}

function highest(netSignal: Float64Array, pixels: readonly number[]): number | null {
  return pixels.reduce<number | null>(
    (so, px) => (so === null || netSignal[px]! > netSignal[so]! ? px : so),
    null,
  );
}

/** Pixels of the fit within so many widths of the centre, clipped ones passed over. */
function usable({ recording, variance, centreNm, fwhmNm }: FittedPlace, widths: number): readonly number[] {
  const { wavelengthNm, clipped } = recording;
  const from = pixelAt(wavelengthNm, centreNm - widths * fwhmNm);
  const to = pixelAt(wavelengthNm, centreNm + widths * fwhmNm);
  const pixels: number[] = [];
  for (let px = from; px <= to; px++) if (clipped[px] !== 1 && variance[px]! > 0) pixels.push(px);
  return pixels;
}
