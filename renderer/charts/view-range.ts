/** The part of the wavelength axis that is shown, nm. */
export interface ViewRange {
  readonly fromNm: number;
  readonly toNm: number;
}

/** Narrower than this a recording has no more to show. */
const minSpanNm = 0.2;

/** Keeps a range inside the whole one and at least `minSpanNm` wide. */
export function clampRange(range: ViewRange, whole: ViewRange): ViewRange {
  const wholeSpan = whole.toNm - whole.fromNm;
  const span = Math.min(wholeSpan, Math.max(Math.min(minSpanNm, wholeSpan), range.toNm - range.fromNm));
  const middle = (range.fromNm + range.toNm) / 2;
  const fromNm = Math.min(whole.toNm - span, Math.max(whole.fromNm, middle - span / 2));
  return { fromNm, toNm: fromNm + span };
}

/** Zooms about a wavelength that stays where it is; a factor below 1 zooms in. */
export function zoomAbout(range: ViewRange, aboutNm: number, factor: number, whole: ViewRange): ViewRange {
  const span = range.toNm - range.fromNm;
  const share = span > 0 ? (aboutNm - range.fromNm) / span : 0.5;
  const fromNm = aboutNm - share * span * factor;
  return clampRange({ fromNm, toNm: fromNm + span * factor }, whole);
}

/** Moves by a share of the shown span; positive is towards longer wavelengths. */
export function panBy(range: ViewRange, share: number, whole: ViewRange): ViewRange {
  const step = (range.toNm - range.fromNm) * share;
  return clampRange({ fromNm: range.fromNm + step, toNm: range.toNm + step }, whole);
}

export const isWhole = (range: ViewRange, whole: ViewRange): boolean =>
  range.toNm - range.fromNm >= (whole.toNm - whole.fromNm) * (1 - 1e-9);
