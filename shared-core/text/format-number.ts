/**
 * The one rounding rule of the program, and how a rounded number is written.
 *
 * An uncertainty is given to two significant digits and its value to the same decimal place; the ends of an
 * interval go to the place of the standard uncertainty where there is one, else to the place that leaves the
 * wider side two digits and the narrower at least one.
 * Rounding works on the decimal expansion of the double itself, so no logarithm and no power is involved.
 *
 * @source [JCGM2008] 7.2.6: at most two significant digits, estimates rounded consistently with them
 * @check  test/unit/text/format-number.test.ts
 * @check  test/property/text/format-number.test.ts
 */
import { invariant } from '../result/result.ts';
import {
  exponentAtPlace,
  fixedDecimal,
  isZeroAtPlace,
  roundingExponent,
  withoutNegativeZero,
} from './decimal-digits.ts';

/** `typographic` for screens and paper (U+2212, U+202F, superscripts), `ascii` for terminals and tables. */
export type NumberStyle = 'typographic' | 'ascii';

/** What stands where there is no number. */
export const absentMark: Readonly<Record<NumberStyle, string>> = { typographic: '–', ascii: '-' };

const thinSpace = '\u202f';
const minusSign = '\u2212';
const superscripts = '⁰¹²³⁴⁵⁶⁷⁸⁹';
/** Beyond these decimal exponents a number is written as mantissa and power of ten. */
const plainExponents = { lowest: -4, highest: 6 };
/** Digits for a value whose uncertainty is not known: no claim beyond a per mille. */
const digitsWithoutSigma = 3;

/** Place of the last digit kept (as power of ten) when `uncertainty` (> 0, any unit) is cut to `digitCount` digits. */
export function uncertaintyPlace(uncertainty: number, digitCount = 2): number {
  invariant(
    uncertainty > 0 && Number.isFinite(uncertainty),
    'an uncertainty to round by is positive and finite',
  );
  return roundingExponent(uncertainty, digitCount) - (digitCount - 1);
}

/**
 * Place of the last digit for a value with an interval around it.
 *
 * Place: that of sigma at two digits; without sigma the smaller of (wider half at two digits, narrower half at one).
 * All arguments in one unit, low <= value <= high. Null when the interval has no width: nothing to round by.
 *
 * @source own extension of [JCGM2008] 7.2.6 to intervals that are not symmetric
 * @check  test/unit/text/format-number.test.ts
 */
export function intervalPlace(interval: {
  readonly value: number;
  readonly low: number;
  readonly high: number;
  readonly sigma: number | null;
}): number | null {
  const { value, low, high, sigma } = interval;
  if (sigma !== null && sigma > 0 && Number.isFinite(sigma)) return uncertaintyPlace(sigma);
  const halves = [value - low, high - value].filter((half) => half > 0 && Number.isFinite(half));
  if (halves.length === 0) return null;
  return Math.min(uncertaintyPlace(Math.max(...halves)), uncertaintyPlace(Math.min(...halves), 1));
}

/** A number cut at a decimal place (power of ten), grouped in threes; a power of ten where it is very large or small. */
export function formatAtPlace(value: number, place: number, style: NumberStyle = 'typographic'): string {
  if (!Number.isFinite(value)) return absentMark[style];
  const exponent = exponentAtPlace(value, place);
  if (exponent < plainExponents.lowest && isZeroAtPlace(value, place)) return '0';
  const isPlain = exponent >= plainExponents.lowest && exponent <= plainExponents.highest;
  return isPlain ? plainAt(value, place, style) : scientificAt(value, place, style);
}

/** A number with `digitCount` significant digits, for quantities that carry no uncertainty of their own. */
export function formatSignificant(
  value: number | null,
  digitCount: number,
  style: NumberStyle = 'typographic',
): string {
  if (value === null || !Number.isFinite(value)) return absentMark[style];
  if (value === 0) return '0';
  return formatAtPlace(value, roundingExponent(value, digitCount) - (digitCount - 1), style);
}

/**
 * "6 210 ± 95": value and standard uncertainty, both in the unit the caller adds.
 *
 * A sigma of 0 means exact: the value alone, all its digits. An unknown sigma (null or not finite): the value
 * alone, three digits. An absent value: the absent mark.
 */
export function formatWithSigma(
  value: number | null,
  sigma: number | null,
  style: NumberStyle = 'typographic',
): string {
  if (value === null || !Number.isFinite(value)) return absentMark[style];
  if (sigma === null || !Number.isFinite(sigma)) return formatSignificant(value, digitsWithoutSigma, style);
  invariant(sigma >= 0, 'a standard uncertainty is not negative');
  if (sigma === 0) return formatExact(value, style);
  const place = uncertaintyPlace(sigma);
  const plusMinus = style === 'typographic' ? '±' : '+/-';
  const exponent = exponentAtPlace(Math.max(Math.abs(value), sigma), place);
  if (exponent >= plainExponents.lowest && exponent <= plainExponents.highest)
    return `${plainAt(value, place, style)} ${plusMinus} ${plainAt(sigma, place, style)}`;
  const mantissas = [value, sigma].map((each) => mantissaAt(each, place, exponent, style));
  return `(${mantissas.join(` ${plusMinus} `)})${powerOfTen(exponent, style)}`;
}

/** "6 030 to 6 401": ends in one unit, cut at the place of sigma, or by their half distance when sigma is unknown. */
export function formatInterval(
  low: number | null,
  high: number | null,
  options: { readonly sigma?: number | null; readonly style?: NumberStyle } = {},
): string {
  const style = options.style ?? 'typographic';
  if (low === null || high === null || !Number.isFinite(low) || !Number.isFinite(high))
    return absentMark[style];
  invariant(low <= high, 'an interval runs upwards');
  const place = intervalPlace({ value: (low + high) / 2, low, high, sigma: options.sigma ?? null });
  if (place === null) return `${formatExact(low, style)} to ${formatExact(high, style)}`;
  return `${formatAtPlace(low, place, style)} to ${formatAtPlace(high, place, style)}`;
}

/** "95 %": a fraction from 0 to 1 as per cent with at most `decimalCount` decimals, trailing zeros dropped. */
export function formatPercent(
  fraction: number,
  decimalCount = 0,
  style: NumberStyle = 'typographic',
): string {
  const percent = formatAtPlace(fraction * 100, -decimalCount, style);
  const shortened = percent.includes('.') ? percent.replace(/\.?0+$/, '') : percent;
  return `${shortened}${style === 'typographic' ? thinSpace : ' '}%`;
}

/** Every digit the double needs to come back the same; for settings and other exact numbers. */
export function formatExact(value: number, style: NumberStyle = 'typographic'): string {
  if (!Number.isFinite(value)) return absentMark[style];
  const [mantissa = '', exponentPart] = String(Math.abs(value)).split('e');
  const text =
    groupThousands(mantissa, style) + (exponentPart ? powerOfTen(Number(exponentPart), style) : '');
  return signed(value, text, style);
}

/** "4.1 × 10²⁰" or "4.1e20": mantissa cut at `place`, which counts in units of the number, not of the mantissa. */
export function scientificAt(value: number, place: number, style: NumberStyle): string {
  if (isZeroAtPlace(value, place)) return '0';
  const exponent = exponentAtPlace(value, place);
  return mantissaAt(value, place, exponent, style) + powerOfTen(exponent, style);
}

/** " × 10²⁰" or "e20", to stand behind a mantissa. */
export function powerOfTen(exponent: number, style: NumberStyle): string {
  if (style === 'ascii') return `e${String(exponent)}`;
  const digits = [...String(Math.abs(exponent))].map((digit) => superscripts[Number(digit)] ?? '').join('');
  return `${thinSpace}×${thinSpace}10${exponent < 0 ? '⁻' : ''}${digits}`;
}

/** Mantissa text of `value` in units of 10^exponent, cut at `place`, with its sign. */
export function mantissaAt(value: number, place: number, exponent: number, style: NumberStyle): string {
  return signed(value, fixedDecimal(value, place, exponent), style);
}

function plainAt(value: number, place: number, style: NumberStyle): string {
  return signed(value, groupThousands(fixedDecimal(value, place, 0), style), style);
}

function signed(value: number, magnitude: string, style: NumberStyle): string {
  return withoutNegativeZero(value < 0, magnitude, style === 'typographic' ? minusSign : '-');
}

function groupThousands(text: string, style: NumberStyle): string {
  if (style === 'ascii') return text;
  const [whole = '', fraction] = text.split('.');
  const grouped = whole.replace(/\B(?=(\d{3})+$)/g, thinSpace);
  return fraction === undefined ? grouped : `${grouped}.${fraction}`;
}
