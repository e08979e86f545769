import { expect, test } from 'vitest';
import type { Bench } from '../../../shared-core/bench/bench.ts';
import { benchTemplate } from '../../../shared-core/bench/bench-template.ts';
import { recordingLimits } from '../../../shared-core/recording/limits.ts';
import { readRecording } from '../../../shared-core/recording/read-recording.ts';
import { problemSentence, type Problem } from '../../../shared-core/result/result.ts';
import { textFile } from '../../support/text-file.ts';

function refuse(content: string | Uint8Array, bench: Bench = {}, subject?: 'recording' | 'dark'): Problem {
  const result = readRecording(textFile(content), bench, subject);
  if (result.ok) throw new Error(`read as ${String(result.value.wavelengthNm.length)} points`);
  return result.problem;
}

const header = 'wavelength_nm,counts\n';
const good = Array.from({ length: 20 }, (_, i) => `${(400 + i * 0.5).toFixed(1)},${String(100 + i)}`);
const signals = good.map((line) => line.split(',')[1]).join('\n');
const semicolons = good.map((line) => line.replace(',', ';'));
/** The good table with another row `index` (from 0), which stands in line index + 2. */
const withRow = (index: number, row: string): string =>
  `${header}${good.map((line, i) => (i === index ? row : line)).join('\n')}\n`;
const binary = (...head: number[]): Uint8Array =>
  Uint8Array.from([...head, ...Array.from({ length: 100 }, (_, i) => i)]);
const axis = (value: (i: number) => number): string => good.map((_, i) => `${String(value(i))},5`).join('\n');

interface Case {
  readonly what: string;
  readonly content: string | Uint8Array;
  readonly bench?: Bench;
  readonly code: Problem['code'];
  readonly line?: number;
  readonly says: string;
}

const asText = 'Export the data as text (CSV) and choose that file.';
const notText = (found: string): string => `expected a text table, found ${found}. ${asText}`;
const badCell = (column: number, found: string): string =>
  `expected a number in column ${String(column)}, found ${found}. Remove that line or export the file again.`;
const noThousands = (found: string): string =>
  `expected a number in column 2, found ${found}. Export the file again without marks between thousands.`;
const columns = (found: string): string =>
  `expected 2 columns between commas as in the rows above, found ${found}. Complete or remove that line, or export the file again.`;
const oneWay = (found: string): string =>
  `expected wavelengths that run one way, each once, found ${found}. Keep one recording in a file and remove repeated rows.`;
const giveAxis =
  'Export the wavelength column too, or give axis.coefficientsNm (pixel number from 0 to nm) in the bench file.';
const optical = 'expected wavelengths between 100 and 3000 nm';
const checkColumn = 'Check that column 1 holds the wavelength and in which unit.';
const coefficients =
  'expected coefficients in the bench file that give wavelengths between 100 and 3000 nm, running one way';

// What people read. Each sentence was read over when it was written; a changed one is to be read again.
const cases: readonly Case[] = [
  {
    what: 'an empty file',
    content: '',
    code: 'file.empty',
    says: 'expected a table of numbers, found an empty file. Export the file again.',
  },
  {
    what: 'blank lines',
    content: ' \n\r\n\t\n',
    code: 'file.empty',
    says: 'expected a table of numbers, found nothing but blank lines. Export the data as text (CSV) with one row a pixel.',
  },
  {
    what: 'a PNG picture',
    content: binary(0x89, 0x50, 0x4e, 0x47, 13, 10, 26, 10),
    code: 'file.not-text',
    says: notText('a PNG picture'),
  },
  {
    what: 'a JPEG picture',
    content: binary(0xff, 0xd8, 0xff, 0xe0),
    code: 'file.not-text',
    says: notText('a JPEG picture'),
  },
  {
    what: 'a workbook',
    content: binary(0x50, 0x4b, 3, 4),
    code: 'file.not-text',
    says: notText('a ZIP archive or a spreadsheet workbook'),
  },
  {
    what: 'a PDF document',
    content: '%PDF-1.7\n1 0 obj',
    code: 'file.not-text',
    says: notText('a PDF document'),
  },
  {
    what: 'zero bytes',
    content: binary(65, 66, 0, 1, 2),
    code: 'file.not-text',
    says: notText('binary data'),
  },
  {
    what: 'JCAMP-DX',
    content: '##TITLE=tube\n##JCAMP-DX=4.24\n',
    code: 'file.not-text',
    says: notText('a JCAMP-DX file'),
  },
  {
    what: 'JCAMP-DX with a comment before it, blanks and small letters',
    content: `$$ made today\n## Title = tube\n##XYDATA=(XY..XY)\n${good.join('\n')}\n`,
    code: 'file.not-text',
    says: notText('a JCAMP-DX file'),
  },
  {
    what: 'a bench file',
    content: JSON.stringify(benchTemplate, null, 2),
    code: 'file.not-text',
    says: notText('a JSON file'),
  },
  {
    what: 'a list in JSON',
    content: JSON.stringify(
      good.map((_, i) => i),
      null,
      1,
    ),
    code: 'file.not-text',
    says: notText('a JSON file'),
  },
  {
    what: 'rows in JSON',
    content: `[[400,1],\n[401,2]]`,
    code: 'file.not-text',
    says: notText('a JSON file'),
  },
  {
    what: 'FITS',
    content: `SIMPLE  =                    T${' '.repeat(100)}`,
    code: 'file.not-text',
    says: notText('a FITS file'),
  },
  {
    what: 'a web page',
    content: '<!doctype html>\n<p>400,1</p>\n',
    code: 'table.no-numbers',
    says: 'expected rows of numbers, found a web page or other markup. Export the data as text (CSV) with one row a pixel.',
  },
  {
    what: 'prose',
    content: 'no numbers here\nat all\n',
    code: 'table.no-numbers',
    says: 'expected rows of numbers, found no row that holds only numbers. Export the data as text (CSV) with one row a pixel.',
  },
  {
    what: 'signal only',
    content: `counts\n${signals}`,
    code: 'table.one-column',
    says: `expected columns of wavelength and signal, found one column of numbers. ${giveAxis}`,
  },
  {
    what: 'pixel numbers',
    content: semicolons.map((line, i) => line.replace(/^[\d.]+/, String(i))).join('\n'),
    code: 'axis.missing',
    says: `expected wavelengths, found pixel numbers from 0 to 19. ${giveAxis}`,
  },
  {
    what: 'five rows',
    content: header + good.slice(0, 5).join('\n'),
    code: 'table.too-few-rows',
    says: 'expected at least 8 rows of numbers, found 5 rows. Export the whole file again.',
  },
  {
    what: 'one row',
    content: header + good[0]!,
    code: 'table.too-few-rows',
    says: 'expected at least 8 rows of numbers, found 1 row. Export the whole file again.',
  },
  {
    what: 'NaN',
    content: withRow(6, '403.0,NaN'),
    code: 'table.not-finite',
    line: 8,
    says: badCell(2, '"NaN"'),
  },
  {
    what: 'NaN in the first row',
    content: withRow(0, '400.0,NaN'),
    code: 'table.not-finite',
    line: 2,
    says: badCell(2, '"NaN"'),
  },
  {
    what: 'NaN in the second row',
    content: withRow(1, '400.5,NaN'),
    code: 'table.not-finite',
    line: 3,
    says: badCell(2, '"NaN"'),
  },
  {
    what: 'NaN in the last row',
    content: withRow(19, '409.5,NaN'),
    code: 'table.not-finite',
    line: 21,
    says: badCell(2, '"NaN"'),
  },
  {
    what: 'NaN in the last row, no line break',
    content: withRow(19, '409.5,NaN').trimEnd(),
    code: 'table.not-finite',
    line: 21,
    says: badCell(2, '"NaN"'),
  },
  {
    what: 'NaN as a wavelength in the last row',
    content: withRow(19, 'NaN,5'),
    code: 'table.not-finite',
    line: 21,
    says: badCell(1, '"NaN"'),
  },
  {
    what: 'minus infinity',
    content: withRow(6, '403.0,-inf'),
    code: 'table.not-finite',
    line: 8,
    says: badCell(2, '"-inf"'),
  },
  {
    what: 'a number too large for any',
    content: withRow(6, '403.0,1e999'),
    code: 'table.not-finite',
    line: 8,
    says: badCell(2, '"1e999"'),
  },
  {
    what: 'a word for a signal',
    content: withRow(6, '403.0,saturated'),
    code: 'table.not-finite',
    line: 8,
    says: badCell(2, '"saturated"'),
  },
  {
    what: 'a word for a signal in the first row',
    content: withRow(0, '400.0,saturated'),
    code: 'table.not-finite',
    line: 2,
    says: badCell(2, '"saturated"'),
  },
  {
    what: 'a word for a wavelength',
    content: withRow(6, 'broken,5'),
    code: 'table.not-finite',
    line: 8,
    says: badCell(1, '"broken"'),
  },
  {
    what: 'a second table below',
    content: `${header}${good.join('\n')}\n${header}${good.join('\n')}\n`,
    code: 'table.not-finite',
    line: 22,
    says: badCell(1, '"wavelength_nm"'),
  },
  {
    what: 'escape characters',
    content: withRow(6, '403.0,\u0007x\u001b[31m'),
    code: 'table.not-finite',
    line: 8,
    says: badCell(2, '" x [31m"'),
  },
  {
    what: 'a gap',
    content: withRow(6, '403.0,'),
    code: 'table.not-finite',
    line: 8,
    says: badCell(2, 'an empty cell'),
  },
  {
    what: 'a gap in the first row',
    content: withRow(0, '400.0,'),
    code: 'table.not-finite',
    line: 2,
    says: badCell(2, 'an empty cell'),
  },
  {
    what: 'a gap in the wavelengths',
    content: withRow(6, ',106'),
    code: 'table.not-finite',
    line: 8,
    says: badCell(1, 'an empty cell'),
  },
  {
    what: 'NaN after CR LF',
    content: withRow(6, '403.0,NaN').replaceAll('\n', '\r\n'),
    code: 'table.not-finite',
    line: 8,
    says: badCell(2, '"NaN"'),
  },
  {
    what: 'NaN after CR',
    content: withRow(6, '403.0,NaN').replaceAll('\n', '\r'),
    code: 'table.not-finite',
    line: 8,
    says: badCell(2, '"NaN"'),
  },
  {
    what: 'NaN after LF CR',
    content: withRow(6, '403.0,NaN').replaceAll('\n', '\n\r'),
    code: 'table.not-finite',
    line: 8,
    says: badCell(2, '"NaN"'),
  },
  {
    what: 'points between thousands',
    content: semicolons.map((line) => line.replace(/;(\d+)/, ';1.$1,5')).join('\n'),
    code: 'table.not-finite',
    line: 1,
    says: noThousands('"1.100,5"'),
  },
  {
    what: 'commas between thousands',
    content: semicolons.map((line, i) => (i === 7 ? '403.5;107,234.5' : line)).join('\n'),
    code: 'table.not-finite',
    line: 8,
    says: noThousands('"107,234.5"'),
  },
  {
    what: 'a missing column',
    content: withRow(6, '403.0'),
    code: 'table.column-count',
    line: 8,
    says: columns('1 in "403.0"'),
  },
  {
    what: 'a third column in one row',
    content: withRow(6, '403.0,5,6'),
    code: 'table.column-count',
    line: 8,
    says: columns('3 in "403.0,5,6"'),
  },
  {
    what: 'a short last row that has its line break',
    content: `${header}${good.join('\n')}\n410\n`,
    code: 'table.column-count',
    line: 22,
    says: columns('1 in "410"'),
  },
  {
    what: 'commas that cannot be told apart',
    content: good.map((_, i) => (i % 2 === 0 ? `400,${String(i)},100,5` : `400,${String(i)},100`)).join('\n'),
    code: 'table.column-count',
    line: 2,
    says: 'expected columns that can be told apart, found commas both inside and between the numbers in "400,1,100". Export the file again with semicolons or tabs between the columns.',
  },
  {
    what: 'a wavelength twice',
    content: withRow(6, '402.5,106'),
    code: 'axis.duplicate',
    line: 8,
    says: oneWay('402.5 twice'),
  },
  {
    what: 'wavelengths that turn back',
    content: withRow(6, '401.0,106'),
    code: 'axis.not-monotonic',
    line: 8,
    says: oneWay('401 after 402.5'),
  },
  {
    what: 'falling wavelengths that turn back',
    content:
      header +
      good
        .toReversed()
        .map((line, i) => (i === 6 ? '409.0,5' : line))
        .join('\n'),
    code: 'axis.not-monotonic',
    line: 8,
    says: oneWay('409 after 407'),
  },
  {
    what: 'one recording after another',
    content: `${header}${good.join('\n')}\n${good.join('\n')}\n`,
    code: 'axis.not-monotonic',
    line: 22,
    says: oneWay('400 after 409.5'),
  },
  {
    what: 'a fault after a comment among the rows',
    content: withRow(6, '# lamp knocked\n\n402.5,106'),
    code: 'axis.duplicate',
    line: 10,
    says: oneWay('402.5 twice'),
  },
  {
    what: 'a time axis',
    content: `Time (s),Counts\n${good.join('\n')}`,
    code: 'axis.implausible',
    says: 'expected a wavelength column, found a time column ("time (s)"). Convert the scan time to wavelength first.',
  },
  {
    what: 'no optical range',
    content: axis((i) => (i + 1) / 1000),
    code: 'axis.implausible',
    says: `${optical}, found 0.001 to 0.02. ${checkColumn}`,
  },
  {
    what: 'a header with the wrong unit',
    content: `Wavelength (nm),Counts\n${axis((i) => 4000 + i * 50)}`,
    code: 'axis.implausible',
    says: `${optical}, found 4000 to 4950 nm. ${checkColumn} It would fit angstrom: if so, set axis.unit in the bench file.`,
  },
  {
    what: 'wavelengths below zero',
    content: `nm,counts\n${axis((i) => 5 * i - 10)}`,
    code: 'axis.implausible',
    says: `${optical}, found -10 to 85 nm. ${checkColumn}`,
  },
  {
    what: 'wavelengths below zero, no header',
    content: axis((i) => -5 - i),
    code: 'axis.implausible',
    says: `${optical}, found -24 to -5. ${checkColumn}`,
  },
  {
    what: 'coefficients that turn back',
    content: signals,
    bench: { axis: { coefficientsNm: [400, 1, -0.1] } },
    code: 'axis.implausible',
    says: `${coefficients}, found wavelengths that turn back at pixel 6. Correct axis.coefficientsNm in the bench file.`,
  },
  {
    what: 'coefficients in another unit',
    content: signals,
    bench: { axis: { coefficientsNm: [4, 0.1] } },
    code: 'axis.implausible',
    says: `${coefficients}, found 4 to 5.9 nm. Correct axis.coefficientsNm in the bench file.`,
  },
];

test.each(cases)('$what', ({ content, bench, code, line, says }) => {
  const problem = refuse(content, bench);
  expect({ code: problem.code, line: problem.lineNumber }).toEqual({ code, line: line ?? null });
  const where = line === undefined ? '' : `, line ${String(line)}`;
  expect(problemSentence(problem)).toBe(`Cannot use the recording "tube.csv"${where}: ${says}`);
});

test('a dark is called a dark', () => {
  expect(problemSentence(refuse('', {}, 'dark'))).toMatch(/^Cannot use the dark "tube\.csv": /);
});

test('a file above the size limit is refused before it is looked at', () => {
  const problem = refuse(new Uint8Array(recordingLimits.maximumByteCount + 1));
  expect(problem).toMatchObject({ code: 'file.too-large', expected: 'at most 64 MiB', found: '65 MiB' });
});

test('more rows than the limit are refused', () => {
  const rows = Array.from({ length: recordingLimits.maximumRowCount + 1 }, (_, i) => `${String(i)} 1`);
  const problem = refuse(rows.join('\n'), { axis: { coefficientsNm: [200, 0.0001] } });
  expect(problem).toMatchObject({ code: 'file.too-large', expected: 'at most 2000000 rows' });
});

test('a long line that is no table is refused in good time', () => {
  const line = '123 '.repeat(16_000);
  const startedAt = performance.now();
  expect(refuse(`${line}x\n`.repeat(20)).code).toBe('table.no-numbers');
  expect(performance.now() - startedAt).toBeLessThan(2000);
});

test('a head of comments or brackets only is refused in good time', () => {
  const startedAt = performance.now();
  for (const head of ['$$ \n', '$$\t \r\n', '[ ', '{ ', '## ', ' \n']) refuse(head.repeat(2000));
  expect(performance.now() - startedAt).toBeLessThan(2000);
});
