import { log } from '../numeric/portable-math.ts';
import { fitAxisPolynomial } from './axis-polynomial.ts';
import type { Peak } from './find-peaks.ts';
import type { MatchedLine, RecordedAxisMap } from './recorded-axis-map.ts';

export type { MatchedLine, RecordedAxisMap };

/** A line of the pattern to look for, in the medium of the recording. */
export interface PatternLine {
  readonly id: string;
  readonly referenceNm: number;
}

export interface AxisRegistration {
  readonly status: 'registered' | 'ambiguous' | 'not-found';
  readonly map: RecordedAxisMap;
  readonly matched: readonly MatchedLine[];
  /** Natural log of the odds against a chance coincidence of this quality. */
  readonly evidence: number;
  /** The same for the best reading that differs; null when there is none. */
  readonly rivalEvidence: number | null;
  /** Two readings that cannot be told apart, for the message. */
  readonly rivalOffsetNm: number | null;
}

/** The widest axis error looked for: 9 nm of shift, 1.5 % of stretch. */
export const axisSearchLimits = Object.freeze({ offsetNm: 9, stretch: 0.015 });
/** What is usual, and so needs less proof: 1 sigma of a Gaussian belief. */
const usual = Object.freeze({ offsetNm: 2.5, stretch: 0.004 });
const acceptEvidence = 4.5;
const rivalMargin = 3;
const candidatePeakCount = 18;

interface Reading {
  readonly offsetNm: number;
  readonly stretch: number;
  readonly evidence: number;
  readonly matched: readonly MatchedLine[];
}

/**
 * Finds the Balmer lines among the peaks by their pattern, whatever the axis error.
 *
 * Every pair of peaks is tried as every pair of lines; the offset and stretch that follow are refused outside the
 * limits above, then the other lines are looked for where they should lie. Each match counts minus the log of the
 * probability that a peak at least as strong lies there by chance, given how many such peaks the recording has;
 * a pair uses up its own freedom (the first match is judged against the usual spread of offsets, the second
 * against that of stretches). A brighter line that is missing while a fainter one is claimed counts against.
 * The reading is accepted when chance is ruled out (evidence above 4.5, odds of about 90 to 1) and no different
 * reading comes within 3 (20 to 1).
 *
 * @source Bayesian pattern matching by pairs, after the general idea of [Lang2010]
 * @check  test/property/axis-registration.test.ts
 */
export function registerAxis(
  peaks: readonly Peak[],
  pattern: readonly PatternLine[],
  range: { readonly firstNm: number; readonly lastNm: number; readonly fwhmNm: number },
): AxisRegistration {
  const pivotNm = 500;
  const spanNm = range.lastNm - range.firstNm;
  const candidates = peaks.slice(0, candidatePeakCount);
  const context: Context = {
    strongerCount: countStronger(peaks),
    peaks,
    pattern,
    pivotNm,
    spanNm,
    toleranceNm: 0.6 * range.fwhmNm + 0.08,
    firstNm: range.firstNm,
    lastNm: range.lastNm,
  };
  const readings: Reading[] = [];
  for (const [a, lineA] of pattern.entries()) {
    for (const lineB of pattern.slice(a + 1)) {
      for (const peakA of candidates) {
        if (!isInReach(peakA, lineA)) continue;
        for (const peakB of candidates) {
          if (!isInReach(peakB, lineB) || peakA.recordedNm <= peakB.recordedNm) continue;
          // Pattern lines run from long to short wavelength: peakA belongs to the redder line.
          const reading = readPair(context, lineA, peakA, lineB, peakB);
          if (reading !== null) readings.push(reading);
        }
      }
    }
  }
  for (const line of pattern.slice(0, 1)) {
    for (const peak of candidates.slice(0, 3)) {
      const reading = readSingle(context, line, peak);
      if (reading !== null) readings.push(reading);
    }
  }
  readings.sort((x, y) => y.evidence - x.evidence);
  const best = readings[0];
  const flat: RecordedAxisMap = { pivotNm, offsetNm: 0, stretch: 0, bowPerNm: 0 };
  if (best === undefined || best.evidence < 1) {
    return {
      status: 'not-found',
      map: flat,
      matched: [],
      evidence: best?.evidence ?? 0,
      rivalEvidence: null,
      rivalOffsetNm: null,
    };
  }
  const rival = readings.find((other) => differs(context, best, other)) ?? null;
  const isClear = best.evidence >= acceptEvidence && best.matched.length >= 2;
  const isRivalled = rival !== null && best.evidence - rival.evidence < rivalMargin;
  return {
    status: isClear && !isRivalled ? 'registered' : isRivalled ? 'ambiguous' : 'not-found',
    map: fitAxisPolynomial(best.matched, pivotNm, best),
    matched: best.matched,
    evidence: best.evidence,
    rivalEvidence: rival?.evidence ?? null,
    rivalOffsetNm: rival?.offsetNm ?? null,
  };
}

function isInReach(peak: Peak, line: PatternLine): boolean {
  return Math.abs(peak.recordedNm - line.referenceNm) <= axisSearchLimits.offsetNm;
}

function countStronger(peaks: readonly Peak[]): ReadonlyMap<Peak, number> {
  const heights = Float64Array.from(peaks, ({ height }) => height).sort();
  // The last place at which a height stands in the sorted list counts ties as at least as high.
  return new Map(peaks.map((peak) => [peak, heights.length - heights.indexOf(peak.height)]));
}

interface Context {
  /** How many peaks are at least as high as each. */
  readonly strongerCount: ReadonlyMap<Peak, number>;
  readonly peaks: readonly Peak[];
  readonly pattern: readonly PatternLine[];
  readonly pivotNm: number;
  readonly spanNm: number;
  readonly toleranceNm: number;
  readonly firstNm: number;
  readonly lastNm: number;
}

function readPair(
  context: Context,
  lineA: PatternLine,
  peakA: Peak,
  lineB: PatternLine,
  peakB: Peak,
): Reading | null {
  const separation = lineA.referenceNm - lineB.referenceNm;
  const stretch = (peakA.recordedNm - peakB.recordedNm) / separation - 1;
  if (Math.abs(stretch) > axisSearchLimits.stretch) return null;
  const offsetNm = peakA.recordedNm - lineA.referenceNm - stretch * (lineA.referenceNm - context.pivotNm);
  const shiftA = peakA.recordedNm - lineA.referenceNm;
  const shiftB = peakB.recordedNm - lineB.referenceNm;
  const [strong, weak] = peakA.signalToNoise >= peakB.signalToNoise ? [peakA, peakB] : [peakB, peakA];
  const strongShift = strong === peakA ? shiftA : shiftB;
  let evidence =
    matchEvidence(context, strong, usual.offsetNm) -
    0.5 * (strongShift / usual.offsetNm) * (strongShift / usual.offsetNm) +
    matchEvidence(context, weak, usual.stretch * separation + context.toleranceNm) -
    0.5 * (stretch / usual.stretch) * (stretch / usual.stretch);
  const matched: MatchedLine[] = [];
  let missing = 0;
  let penalty = 0;
  for (const line of context.pattern) {
    if (line === lineA || line === lineB) {
      matched.push({ ...line, peak: line === lineA ? peakA : peakB });
      penalty += missing;
      missing = 0;
      continue;
    }
    const expectedNm = line.referenceNm + offsetNm + stretch * (line.referenceNm - context.pivotNm);
    if (expectedNm < context.firstNm || expectedNm > context.lastNm) continue;
    // A line well outside the pair is an extrapolation, where the axis may bow.
    const outside = Math.max(0, line.referenceNm - lineA.referenceNm, lineB.referenceNm - line.referenceNm);
    const toleranceNm = context.toleranceNm + 0.004 * outside;
    const peak = nearest(context.peaks, expectedNm, toleranceNm);
    if (peak === null || peak === peakA || peak === peakB) {
      missing += 2.5;
      continue;
    }
    penalty += missing;
    missing = 0;
    const miss = (peak.recordedNm - expectedNm) / toleranceNm;
    evidence += Math.max(0, matchEvidence(context, peak, toleranceNm) - miss * miss);
    matched.push({ ...line, peak });
  }
  return { offsetNm, stretch, evidence: evidence - penalty - inversionPenalty(matched), matched };
}

/** Only the reddest line, on the strongest peaks: enough to name the peak, never enough to register the axis. */
function readSingle(context: Context, line: PatternLine, peak: Peak): Reading | null {
  const shift = peak.recordedNm - line.referenceNm;
  if (Math.abs(shift) > axisSearchLimits.offsetNm) return null;
  const evidence =
    matchEvidence(context, peak, usual.offsetNm) - 0.5 * (shift / usual.offsetNm) * (shift / usual.offsetNm);
  return { offsetNm: shift, stretch: 0, evidence, matched: [{ ...line, peak }] };
}

/** -ln of the chance that one of the peaks at least this strong falls within +-toleranceNm of a given place. */
function matchEvidence(context: Context, peak: Peak, toleranceNm: number): number {
  const expectedCount = (context.strongerCount.get(peak)! * 2 * toleranceNm) / context.spanNm;
  // -ln(1 - exp(-x)), bounded by the coincidence being certain.
  return expectedCount > 3
    ? 0
    : -log(
        expectedCount < 1e-3
          ? expectedCount
          : (expectedCount * (6 + expectedCount)) / (6 + 4 * expectedCount + expectedCount * expectedCount),
      );
}

/** Going up the series the lines get weaker; a fainter-than-next line may be clipped or cut off by the response. */
function inversionPenalty(matched: readonly MatchedLine[]): number {
  let penalty = 0;
  for (let i = 1; i < matched.length; i++) {
    const lower = matched[i - 1]!.peak;
    const upper = matched[i]!.peak;
    if (!lower.hasClipping && upper.height > 2 * lower.height) penalty += 3;
  }
  return penalty;
}

function nearest(peaks: readonly Peak[], nm: number, toleranceNm: number): Peak | null {
  let best: Peak | null = null;
  let bestScore = 0;
  for (const peak of peaks) {
    const miss = Math.abs(peak.recordedNm - nm) / toleranceNm;
    if (miss > 1) continue;
    const score = peak.signalToNoise * (1.2 - miss);
    if (score > bestScore) {
      best = peak;
      bestScore = score;
    }
  }
  return best;
}

/** Two readings differ when they put a line that both claim on different peaks. */
function differs(context: Context, a: Reading, b: Reading): boolean {
  for (const match of a.matched) {
    const other = b.matched.find((candidate) => candidate.id === match.id);
    if (
      other !== undefined &&
      Math.abs(other.peak.recordedNm - match.peak.recordedNm) > 2 * context.toleranceNm
    )
      return true;
  }
  return false;
}
