const plainDigit: Readonly<Record<string, string>> = {
  '⁻': '−',
  '⁰': '0',
  '¹': '1',
  '²': '2',
  '³': '3',
  '⁴': '4',
  '⁵': '5',
  '⁶': '6',
  '⁷': '7',
  '⁸': '8',
  '⁹': '9',
};

/** A written number with its exponents raised and its thin spaces just wide enough to be seen. */
export function Quantity({ text }: { readonly text: string }) {
  return <span className="quantity">{quantityParts(text).map(renderPart)}</span>;
}

function renderPart(part: QuantityPart, index: number) {
  if (part.kind === 'raised') return <sup key={index}>{part.text}</sup>;
  if (part.kind === 'gap') {
    return (
      <span key={index} className="thin-gap">
        {part.text}
      </span>
    );
  }
  return part.text;
}

export interface QuantityPart {
  readonly kind: 'plain' | 'raised' | 'gap';
  readonly text: string;
}

/** Takes a written number apart: "10²⁰ m⁻³" is "10", raised "20", " m", raised "−3". The face has few raised digits. */
export function quantityParts(text: string): readonly QuantityPart[] {
  return text
    .split(/([⁻⁰¹²³⁴⁵⁶⁷⁸⁹]+|\u202f)/u)
    .filter((part) => part !== '')
    .map((part): QuantityPart => {
      if (part === '\u202f') return { kind: 'gap', text: part };
      if (!/^[⁻⁰¹²³⁴⁵⁶⁷⁸⁹]/u.test(part)) return { kind: 'plain', text: part };
      return { kind: 'raised', text: [...part].map((mark) => plainDigit[mark] ?? mark).join('') };
    });
}
