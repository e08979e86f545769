import type { Understood } from './recording.ts';

export type Delimiter = Understood['delimiter'];
export type DecimalMark = Understood['decimalMark'];

export interface Cell {
  readonly text: string;
  readonly isQuoted: boolean;
}

const SEPARATOR = { comma: ',', semicolon: ';', tab: '\t', blanks: ' ' } as const;

/** Cells of one line, trimmed; a quoted cell may hold the delimiter. An empty last cell is kept. */
export function splitRow(line: string, delimiter: Delimiter): readonly Cell[] {
  const separator = SEPARATOR[delimiter];
  const byBlanks = delimiter === 'blanks';
  const source = byBlanks ? line.trim().replaceAll('\t', ' ') : line;
  if (!source.includes('"')) {
    const texts = source.split(separator).map((text) => text.trim());
    return (byBlanks ? texts.filter((text) => text !== '') : texts).map((text) => ({
      text,
      isQuoted: false,
    }));
  }
  const cells: Cell[] = [];
  let text = '';
  let isQuoted = false;
  let inside = false;
  const push = (): void => {
    const trimmed = text.trim();
    if (!byBlanks || trimmed !== '' || isQuoted) cells.push({ text: trimmed, isQuoted });
    text = '';
    isQuoted = false;
  };
  for (const character of source) {
    if (character === '"') {
      inside = !inside;
      isQuoted = true;
    } else if (character === separator && !inside) push();
    else text += character;
  }
  push();
  return cells;
}

/** Cells of one line of a table whose comma may be both: then a comma between two digits is a decimal mark. */
export function splitDataRow(line: string, delimiter: Delimiter, decimalMark: DecimalMark): readonly Cell[] {
  if (delimiter !== 'comma' || decimalMark !== 'comma') return splitRow(line, delimiter);
  const joined = line.replace(/(\d),(\d+)(?=$|[^\d])/g, '$1.$2');
  return splitRow(joined, delimiter).map((cell) => ({ ...cell, text: cell.text.replace('.', ',') }));
}

const PLAIN_NUMBER = /^[+-]?(?:\d+(?:\.\d*)?|\.\d+)(?:[eEdD][+-]?\d+)?$/;

/** The number a cell holds, or null; infinities and "NaN" are not numbers here. */
export function cellNumber(text: string, decimalMark: DecimalMark): number | null {
  if (decimalMark === 'comma' && text.includes('.')) return null;
  const plain = decimalMark === 'comma' ? text.replace(',', '.') : text;
  if (!PLAIN_NUMBER.test(plain)) return null;
  const value = Number(plain.replace(/[dD]/, 'e'));
  return Number.isFinite(value) ? value : null;
}
