import { log } from '../numeric/portable-math.ts';
import { chanceOfPlace, lnTruncatedProductChance, type StrayPeaks } from './chance.ts';
import type { Emitter, Feature } from './emitters.ts';
import { leastSignalToNoise, type Measurement } from './measure-feature.ts';

/** An emitter with what the recording shows at each of its features, strongest feature first. */
export interface MeasuredEmitter {
  readonly emitter: Emitter;
  readonly measurements: readonly Measurement[];
}

export interface Claim {
  readonly emitter: Emitter;
  /** Places whose light agrees in strength, the strongest feature first. */
  readonly agreeing: readonly Measurement[];
  /** Features that should stand out, those that do included. */
  readonly expectedCount: number;
  /** Natural log of the chance that other lines and noise look like this, not yet counting how many emitters are looked for. */
  readonly lnChance: number;
}

/** The second strongest of the agreeing lines must stand out by itself. */
const secondSignalToNoise = 4;
/** A feature expected at least this strong counts when it is missing. */
const missedSignalToNoise = 5;
/** Of the lines that agree, one in this many may be missing: lost to a blend. */
const agreeingPerMissing = 4;
/** A line under hydrogen rests on the model of that line: it supports, and no more. */
const leastChanceUnderHydrogen = 0.01;

/**
 * Natural log of the factor by which the ratio of two strengths may differ from the table: 4 in any case (the table is an
 * order of magnitude), 10 for each 150 nm apart (response of the instrument), 4.5 for each eV between the upper
 * levels (temperature of the emitter: 0.6 eV assumed, 0.32 eV to infinity allowed). Own choice.
 */
function lnTolerance(a: Feature, b: Feature): number {
  const apart = Math.abs(a.centreNm - b.centreNm) / 150;
  const isKnown = a.upperEnergyEv !== null && b.upperEnergyEv !== null;
  const energies = isKnown ? Math.abs(a.upperEnergyEv - b.upperEnergyEv) : 0;
  return ln4 + ln10 * apart + ln45 * energies;
}
const ln4 = 1.3862943611198906;
const ln10 = 2.302585092994046;
const ln45 = 1.5040773967762742;

/**
 * Whether the places of one emitter show it: at least two agree in strength, none that must be stronger is missing, and the
 * chance that other lines and noise do as well is as stated in the claim.
 *
 * Each place that is seen is tried as the measure of all others; the reading with the least chance is returned. The
 * chance is that of the strongest k features for the best k, paid for with k (k - 1), whose inverses sum to 1.
 *
 * @check test/unit/identify/judge-emitter.test.ts
 */
export function judgeEmitter(
  { emitter, measurements }: MeasuredEmitter,
  strays: StrayPeaks,
  fwhmNm: number,
): Claim | null {
  const seen = measurements.filter(({ status }) => status === 'seen');
  if (seen.length < 2) return null;
  const measured = measurements.filter(({ status }) => status === 'seen' || status === 'absent');
  const others = { ...strays, places: strays.places.filter((peak) => !isExplained(peak, seen, fwhmNm)) };
  const lnChances = new Map(seen.map((each) => [each, log(chanceOf(each, others, fwhmNm))]));
  const widest = seen.reduce((most, { reachNm }) => Math.max(most, reachNm), fwhmNm);
  const limit = Math.min(
    0.9,
    Math.max(
      0.02,
      ...seen.map(({ recordedNm }) =>
        chanceOfPlace({ recordedNm, signalToNoise: leastSignalToNoise, widthNm: widest }, others, fwhmNm),
      ),
    ),
  );
  let best: Claim | null = null;
  for (const anchor of seen) {
    if (anchor.isUnderHydrogen) continue;
    const agreeing = seen.filter((each) => doAgree(anchor, each));
    const strengths = agreeing.map(({ signalToNoise }) => signalToNoise).sort((a, b) => b - a);
    if (agreeing.length < 2 || strengths[1]! < secondSignalToNoise) continue;
    const missing = measured.filter((each) => isMissing(anchor, each));
    if (agreeingPerMissing * missing.length > agreeing.length) continue;
    const lnChance = lnChanceOfPattern(measured, agreeing, lnChances, log(limit), limit);
    if (best !== null && lnChance >= best.lnChance) continue;
    const expected = measured.filter(
      (each) => agreeing.includes(each) || (each.status === 'absent' && isExpected(anchor, each)),
    );
    best = { emitter, agreeing, expectedCount: expected.length, lnChance };
  }
  return best;
}

function chanceOf(each: Measurement, others: StrayPeaks, fwhmNm: number): number {
  const { recordedNm, signalToNoise, reachNm, isUnderHydrogen } = each;
  const chance = chanceOfPlace({ recordedNm, signalToNoise, widthNm: reachNm }, others, fwhmNm);
  return isUnderHydrogen ? Math.max(leastChanceUnderHydrogen, chance) : chance;
}

/** Whether a peak belongs to one of these places: the line itself, or the body of a band. */
export function isExplained(
  { recordedNm }: { readonly recordedNm: number },
  seen: readonly Measurement[],
  fwhmNm: number,
): boolean {
  return seen.some(({ feature, recordedNm: placeNm }) => {
    const apart = recordedNm - placeNm;
    if (Math.abs(apart) < fwhmNm) return true;
    return feature.shape === 'violet'
      ? apart < 0 && apart > -bandBodyNm
      : feature.shape === 'red' && apart > 0 && apart < bandBodyNm;
  });
}

/** nm; rotational structure reaches about so far from a head. */
const bandBodyNm = 2.5;

/** ln of the strength that the species would have by this place alone. */
const lnScale = ({ area, feature }: Measurement): number => log(area / feature.strength);

function doAgree(a: Measurement, b: Measurement): boolean {
  const noise =
    3 * Math.sqrt(1 / (a.signalToNoise * a.signalToNoise) + 1 / (b.signalToNoise * b.signalToNoise));
  return Math.abs(lnScale(a) - lnScale(b)) <= lnTolerance(a.feature, b.feature) + noise;
}

/** ln of the area that a feature should have, seen from another one. */
const lnExpected = (from: Measurement, { feature }: Measurement): number =>
  lnScale(from) + log(feature.strength);

function isExpected(from: Measurement, absent: Measurement): boolean {
  return lnExpected(from, absent) > log(missedSignalToNoise * absent.sigma);
}

/** Whether the least that a feature must have is ruled out by what is there. */
function isMissing(from: Measurement, { ...absent }: Measurement): boolean {
  if (absent.status !== 'absent') return false;
  const least = lnExpected(from, absent) - lnTolerance(from.feature, absent.feature);
  return least > log(Math.max(missedSignalToNoise * absent.sigma, absent.area + 3 * absent.sigma));
}

function lnChanceOfPattern(
  measured: readonly Measurement[],
  agreeing: readonly Measurement[],
  lnChances: ReadonlyMap<Measurement, number>,
  lnLimit: number,
  limit: number,
): number {
  let lnProduct = 0;
  let count = 0;
  let least = 0;
  for (const [index, each] of measured.entries()) {
    if (!agreeing.includes(each)) continue;
    count++;
    lnProduct += Math.min(lnLimit, lnChances.get(each)!);
    const k = index + 1;
    if (count < 2) continue;
    least = Math.min(least, lnTruncatedProductChance(k, lnProduct, limit) + log(k * (k - 1)));
  }
  return least;
}
