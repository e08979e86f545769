import { describe, expect, it, test } from 'vitest';
import {
  formatAtPlace,
  formatExact,
  formatInterval,
  formatPercent,
  formatSignificant,
  formatWithSigma,
  intervalPlace,
  uncertaintyPlace,
} from '../../../shared-core/text/format-number.ts';

const thin = '\u202f';

// GUM 7.2.6 gives the practice; the cases themselves are worked by hand.
describe('formatWithSigma', () => {
  test.each([
    [6210, 95, `6${thin}210 ± 95`],
    [6214.6, 95.4, `6${thin}215 ± 95`],
    [6214.6, 9.96, `6${thin}215 ± 10`],
    [6214.6, 9.94, `6${thin}214.6 ± 9.9`],
    [6214.6, 995, `6${thin}200 ± 1${thin}000`],
    [12.3456, 0.0123, '12.346 ± 0.012'],
    [-12.3456, 0.0123, '\u221212.346 ± 0.012'],
    [-0.3, 50, '0 ± 50'],
    [3, 512, '0 ± 510'],
    [812345, 950, `812${thin}350 ± 950`],
    [4.13e20, 3.2e19, `(4.13 ± 0.32)${thin}×${thin}10²⁰`],
    [9.996e20, 3.2e19, `(1.000 ± 0.032)${thin}×${thin}10²¹`],
    [2.5e-7, 1.1e-8, `(2.50 ± 0.11)${thin}×${thin}10⁻⁷`],
    [-4.13e20, 3.2e19, `(\u22124.13 ± 0.32)${thin}×${thin}10²⁰`],
  ])('writes %d with sigma %d as %s', (value, sigma, text) => {
    expect(formatWithSigma(value, sigma)).toBe(text);
  });

  it('keeps to ASCII where asked', () => {
    expect(formatWithSigma(-6214.6, 95.4, 'ascii')).toBe('-6215 +/- 95');
    expect(formatWithSigma(4.13e20, 3.2e19, 'ascii')).toBe('(4.13 +/- 0.32)e20');
  });

  it('shows an exact value whole, a value of unknown sigma with three digits, and nothing as a dash', () => {
    expect(formatWithSigma(656.27952, 0)).toBe('656.27952');
    expect(formatWithSigma(656.27952, null)).toBe('656');
    expect(formatWithSigma(656.27952, Number.POSITIVE_INFINITY)).toBe('656');
    expect(formatWithSigma(null, 3)).toBe('–');
    expect(formatWithSigma(Number.NaN, 3, 'ascii')).toBe('-');
  });

  it('refuses a negative sigma as a mistake of the caller', () => {
    expect(() => formatWithSigma(1, -1)).toThrow('not negative');
  });
});

describe('intervals', () => {
  it('goes to the place of sigma where sigma is known', () => {
    expect(formatInterval(6030.4, 6401.2, { sigma: 95 })).toBe(`6${thin}030 to 6${thin}401`);
  });

  it('goes by the half distance where sigma is not known', () => {
    expect(formatInterval(6030.4, 6401.2)).toBe(`6${thin}030 to 6${thin}400`);
    expect(formatInterval(-6401.2, -6030.4)).toBe('\u22126\u202f400 to \u22126\u202f030');
    expect(formatInterval(3, 3)).toBe('3 to 3');
    expect(formatInterval(0, 1e-9, { style: 'ascii' })).toBe('0 to 1.00e-9');
    expect(formatInterval(null, 3)).toBe('–');
  });

  it('leaves the wider side two digits and the narrower at least one', () => {
    expect(intervalPlace({ value: 4.1, low: 3.2, high: 5.1, sigma: null })).toBe(-1);
    expect(intervalPlace({ value: 4.1, low: 4.07, high: 5.1, sigma: null })).toBe(-2);
    expect(intervalPlace({ value: 4.1, low: 4.1, high: 4.1, sigma: null })).toBeNull();
  });

  it('throws on an interval that runs downwards', () => {
    expect(() => formatInterval(2, 1)).toThrow('runs upwards');
  });
});

describe('single numbers', () => {
  test.each([
    [0.99, 2, '0.99'],
    [9.996, 2, '10'],
    [0.000123, 2, '0.00012'],
    [0.0000123, 2, `1.2${thin}×${thin}10⁻⁵`],
    [9_999_999, 3, `1.00${thin}×${thin}10⁷`],
    [0, 3, '0'],
  ])('writes %d with %d digits as %s', (value, digits, text) => {
    expect(formatSignificant(value, digits)).toBe(text);
  });

  it('rounds a tie of exact halves away from zero, on both sides', () => {
    expect(formatAtPlace(2.5, 0)).toBe('3');
    expect(formatAtPlace(-2.5, 0)).toBe('\u22123');
    expect(formatAtPlace(50, 2)).toBe('100');
    expect(formatAtPlace(49.999, 2)).toBe('0');
  });

  it('writes exact numbers with every digit', () => {
    expect(formatExact(0.1)).toBe('0.1');
    expect(formatExact(-1234567.25)).toBe(`\u22121${thin}234${thin}567.25`);
    expect(formatExact(1.5e-9)).toBe(`1.5${thin}×${thin}10⁻⁹`);
    expect(formatExact(1.5e25, 'ascii')).toBe('1.5e25');
  });

  it('writes per cent without idle zeros', () => {
    expect(formatPercent(0.95)).toBe(`95${thin}%`);
    expect(formatPercent(0.6827, 1)).toBe(`68.3${thin}%`);
    expect(formatPercent(0.9, 1, 'ascii')).toBe('90 %');
    expect(formatPercent(1, 0)).toBe(`100${thin}%`);
  });

  it('takes its place from an uncertainty that rounds up a decade', () => {
    expect(uncertaintyPlace(9.96)).toBe(0);
    expect(uncertaintyPlace(9.94)).toBe(-1);
    expect(() => uncertaintyPlace(0)).toThrow('positive');
  });
});
