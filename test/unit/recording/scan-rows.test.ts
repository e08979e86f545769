import { describe, expect, test } from 'vitest';
import { createRandom } from '../../../shared-core/numeric/random.ts';
import { scanRows, type ScanColumns, type ScanPlan } from '../../../shared-core/recording/scan-rows.ts';

const plan = (text: string, over: Partial<ScanPlan> = {}): ScanPlan => ({
  bytes: new TextEncoder().encode(text),
  delimiter: 'comma',
  decimalMark: 'point',
  columnCount: 2,
  axisIndex: 0,
  signalIndex: 1,
  extraIndex: -1,
  ...over,
});

const none = (): ScanColumns => ({
  axis: new Float64Array(0),
  signal: new Float64Array(0),
  extra: new Float64Array(0),
  rowCount: 0,
  axisDecimalCount: 0,
});

function scan(text: string, over: Partial<ScanPlan> = {}, rowLimit = 1000) {
  const columns = none();
  const stop = scanRows(plan(text, over), columns, 0, rowLimit);
  const rows = Array.from({ length: columns.rowCount }, (_, i) => [columns.axis[i], columns.signal[i]]);
  return { ...stop, rows, columns };
}

describe('numbers become the nearest double', () => {
  // The conversion in the language itself is correctly rounded (ECMA-262, StringToNumber), so it is the reference.
  test('for 20000 random ways to write one', () => {
    const random = createRandom(20_261);
    const below = (count: number): number => Math.floor(random.uniform() * count);
    const digits = (count: number): string => Array.from({ length: count }, () => String(below(10))).join('');
    const texts = Array.from({ length: 20_000 }, () => {
      const sign = ['', '-', '+'][below(3)]!;
      const fraction = below(2) === 0 ? '' : `.${digits(1 + below(18))}`;
      const exponent = below(3) === 0 ? `e${String(below(80) - 40)}` : '';
      return `${sign}${digits(1 + below(18))}${fraction}${exponent}`;
    });
    const { rows } = scan(texts.map((text, i) => `${String(i)},${text}\n`).join(''), {}, 30_000);
    const wrong = texts.filter((text, i) => !Object.is(rows[i]?.[1], Number(text)));
    expect(wrong).toEqual([]);
  });

  test('at the edge of 53 bits', () => {
    const texts = [
      '9007199254740991',
      '9007199254740992',
      '9007199254740993',
      '900719925474099.3',
      '0.9007199254740993',
      '1e22',
      '1e23',
      '123456789012345e22',
      '-0',
      '0.000000000000000000000000000001',
    ];
    const { rows } = scan(texts.map((text) => `1,${text}\n`).join(''));
    expect(rows.map((row) => row[1])).toEqual(texts.map(Number));
  });
});

describe('where a row stops being one', () => {
  test.each([
    ['400,NaN\n'],
    ['400,inf\n'],
    ['400,1e999\n'],
    ['400,\n'],
    [',5\n'],
    ['400\n'],
    ['400,5,6\n'],
    ['400,5 6\n'],
    ['400,5x\n'],
    ['400,1e\n'],
    ['400,.\n'],
    ['400,-\n'],
    ['400,0x10\n'],
    ['400,1.2.3\n'],
    ['400,1,2\n'],
  ])('%j is refused, after a good row', (bad) => {
    const { reason, offset, rows } = scan(`399,1\n${bad}401,2\n`);
    expect({ reason, offset, rows }).toEqual({ reason: 'bad-row', offset: 6, rows: [[399, 1]] });
  });

  test('blank lines and line breaks of every kind pass', () => {
    expect(scan('\r\n 1,2\r\n\n\r3 , 4\r\t5,\t6,\n').rows).toEqual([
      [1, 2],
      [3, 4],
      [5, 6],
    ]);
  });

  test('the row limit stops before the next row', () => {
    const { reason, offset, rows } = scan('1,2\n3,4\n5,6\n', {}, 2);
    expect({ reason, offset, count: rows.length }).toEqual({ reason: 'full', offset: 8, count: 2 });
  });
});

test('a number too long for one double ends where its cell ends', () => {
  const { rows } = scan(
    '9007199254740993,1234567890123456789\n-3.700904853290375e2,+0.00012345678901234567\n',
  );
  expect(rows).toEqual([
    [9007199254740992, 1234567890123456789],
    [-370.0904853290375, 0.00012345678901234567],
  ]);
  const commas = scan('400,12345678901234567,5\n', { decimalMark: 'comma' });
  expect(commas.rows).toEqual([[400.12345678901234567, 5]]);
});

test('columns nobody wants may hold anything, quoted delimiters too', () => {
  const { rows } = scan('"a, b",400,n/a,7,\n"c",401,,8,\n', { columnCount: 4, axisIndex: 1, signalIndex: 3 });
  expect(rows).toEqual([
    [400, 7],
    [401, 8],
  ]);
});

test('the most decimals of the axis are counted, and exponents mark it as unknown', () => {
  expect(scan('400.1,5.123\n400,7\n').columns.axisDecimalCount).toBe(1);
  expect(scan('4.001e2,5\n').columns.axisDecimalCount).toBe(99);
});
