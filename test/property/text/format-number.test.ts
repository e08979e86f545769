import fc from 'fast-check';
import { expect, it } from 'vitest';
import { formatDensity, formatTemperature } from '../../../shared-core/report/format-answer.ts';
import { fixedDecimal, roundingExponent } from '../../../shared-core/text/decimal-digits.ts';
import { formatExact, formatInterval, formatWithSigma } from '../../../shared-core/text/format-number.ts';

const magnitude = fc
  .tuple(fc.double({ min: 1, max: 9.999, noNaN: true }), fc.integer({ min: -30, max: 30 }))
  .map(([mantissa, exponent]) => Number(`${String(mantissa)}e${String(exponent)}`));
const anyNumber = fc.tuple(magnitude, fc.boolean()).map(([size, negative]) => (negative ? -size : size));

/** Reads "(-4.13 +/- 0.32)e20" and "6215 +/- 95" back; shares nothing with the writer. */
function readBack(text: string): { value: number; sigma: number; sigmaDigits: string } {
  const found = /^\(?(-?[\d.]+) \+\/- ([\d.]+)\)?(e-?\d+)?$/.exec(text);
  if (!found) throw new Error(`cannot read "${text}"`);
  const [, value = '', sigma = '', power = ''] = found;
  return {
    value: Number(value + power),
    sigma: Number(sigma + power),
    sigmaDigits: sigma.replace('.', '').replace(/^0+/, ''),
  };
}

it('keeps value and sigma within half a unit of the second digit of sigma', () => {
  fc.assert(
    fc.property(anyNumber, magnitude, (value, sigma) => {
      fc.pre(Math.abs(value) < sigma * 1e12 && sigma < Math.abs(value) * 1e12);
      const read = readBack(formatWithSigma(value, sigma, 'ascii'));
      const halfUnit = 0.5 * Number(`1e${String(roundingExponent(sigma, 2) - 1)}`);
      expect(Math.abs(read.sigma - sigma)).toBeLessThanOrEqual(halfUnit * (1 + 1e-9));
      expect(Math.abs(read.value - value)).toBeLessThanOrEqual(
        halfUnit * (1 + 1e-9) + Math.abs(value) * 1e-15,
      );
    }),
    { numRuns: 2000 },
  );
});

it('never gives sigma a third digit', () => {
  fc.assert(
    fc.property(magnitude, (sigma) => {
      const read = readBack(formatWithSigma(0, sigma, 'ascii'));
      expect(read.sigmaDigits.replace(/0+$/, '').length).toBeLessThanOrEqual(2);
    }),
  );
});

it('writes a number and its negative alike but for the sign', () => {
  fc.assert(
    fc.property(magnitude, magnitude, (value, sigma) => {
      const up = formatWithSigma(value, sigma);
      const down = formatWithSigma(-value, sigma);
      expect(down.replace('\u2212', '')).toBe(up);
      expect(down).not.toMatch(/^\(?\u22120(\.0*)? /);
    }),
  );
});

it('agrees with the shortest decimal form of every exact number', () => {
  fc.assert(
    fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (value) => {
      expect(Number(formatExact(value, 'ascii'))).toBe(value === 0 ? 0 : value);
    }),
  );
});

it('agrees with toFixed where toFixed reaches', () => {
  fc.assert(
    fc.property(
      fc.double({ min: 0, max: 1e15, noNaN: true }),
      fc.integer({ min: 0, max: 20 }),
      (value, decimals) => {
        expect(fixedDecimal(value, -decimals, 0)).toBe(value.toFixed(decimals));
      },
    ),
    { numRuns: 2000 },
  );
});

it('writes intervals that still run upwards', () => {
  fc.assert(
    fc.property(anyNumber, magnitude, (low, width) => {
      const high = low + width;
      fc.pre(high > low);
      const [first = '', second = ''] = formatInterval(low, high, { style: 'ascii' }).split(' to ');
      expect(Number(first)).toBeLessThanOrEqual(Number(second));
    }),
  );
});

it('keeps a limit on the side that claims less', () => {
  fc.assert(
    fc.property(fc.double({ min: 500, max: 90_000, noNaN: true }), (limit) => {
      const temperature = {
        status: 'lower-limit',
        kelvin: null,
        sigmaKelvin: null,
        lowKelvin: limit,
        highKelvin: null,
        coverage: 0.95,
        chiSquare: null,
        degreesOfFreedom: null,
        effectiveDegreesOfFreedom: null,
        birgeRatio: null,
        widening: 1,
        responseCorrected: true,
        text: '',
      } as const;
      const printed = Number(/> (\d+) K/.exec(formatTemperature(temperature, 'ascii'))?.[1]);
      expect(printed).toBeLessThanOrEqual(limit * (1 + 1e-9));
      expect(printed).toBeGreaterThan(limit * 0.9);
      const density = {
        status: 'upper-limit',
        perCubicMetre: null,
        lowPerCubicMetre: null,
        highPerCubicMetre: limit * 1e16,
        coverage: 0.95,
        line: null,
        text: '',
      } as const;
      const upper = Number(/< (\S+) m/.exec(formatDensity(density, 'ascii'))?.[1]);
      expect(upper).toBeGreaterThanOrEqual(limit * 1e16 * (1 - 1e-9));
      expect(upper).toBeLessThan(limit * 1e16 * 1.11);
    }),
  );
});
