/** Numbers inside sentences: `digits` significant figures, no exponent for ordinary sizes, real minus sign. */
export function plain(value: number, digits = 3): string {
  const rounded = Number(value.toPrecision(digits));
  const size = Math.abs(rounded);
  const text =
    size !== 0 && (size >= 1e6 || size < 1e-3) ? rounded.toExponential(digits - 1) : String(rounded);
  return text.replace('-', '\u2212');
}
