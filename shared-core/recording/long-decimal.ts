/** Exact powers of ten: 10^22 is the largest that a double holds without rounding. */
export const powersOfTen = Float64Array.from({ length: 23 }, (_, n) => Number(`1e${String(n)}`));

/** 2^27 + 1: halves a double into two factors whose products are exact. */
const SPLITTER = 134_217_729;
/** The quotient below is good to about 2^-102 of itself; 2^-96 leaves room. */
const QUOTIENT_ERROR = 1 / (4_294_967_296 * 4_294_967_296 * 4_294_967_296);

/**
 * The double nearest to (head 10^tailDigitCount + tail) / 10^fractionCount, for decimals too long for one double.
 *
 * The whole number is held exactly as a sum of two doubles, divided by the exact power of ten, and the quotient
 * rounded once. NaN where the error of all that leaves the rounding open, which is about once in 10^12 and always where
 * the decimal stands midway between two doubles: then the caller has to read the text in another way.
 *
 * @param head           whole number below 10^15
 * @param tail           whole number below 10^tailDigitCount
 * @param tailDigitCount 0 to 7
 * @param fractionCount  0 to 22
 * @source [Dekker1971]: exact product of two doubles, quotient in double length
 * @check  test/unit/recording/long-decimal.test.ts
 */
export function longDecimal(
  head: number,
  tail: number,
  tailDigitCount: number,
  fractionCount: number,
): number {
  const tens = powersOfTen[tailDigitCount]!;
  const product = head * tens;
  const high = product + (productError(head, tens, product) + tail);
  const low = product - high + (productError(head, tens, product) + tail);
  const divisor = powersOfTen[fractionCount]!;
  const quotient = high / divisor;
  const back = quotient * divisor;
  const rest = (high - back - productError(quotient, divisor, back) + low) / divisor;
  const margin = quotient * QUOTIENT_ERROR;
  const value = quotient + (rest - margin);
  return value === quotient + (rest + margin) ? value : NaN;
}

/** a b - product, exactly, where product is a b as rounded. */
function productError(a: number, b: number, product: number): number {
  const aWide = a * SPLITTER;
  const aHigh = aWide - (aWide - a);
  const aLow = a - aHigh;
  const bWide = b * SPLITTER;
  const bHigh = bWide - (bWide - b);
  const bLow = b - bHigh;
  return aHigh * bHigh - product + aHigh * bLow + aLow * bHigh + aLow * bLow;
}
