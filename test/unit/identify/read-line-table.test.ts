import { describe, expect, test } from 'vitest';
import { readLineTable } from '../../../shared-core/identify/read-line-table.ts';
import { vacuumToAirNm } from '../../../shared-core/physics/air-index.ts';
import { photonEnergyEvNm } from '../../../shared-core/physics/constants.ts';
import { hydrogenLine } from '../../../shared-core/physics/hydrogen.ts';
import { shippedLineTable, shippedLineTableText } from '../../support/line-table.ts';

const head = shippedLineTableText.split('\n')[0] ?? '';
const row =
  'Hg,I,435.8335,0.005,5.6e+07,7.73046,3,4.88649,1,line,,,both,"mercury vapour (pump, lamp)",a source,level-checked';

describe('a line table', () => {
  test('gives each cell its meaning; quoted cells may hold commas', () => {
    const table = readLineTable(`${head}\r\n${row}\r\n\r\n`);
    expect(table.ok ? table.value : []).toEqual([
      {
        species: 'Hg',
        ionStage: 'I',
        wavelengthAirNm: 435.8335,
        wavelengthToleranceNm: 0.005,
        transitionProbabilityPerS: 5.6e7,
        upperEnergyEv: 7.73046,
        upperWeight: 3,
        lowerEnergyEv: 4.88649,
        relativeStrength: 1,
        kind: 'line',
        shading: null,
        transition: '',
        use: 'both',
        meaning: 'mercury vapour (pump, lamp)',
        source: 'a source',
        verified: 'level-checked',
      },
    ]);
  });

  test('finds its columns by name, in any order', () => {
    const turned = (line: string): string => line.split(',').reverse().join(',');
    const plain = row.replace('"mercury vapour (pump, lamp)"', 'mercury vapour');
    const straight = readLineTable(`${head}\n${plain}`);
    expect(readLineTable(`${turned(head)}\n${turned(plain)}`)).toEqual(straight);
    expect(straight.ok).toBe(true);
  });

  test.each([
    ['a missing column', `${head.replace('kind,', '')}\n${row}`, 1, 'a column "kind"'],
    ['a short row', `${head}\n${row}\nHg,I,546.075`, 3, '16 cells'],
    ['a wavelength that is no number', `${head}\n${row.replace('435.8335', 'blue')}`, 2, 'a wavelength'],
    ['an unknown kind', `${head}\n${row.replace(',line,', ',edge,')}`, 2, 'a kind'],
    ['an unknown use', `${head}\n${row.replace(',both,', ',none,')}`, 2, 'a use'],
    [
      'an unknown verification',
      `${head}\n${row.replace('level-checked', 'trust me')}`,
      2,
      'how it was verified',
    ],
    ['a band without its shading', `${head}\n${row.replace(',line,', ',bandhead,')}`, 2, 'a kind'],
    ['no rows', `${head}\n`, 2, 'at least one line'],
  ])('with %s is refused by line', (_what, text, lineNumber, expected) => {
    const table = readLineTable(text);
    expect(table.ok).toBe(false);
    if (table.ok) return;
    expect(table.problem.lineNumber).toBe(lineNumber);
    expect(table.problem.expected).toContain(expected);
  });
});

describe('the shipped table', () => {
  const table = shippedLineTable();

  test('names a source and a meaning on every row, in the order of wavelengths', () => {
    expect(table).toHaveLength(205);
    expect(table.filter(({ source, meaning }) => source === '' || meaning === '')).toEqual([]);
    const order = table.map(({ wavelengthAirNm }) => wavelengthAirNm);
    expect(order).toEqual([...order].sort((a, b) => a - b));
  });

  test('tells molecules by their transition and atoms by none', () => {
    for (const { ionStage, transition, kind } of table) {
      expect(ionStage === 'mol').toBe(transition !== '');
      if (kind === 'bandhead') expect(ionStage).toBe('mol');
    }
  });

  test('ranks the lines of every species by one measure or the other', () => {
    const unranked = table.filter(
      (line) =>
        line.relativeStrength === null &&
        (line.transitionProbabilityPerS === null || line.upperEnergyEv === null),
    );
    expect(unranked).toEqual([]);
  });

  test('says how far each wavelength was verified, and what is said to agree with its levels does', () => {
    const checked = table.filter(({ verified }) => verified === 'level-checked');
    expect(checked.length).toBeGreaterThan(80);
    for (const { wavelengthAirNm, upperEnergyEv, lowerEnergyEv } of checked) {
      const nm = vacuumToAirNm(photonEnergyEvNm / (upperEnergyEv! - lowerEnergyEv!));
      // Energies are tabulated to 1e-5 eV: 2 pm at 500 nm.
      expect(Math.abs(nm - wavelengthAirNm)).toBeLessThan(0.008);
    }
  });

  test('has deuterium where the program computes it', () => {
    for (const [level, tableNm] of [
      [3, 656.101],
      [4, 486.0003],
      [5, 433.9283],
    ] as const) {
      const row = table.find(
        ({ species, wavelengthAirNm }) => species === 'D' && wavelengthAirNm === tableNm,
      );
      expect(row?.wavelengthAirNm).toBeCloseTo(hydrogenLine(level, 'D').wavelengthAirNm, 4);
    }
  });
});
