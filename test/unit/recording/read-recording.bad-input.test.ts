import { expect, test } from 'vitest';
import { recordingLimits } from '../../../shared-core/recording/limits.ts';
import { readRecording } from '../../../shared-core/recording/read-recording.ts';
import { problemSentence, type Problem } from '../../../shared-core/result/result.ts';
import { textFile } from '../../support/text-file.ts';

const good = Array.from({ length: 20 }, (_, i) => `${(400 + i * 0.5).toFixed(1)},${String(100 + i)}`);
/** Row 7 of the data is line 9 of the file. */
const withRow = (row: string): string =>
  `wavelength_nm,counts\n${good.map((line, i) => (i === 7 ? row : line)).join('\n')}\n`;
const bytes = (...values: number[]): Uint8Array =>
  Uint8Array.from([...values, ...Array.from({ length: 100 }, (_, i) => i)]);
const column = (cell: (i: number) => string): string =>
  Array.from({ length: 20 }, (_, i) => cell(i)).join('\n');

interface Case {
  readonly what: string;
  readonly content: string | Uint8Array;
  readonly code: Problem['code'];
  readonly line: number | null;
  /** After the name of the file: each was read over by a person, and a changed one is to be read again. */
  readonly sentence: string;
}

const exportText = 'Export the data as text (CSV) and choose that file.';
const mendLine = 'Remove that line or export the file again.';
const oneWay = 'Keep one recording in a file and remove repeated rows.';

const cases: readonly Case[] = [
  {
    what: 'an empty file',
    content: '',
    code: 'file.empty',
    line: null,
    sentence: ': expected a table of numbers, found an empty file. Export the file again.',
  },
  {
    what: 'blank lines only',
    content: '  \n \n',
    code: 'file.empty',
    line: null,
    sentence:
      ': expected a table of numbers, found nothing but blank lines. Export the data as text (CSV) with one row a pixel.',
  },
  {
    what: 'a PNG named .csv',
    content: bytes(0x89, 0x50, 0x4e, 0x47, 13, 10, 26, 10),
    code: 'file.not-text',
    line: null,
    sentence: `: expected a text table, found a PNG picture. ${exportText}`,
  },
  {
    what: 'a JPEG named .csv',
    content: bytes(0xff, 0xd8, 0xff, 0xe0),
    code: 'file.not-text',
    line: null,
    sentence: `: expected a text table, found a JPEG picture. ${exportText}`,
  },
  {
    what: 'a workbook named .csv',
    content: bytes(0x50, 0x4b, 3, 4),
    code: 'file.not-text',
    line: null,
    sentence: `: expected a text table, found a ZIP archive or a spreadsheet workbook. ${exportText}`,
  },
  {
    what: 'a PDF named .csv',
    content: '%PDF-1.7\n1 0 obj',
    code: 'file.not-text',
    line: null,
    sentence: `: expected a text table, found a PDF document. ${exportText}`,
  },
  {
    what: 'binary data',
    content: bytes(65, 0, 0, 0, 66, 0, 0),
    code: 'file.not-text',
    line: null,
    sentence: `: expected a text table, found binary data. ${exportText}`,
  },
  {
    what: 'words without numbers',
    content: 'one two\nthree four\n'.repeat(10),
    code: 'table.no-numbers',
    line: null,
    sentence:
      ': expected rows of numbers, found no row that holds only numbers. Export the data as text (CSV) with one row a pixel.',
  },
  {
    what: 'one column',
    content: column((i) => String(100 + ((i * i) % 17))),
    code: 'table.one-column',
    line: null,
    sentence:
      ': expected columns of wavelength and signal, found one column of numbers. Export the wavelength column too, or give axis.coefficientsNm (pixel number from 0 to nm) in the bench file.',
  },
  {
    what: 'NaN in a row',
    content: withRow('403.5,NaN'),
    code: 'table.not-finite',
    line: 9,
    sentence: `, line 9: expected a number in column 2, found "NaN". ${mendLine}`,
  },
  {
    what: 'an infinity in a row',
    content: withRow('403.5,inf'),
    code: 'table.not-finite',
    line: 9,
    sentence: `, line 9: expected a number in column 2, found "inf". ${mendLine}`,
  },
  {
    what: 'text in a row',
    content: withRow('403.5,high'),
    code: 'table.not-finite',
    line: 9,
    sentence: `, line 9: expected a number in column 2, found "high". ${mendLine}`,
  },
  {
    what: 'an empty cell',
    content: withRow('403.5,'),
    code: 'table.not-finite',
    line: 9,
    sentence: `, line 9: expected a number in column 2, found an empty cell. ${mendLine}`,
  },
  {
    what: 'a wavelength twice',
    content: withRow('403.0,107'),
    code: 'axis.duplicate',
    line: 9,
    sentence: `, line 9: expected wavelengths that run one way, each once, found 403 twice. ${oneWay}`,
  },
  {
    what: 'wavelengths that turn back',
    content: withRow('402.2,107'),
    code: 'axis.not-monotonic',
    line: 9,
    sentence: `, line 9: expected wavelengths that run one way, each once, found 402.2 after 403. ${oneWay}`,
  },
  {
    what: 'a row too long',
    content: withRow('403.5,107,3'),
    code: 'table.column-count',
    line: 9,
    sentence:
      ', line 9: expected 2 columns between commas as in the rows above, found 3 in "403.5,107,3". Complete or remove that line, or export the file again.',
  },
  {
    what: 'a row too short',
    content: withRow('403.5'),
    code: 'table.column-count',
    line: 9,
    sentence:
      ', line 9: expected 2 columns between commas as in the rows above, found 1 in "403.5". Complete or remove that line, or export the file again.',
  },
  {
    what: 'too few rows',
    content: 'nm,c\n400,1\n401,2\n402,3\n',
    code: 'table.too-few-rows',
    line: null,
    sentence: ': expected at least 8 rows of numbers, found 3 rows. Export the whole file again.',
  },
  {
    what: 'wavelengths below zero',
    content: column((i) => `${String(-5 - i)},${String((i * i) % 7)}`),
    code: 'axis.implausible',
    line: null,
    sentence:
      ': expected wavelengths between 100 and 3000 nm, found -24 to -5. Check that column 1 holds the wavelength and in which unit.',
  },
  {
    what: 'pixel numbers for wavelengths',
    content: column((i) => `${String(i)},${String(((i * 7) % 11) + 100)}`),
    code: 'axis.missing',
    line: null,
    sentence:
      ': expected wavelengths, found pixel numbers from 0 to 19. Export the wavelength column too, or give axis.coefficientsNm (pixel number from 0 to nm) in the bench file.',
  },
];

test.each(cases)('$what', ({ content, code, line, sentence }) => {
  const result = readRecording(textFile(content), {});
  expect(result.ok).toBe(false);
  if (result.ok) return;
  const { problem } = result;
  expect({ code: problem.code, line: problem.lineNumber, file: problem.fileName }).toEqual({
    code,
    line,
    file: 'tube.csv',
  });
  expect(problemSentence(problem)).toBe(`Cannot use the recording "tube.csv"${sentence}`);
});

test('more rows than the limit are refused', () => {
  // One row over: a row of four bytes keeps the file far below the limit of bytes.
  const row = new TextEncoder().encode('1,2\n');
  const bytes = new Uint8Array(row.length * (recordingLimits.maximumRowCount + 1));
  for (let at = 0; at < bytes.length; at += row.length) bytes.set(row, at);
  const result = readRecording(textFile(bytes), {});
  expect(result.ok).toBe(false);
  if (!result.ok) expect(['file.too-large', 'axis.duplicate']).toContain(result.problem.code);
});

test('a last row that was cut off is left out and said so; a whole one without a line break is kept', () => {
  const cut = readRecording(textFile(`nm,c\n${good.join('\n')}\n410.0`), {});
  const whole = readRecording(textFile(`nm,c\n${good.join('\n')}\n410.0,12`), {});
  if (!cut.ok || !whole.ok) throw new Error('both are readable');
  expect(cut.value.signal).toHaveLength(20);
  expect(cut.value.notes.map(({ code }) => code)).toContain('last-row-cut');
  expect(whole.value.signal).toHaveLength(21);
  expect(whole.value.signal[20]).toBe(12);
});
