/** Columns that fit any terminal and a printed page. */
const widestLine = 110;

/** Breaks a line between words; what follows is set in by `indent` blanks. A word longer than a line stays whole. */
export function wrapLine(line: string, indent: number): string[] {
  const lines: string[] = [];
  let rest = line;
  while (rest.length > widestLine) {
    const at = rest.lastIndexOf(' ', widestLine);
    if (at <= indent) break;
    lines.push(rest.slice(0, at).trimEnd());
    rest = ' '.repeat(indent) + rest.slice(at + 1);
  }
  return [...lines, rest];
}
