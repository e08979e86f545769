const superscript = /[⁻⁰¹²³⁴⁵⁶⁷⁸⁹]+/;
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

/** A written number with its exponents raised: the text face has no raised digits beyond three. */
export function Quantity({ text }: { readonly text: string }) {
  return (
    <>
      {raisedParts(text).map((part, index) =>
        // The parts of one text never change places.
        part.isRaised ? <sup key={index}>{part.text}</sup> : <span key={index}>{part.text}</span>,
      )}
    </>
  );
}

/** Splits a text into plain and raised parts: "10²⁰ m⁻³" is "10", raised "20", " m", raised "−3". */
export function raisedParts(text: string): readonly { readonly text: string; readonly isRaised: boolean }[] {
  return text
    .split(new RegExp(`(${superscript.source})`, 'u'))
    .filter((part) => part !== '')
    .map((part) => {
      const isRaised = superscript.test(part);
      return { isRaised, text: isRaised ? [...part].map((mark) => plainDigit[mark] ?? mark).join('') : part };
    });
}
