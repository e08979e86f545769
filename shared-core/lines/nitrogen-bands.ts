import { toRecordedNm } from '../axis/axis-polynomial.ts';
import { exp, log } from '../numeric/portable-math.ts';
import { gaussianFwhmPerSigma } from '../numeric/voigt-run.ts';
import { airToVacuumNm } from '../physics/air-index.ts';
import { bandLines } from '../physics/molecular-band.ts';
import type { WindowPlan } from './choose-windows.ts';
import { companionAt, narrowStick, type Companion } from './companion.ts';
import {
  instrumentIndex,
  type JointLine,
  type JointProblem,
  type Segment,
  type Stick,
} from './joint-problem.ts';
import { sharedCentreNm } from './line-shape.ts';
import type { FitLinesInput } from './solved-fit.ts';

/** A band of the second positive system of N2 with its vibrational quanta. */
interface Band {
  readonly headAirNm: number;
  readonly upper: number;
  readonly lower: number;
}

/** The bands from H-10 to H-gamma; heads as in the table of assets/lines. */
const bands: readonly Band[] = [
  { headAirNm: 380.49, upper: 0, lower: 2 },
  { headAirNm: 394.3, upper: 2, lower: 5 },
  { headAirNm: 399.84, upper: 1, lower: 4 },
  { headAirNm: 405.94, upper: 0, lower: 3 },
  { headAirNm: 414.18, upper: 3, lower: 7 },
  { headAirNm: 434.36, upper: 0, lower: 4 },
];

/** Rotational temperatures among which the bands' own shape chooses, K; the first is looked at first. */
export const rotationalKelvins = [1000, 300, 600, 1600, 2500] as const;
/** nm to the violet of a head where the hottest of these still has light. */
const tailNm = 6;
/** Sticks per instrument width: nearer ones are drawn as one. */
const sticksPerWidth = 4;

/** One band on one segment, drawn for each of the rotational temperatures. */
export interface BandPlace {
  readonly segment: number;
  readonly companions: readonly Companion[];
}

/** Where bands of N2 reach into the windows of a plan. */
export function nitrogenPlaces(
  { recording, registration }: FitLinesInput,
  plan: WindowPlan,
  fwhmNm: number,
): BandPlace[] {
  const { wavelengthNm, medium } = recording;
  return plan.segments.flatMap(({ firstPx, endPx, lines }, segment) => {
    const [fromNm, toNm] = [wavelengthNm[firstPx]!, wavelengthNm[endPx - 1]!];
    return bands.flatMap((band) => {
      const { headAirNm } = band;
      const referenceNm = medium === 'air' ? headAirNm : airToVacuumNm(headAirNm);
      const recordedNm = toRecordedNm(registration.map, referenceNm);
      if (recordedNm < fromNm || recordedNm - tailNm > toNm) return [];
      const distance = (line: number): number => Math.abs(plan.lines[line]!.nominalCentreNm - recordedNm);
      const nearest = lines.reduce((so, next) => (distance(next) < distance(so) ? next : so));
      const companions = rotationalKelvins.map((kelvin) =>
        companionAt(plan.lines[nearest]!.id, 'N2', referenceNm, recordedNm, sticksOf(band, kelvin, fwhmNm)),
      );
      return [{ segment, companions }];
    });
  });
}

const lnStep = log(1.1);
const sticksMade = new Map<string, readonly Stick[]>();

/**
 * Rotational constants per cm: C 1.8247 - 0.0187 (v + 1/2), B 1.6375 - 0.0179 (v + 1/2).
 * @source [Herzberg1950] table 39
 */
function sticksOf(band: Band, kelvin: number, fwhmNm: number): readonly Stick[] {
  // Steps of a tenth in width share their sticks, so that a batch draws them once.
  const spacingNm = exp(lnStep * Math.round(log(fwhmNm / sticksPerWidth) / lnStep));
  const key = `${band.headAirNm} ${kelvin} ${spacingNm}`;
  const made = sticksMade.get(key);
  if (made !== undefined) return made;
  const shares = new Map<number, number>();
  const lines = bandLines(
    {
      headNm: band.headAirNm,
      upperPerCm: 1.8247 - 0.0187 * (band.upper + 0.5),
      lowerPerCm: 1.6375 - 0.0179 * (band.lower + 0.5),
    },
    kelvin,
  );
  for (const { shiftNm, share } of lines) {
    const bin = Math.round(shiftNm / spacingNm);
    shares.set(bin, (shares.get(bin) ?? 0) + share);
  }
  const narrow = narrowStick(band.headAirNm, 28.0134);
  const sticks = [...shares].map(([bin, weight]) => ({ ...narrow, shiftNm: bin * spacingNm, weight }));
  sticksMade.set(key, sticks);
  return sticks;
}

/**
 * Roughly what a line of many sticks puts on each pixel of a segment: sticks shared between the two nearest pixels, then
 * spread by a Gaussian of the instrument's width. Good to a few per cent, and fast enough to ask whether the light is there.
 */
export function roughShareColumn(
  problem: JointProblem,
  values: Float64Array,
  line: JointLine,
  { firstPx, endPx }: Segment,
): Float64Array {
  const { wavelengthNm, edgeNm, signalKind } = problem.recording;
  const pixelNm = (edgeNm[endPx]! - edgeNm[firstPx]!) / (endPx - firstPx);
  const sigmaPx = Math.max(0.5, values[instrumentIndex]! / gaussianFwhmPerSigma / pixelNm);
  const reach = Math.ceil(3.5 * sigmaPx);
  const kernel = Float64Array.from({ length: 2 * reach + 1 }, (_, k) => {
    const deviate = (k - reach) / sigmaPx;
    return exp(-0.5 * deviate * deviate);
  });
  const kernelSum = kernel.reduce((sum, each) => sum + each, 0);
  const count = endPx - firstPx;
  const padded = new Float64Array(count + 2 * reach + 1);
  const headPx = (sharedCentreNm(problem, values, line) - wavelengthNm[firstPx]!) / pixelNm;
  for (const { shiftNm, weight } of line.sticks) {
    const at = headPx + shiftNm / pixelNm + reach;
    const left = Math.floor(at);
    if (left < 0 || left + 1 >= padded.length) continue;
    padded[left] = padded[left]! + weight * (left + 1 - at);
    padded[left + 1] = padded[left + 1]! + weight * (at - left);
  }
  const perPixel = signalKind === 'per-nm' ? 1 / pixelNm : 1;
  return Float64Array.from({ length: count }, (_, i) => {
    let sum = 0;
    for (let k = 0; k <= 2 * reach; k++) sum += kernel[k]! * padded[i + k]!;
    return (sum / kernelSum) * perPixel;
  });
}
