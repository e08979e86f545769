import { element, escapeMarkup } from './svg.ts';

/** Plain text as HTML content. */
export const text = escapeMarkup;

/** A section with a heading; left out altogether when it has nothing to say. */
export function section(id: string, heading: string, ...content: readonly string[]): string {
  const inner = content.join('');
  if (inner === '') return '';
  return `${element('section', { class: id, 'aria-labelledby': id }, element('h2', { id }, text(heading)), inner)}\n`;
}

export function paragraph(content: string, className?: string): string {
  return content === ''
    ? ''
    : element('p', className === undefined ? {} : { class: className }, text(content));
}

/** Pairs of name and value; values are markup already, pairs without a value are left out. */
export function factList(
  facts: readonly (readonly [name: string, markup: string | null])[],
  className = '',
): string {
  const rows = facts
    .filter(([, markup]) => markup !== null)
    .map(([name, markup]) => `<dt>${text(name)}</dt><dd>${markup ?? ''}</dd>`);
  return element('dl', { class: `facts ${className}`.trim() }, ...rows);
}

export interface Column<Row> {
  readonly heading: string;
  /** Markup of the cell. */
  readonly cell: (row: Row) => string;
  readonly className?: string;
}

/** A table whose first column names the row. */
export function table<Row>(
  rows: readonly Row[],
  columns: readonly Column<Row>[],
  options: { readonly caption: string; readonly rowClass?: (row: Row) => string },
): string {
  const attributesOf = ({ className }: Column<Row>) =>
    className === undefined ? '' : ` class="${text(className)}"`;
  const head = columns.map((column) => `<th scope="col"${attributesOf(column)}>${text(column.heading)}</th>`);
  const body = rows.map((row) => {
    const rowClass = options.rowClass?.(row) ?? '';
    const cells = columns.map((column, index) =>
      index === 0
        ? `<th scope="row"${attributesOf(column)}>${column.cell(row)}</th>`
        : `<td${attributesOf(column)}>${column.cell(row)}</td>`,
    );
    return `<tr${rowClass === '' ? '' : ` class="${text(rowClass)}"`}>${cells.join('')}</tr>`;
  });
  return `<table><caption>${text(options.caption)}</caption><thead><tr>${head.join('')}</tr></thead><tbody>${body.join('')}</tbody></table>`;
}
