import { erf, exp } from '../numeric/portable-math.ts';
import type { AbsorbingProfile } from './absorbing-profile.ts';
import type { LineWindow } from './line-window.ts';

/** What a homogeneous tube does to one line, as a function of its optical depth at the peak. */
export interface Slab {
  /** Width of continuum, nm, that a window sees missing, in units of what it sees beside the line. */
  readonly missingNm: (peakDepth: number) => number;
  /** Share of the light in a window that a second passage through the tube leaves. */
  readonly returned: (peakDepth: number) => number;
  /** Share of the whole line's light that leaves the tube; no window, no instrument. */
  readonly escape: (peakDepth: number) => number;
  /** Atoms per m^2 per unit of depth at the peak. */
  readonly columnPerDepth: number;
}

const sqrtHalf = 0.7071067811865476;
const fwhmPerSigma = 2.3548200450309493;
/** Below this depth the exponential is a series. */
const thin = 1e-4;

/**
 * A homogeneous tube behind a spectrometer: emission goes with 1 - exp(-tau), what a mirror sends back through it with
 * (1 - exp(-tau)) exp(-tau), a continuum loses 1 - exp(-tau), each at every wavelength of the atoms' own profile and then
 * spread by the instrument over the pixels of a window. So nothing hangs on whether the instrument resolves the line.
 *
 * @param edgeNm            edges of the pixels of the recording
 * @param instrumentFwhmNm  of a Gaussian
 * @source [Mitchell1934] ch. 3; two passages: [Moon2009]
 * @check  test/unit/optical-depth/slab.test.ts
 */
export function slab(
  profile: AbsorbingProfile,
  window: LineWindow,
  edgeNm: Float64Array,
  centreNm: number,
  instrumentFwhmNm: number,
): Slab {
  const { weightNm, perNm, peakPerNm, depthNmPerColumn } = profile;
  const sigmaNm = instrumentFwhmNm / fwhmPerSigma;
  const seen = seenWeights(profile, window.firstPx, window.weights, edgeNm, centreNm, sigmaNm);
  // Wings that reach the sides lower the continuum that the line is compared with.
  const beside = seenWeights(profile, window.firstPx, sideWeights(window), edgeNm, centreNm, sigmaNm);
  const pixelNm =
    (edgeNm[window.coreEndPx]! - edgeNm[window.coreFirstPx]!) / (window.coreEndPx - window.coreFirstPx);
  const n = weightNm.length;
  const area = weightNm.reduce((sum, weight, i) => sum + weight * perNm[i]!, 0);
  const lostAt = (peakDepth: number, i: number): number => {
    const depth = (peakDepth * perNm[i]!) / peakPerNm;
    return depth < thin ? depth * (1 - depth / 2) : 1 - exp(-depth);
  };
  return {
    missingNm(peakDepth) {
      let sum = 0;
      let sides = 0;
      for (let i = 0; i < n; i++) {
        if (seen[i] === 0 && beside[i] === 0) continue;
        const lost = weightNm[i]! * lostAt(peakDepth, i);
        sum += seen[i]! * lost;
        sides += beside[i]! * lost;
      }
      return sum / (1 - sides / pixelNm);
    },
    returned(peakDepth) {
      if (!(peakDepth > 0)) return 1;
      let emitted = 0;
      let left = 0;
      for (let i = 0; i < n; i++) {
        if (seen[i] === 0) continue;
        const lost = lostAt(peakDepth, i);
        emitted += seen[i]! * weightNm[i]! * lost;
        left += seen[i]! * weightNm[i]! * lost * (1 - lost);
      }
      return left / emitted;
    },
    escape(peakDepth) {
      if (!(peakDepth > 0)) return 1;
      let sum = 0;
      for (let i = 0; i < n; i++) sum += weightNm[i]! * lostAt(peakDepth, i);
      return (sum * peakPerNm) / (peakDepth * area);
    },
    columnPerDepth: 1 / (peakPerNm * depthNmPerColumn),
  };
}

/** The mean over the sides as weights. */
function sideWeights({ firstPx, weights, sidePixels }: LineWindow): Float64Array {
  const mean = new Float64Array(weights.length);
  for (const px of sidePixels) mean[px - firstPx] = 1 / sidePixels.length;
  return mean;
}

/** For light of each node: the sum over the window's pixels of weight times the share that the instrument puts there. */
function seenWeights(
  { offsetNm }: AbsorbingProfile,
  firstPx: number,
  weights: Float64Array,
  edgeNm: Float64Array,
  centreNm: number,
  sigmaNm: number,
): Float64Array {
  const count = weights.length;
  const reachNm = 6 * sigmaNm;
  const from = edgeNm[firstPx]! - centreNm - reachNm;
  const to = edgeNm[firstPx + count]! - centreNm + reachNm;
  return offsetNm.map((nm) => {
    if (nm < from || nm > to) return 0;
    let sum = 0;
    let below = -1;
    for (let i = 0; i <= count; i++) {
      const z = ((edgeNm[firstPx + i]! - centreNm - nm) * sqrtHalf) / sigmaNm;
      const above = z > 4.3 ? 1 : z < -4.3 ? -1 : erf(z);
      if (i > 0) sum += weights[i - 1]! * 0.5 * (above - below);
      below = above;
    }
    return sum;
  });
}
