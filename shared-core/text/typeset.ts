const superscripts = '⁰¹²³⁴⁵⁶⁷⁸⁹';

const raised = (digits: string): string =>
  digits.replace(/\d/g, (digit) => superscripts[Number(digit)]!).replace('-', '⁻');

/**
 * A sentence of the diagnosis, whose numbers are plain text, as a page shows them: "6.3e+18 per m^3" becomes
 * "6.3 × 10¹⁸ per m³", and a minus before a digit gets its own sign.
 * @check test/unit/text/typeset.test.ts
 */
export function typeset(text: string): string {
  return text
    .replace(
      /(\d)e([+-]?)(\d+)/g,
      (_, digit: string, sign: string, power: string) =>
        `${digit}\u202f×\u202f10${raised((sign === '-' ? '-' : '') + power)}`,
    )
    .replace(/\bm\^(-?\d)/g, (_, power: string) => `m${raised(power)}`)
    .replace(/(^|[\s(])-(\d)/g, '$1−$2');
}
