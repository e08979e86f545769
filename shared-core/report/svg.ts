/** Building blocks of SVG text: every name and text that goes in is escaped here and nowhere else. */

export type Attributes = Readonly<Record<string, string | number>>;

/** Text made safe for element content and quoted attributes; characters XML 1.0 forbids become U+FFFD. */
export function escapeMarkup(text: string): string {
  return text
    .replace(/[^\t\n\r\u{20}-\u{D7FF}\u{E000}-\u{FFFD}\u{10000}-\u{10FFFF}]/gu, '\uFFFD')
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;')
    .replaceAll("'", '&#39;');
}

/** One element; `children` are markup already. */
export function element(name: string, attributes: Attributes, ...children: readonly string[]): string {
  const written = Object.entries(attributes)
    .map(([key, value]) => ` ${key}="${typeof value === 'number' ? coordinate(value) : escapeMarkup(value)}"`)
    .join('');
  const content = children.join('');
  return content === '' ? `<${name}${written}/>` : `<${name}${written}>${content}</${name}>`;
}

/** A text element; `content` is plain text. */
export function textElement(content: string, attributes: Attributes): string {
  return element('text', attributes, escapeMarkup(content) || ' ');
}

/** A length in user units with at most two decimals; a hundredth of a pixel is finer than any printer. */
export function coordinate(length: number): string {
  const rounded = Math.round(length * 100) / 100;
  return String(rounded === 0 ? 0 : rounded);
}

/** "M1 2L3 4" through the points; positions that are not finite break the line. */
export function polyline(points: readonly (readonly [x: number, y: number])[]): string {
  let path = '';
  let isPenUp = true;
  for (const [x, y] of points) {
    if (!Number.isFinite(x) || !Number.isFinite(y)) {
      isPenUp = true;
      continue;
    }
    path += `${isPenUp ? 'M' : 'L'}${coordinate(x)} ${coordinate(y)}`;
    isPenUp = false;
  }
  return path;
}

/**
 * The root of a figure: a picture with a name and a description that a screen reader speaks.
 *
 * @param figure.id  letters, digits, hyphens; unique in the document that holds the figure
 */
export function figureRoot(
  figure: {
    readonly id: string;
    readonly width: number;
    readonly height: number;
    readonly title: string;
    readonly description: string;
  },
  body: readonly string[],
): string {
  const { id, width, height } = figure;
  return element(
    'svg',
    {
      xmlns: 'http://www.w3.org/2000/svg',
      viewBox: `0 0 ${coordinate(width)} ${coordinate(height)}`,
      width,
      height,
      role: 'img',
      'aria-labelledby': `${id}-title ${id}-description`,
      'font-family': "'DejaVu Sans', 'Segoe UI', 'Helvetica Neue', Arial, sans-serif",
      'font-size': 9.5,
    },
    element('title', { id: `${id}-title` }, escapeMarkup(figure.title)),
    element('desc', { id: `${id}-description` }, escapeMarkup(figure.description)),
    ...body,
  );
}

/** Makes an id of any name: letters, digits and hyphens stay, the rest becomes a hyphen. */
export function idFrom(...parts: readonly (string | number)[]): string {
  return parts.map((part) => String(part).replace(/[^A-Za-z0-9-]+/g, '-')).join('-');
}
