import { log } from '../numeric/portable-math.ts';
import type { CorrectedRecording } from '../noise/corrected-recording.ts';
import { noiseMemory } from '../noise/noise-memory.ts';
import { chiSquareUpperTail } from '../numeric/distributions.ts';
import { boundedDepth, notDetermined, withAreaFactors } from './describe-depth.ts';
import type { DepthOfPixel, OpticalDepthFinding } from './finding.ts';
import {
  baselineAt,
  pixelVariance,
  sideLevel,
  windowSum,
  windowVariance,
  type LineWindow,
} from './line-window.ts';
import type { ObservedLine } from './observed-line.ts';
import { depthAt, largestDepth } from './solve-depth.ts';

export interface AbsorptionRecordings {
  /** The discharge alone. */
  readonly discharge: CorrectedRecording;
  /** The continuum source alone, the discharge off. */
  readonly source: CorrectedRecording;
  /** The source through the burning tube. */
  readonly through: CorrectedRecording;
}

/**
 * Relative change of the lamp between the recordings with and without the source, 1 sigma: what is left of an emission
 * line after subtraction. Common practice for a lamp that has warmed up.
 */
const lampDrift = 0.005;
/** The source must outshine its noise by this much in every pixel, or its ratio tells nothing. */
const leastSourceSignificance = 5;
const misfitPValue = 0.01;
/** Widths from the centre beyond which even a deep line's wings are nearly straight. */
const wingWidths = 3;

/** Transmission of the tube in a window, over what it is beside the line. */
interface Transmission {
  readonly perPixel: Float64Array;
  readonly variance: Float64Array;
}

/**
 * Optical depth of each line from a continuum source behind the tube: transmission T = (through - discharge)/source, pixel
 * by pixel; the width of continuum that is missing, W = sum (1 - T/T_beside) times the pixel width, keeps its value through
 * any instrument, and W(tau) is the curve of growth as the window sees it. In the thin limit the column is
 * W/(pi r_e lambda^2 f).
 *
 * A straight line through T beside the line takes drifts of the source out.
 *
 * @param variancePerSignal  counts of variance per count, of all recordings
 * @source [Mitchell1934] ch. 3; curve of growth: [Ladenburg1913]
 * @check  test/property/optical-depth.test.ts
 */
export function measureByAbsorption(
  lines: readonly ObservedLine[],
  recordings: AbsorptionRecordings,
  variancePerSignal: number,
  coverage: number,
): readonly OpticalDepthFinding[] {
  const slabs = new Map(lines.map(({ place, best }) => [place.line.id, best]));
  return withAreaFactors(
    lines.map((observed) => measureLine(observed, recordings, variancePerSignal, coverage)),
    slabs,
  );
}

function measureLine(
  observed: ObservedLine,
  recordings: AbsorptionRecordings,
  variancePerSignal: number,
  coverage: number,
): OpticalDepthFinding {
  const { place, window } = observed;
  const { line } = place;
  const fail = (reason: string): OpticalDepthFinding => notDetermined(line.id, 'absorption', reason);
  const transmission = transmissionOf(window, recordings, variancePerSignal);
  if (transmission === null) return fail('the source gives too little light there');
  const { edgeNm } = recordings.discharge;
  const pixelNm =
    (edgeNm[window.coreEndPx]! - edgeNm[window.coreFirstPx]!) / (window.coreEndPx - window.coreFirstPx);
  const beside = sideLevel(window, transmission.perPixel);
  if (!(beside > 0)) return fail('no light of the source comes through the tube there');
  const { correlation } = recordings.discharge.noise;
  const widthNm = (-windowSum(window, transmission.perPixel) / beside) * pixelNm;
  const drift =
    (lampDrift * windowSum(window, recordings.discharge.netSignal)) /
    sideLevel(window, recordings.source.netSignal);
  const variance =
    windowVariance(window, transmission.variance, correlation) *
    scatter(observed, transmission, recordings.discharge);
  const sigmaNm = (Math.sqrt(variance + drift * drift) / beside) * pixelNm;
  if (widthNm > observed.best.missingNm(largestDepth) + 3 * sigmaNm)
    return fail('more is missing than this line can take out; is the source seen past the tube?');

  const bounded = boundedDepth(observed, widthNm / sigmaNm, coverage, (slab, sigmas) =>
    depthAt(slab.missingNm, Math.max(0, widthNm) + sigmas * sigmaNm),
  );
  return {
    ...notDetermined(line.id, 'absorption', ''),
    ...bounded,
    reason: bounded.status === 'not-determined' ? 'too noisy to bound the depth' : '',
    seen: { kind: 'absorption', equivalentWidthNm: widthNm, equivalentWidthSigmaNm: sigmaNm },
    isResolved: observed.isResolved,
    profile: depthProfile(observed, recordings.discharge, transmission),
  };
}

function transmissionOf(
  window: LineWindow,
  { discharge, source, through }: AbsorptionRecordings,
  variancePerSignal: number,
): Transmission | null {
  const n = discharge.netSignal.length;
  const perPixel = new Float64Array(n);
  const variance = new Float64Array(n);
  const [ofDischarge, ofSource, ofThrough] = [discharge, source, through].map((recording) =>
    pixelVariance(recording, window, variancePerSignal),
  ) as [Float64Array, Float64Array, Float64Array];
  for (let i = 0; i < window.weights.length; i++) {
    const px = window.firstPx + i;
    if (window.weights[i] === 0) continue;
    const light = source.netSignal[px]!;
    if (!(light > leastSourceSignificance * Math.sqrt(ofSource[px]!))) return null;
    const ratio = (through.netSignal[px]! - discharge.netSignal[px]!) / light;
    perPixel[px] = ratio;
    variance[px] = (ofThrough[px]! + ofDischarge[px]! + ratio * ratio * ofSource[px]!) / (light * light);
  }
  return { perPixel, variance };
}

/**
 * Variance that the pixels far beside the line show over the variance expected, where chance does not explain it; else 1.
 * From second differences of separate triples, which the wings of wide lines leave alone.
 */
function scatter(
  { window, place }: ObservedLine,
  { perPixel, variance }: Transmission,
  { wavelengthNm, noise }: CorrectedRecording,
): number {
  const far = window.sidePixels.filter(
    (px) => Math.abs(wavelengthNm[px]! - place.centreNm) > wingWidths * place.fwhmNm,
  );
  let chiSquare = 0;
  let count = 0;
  for (let i = 0; i + 2 < far.length;) {
    const [a, b, c] = [far[i]!, far[i + 1]!, far[i + 2]!];
    if (c !== a + 2) {
      i++;
      continue;
    }
    const bend = perPixel[a]! - 2 * perPixel[b]! + perPixel[c]!;
    chiSquare += (bend * bend) / (variance[a]! + 4 * variance[b]! + variance[c]!);
    count++;
    i += 3;
  }
  const spread = noiseMemory(noise.correlation).varianceOfChiSquare;
  const isMisfit =
    chiSquare > count && chiSquareUpperTail(chiSquare / spread, Math.max(1, count / spread)) < misfitPValue;
  return isMisfit ? chiSquare / count : 1;
}

/** -ln T pixel by pixel. */
function depthProfile(
  { place, window }: ObservedLine,
  { wavelengthNm }: CorrectedRecording,
  { perPixel, variance }: Transmission,
): readonly DepthOfPixel[] {
  const base = baselineAt(window, perPixel);
  const profile: DepthOfPixel[] = [];
  for (let px = window.firstPx; px < window.firstPx + window.weights.length; px++) {
    const offsetNm = wavelengthNm[px]! - place.centreNm;
    const transmission = perPixel[px]! / base(px);
    const sigma = Math.sqrt(variance[px]!) / perPixel[px]!;
    if (Math.abs(offsetNm) <= place.fwhmNm && transmission > 0 && sigma > 0 && sigma < 1)
      profile.push({ offsetNm, opticalDepth: -log(transmission), sigma });
  }
  return profile;
}
