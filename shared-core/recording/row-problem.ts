import type { Problem } from '../result/result.ts';
import type { ColumnChoice } from './choose-columns.ts';
import type { Layout } from './sniff-layout.ts';
import { cellNumber, splitDataRow, type Delimiter } from './split-row.ts';

const BETWEEN: Record<Delimiter, string> = {
  comma: 'commas',
  semicolon: 'semicolons',
  tab: 'tabs',
  blanks: 'blanks',
};

/** What is wrong with a line that should be a data row, in facts. */
export function rowProblem(
  line: string,
  layout: Layout,
  choice: ColumnChoice,
): Pick<Problem, 'code' | 'expected' | 'found' | 'remedy'> {
  const { columnCount, delimiter, decimalMark } = layout;
  const cells = splitDataRow(line, delimiter, decimalMark);
  const isEndedByDelimiter = cells.length === columnCount + 1 && cells[columnCount]!.text === '';
  if (cells.length !== columnCount && !isEndedByDelimiter) {
    return {
      code: 'table.column-count',
      expected:
        columnCount === 1
          ? 'one number'
          : `${String(columnCount)} columns between ${BETWEEN[delimiter]} as in the rows above`,
      found: `${String(cells.length)} in ${excerpt(line)}`,
      remedy: 'Complete or remove that line, or export the file again.',
    };
  }
  for (const index of [choice.axisIndex, choice.signalIndex, choice.uncertaintyIndex]) {
    if (index < 0) continue;
    const { text } = cells[index]!;
    if (cellNumber(text, decimalMark) !== null) continue;
    return {
      code: 'table.not-finite',
      expected: `a number in column ${String(index + 1)}`,
      found: text === '' ? 'an empty cell' : excerpt(text),
      remedy: /^[+-]?\d{1,3}([.,' ]\d{3})+([.,]\d*)?$/.test(text)
        ? 'Export the file again without marks between thousands.'
        : 'Remove that line or export the file again.',
    };
  }
  return {
    code: 'table.not-finite',
    expected: 'a row of numbers as in the rows above',
    found: excerpt(line),
    remedy: 'Remove that line or export the file again.',
  };
}

/** A short quotation of what stands in the file, safe to print. */
export function excerpt(text: string): string {
  let clean = '';
  for (const character of text.trim()) clean += character < ' ' || character === '\u007f' ? ' ' : character;
  return `"${clean.length > 40 ? `${clean.slice(0, 40)}…` : clean}"`;
}
