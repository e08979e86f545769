import { describe, expect, test } from 'vitest';
import type { Bench } from '../../../shared-core/bench/bench.ts';
import { readRecording } from '../../../shared-core/recording/read-recording.ts';
import type { Recording, Understood } from '../../../shared-core/recording/recording.ts';
import { problemSentence } from '../../../shared-core/result/result.ts';
import { latin1, textFile, utf16 } from '../../support/text-file.ts';

function read(content: string | Uint8Array, bench: Bench = {}, subject?: 'recording' | 'dark'): Recording {
  const result = readRecording(textFile(content), bench, subject);
  if (!result.ok) throw new Error(problemSentence(result.problem));
  return result.value;
}

const notesOf = (recording: Recording): string[] => recording.notes.map((note) => note.code);

// One recording, 400 rows: an even grid in hundredths of a nm so that every layout can write it exactly.
const ROWS = Array.from({ length: 400 }, (_, i) => ({
  hundredthsNm: 37_000 + 83 * i,
  tenthsCounts: 10_000 + ((i * 7919) % 5000) * (i % 7 === 0 ? -1 : 1),
}));
const nm = (row: (typeof ROWS)[number]): string => (row.hundredthsNm / 100).toFixed(2);
const counts = (row: (typeof ROWS)[number]): string => (row.tenthsCounts / 10).toFixed(1);
const comma = (text: string): string => text.replace('.', ',');
const plain = `wavelength_nm,signal_counts\n${ROWS.map((row) => `${nm(row)},${counts(row)}`).join('\n')}\n`;

const thirteenLines = [
  'Data from recording',
  '\rDate: Wed Aug 09 10:23:12 2023',
  'User:\toperator',
  'Spectrometer: S1',
  'Scans to average: 1',
  'Trigger mode: 4',
  'Integration Time (sec): 2.000000E-2',
  'Electric dark correction enabled: true',
  'Boxcar width:\t0',
  'XAxis mode: Wavelengths',
  'Number of Pixels in Spectrum: 400',
  '>>>>>Begin Data<<<<<',
].join('\n');

interface Layout {
  readonly what: string;
  readonly content: string | Uint8Array;
  readonly understood: Partial<Understood>;
}

const rows = (write: (row: (typeof ROWS)[number]) => string, lineBreak = '\n'): string =>
  ROWS.map(write).join(lineBreak) + lineBreak;

const layouts: readonly Layout[] = [
  {
    what: 'no header',
    content: rows((r) => `${nm(r)},${counts(r)}`),
    understood: { headerLineCount: 0, axisUnitFrom: 'range' },
  },
  {
    what: 'descending angstrom, named in the header',
    content: `Wavelength (Å),Counts\n${ROWS.toReversed()
      .map((r) => `${(r.hundredthsNm / 10).toFixed(1)},${counts(r)}`)
      .join('\n')}\n`,
    understood: { axisUnit: 'angstrom', axisUnitFrom: 'header', order: 'descending' },
  },
  {
    what: 'angstrom without a header',
    content: rows((r) => `${(r.hundredthsNm / 10).toFixed(1)} ${counts(r)}`),
    understood: { axisUnit: 'angstrom', axisUnitFrom: 'range', delimiter: 'blanks' },
  },
  {
    what: 'micrometres',
    content: `Lambda [µm];Signal\n${rows((r) => `${(r.hundredthsNm / 100_000).toFixed(5)};${counts(r)}`)}`,
    understood: { axisUnit: 'um', axisUnitFrom: 'header', delimiter: 'semicolon' },
  },
  {
    what: 'micrometres without a header',
    content: rows((r) => `${(r.hundredthsNm / 100_000).toFixed(5)};${counts(r)}`),
    understood: { axisUnit: 'um', axisUnitFrom: 'range' },
  },
  {
    what: 'decimal commas with semicolons',
    content: `Wellenlänge (nm);Intensität\n${rows((r) => `${comma(nm(r))};${comma(counts(r))}`)}`,
    understood: { delimiter: 'semicolon', decimalMark: 'comma', axisUnitFrom: 'header' },
  },
  {
    what: 'decimal commas with tabs',
    content: rows((r) => `${comma(nm(r))}\t${comma(counts(r))}`),
    understood: { delimiter: 'tab', decimalMark: 'comma' },
  },
  {
    what: 'decimal commas with blanks',
    content: rows((r) => `  ${comma(nm(r))}    ${comma(counts(r))}`),
    understood: { delimiter: 'blanks', decimalMark: 'comma' },
  },
  {
    what: 'commas as decimal marks and between the columns',
    content: `Wavelength,Counts\n${rows((r) => `${comma(nm(r))},${comma(counts(r))}`)}`,
    understood: { delimiter: 'comma', decimalMark: 'comma', columnCount: 2 },
  },
  {
    what: 'commas as both, no header',
    content: rows((r) => `${comma(nm(r))},${comma(counts(r))}`),
    understood: { delimiter: 'comma', decimalMark: 'comma', columnCount: 2, headerLineCount: 0 },
  },
  {
    what: 'quoted decimal commas between commas',
    content: `"Wavelength (nm)","Counts"\n${rows((r) => `"${comma(nm(r))}","${comma(counts(r))}"`)}`,
    understood: { delimiter: 'comma', decimalMark: 'comma', columnCount: 2 },
  },
  {
    what: 'decimal commas followed by comma and blank',
    content: rows((r) => `${comma(nm(r))}, ${comma(counts(r))}`),
    understood: { delimiter: 'comma', decimalMark: 'comma', columnCount: 2 },
  },
  {
    what: 'commas with blanks after them',
    content: rows((r) => `${nm(r)}, ${counts(r)}`),
    understood: { delimiter: 'comma', decimalMark: 'point' },
  },
  {
    what: 'a comma that ends every row',
    content: rows((r) => `${nm(r)},${counts(r)},`),
    understood: { delimiter: 'comma', columnCount: 2 },
  },
  {
    what: 'several blanks, aligned',
    content: `  wavelength (nm)   intensity\n${rows((r) => `${nm(r).padStart(12)}${counts(r).padStart(14)}`)}`,
    understood: { delimiter: 'blanks', axisUnit: 'nm', axisUnitFrom: 'header', headerLineCount: 1 },
  },
  {
    what: 'quoted headers and numbers after a byte-order mark',
    content: `\ufeff"Latest: Wavelength (nm)","Latest: Intensity (rel)"\n${rows((r) => `"${nm(r)}","${counts(r)}"`)}`,
    understood: { encoding: 'utf-8', headerLineCount: 1, axisUnitFrom: 'header' },
  },
  { what: 'CR LF', content: plain.replaceAll('\n', '\r\n'), understood: { headerLineCount: 1 } },
  { what: 'CR alone', content: plain.replaceAll('\n', '\r'), understood: { headerLineCount: 1 } },
  { what: 'LF CR throughout', content: plain.replaceAll('\n', '\n\r'), understood: { headerLineCount: 1 } },
  { what: 'no line break at the end', content: plain.trimEnd(), understood: { skippedRowCount: 0 } },
  {
    what: 'a header in brackets',
    content: `[Data]\n${rows((r) => `${nm(r)},${counts(r)}`)}`,
    understood: { headerLineCount: 1 },
  },
  {
    what: '13 header lines with tabs and mixed line breaks',
    content: `${thirteenLines}\n${rows((r) => `${nm(r)}\t${counts(r)}`, '\r\n')}`,
    understood: { headerLineCount: 13, delimiter: 'tab', axisUnit: 'nm', axisUnitFrom: 'range' },
  },
  {
    what: 'a preamble of 5000 lines with lone numbers in it',
    content: `${Array.from({ length: 5000 }, (_, i) => (i % 50 === 0 ? '20' : `key ${String(i)}: value`)).join('\n')}\n${plain}`,
    understood: { headerLineCount: 5001, axisUnitFrom: 'header' },
  },
  {
    what: 'comment signs before the header and among the rows',
    content: `# made by hand\n# wavelength_nm,signal_counts\n${rows((r) => (r === ROWS[200] ? `# lamp knocked\n${nm(r)},${counts(r)}` : `${nm(r)},${counts(r)}`))}`,
    understood: { headerLineCount: 2, axisUnitFrom: 'header', skippedRowCount: 1 },
  },
  {
    what: 'lines of words after the rows',
    content: `${plain}>>>>>End Data<<<<<\nOperator: nobody\n\nScans 20\n`,
    understood: { skippedRowCount: 3 },
  },
  {
    what: 'a units line below the names',
    content: `Wavelength;Intensity\nnm;counts\n${rows((r) => `${nm(r)};${counts(r)}`)}`,
    understood: { headerLineCount: 2, axisUnitFrom: 'header', axisUnit: 'nm' },
  },
  {
    what: 'exponents',
    content: rows(
      (r) =>
        `${(r.hundredthsNm / 100).toExponential(20)}\t${(r.tenthsCounts / 10).toExponential(8).replace('e', 'D')}`,
    ),
    understood: { delimiter: 'tab' },
  },
  { what: 'UTF-16, little-endian', content: utf16(plain, 'le', true), understood: { encoding: 'utf-16le' } },
  { what: 'UTF-16, big-endian', content: utf16(plain, 'be', true), understood: { encoding: 'utf-16be' } },
  { what: 'UTF-16 without a mark', content: utf16(plain, 'le', false), understood: { encoding: 'utf-16le' } },
  {
    what: 'Latin-1',
    content: latin1(
      `Longueur d'onde (Å)\tIntensité\n${rows((r) => `${(r.hundredthsNm / 10).toFixed(1)}\t${counts(r)}`)}`,
    ),
    understood: { encoding: 'latin-1', axisUnit: 'angstrom', axisUnitFrom: 'header' },
  },
  {
    what: 'pixel number, wavelength, dark, counts',
    content: `Pixel,Wavelength (nm),Dark,Counts\n${ROWS.map((r, i) => `${String(i)},${nm(r)},${String(900 + (i % 9))},${counts(r)}`).join('\n')}\n`,
    understood: { columnCount: 4, axisColumn: 2, signalColumn: 4 },
  },
  {
    what: 'pixel number, wavelength, counts without a header',
    content: ROWS.map((r, i) => `${String(i)} ${nm(r)} ${counts(r)}`).join('\n'),
    understood: { columnCount: 3, axisColumn: 2, signalColumn: 3 },
  },
  {
    what: 'the signal before the wavelength',
    content: `Counts;Wavelength (nm)\n${rows((r) => `${counts(r)};${nm(r)}`)}`,
    understood: { axisColumn: 2, signalColumn: 1 },
  },
  {
    what: 'an empty column between',
    content: rows((r) => `${nm(r)}\t\t${counts(r)}`),
    understood: { columnCount: 3, axisColumn: 1, signalColumn: 3 },
  },
];

const whole = read(plain);

describe('the plain file', () => {
  test('gives every number as it is written', () => {
    expect([...whole.wavelengthNm]).toEqual(ROWS.map((row) => Number(nm(row))));
    expect([...whole.signal]).toEqual(ROWS.map((row) => Number(counts(row))));
  });

  test('is understood and says that air was assumed', () => {
    expect(whole.understood).toEqual({
      encoding: 'utf-8',
      delimiter: 'comma',
      decimalMark: 'point',
      headerLineCount: 1,
      columnCount: 2,
      axisColumn: 1,
      signalColumn: 2,
      axisUnit: 'nm',
      axisUnitFrom: 'header',
      order: 'ascending',
      skippedRowCount: 0,
    });
    expect(whole.medium).toBe('air');
    expect(notesOf(whole)).toEqual(['medium-assumed']);
  });
});

describe('the same recording in another layout', () => {
  test.each(layouts)('$what', ({ content, understood }) => {
    const other = read(content);
    expect(other.understood).toMatchObject(understood);
    expect(other.wavelengthNm.length).toBe(ROWS.length);
    for (let i = 0; i < ROWS.length; i += 1) {
      expect(Math.abs(other.wavelengthNm[i]! - whole.wavelengthNm[i]!)).toBeLessThan(1e-9);
    }
    expect([...other.signal]).toEqual([...whole.signal]);
  });
});

describe('units and medium', () => {
  const pairs = (values: readonly number[]): string =>
    values.map((value, i) => `${String(value)},${String(100 + i)}`).join('\n');
  const steps = (first: number, step: number): number[] =>
    Array.from({ length: 40 }, (_, i) => first + i * step);

  test('wavenumbers become vacuum wavelengths in ascending order', () => {
    const recording = read(`Wavenumber (cm-1),Counts\n${pairs(steps(15_000, 100))}`);
    expect(recording.understood).toMatchObject({
      axisUnit: 'cm-1',
      axisUnitFrom: 'header',
      order: 'ascending',
    });
    expect(recording.medium).toBe('vacuum');
    expect(recording.wavelengthNm[39]).toBe(1e7 / 15_000);
    expect(recording.signal[39]).toBe(100);
    expect(notesOf(recording)).toContain('medium-vacuum');
  });

  test('wavenumbers stay in the medium that the bench file names', () => {
    expect(read(`cm^-1,Counts\n${pairs(steps(15_000, 100))}`, { axis: { medium: 'air' } }).medium).toBe(
      'air',
    );
  });

  test.each([
    { what: 'nm', first: 370, step: 8, unit: 'nm' },
    { what: 'um', first: 0.2, step: 0.02, unit: 'um' },
    { what: 'angstrom', first: 3700, step: 80, unit: 'angstrom' },
    { what: 'cm-1', first: 14_000, step: 300, unit: 'cm-1' },
  ])('the range alone shows $what', ({ first, step, unit }) => {
    const recording = read(pairs(steps(first, step).map((value) => Number(value.toFixed(3)))));
    expect(recording.understood).toMatchObject({ axisUnit: unit, axisUnitFrom: 'range' });
    expect(notesOf(recording)).not.toContain('unit-ambiguous');
  });

  test('a range that two units would explain is said to be ambiguous', () => {
    const recording = read(pairs(steps(9000, 70)));
    expect(recording.understood.axisUnit).toBe('angstrom');
    expect(notesOf(recording)).toContain('unit-ambiguous');
  });

  test('the bench file goes before header and range', () => {
    const recording = read(`Wavelength (nm),Counts\n${pairs(steps(9000, 70))}`, { axis: { unit: 'cm-1' } });
    expect(recording.understood).toMatchObject({ axisUnit: 'cm-1', axisUnitFrom: 'bench' });
    expect(recording.wavelengthNm[0]).toBe(1e7 / (9000 + 39 * 70));
  });

  test.each([
    ['Wavelength (nm)', 'nm'],
    ['wavelength_nm', 'nm'],
    ['Wavelength/nm', 'nm'],
    ['nm', 'nm'],
    ['Wavelength [Å]', 'angstrom'],
    ['wave_A', 'angstrom'],
    ['Lambda (A)', 'angstrom'],
    ['Angstroms', 'angstrom'],
    ['Ångström', 'angstrom'],
  ])('the header "%s" means %s', (header, unit) => {
    const values = unit === 'nm' ? steps(370, 8) : steps(3700, 80);
    expect(read(`${header},Counts\n${pairs(values)}`).understood).toMatchObject({
      axisUnit: unit,
      axisUnitFrom: 'header',
    });
  });

  test.each(['Wavelength (µm)', 'Lambda um', 'Wavelength (microns)', 'micrometres'])(
    'the header "%s" means um',
    (header) => {
      const values = steps(37, 1).map((value) => value / 100);
      expect(read(`${header},Counts\n${pairs(values)}`).understood).toMatchObject({
        axisUnit: 'um',
        axisUnitFrom: 'header',
      });
    },
  );

  test.each(['Wavenumber', 'cm-1', 'Wavenumber (cm^-1)', '1/cm', 'cm⁻¹'])(
    'the header "%s" means cm-1',
    (header) => {
      expect(read(`${header},Counts\n${pairs(steps(14_000, 300))}`).understood).toMatchObject({
        axisUnit: 'cm-1',
        axisUnitFrom: 'header',
      });
    },
  );

  test('a header that says vacuum is believed, the bench file before it', () => {
    const text = `Vacuum wavelength (nm),Counts\n${pairs(steps(370, 8))}`;
    expect(read(text).medium).toBe('vacuum');
    expect(read(text, { axis: { medium: 'air' } }).medium).toBe('air');
  });
});

describe('pixel axes', () => {
  const bench: Bench = { axis: { coefficientsNm: [380, 0.5, 0.0001], medium: 'air' } };
  const signal = Array.from({ length: 30 }, (_, i) => 40 + ((i * 16) % 11));
  const expected = signal.map((_, i) => 380 + 0.5 * i + 0.0001 * i * i);

  test('a file with signal only takes the coefficients of the bench file', () => {
    const recording = read(`counts\n${signal.join('\n')}\n`, bench);
    expect(recording.understood).toMatchObject({
      axisColumn: null,
      signalColumn: 1,
      axisUnit: 'pixel',
      axisUnitFrom: 'bench',
    });
    expect(notesOf(recording)).toEqual(['pixel-axis']);
    for (const [i, nmValue] of expected.entries()) expect(recording.wavelengthNm[i]).toBeCloseTo(nmValue, 10);
    expect([...recording.signal]).toEqual(signal);
  });

  test('signal only with decimal commas', () => {
    const recording = read(signal.map((value) => `${String(value)},5`).join('\r\n'), bench);
    expect(recording.understood).toMatchObject({ columnCount: 1, decimalMark: 'comma' });
    expect([...recording.signal]).toEqual(signal.map((value) => value + 0.5));
  });

  test.each([0, 1])('a column that counts from %i is a pixel number', (from) => {
    const recording = read(
      `\ufeff${signal.map((value, i) => `${String(i + from)};${String(value)}`).join('\n')}`,
      bench,
    );
    expect(recording.understood).toMatchObject({ axisColumn: 1, axisUnit: 'pixel' });
    expect(recording.wavelengthNm[0]).toBe(380);
    expect(recording.wavelengthNm[29]).toBeCloseTo(expected[29]!, 10);
  });

  test('coefficients that fall give an ascending recording', () => {
    const recording = read(signal.join('\n'), { axis: { coefficientsNm: [700, -1] } });
    expect(recording.wavelengthNm[0]).toBe(671);
    expect(recording.signal[0]).toBe(signal[29]);
  });

  test('whole nanometres are wavelengths, not pixel numbers', () => {
    const recording = read(signal.map((value, i) => `${String(i + 380)},${String(value)}`).join('\n'), bench);
    expect(recording.understood).toMatchObject({ axisUnit: 'nm', axisUnitFrom: 'range' });
    expect(recording.wavelengthNm[0]).toBe(380);
  });
});

describe('which column is the signal', () => {
  const table = (header: string): string =>
    `${header}\n${Array.from({ length: 20 }, (_, i) => `${String(400 + i)},${String(7 + (i % 3))},${String(100 + i)},${String(1000 - i)}`).join('\n')}`;

  test('the first that follows, where no header tells', () => {
    const recording = read(table('a,b,c,d').split('\n').slice(1).join('\n'));
    expect(recording.understood).toMatchObject({ axisColumn: 1, signalColumn: 2 });
    expect(notesOf(recording)).toContain('columns-ignored');
  });

  test.each([
    ['wavelength (nm),dark,reference,intensity', 4],
    ['wavelength (nm),dark,sample,scope', 3],
    ['wavelength (nm),error,counts,counts 2', 3],
    ['wavelength (nm),background,x,y', 3],
  ])('"%s": column %i', (header, column) => {
    expect(read(table(header)).understood.signalColumn).toBe(column);
  });

  test('a dark is taken from the dark column', () => {
    expect(read(table('wavelength (nm),dark,sample,intensity'), {}, 'dark').understood.signalColumn).toBe(2);
  });
});

test('a decimal comma that shows only far down is still understood', () => {
  const rowsOfWholes = Array.from({ length: 100 }, (_, i) => `${String(400 + i)};${String(50 + i)}`);
  const recording = read([...rowsOfWholes, '500,5;12,25'].join('\n'));
  expect(recording.understood.decimalMark).toBe('comma');
  expect(recording.wavelengthNm[100]).toBe(500.5);
  expect(recording.signal[100]).toBe(12.25);
});

test('a half-written last row without a line break is left out and said so', () => {
  for (const end of ['700', '700.', '700.1,', '700.1,-', '700.1,1.2e']) {
    const recording = read(`${plain}${end}`);
    expect(recording.wavelengthNm.length).toBe(ROWS.length);
    expect(recording.understood.skippedRowCount).toBe(1);
    expect(notesOf(recording)).toContain('last-row-cut');
  }
});

test('a whole last row without a line break is kept', () => {
  const recording = read(`${plain}710.5,12`);
  expect(recording.wavelengthNm.at(-1)).toBe(710.5);
  expect(recording.signal.at(-1)).toBe(12);
  expect(notesOf(recording)).not.toContain('last-row-cut');
});
