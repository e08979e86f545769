/** JSON with the line of every field, so that a problem can name the line a person has to look at. */
export interface ParsedJson {
  readonly value: unknown;
  /** 1-based line of the field or entry at a path; the nearest one above where the path itself is not there. */
  readonly lineOf: (path: readonly PropertyKey[]) => number;
}

export interface JsonFault {
  readonly lineNumber: number;
  readonly kind: 'syntax' | 'duplicate';
  readonly expected: string;
  readonly found: string;
  readonly remedy: string;
}

export type JsonResult =
  { readonly ok: true; readonly value: ParsedJson } | { readonly ok: false; readonly fault: JsonFault };

/** Far deeper than any file of ours; keeps a hostile one from exhausting the stack. */
const DEEPEST = 64;

interface Cursor {
  readonly text: string;
  at: number;
  fault: JsonFault | null;
  readonly lines: Map<string, number>;
  countedTo: number;
  countedLine: number;
}

/** Strict JSON (RFC 8259) that also refuses a field given twice. */
export function parseJson(text: string): JsonResult {
  const cursor: Cursor = { text, at: 0, fault: null, lines: new Map(), countedTo: 0, countedLine: 1 };
  skipBlanks(cursor);
  const value = readValue(cursor, []);
  if (cursor.fault === null) {
    skipBlanks(cursor);
    if (cursor.at < text.length) {
      stop(cursor, 'the end of the file', 'Remove what follows the last closing brace.');
    }
  }
  if (cursor.fault !== null) return { ok: false, fault: cursor.fault };
  const lineOf = (path: readonly PropertyKey[]): number => {
    for (let length = path.length; length > 0; length -= 1) {
      const line = cursor.lines.get(keyOf(path.slice(0, length)));
      if (line !== undefined) return line;
    }
    return 1;
  };
  return { ok: true, value: { value, lineOf } };
}

const keyOf = (path: readonly PropertyKey[]): string => JSON.stringify(path.map(String));

/** Counts on from the last place asked for, so that a long list costs one pass over the text. */
function lineAt(cursor: Cursor, at: number): number {
  const { text } = cursor;
  if (at < cursor.countedTo) {
    cursor.countedTo = 0;
    cursor.countedLine = 1;
  }
  for (; cursor.countedTo < at; cursor.countedTo += 1) {
    const character = text[cursor.countedTo];
    if (character === '\n' || (character === '\r' && text[cursor.countedTo + 1] !== '\n'))
      cursor.countedLine += 1;
  }
  return cursor.countedLine;
}

function stop(cursor: Cursor, expected: string, remedy: string, at = cursor.at): undefined {
  const rest = cursor.text.slice(at, at + 80);
  cursor.fault ??= {
    kind: 'syntax',
    lineNumber: lineAt(cursor, at),
    expected,
    found: rest === '' ? 'the end of the file' : describe(rest),
    remedy:
      rest === ''
        ? 'Close every brace, bracket and quote that was opened.'
        : isComment(rest)
          ? 'Remove the comment: JSON has none.'
          : remedy,
  };
  return undefined;
}

function describe(rest: string): string {
  if (isComment(rest)) return 'a comment';
  if (/^[\r\n]/.test(rest)) return 'the end of the line';
  const text = /^"[^"\r\n]{0,30}/.exec(rest)?.[0];
  if (text !== undefined) return `${text}"`;
  return `"${/^[^\s,:{}[\]"]{1,20}/.exec(rest)?.[0] ?? rest.slice(0, 1)}"`;
}

const isComment = (rest: string): boolean => rest.startsWith('//') || rest.startsWith('/*');

function skipBlanks(cursor: Cursor): void {
  const { text } = cursor;
  while (cursor.at < text.length && ' \t\r\n'.includes(text[cursor.at]!)) cursor.at += 1;
}

function readValue(cursor: Cursor, path: readonly PropertyKey[]): unknown {
  const { text } = cursor;
  const first = text[cursor.at];
  if (path.length > DEEPEST)
    return stop(
      cursor,
      `at most ${String(DEEPEST)} brackets one inside another`,
      'Use the fields the manual lists.',
    );
  if (first === '{') return readObject(cursor, path);
  if (first === '[') return readList(cursor, path);
  if (first === '"') return readString(cursor);
  const word = /^(?:true|false|null|-?(?:0|[1-9]\d*)(?:\.\d+)?(?:[eE][+-]?\d+)?)(?![\w.+-])/.exec(
    text.slice(cursor.at, cursor.at + 400),
  )?.[0];
  if (word === undefined) {
    return stop(cursor, 'a value', 'Write text in double quotes and numbers plainly, with a decimal point.');
  }
  cursor.at += word.length;
  return word === 'true' ? true : word === 'false' ? false : word === 'null' ? null : Number(word);
}

function readObject(cursor: Cursor, path: readonly PropertyKey[]): unknown {
  const { text, lines } = cursor;
  const entries: [string, unknown][] = [];
  const seenAt = new Map<string, number>();
  cursor.at += 1;
  skipBlanks(cursor);
  if (text[cursor.at] === '}') {
    cursor.at += 1;
    return {};
  }
  for (;;) {
    skipBlanks(cursor);
    const keyAt = cursor.at;
    if (text[cursor.at] !== '"') {
      const isAfterComma = entries.length > 0 && text[cursor.at] === '}';
      return stop(
        cursor,
        isAfterComma ? 'another field after the comma' : 'a field name in double quotes',
        isAfterComma
          ? 'Remove the comma after the last field.'
          : /\d/.test(text[cursor.at] ?? '')
            ? 'Write decimals with a point.'
            : 'Write each field as "name": value.',
      );
    }
    const key = readString(cursor);
    if (key === undefined) return undefined;
    const lineNumber = lineAt(cursor, keyAt);
    const earlier = seenAt.get(key);
    if (earlier !== undefined) {
      cursor.fault ??= {
        kind: 'duplicate',
        lineNumber,
        expected: 'each field once',
        found: `"${[...path, key].map(String).join('.')}" again after line ${String(earlier)}`,
        remedy: 'Keep one of the two.',
      };
      return undefined;
    }
    seenAt.set(key, lineNumber);
    const inner = [...path, key];
    lines.set(keyOf(inner), lineNumber);
    skipBlanks(cursor);
    if (text[cursor.at] !== ':') {
      return stop(cursor, `a colon after "${key}"`, 'Write each field as "name": value.');
    }
    cursor.at += 1;
    skipBlanks(cursor);
    const value = readValue(cursor, inner);
    if (cursor.fault !== null) return undefined;
    entries.push([key, value]);
    skipBlanks(cursor);
    const next = text[cursor.at];
    if (next === '}') {
      cursor.at += 1;
      // fromEntries makes own properties, so that a field named "__proto__" is only an unknown field.
      return Object.fromEntries(entries);
    }
    if (next !== ',') {
      return stop(cursor, `a comma or a closing brace after "${key}"`, 'Put a comma between two fields.');
    }
    cursor.at += 1;
  }
}

function readList(cursor: Cursor, path: readonly PropertyKey[]): unknown {
  const { text, lines } = cursor;
  const values: unknown[] = [];
  cursor.at += 1;
  skipBlanks(cursor);
  if (text[cursor.at] === ']') {
    cursor.at += 1;
    return values;
  }
  for (;;) {
    skipBlanks(cursor);
    if (values.length > 0 && text[cursor.at] === ']') {
      return stop(cursor, 'another entry after the comma', 'Remove the comma after the last entry.');
    }
    const inner = [...path, values.length];
    lines.set(keyOf(inner), lineAt(cursor, cursor.at));
    const value = readValue(cursor, inner);
    if (cursor.fault !== null) return undefined;
    values.push(value);
    skipBlanks(cursor);
    const next = text[cursor.at];
    if (next === ']') {
      cursor.at += 1;
      return values;
    }
    if (next !== ',') {
      return stop(cursor, 'a comma or a closing bracket', 'Put a comma between two entries.');
    }
    cursor.at += 1;
  }
}

function readString(cursor: Cursor): string | undefined {
  const { text } = cursor;
  const from = cursor.at;
  let at = from + 1;
  while (at < text.length && text[at] !== '"') {
    if (text[at]! < ' ')
      return stop(cursor, 'a closing double quote', 'Close the text on the line where it starts.', at);
    at += text[at] === '\\' ? 2 : 1;
  }
  if (at >= text.length)
    return stop(cursor, 'a closing double quote', 'Close the text on the line where it starts.', text.length);
  cursor.at = at + 1;
  try {
    return JSON.parse(text.slice(from, at + 1)) as string;
  } catch {
    return stop(
      cursor,
      'text without unknown escapes',
      'Write a backslash in a path twice, or use forward slashes.',
      from,
    );
  }
}
