import { describe, expect, test } from 'vitest';
import { readLineTable } from '../../../shared-core/identify/read-line-table.ts';
import { hydrogenLine } from '../../../shared-core/physics/hydrogen.ts';
import { shippedLineTable, shippedLineTableText } from '../../support/line-table.ts';

const head = shippedLineTableText.split('\n')[0] ?? '';
const row = 'Hg,I,435.8335,5.6e+07,7.73046,3,1,line,,both,"mercury vapour (pump, lamp)",a source';

describe('a line table', () => {
  test('gives each cell its meaning; quoted cells may hold commas', () => {
    const table = readLineTable(`${head}\r\n${row}\r\n\r\n`);
    expect(table.ok ? table.value : []).toEqual([
      {
        species: 'Hg',
        ionStage: 'I',
        wavelengthAirNm: 435.8335,
        transitionProbabilityPerS: 5.6e7,
        upperEnergyEv: 7.73046,
        upperWeight: 3,
        relativeStrength: 1,
        kind: 'line',
        transition: '',
        use: 'both',
        meaning: 'mercury vapour (pump, lamp)',
        source: 'a source',
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
    ['a short row', `${head}\n${row}\nHg,I,546.075`, 3, '12 cells'],
    ['a wavelength that is no number', `${head}\n${row.replace('435.8335', 'blue')}`, 2, 'a wavelength'],
    ['an unknown kind', `${head}\n${row.replace(',line,', ',edge,')}`, 2, 'a kind'],
    ['an unknown use', `${head}\n${row.replace(',both,', ',none,')}`, 2, 'a use'],
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
    // Nothing is known of their relative strength; they count as equals.
    expect([...new Set(unranked.map(({ species }) => species))].sort()).toEqual(['H2']);
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
