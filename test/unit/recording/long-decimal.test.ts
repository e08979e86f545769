import { expect, test } from 'vitest';
import { createRandom } from '../../../shared-core/numeric/random.ts';
import { longDecimal } from '../../../shared-core/recording/long-decimal.ts';

const random = createRandom(5);
const digits = (count: number): string =>
  Array.from({ length: count }, (_, i) =>
    String(Math.floor(random.uniform() * 10) || (i === 0 ? 1 : 0)),
  ).join('');

/** Whether the decimal stands exactly between two doubles: 54 bits, the last of them set. */
function isMidway(whole: bigint, fractionCount: number): boolean {
  let over = whole;
  let under = 10n ** BigInt(fractionCount);
  while (over < under << 53n) over <<= 1n;
  while (over >= under << 54n) under <<= 1n;
  return over % under === 0n && (over / under) % 2n === 1n;
}

// The language's own conversion of text to the nearest double is the independent reference here.
test('gives the double that the language reads from the same digits', () => {
  for (let round = 0; round < 50_000; round += 1) {
    const [head, tailDigitCount] = [digits(15), Math.floor(random.uniform() * 8)];
    const tail = digits(tailDigitCount);
    const fractionCount = Math.floor(random.uniform() * 23);
    const value = longDecimal(Number(head), Number(tail), tailDigitCount, fractionCount);
    if (Number.isNaN(value)) expect(isMidway(BigInt(head + tail), fractionCount)).toBe(true);
    else expect(value).toBe(Number(`${head}${tail}e-${String(fractionCount)}`));
  }
});

test('gives back every double from the 17 digits that name it', () => {
  for (let round = 0; round < 20_000; round += 1) {
    const nm = 100 + 900 * random.uniform();
    const all = nm.toPrecision(17).replace('.', '');
    expect(longDecimal(Number(all.slice(0, 15)), Number(all.slice(15)), 2, 14)).toBe(nm);
  }
});

test('leaves a tie open, and settles what is one step beside it', () => {
  // 2^53 + 1 stands midway between the doubles 2^53 and 2^53 + 2.
  expect(longDecimal(900_719_925_474_099, 3, 1, 0)).toBeNaN();
  expect(longDecimal(900_719_925_474_099, 300, 3, 2)).toBeNaN();
  expect(longDecimal(900_719_925_474_099, 300_001, 6, 5)).toBe(9_007_199_254_740_994);
  expect(longDecimal(900_719_925_474_099, 299_999, 6, 5)).toBe(9_007_199_254_740_992);
});
