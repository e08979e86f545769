/** Decimal digits of a double, rounded once from its exact expansion; no logarithms, no powers, no locale. */

/** What toExponential accepts at most; a double has far fewer digits that mean anything. */
const mostDigits = 100;

/**
 * Decimal exponent of a number once it is rounded to `digitCount` significant digits: 9.96 to two digits is 10, so 1.
 * Zero has no exponent of its own and gets 0.
 *
 * @source definition of rounding half up on the exact decimal expansion (ECMA-262, Number.prototype.toExponential)
 * @check  test/unit/text/format-number.test.ts
 */
export function roundingExponent(value: number, digitCount: number): number {
  return Number(value.toExponential(Math.min(digitCount - 1, mostDigits)).split('e')[1]);
}

/**
 * Magnitude of `value` in units of 10^exponent, rounded at 10^place, as a decimal string without sign.
 *
 * Example: 6214.6 at place 0 with exponent 0 is "6215"; 4.13e20 at place 19 with exponent 20 is "4.1".
 *
 * @param value     any finite number
 * @param place     power of ten of the last digit kept
 * @param exponent  power of ten that is taken out (0 for plain notation)
 * @source ECMA-262, Number.prototype.toExponential, for the digits; the rest is moving the point
 * @check  test/property/text/format-number.test.ts
 */
export function fixedDecimal(value: number, place: number, exponent: number): string {
  const units = wholeUnits(Math.abs(value), place);
  const decimalCount = exponent - place;
  if (decimalCount <= 0) return units === '0' ? '0' : units + '0'.repeat(-decimalCount);
  const padded = units.padStart(decimalCount + 1, '0');
  return `${padded.slice(0, -decimalCount)}.${padded.slice(-decimalCount)}`;
}

/** Decimal exponent of `value` once it is rounded at 10^place: 9.96e20 at place 19 is 1.00e21, so 21. Place itself for 0. */
export function exponentAtPlace(value: number, place: number): number {
  return place + wholeUnits(Math.abs(value), place).length - 1;
}

/** True when nothing of `value` is left after rounding at 10^place. */
export function isZeroAtPlace(value: number, place: number): boolean {
  return wholeUnits(Math.abs(value), place) === '0';
}

/** Puts the sign before a magnitude, unless the digits left after rounding are all zero. */
export function withoutNegativeZero(isNegative: boolean, magnitude: string, minus: string): string {
  return isNegative && /[1-9]/.test(magnitude) ? minus + magnitude : magnitude;
}

/** round(magnitude / 10^place) as digits. */
function wholeUnits(magnitude: number, place: number): string {
  if (magnitude === 0) return '0';
  const kept = Number(magnitude.toExponential().split('e')[1]) - place;
  if (kept < -1) return '0';
  if (kept === -1) return magnitude >= Number(`5e${String(place - 1)}`) ? '1' : '0';
  const [mantissa = '', exponent = ''] = magnitude.toExponential(Math.min(kept, mostDigits)).split('e');
  return mantissa.replace('.', '').padEnd(Number(exponent) - place + 1, '0');
}
