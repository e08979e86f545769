/**
 * A strict reader of markup for tests, sharing nothing with the writer: every tag closed in order, every attribute
 * quoted and named once, no bare ampersand or angle bracket, ids unique, and every label id present.
 */
export interface MarkupElement {
  readonly name: string;
  readonly attributes: ReadonlyMap<string, string>;
  readonly children: (MarkupElement | string)[];
}

/** HTML elements that stand without an end tag. */
const voidElements = new Set(['meta', 'br']);
const token =
  /<!doctype html>|<style>([\s\S]*?)<\/style>|<(\/?)([a-zA-Z][\w-]*)((?:\s[^<>]*?)?)(\/?)>|([^<]+)|(<)/g;
const attribute = /\s+([a-zA-Z_][\w:.-]*)="([^"<]*)"/g;

export function readMarkup(markup: string): MarkupElement {
  const root: MarkupElement = { name: '#root', attributes: new Map(), children: [] };
  const open: MarkupElement[] = [root];
  for (const match of markup.matchAll(token)) {
    const [whole, style, closing, name, attributes = '', selfClosing, content, stray] = match;
    const parent = open.at(-1) ?? root;
    if (stray !== undefined)
      throw new Error(`bare "<" before ${markup.slice(match.index, match.index + 40)}`);
    if (whole.toLowerCase() === '<!doctype html>') continue;
    if (style !== undefined) {
      parent.children.push({ name: 'style', attributes: new Map(), children: [style] });
    } else if (content !== undefined) {
      parent.children.push(decode(content));
    } else if (closing === '/') {
      if (parent.name !== name) throw new Error(`</${name ?? ''}> closes <${parent.name}>`);
      open.pop();
    } else {
      const element = { name: name ?? '', attributes: readAttributes(attributes), children: [] };
      parent.children.push(element);
      if (selfClosing !== '/' && !voidElements.has(element.name)) open.push(element);
    }
  }
  if (open.length !== 1) throw new Error(`<${open.at(-1)?.name ?? ''}> is never closed`);
  checkIds(root);
  return root;
}

/** All elements below and including one, in document order. */
export function* elementsOf(element: MarkupElement): Generator<MarkupElement> {
  yield element;
  for (const child of element.children) if (typeof child !== 'string') yield* elementsOf(child);
}

/** The text a reader sees, without styles; blocks and cells are kept apart by a blank. */
export function visibleText(element: MarkupElement): string {
  if (element.name === 'style') return '';
  return element.children
    .map((child) => (typeof child === 'string' ? child : ` ${visibleText(child)} `))
    .join('');
}

function readAttributes(source: string): Map<string, string> {
  const found = new Map<string, string>();
  const rest = source.replace(attribute, (_, name: string, value: string) => {
    if (found.has(name)) throw new Error(`attribute ${name} stands twice`);
    found.set(name, decode(value));
    return '';
  });
  if (rest.trim() !== '') throw new Error(`cannot read the attributes "${source}"`);
  return found;
}

function decode(source: string): string {
  if (/&(?!(amp|lt|gt|quot|#39);)/.test(source)) throw new Error(`bare "&" in "${source.slice(0, 60)}"`);
  if (/[\u0000-\u0008\u000b\u000c\u000e-\u001f\ufffe\uffff]/.test(source))
    throw new Error('forbidden character');
  return source
    .replaceAll('&lt;', '<')
    .replaceAll('&gt;', '>')
    .replaceAll('&quot;', '"')
    .replaceAll('&#39;', "'")
    .replaceAll('&amp;', '&');
}

function checkIds(root: MarkupElement): void {
  const ids = new Set<string>();
  const wanted: string[] = [];
  for (const { attributes } of elementsOf(root)) {
    const id = attributes.get('id');
    if (id !== undefined && ids.has(id)) throw new Error(`id "${id}" stands twice`);
    if (id !== undefined) ids.add(id);
    wanted.push(...(attributes.get('aria-labelledby')?.split(' ') ?? []));
  }
  for (const id of wanted) if (!ids.has(id)) throw new Error(`no element has the id "${id}"`);
}
