import { exp } from '../numeric/portable-math.ts';
import { median } from '../numeric/robust.ts';
import { pixelAt } from '../axis/pixel-at.ts';
import type { Feature } from './emitters.ts';
import { gaussianWidth } from './place-kernels.ts';
import type { PlaceMeter } from './place-meter.ts';
import type { Reading } from './reading.ts';

/** What the recording shows at the place of a feature. */
export interface Measurement {
  readonly feature: Feature;
  /**
   * 'seen': light of the right shape with its top at the place; 'absent': none, and `area` and `sigma` bound it;
   * 'hidden': something else covers the place; 'out-of-range': not recorded.
   */
  readonly status: 'seen' | 'absent' | 'hidden' | 'out-of-range';
  readonly area: number;
  readonly sigma: number;
  readonly signalToNoise: number;
  /** nm, recorded axis, of the top found, or of the place where one should be. */
  readonly recordedNm: number;
  /** Width of the interval in which a top this strong would have passed, nm. */
  readonly reachNm: number;
  /** For shaded bands: whether the tail is there, cannot be told, or is missing, as beside a mere line. */
  readonly shading: 'seen' | 'open' | 'refuted' | null;
  /** Found by the line fit under a line of hydrogen. */
  readonly isUnderHydrogen: boolean;
}

/** Where features lie on the recorded axis. */
export interface AxisInAir {
  readonly recordedNm: (airNm: number) => number;
  readonly sigmaNm: (airNm: number) => number;
}

/** Light weaker than this is not called seen. */
export const leastSignalToNoise = 3;
/** A first look at the place; below this the top cannot be strong enough. */
const glance = 2;
/** Deviations of the place allowed, in standard deviations. */
const placeSigmas = 2.5;
/** Below this the place is darkened by something beside it. */
const darkened = -4;

const reading: Reading = { area: 0, sigma: 1 };

/**
 * Looks for a feature at its place and as far around it as axis, table and noise allow.
 * @check test/unit/identify/measure-feature.test.ts
 */
export function measureFeature(meter: PlaceMeter, axis: AxisInAir, feature: Feature): Measurement {
  const { recording, fwhmNm } = meter;
  const { wavelengthNm } = recording;
  const n = wavelengthNm.length;
  const { shape } = feature;
  // The top of a blurred band lies up to half a line width inside its head.
  const inside = 0.5 * fwhmNm;
  const low = axis.recordedNm(feature.fromNm) - (shape === 'violet' ? inside : 0);
  const high = axis.recordedNm(feature.toNm) + (shape === 'red' ? inside : 0);
  const middle = axis.recordedNm(feature.centreNm);
  if (low - fwhmNm < wavelengthNm[0]! || high + fwhmNm > wavelengthNm[n - 1]!) {
    return nothing(feature, 'out-of-range', middle);
  }
  const axisSigma = axis.sigmaNm(feature.centreNm);
  const systematic = Math.sqrt(
    squared(feature.toleranceNm) + squared(placeSigmas * axisSigma) + squared(0.1 * fwhmNm),
  );
  const signalAt = (nm: number): number => {
    const isMeasured = meter.measure(nm, shape, reading);
    return isMeasured ? reading.area / reading.sigma : NaN;
  };
  const span = 0.5 * (high - low) + systematic;
  const centre = 0.5 * (high + low);
  // The first look: as coarse as a line is wide.
  const looks = Math.max(0, Math.ceil(span / (0.35 * fwhmNm)) - 1);
  let most = -Infinity;
  let brightestNm = centre;
  for (let i = -looks; i <= looks; i++) {
    const nm = looks === 0 ? centre : centre + (i * span) / looks;
    const z = meter.glance(nm, shape);
    if (Number.isNaN(z)) return nothing(feature, 'hidden', middle);
    if (z <= most) continue;
    most = z;
    brightestNm = nm;
  }
  let best = signalAt(brightestNm);
  let { area, sigma } = reading;
  if (Number.isNaN(best)) return nothing(feature, 'hidden', middle);
  if (most < glance) {
    if (best < darkened) return nothing(feature, 'hidden', middle);
    return { ...nothing(feature, 'absent', middle), area, sigma, signalToNoise: best };
  }
  // The climb: the top nearby, wherever it is.
  const step = fwhmNm / 6;
  const stepCount = Math.ceil((span + 0.6 * fwhmNm) / step);
  let top = 0;
  best = -Infinity;
  for (let i = -stepCount; i <= stepCount; i++) {
    const z = signalAt(centre + i * step);
    if (!(z > best)) continue;
    best = z;
    top = i;
    area = reading.area;
    sigma = reading.sigma;
  }
  const before = signalAt(centre + (top - 1) * step);
  const after = signalAt(centre + (top + 1) * step);
  const bend = before - 2 * best + after;
  const shift = bend < 0 ? Math.max(-0.5, Math.min(0.5, (0.5 * (before - after)) / bend)) : 0;
  const recordedNm = centre + (top + shift) * step;
  const scatter = (placeSigmas * fwhmNm) / gaussianWidth / Math.max(1, best);
  const allowed = Math.sqrt(squared(systematic) + squared(scatter));
  const reachNm = high - low + 2 * allowed + (shape === 'line' ? 0 : fwhmNm);
  const found = { area, sigma, signalToNoise: best, recordedNm, reachNm };
  const isAtEdge = Math.abs(top) === stepCount || before > best || after > best;
  if (isAtEdge || recordedNm < low - allowed || recordedNm > high + allowed) {
    // The slope of something beside the place.
    return { ...nothing(feature, best < 2 * leastSignalToNoise ? 'absent' : 'hidden', middle), area, sigma };
  }
  if (best < leastSignalToNoise) {
    return { ...nothing(feature, 'absent', middle), area, sigma, signalToNoise: best };
  }
  return {
    ...nothing(feature, 'seen', middle),
    ...found,
    shading: shape === 'line' ? null : judgeShading(meter, shape, recordedNm),
  };
}

const squared = (value: number): number => value * value;

const nothing = (feature: Feature, status: Measurement['status'], recordedNm: number): Measurement => ({
  feature,
  status,
  area: 0,
  sigma: 0,
  signalToNoise: 0,
  recordedNm,
  reachNm: 0,
  shading: null,
  isUnderHydrogen: false,
});

/** The least that a tail is expected to hold of the head's height falls by a factor e over this: a cold band in the near ultraviolet. */
const quickFadingNm = 0.3;
const tailSigmas = 3;

/**
 * Compares the signal on the shaded side of a head with that on the other side, where a mere line shows the same.
 *
 * Medians from one line width to 1 nm (three widths if that is more) on both sides; the height is that of the highest
 * pixel near the head over the open side.
 */
function judgeShading(
  { recording, fwhmNm }: PlaceMeter,
  shape: 'violet' | 'red',
  headNm: number,
): 'seen' | 'open' | 'refuted' {
  const { wavelengthNm, netSignal, noise } = recording;
  const near = 1.1 * fwhmNm;
  const far = Math.max(1, 3 * fwhmNm);
  const sign = shape === 'violet' ? -1 : 1;
  const side = (from: number, to: number): Float64Array => {
    const a = pixelAt(wavelengthNm, Math.min(from, to));
    const b = pixelAt(wavelengthNm, Math.max(from, to));
    return netSignal.slice(a, b + 1);
  };
  // The top of a blurred step lies by about half a width inside the shaded side.
  const shaded = side(headNm + sign * (near + 0.5 * fwhmNm), headNm + sign * far);
  const open = side(headNm - sign * near, headNm - sign * far);
  if (shaded.length < 3 || open.length < 3) return 'open';
  const floor = median(open);
  const height = side(headNm - 0.6 * fwhmNm, headNm + 0.6 * fwhmNm).reduce((a, b) => Math.max(a, b)) - floor;
  const excess = median(shaded) - floor;
  const px = pixelAt(wavelengthNm, headNm);
  const variance = noise.fixedVariance[px]! + noise.variancePerSignal * Math.max(0, floor);
  // The median of m normal values has pi/2 times the variance of their mean.
  const sigma = Math.sqrt((Math.PI / 2) * variance * (1 / shaded.length + 1 / open.length));
  const middleNm = 0.5 * (near + 0.5 * fwhmNm + far);
  const expected = height * exp(-middleNm / quickFadingNm);
  if (excess > tailSigmas * sigma && excess > 0.3 * expected) return 'seen';
  return excess + tailSigmas * sigma < 0.5 * expected ? 'refuted' : 'open';
}
