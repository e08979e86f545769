import { pow } from '../numeric/portable-math.ts';
import type { SpectralLine } from '../physics/spectral-line.ts';
import { chanceOfAtLeast } from './chance.ts';
import {
  emittersInRange,
  isHiddenByBalmer,
  type Emitter,
  type Feature,
  type Instrument,
} from './features.ts';

export interface FoundPeak {
  /** nm in air, on the registered axis. */
  readonly wavelengthNm: number;
  readonly wavelengthSigmaNm: number;
  readonly signalToNoise: number;
}

export interface IdentifyInput extends Instrument {
  readonly peaks: readonly FoundPeak[];
  readonly lineTable: readonly SpectralLine[];
}

export interface ImpurityFinding {
  readonly species: string;
  /** "N2 second positive C-B (0-0) 337.1 nm, (0-1) 357.7 nm"; begins with "possible" when one line is all there is. */
  readonly evidence: string;
  /** Of the strongest peak found. */
  readonly signalToNoise: number;
  readonly meaning: string;
}

/** Chance, over all emitters looked for together, that two or more lines fall together by accident. */
const certainChance = 0.01;
/** The same for a single strong line, which is reported as possible only. */
const possibleChance = 0.05;
const singleLineSignalToNoise = 10;
/** What a stronger line must reach for its absence to count; the peak search keeps 4. */
const missedSignalToNoise = 6;

interface Match {
  readonly feature: Feature;
  readonly peak: FoundPeak;
}

interface Candidate {
  readonly emitter: Emitter;
  readonly matches: readonly Match[];
  readonly chance: number;
  readonly isPossibleOnly: boolean;
}

/**
 * Which other species the peaks of a recording show.
 *
 * A species is reported when at least two of its lines are found, no stronger line that ought to be seen is missing,
 * and random peaks of the same density would do as well in fewer than 1 % of recordings, counting all species looked
 * for. One strong line (S/N >= 10) that is the strongest its species has here, and that no other species explains, is
 * reported as possible. The best explained species takes its peaks first. Peaks at Balmer lines are left alone.
 *
 * @check test/unit/identify/identify-impurities.test.ts
 */
export function identifyImpurities(input: IdentifyInput): readonly ImpurityFinding[] {
  const emitters = emittersInRange(input.lineTable, input);
  let open = input.peaks.filter(({ wavelengthNm }) => !isHiddenByBalmer(wavelengthNm, input));
  let left = emitters;
  const findings: ImpurityFinding[] = [];
  for (;;) {
    const candidates = left
      .map((emitter) => judge(emitter, open, left, emitters.length, input))
      .filter((candidate) => candidate !== null);
    const best = candidates.reduce<Candidate | null>((a, b) => (a === null || isBetter(b, a) ? b : a), null);
    if (best === null) break;
    const taken = new Set(best.matches.map(({ peak }) => peak));
    open = open.filter((peak) => !taken.has(peak));
    left = left.filter((emitter) => emitter !== best.emitter);
    findings.push(describe(best));
  }
  return findings.sort((a, b) => b.signalToNoise - a.signalToNoise);
}

function isBetter(a: Candidate, b: Candidate): boolean {
  return a.isPossibleOnly === b.isPossibleOnly ? a.chance < b.chance : b.isPossibleOnly;
}

function judge(
  emitter: Emitter,
  open: readonly FoundPeak[],
  rivals: readonly Emitter[],
  emitterCount: number,
  input: IdentifyInput,
): Candidate | null {
  const matches = matchPeaks(emitter, open, input.fwhmNm);
  if (matches.length === 0 || isStrongerLineMissing(emitter, matches, input)) return null;
  if (matches.length === 1) {
    const { feature, peak } = matches[0]!;
    if (peak.signalToNoise < singleLineSignalToNoise || feature !== emitter.features[0]) return null;
    const strong = open.filter(({ signalToNoise }) => signalToNoise >= singleLineSignalToNoise);
    const chance = emitterCount * chanceOfMatch(feature, strong, matches, input);
    const isAmbiguous = rivals.some(
      (rival) =>
        rival !== emitter && rival.features.slice(0, 3).some((other) => fits(other, peak, input.fwhmNm)),
    );
    return chance < possibleChance && !isAmbiguous
      ? { emitter, matches, chance, isPossibleOnly: true }
      : null;
  }
  const chance = emitterCount * chanceOfPattern(emitter, open, matches, input);
  return chance < certainChance ? { emitter, matches, chance, isPossibleOnly: false } : null;
}

/** The nearest peak for each feature, strongest feature first, each peak once. */
function matchPeaks(emitter: Emitter, open: readonly FoundPeak[], fwhmNm: number): readonly Match[] {
  const used = new Set<FoundPeak>();
  const matches: Match[] = [];
  for (const feature of emitter.features) {
    const near = open.filter((peak) => !used.has(peak) && fits(feature, peak, fwhmNm));
    if (near.length === 0) continue;
    const distance = ({ wavelengthNm }: FoundPeak): number => Math.abs(wavelengthNm - feature.centreNm);
    const peak = near.reduce((a, b) => (distance(b) < distance(a) ? b : a));
    used.add(peak);
    matches.push({ feature, peak });
  }
  return matches;
}

function reachNm({ wavelengthSigmaNm }: FoundPeak, fwhmNm: number): number {
  return Math.max(0.25 * fwhmNm, 3 * wavelengthSigmaNm);
}

function fits({ fromNm, toNm }: Feature, peak: FoundPeak, fwhmNm: number): boolean {
  const reach = reachNm(peak, fwhmNm);
  return peak.wavelengthNm >= fromNm - reach && peak.wavelengthNm <= toNm + reach;
}

/**
 * Whether lines are absent that must be stronger than those found: at least half of the lines found say so. One in
 * five may be lost to a blend or to a crowded recording.
 *
 * The expected strength is shrunk by what is not known: 4 times in any case, 10 times for each 150 nm apart
 * (response of the instrument), and 4.5 times for each eV between the upper levels (temperature of the emitter).
 */
function isStrongerLineMissing(emitter: Emitter, matches: readonly Match[], input: IdentifyInput): boolean {
  const found = new Set(matches.map(({ feature }) => feature));
  const missing = emitter.features.filter((absent) => {
    if (found.has(absent)) return false;
    // A foreign peak in the place may hide it.
    const isCovered = input.peaks.some(
      (peak) => Math.abs(peak.wavelengthNm - absent.centreNm) < input.fwhmNm,
    );
    if (isCovered) return false;
    const demands = matches.filter((match) => expectedSignalToNoise(absent, match) > missedSignalToNoise);
    return 2 * demands.length >= matches.length;
  });
  return 4 * missing.length > matches.length;
}

/** The least signal-to-noise that a line must have, seen from another one of its species. */
function expectedSignalToNoise(absent: Feature, { feature, peak }: Match): number {
  const apart = Math.abs(absent.centreNm - feature.centreNm) / 150;
  const isKnown = absent.upperEnergyEv !== null && feature.upperEnergyEv !== null;
  const energies = isKnown ? Math.abs(absent.upperEnergyEv - feature.upperEnergyEv) : 0;
  const unknown = 4 * pow(10, apart) * pow(4.5, energies);
  return (peak.signalToNoise * absent.strength) / feature.strength / unknown;
}

/** Chance that one peak of a random list of this density falls on the feature. */
function chanceOfMatch(
  feature: Feature,
  peaks: readonly FoundPeak[],
  matches: readonly Match[],
  { rangeNm, fwhmNm }: IdentifyInput,
): number {
  const own = new Set(matches.map(({ peak }) => peak));
  const others = peaks.filter((peak) => !own.has(peak));
  const near = others.filter(({ wavelengthNm }) => Math.abs(wavelengthNm - feature.centreNm) < 25);
  const span = Math.max(1, rangeNm[1] - rangeNm[0]);
  const density = Math.max((others.length + 0.5) / span, near.length / Math.min(50, span));
  const reach = Math.max(...matches.map(({ peak }) => reachNm(peak, fwhmNm)));
  return Math.min(1, density * (feature.toNm - feature.fromNm + 2 * reach));
}

/** Chance that a random list does as well on the strongest k features, for the best k; doubled for choosing k. */
function chanceOfPattern(
  emitter: Emitter,
  open: readonly FoundPeak[],
  matches: readonly Match[],
  input: IdentifyInput,
): number {
  const found = new Set(matches.map(({ feature }) => feature));
  const probabilities: number[] = [];
  let count = 0;
  let least = 1;
  for (const feature of emitter.features) {
    probabilities.push(chanceOfMatch(feature, open, matches, input));
    if (!found.has(feature)) continue;
    count++;
    if (count >= 2) least = Math.min(least, chanceOfAtLeast(count, probabilities));
  }
  return 2 * least;
}

function describe({ emitter, matches, isPossibleOnly }: Candidate): ImpurityFinding {
  const strongest = matches.reduce((a, b) => (b.peak.signalToNoise > a.peak.signalToNoise ? b : a));
  const ordered = [strongest, ...matches.filter((match) => match !== strongest)].slice(0, 4);
  const places = ordered.map(({ feature }, index) => placeOf(feature, index === 0));
  const more = matches.length > ordered.length ? ` and ${String(matches.length - ordered.length)} more` : '';
  const line = strongest.feature.lines[0];
  return {
    species: emitter.species,
    evidence: `${isPossibleOnly ? 'possible: ' : ''}${emitter.name} ${places.join(', ')}${more}`,
    signalToNoise: strongest.peak.signalToNoise,
    meaning: line?.meaning.split(';')[0] ?? '',
  };
}

/** "435.83 nm", "second positive C-B (0-0) 337.1 nm"; after the first only "(0-1) 357.7 nm". */
function placeOf({ lines, centreNm }: Feature, isFirst: boolean): string {
  const transition = lines[0]?.transition.split(',')[0] ?? '';
  if (transition === '') return `${centreNm.toFixed(2)} nm`;
  return `${isFirst ? transition : transition.replace(/^[^(]*/, '')} ${centreNm.toFixed(1)} nm`;
}
