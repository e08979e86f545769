import { recordingLimits } from './limits.ts';
import type { WavelengthUnit } from './recording.ts';

const UNIT_PATTERNS: readonly (readonly [WavelengthUnit, RegExp])[] = [
  ['cm-1', /cm\s*(\^|\*\*)?\s*[({]?\s*[-−]\s*1|cm⁻¹|1\s*\/\s*cm|wave\s*_?num/],
  ['nm', /(?<![a-z])nm(?![a-z])|nanomet/],
  ['um', /[µμ]m|(?<![a-z])um(?![a-z])|micron|micromet/],
  ['angstrom', /[åÅ]|ngstr[oöø]m|(?<![a-z])angs?(?![a-z])|(?<![a-z])a(?![a-z])/],
];

/** The unit a header cell (lower case) names, or null. */
export function unitInHeader(header: string): WavelengthUnit | null {
  return UNIT_PATTERNS.find(([, pattern]) => pattern.test(header))?.[0] ?? null;
}

/** nm, vacuum for cm-1, else in whatever medium the numbers were in. */
export function toNm(value: number, unit: WavelengthUnit): number {
  switch (unit) {
    case 'nm':
      return value;
    case 'angstrom':
      return value / 10;
    case 'um':
      return value * 1000;
    case 'cm-1':
      return 1e7 / value;
  }
}

export interface UnitGuess {
  readonly unit: WavelengthUnit;
  /** Another unit that would put the numbers in the optical range just as well, or null. */
  readonly rival: WavelengthUnit | null;
}

/** nm: from the Balmer series limit to past H-alpha; what a recording for this program is made to hold. */
const BALMER_WINDOW_NM = { first: 360, last: 700 } as const;

/**
 * The unit that puts the largest part of the range inside the Balmer window, among those that keep it in the
 * optical range; in doubt nm, then angstrom, um, cm-1. Null when no unit gives an optical range.
 */
export function unitFromRange(a: number, b: number): UnitGuess | null {
  const candidates = (['nm', 'angstrom', 'um', 'cm-1'] as const)
    .filter((unit) => isOpticalRange(toNm(a, unit), toNm(b, unit)))
    .map((unit) => ({ unit, share: shareOfWindow(toNm(a, unit), toNm(b, unit)) }));
  if (candidates.length === 0) return null;
  const best = candidates.reduce((so, next) => (next.share > so.share ? next : so));
  const rival = candidates.find(({ unit, share }) => unit !== best.unit && share >= 0.5 * best.share);
  return { unit: best.unit, rival: rival?.unit ?? null };
}

export function isOpticalRange(aNm: number, bNm: number): boolean {
  return Math.min(aNm, bNm) >= recordingLimits.shortestNm && Math.max(aNm, bNm) <= recordingLimits.longestNm;
}

function shareOfWindow(aNm: number, bNm: number): number {
  const first = Math.max(Math.min(aNm, bNm), BALMER_WINDOW_NM.first);
  const last = Math.min(Math.max(aNm, bNm), BALMER_WINDOW_NM.last);
  return Math.max(0, last - first) / (BALMER_WINDOW_NM.last - BALMER_WINDOW_NM.first);
}
