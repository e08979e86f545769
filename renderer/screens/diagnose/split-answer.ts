/** A written answer taken apart for its sizes: the number large, its unit lighter, the interval small. */
export function splitAnswer(answer: string): {
  readonly value: string;
  readonly unit: string;
  readonly rest: string;
} {
  const [, body = answer, rest = ''] = /^(.*?)(?:\s\((.*)\))?$/u.exec(answer) ?? [];
  const [, value, unit] = /^(.*\S)\s(K|m⁻³)$/u.exec(body) ?? [];
  return { value: value ?? body, unit: unit ?? '', rest };
}
