import { log } from '../numeric/portable-math.ts';
import type { CorrectedRecording } from '../noise/corrected-recording.ts';
import { boundedDepth, notDetermined, withAreaFactors } from './describe-depth.ts';
import type { DepthOfPixel, OpticalDepthFinding } from './finding.ts';
import { baselineAt, pixelVariance, windowSum, windowVariance } from './line-window.ts';
import type { ObservedLine } from './observed-line.ts';
import { depthAt } from './solve-depth.ts';
import type { Slab } from './slab.ts';

/**
 * Factor by which a line that the mirror shows absorbed has to be raised: K = ln y/(y - 1), y = (R_line - 1)/(R_thin - 1).
 * Equal to tau/(1 - e^-tau). Exact at one wavelength, so for a pixel where the instrument resolves the line.
 * @param lineRatio  with over without mirror, at the line, > 1
 * @param thinRatio  the same where nothing absorbs, > 1
 * @source [Moon2009]
 * @check  test/unit/optical-depth/mirror.test.ts
 */
export function mirrorCorrection(lineRatio: number, thinRatio: number): number {
  const y = (lineRatio - 1) / (thinRatio - 1);
  const below = y - 1;
  // ln y/(y - 1) without the 0/0 of a thin line.
  return Math.abs(below) < 1e-4 ? 1 - below / 2 + (below * below) / 3 : log(y) / below;
}

/**
 * Relative standard uncertainty of what the mirror returns at one line against another (its reflectance), and of the lamp
 * between the two recordings. Common practice: an aluminium mirror is that flat from 400 to 660 nm.
 */
const mirrorUnevenness = 0.01;
/** A line is a reference for another when its depth is below half of it, and its light this many times its noise. */
const referenceDepth = 0.5;
const leastReferenceSignificance = 5;
/** The mirror must add light by this many standard uncertainties. */
const leastGainSignificance = 5;
/** A line that grows this much more than the thin ones contradicts the model. */
const tooMuchGrowth = -3;

/** Light of one line without and with the mirror. */
interface Pair {
  readonly observed: ObservedLine;
  readonly light: number;
  readonly added: number;
  readonly lightVariance: number;
  readonly withVariance: number;
}

/**
 * Optical depth of each line from a second recording with a mirror behind the tube. Of light that nothing absorbs the
 * mirror adds a share G; of a line's own light it adds G y, y the share that a second passage leaves. Lines of less than
 * half the depth tell G, their own small absorption taken along by f lambda^2; so u(tau) = D - G(tau) y(tau) A, D the
 * light added and A the light without, has mean zero at the true depth, and the interval is where |u| stays below its
 * uncertainty times the quantile.
 *
 * @param variancePerSignal  counts of variance per count, of both recordings
 * @source [Moon2009]; interval by inversion of the test of u: [Fieller1954]
 * @check  test/property/optical-depth.test.ts
 */
export function measureWithMirror(
  lines: readonly ObservedLine[],
  without: CorrectedRecording,
  mirror: CorrectedRecording,
  variancePerSignal: number,
  coverage: number,
): readonly OpticalDepthFinding[] {
  const pairs = lines.map((observed) => pairOf(observed, without, mirror, variancePerSignal));
  const slabs = new Map(lines.map(({ place, best }) => [place.line.id, best]));
  return withAreaFactors(
    pairs.map((pair) => measureLine(pair, pairs, without, mirror, variancePerSignal, coverage)),
    slabs,
  );
}

function pairOf(
  observed: ObservedLine,
  without: CorrectedRecording,
  mirror: CorrectedRecording,
  variancePerSignal: number,
): Pair {
  const { window } = observed;
  const light = windowSum(window, without.netSignal);
  const varianceOf = (recording: CorrectedRecording): number =>
    windowVariance(window, pixelVariance(recording, window, variancePerSignal), recording.noise.correlation);
  return {
    observed,
    light,
    added: windowSum(window, mirror.netSignal) - light,
    lightVariance: varianceOf(without),
    withVariance: varianceOf(mirror),
  };
}

function measureLine(
  pair: Pair,
  pairs: readonly Pair[],
  without: CorrectedRecording,
  mirror: CorrectedRecording,
  variancePerSignal: number,
  coverage: number,
): OpticalDepthFinding {
  const { observed, light, added, lightVariance, withVariance } = pair;
  const { line } = observed.place;
  const fail = (reason: string): OpticalDepthFinding => notDetermined(line.id, 'mirror', reason);
  if (!(light > leastReferenceSignificance * Math.sqrt(lightVariance))) return fail('the line is too faint');
  const references = referencesOf(pair, pairs);
  if (references.length === 0)
    return fail('no line of less than half its depth is bright enough to compare with');
  const thin = gainOf(references, observed.best, 0);
  if (!(thin.gain > leastGainSignificance * Math.sqrt(thin.variance)))
    return fail('the mirror adds too little light to the thin lines; check that it faces the tube');

  const excess = (slab: Slab, peakDepth: number): number => {
    const { gain, variance } = gainOf(references, slab, peakDepth);
    const expected = gain * slab.returned(peakDepth);
    const uneven = mirrorUnevenness * gain;
    const byGain = slab.returned(peakDepth) * light;
    return (
      (added - expected * light) /
      Math.sqrt(
        withVariance +
          (1 + expected) * (1 + expected) * lightVariance +
          byGain * byGain * (variance + uneven * uneven),
      )
    );
  };
  const significance = -excess(observed.best, 0);
  if (significance < tooMuchGrowth)
    return fail(
      'it grows more than the thin lines do, which no absorption explains; check the mirror and the lamp',
    );
  const bounded = boundedDepth(observed, significance, coverage, (slab, sigmas) =>
    depthAt((peakDepth) => excess(slab, peakDepth), Math.max(0, excess(slab, 0)) + sigmas),
  );
  const uneven = mirrorUnevenness * thin.gain;
  const ratio = 1 + added / light;
  return {
    ...notDetermined(line.id, 'mirror', ''),
    ...bounded,
    reason: bounded.status === 'not-determined' ? 'too noisy to bound the depth' : '',
    seen: {
      kind: 'mirror',
      ratio,
      ratioSigma: Math.sqrt(withVariance + ratio * ratio * lightVariance) / light,
      thinRatio: 1 + thin.gain,
      thinRatioSigma: Math.sqrt(thin.variance + uneven * uneven),
      correction: ratio > 1 ? mirrorCorrection(ratio, 1 + thin.gain) : null,
    },
    isResolved: observed.isResolved,
    profile: depthProfile(observed, without, mirror, variancePerSignal, thin.gain),
  };
}

interface Reference {
  readonly pair: Pair;
  readonly variance: number;
}

function referencesOf(pair: Pair, pairs: readonly Pair[]): readonly Reference[] {
  return pairs.flatMap((other) => {
    const relativeDepth = pair.observed.best.columnPerDepth / other.observed.best.columnPerDepth;
    const isBright = other.light > leastReferenceSignificance * Math.sqrt(other.lightVariance);
    if (!(relativeDepth < referenceDepth) || !isBright) return [];
    const ratio = 1 + other.added / other.light;
    return [{ pair: other, variance: other.withVariance + ratio * ratio * other.lightVariance }];
  });
}

/** What the mirror returns, from the lines of less depth when the line in question has this depth, and its variance. */
function gainOf(
  references: readonly Reference[],
  slab: Slab,
  peakDepth: number,
): { readonly gain: number; readonly variance: number } {
  let right = 0;
  let normal = 0;
  for (const { pair, variance } of references) {
    const { best } = pair.observed;
    const depth = (peakDepth * slab.columnPerDepth) / best.columnPerDepth;
    const expected = best.returned(depth) * pair.light;
    right += (expected * pair.added) / variance;
    normal += (expected * expected) / variance;
  }
  return { gain: right / normal, variance: 1 / normal };
}

/** -ln y pixel by pixel, where a pixel's light is plain. */
function depthProfile(
  { place, window }: ObservedLine,
  without: CorrectedRecording,
  mirror: CorrectedRecording,
  variancePerSignal: number,
  gain: number,
): readonly DepthOfPixel[] {
  const base = baselineAt(window, without.netSignal);
  const baseWith = baselineAt(window, mirror.netSignal);
  const variance = pixelVariance(without, window, variancePerSignal);
  const varianceWith = pixelVariance(mirror, window, variancePerSignal);
  const profile: DepthOfPixel[] = [];
  for (let px = window.firstPx; px < window.firstPx + window.weights.length; px++) {
    const offsetNm = without.wavelengthNm[px]! - place.centreNm;
    if (Math.abs(offsetNm) > place.fwhmNm) continue;
    const light = without.netSignal[px]! - base(px);
    const ratio = (mirror.netSignal[px]! - baseWith(px)) / light;
    const y = (ratio - 1) / gain;
    const sigma = Math.sqrt(varianceWith[px]! + ratio * ratio * variance[px]!) / light / gain / y;
    if (light > 5 * Math.sqrt(variance[px]!) && y > 0 && sigma < 1)
      profile.push({ offsetNm, opticalDepth: -log(y), sigma });
  }
  return profile;
}
