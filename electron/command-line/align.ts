/** Columns of text side by side, two blanks apart; numbers stand to the right. Lines end without blanks. */
export function alignColumns(
  rows: readonly (readonly string[])[],
  sides: readonly ('left' | 'right')[],
): string[] {
  const widths = sides.map((_, column) => Math.max(0, ...rows.map((row) => lengthOf(row[column] ?? ''))));
  return rows.map((row) =>
    sides
      .map((side, column) => {
        const cell = row[column] ?? '';
        const gap = ' '.repeat((widths[column] ?? 0) - lengthOf(cell));
        return side === 'left' ? cell + gap : gap + cell;
      })
      .join('  ')
      .trimEnd(),
  );
}

/** Characters as people count them, so that a name with accents does not shift its row. */
const lengthOf = (text: string): number => [...text.normalize('NFC')].length;
