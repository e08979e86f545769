import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  airRefractivity,
  airRefractivityCiddor,
  airToVacuumNm,
  vacuumToAirNm,
} from '../../../shared-core/physics/air-index.ts';
import {
  populationOrdinate,
  twoLineTemperature,
  type AreaUnit,
  type PopulationLine,
} from '../../../shared-core/physics/boltzmann.ts';
import { boltzmannEvPerK } from '../../../shared-core/physics/constants.ts';
import { hydrogenLine } from '../../../shared-core/physics/hydrogen.ts';
import {
  gaussianAreaEscape,
  lorentzianAreaEscape,
  peakEscape,
} from '../../../shared-core/physics/self-absorption.ts';
import {
  electronDensityFromHAlpha,
  electronDensityFromHBeta,
  hAlphaStarkFwhaNm,
  hBetaStarkFwhmNm,
} from '../../../shared-core/physics/stark.ts';

const between = (min: number, max: number) => fc.double({ min, max, noNaN: true });
const isotope = fc.constantFrom('H', 'D');
const unit = fc.constantFrom<AreaUnit>('photon', 'energy');

describe('air and vacuum', () => {
  it('there and back is the same wavelength, either way round and by either formula', () => {
    const formula = fc.constantFrom(airRefractivity, airRefractivityCiddor);
    fc.assert(
      fc.property(between(230, 1100), formula, (nm, refractivity) => {
        const air = vacuumToAirNm(nm, refractivity);
        expect(Math.abs(airToVacuumNm(air, refractivity) - nm)).toBeLessThan(4e-16 * nm);
        expect(Math.abs(vacuumToAirNm(airToVacuumNm(nm, refractivity), refractivity) - nm)).toBeLessThan(
          4e-16 * nm,
        );
        expect(air).toBeLessThan(nm);
      }),
      { numRuns: 2000 },
    );
  });

  it('keeps the order of wavelengths', () => {
    fc.assert(
      fc.property(between(230, 1100), between(1e-6, 10), (nm, step) => {
        expect(vacuumToAirNm(nm + step)).toBeGreaterThan(vacuumToAirNm(nm));
      }),
    );
  });
});

describe('two lines', () => {
  /** Photons (or energy) a line gives off at that temperature, up to a factor common to both lines. */
  const areaAt = (line: PopulationLine, kelvin: number, areaUnit: AreaUnit): number => {
    const population = line.upperWeight * Math.exp(-line.upperEnergyEv / (boltzmannEvPerK * kelvin));
    const photons = population * line.transitionProbabilityPerS;
    return areaUnit === 'energy' ? photons / line.wavelengthNm : photons;
  };
  const pair = fc
    .tuple(fc.integer({ min: 3, max: 12 }), fc.integer({ min: 3, max: 12 }), isotope)
    .filter(([a, b]) => a < b)
    .map(([a, b, of]) => {
      const toLine = (n: number): PopulationLine => {
        const line = hydrogenLine(n, of);
        return { ...line, wavelengthNm: line.wavelengthVacuumNm };
      };
      return [toLine(a), toLine(b)] as const;
    });

  it('give back the temperature that made them, whatever the unit and the brightness', () => {
    fc.assert(
      fc.property(pair, between(500, 50_000), unit, ([a, b], kelvin, areaUnit) => {
        const ratio = areaAt(a, kelvin, areaUnit) / areaAt(b, kelvin, areaUnit);
        const found = twoLineTemperature(a, b, ratio, areaUnit);
        if (found.kind !== 'temperature') throw new Error('no temperature');
        // An error of the ratio in its last places counts k T over the energy between the levels.
        const gap = (b.upperEnergyEv - a.upperEnergyEv) / (boltzmannEvPerK * kelvin);
        expect(Math.abs(found.kelvin / kelvin - 1)).toBeLessThan(1e-14 * (1 + 5 / gap));
      }),
      { numRuns: 2000 },
    );
  });

  it('never give a temperature that is not a positive number', () => {
    fc.assert(
      fc.property(pair, between(1e-6, 1e6), unit, ([a, b], ratio, areaUnit) => {
        const found = twoLineTemperature(a, b, ratio, areaUnit);
        const slope = populationOrdinate(a, ratio, areaUnit) - populationOrdinate(b, 1, areaUnit);
        if (found.kind === 'temperature') {
          expect(found.kelvin).toBeGreaterThan(0);
          expect(found.kelvin).toBeLessThan(Infinity);
        }
        expect(found.kind === 'temperature').toBe(slope > 0);
      }),
      { numRuns: 2000 },
    );
  });
});

describe('Stark widths', () => {
  it('give back the electron density', () => {
    fc.assert(
      fc.property(between(20, 25), (decades) => {
        const density = Math.pow(10, decades);
        expect(electronDensityFromHBeta(hBetaStarkFwhmNm(density)) / density).toBeCloseTo(1, 13);
        expect(electronDensityFromHAlpha(hAlphaStarkFwhaNm(density)) / density).toBeCloseTo(1, 13);
      }),
    );
  });
});

describe('self-absorption', () => {
  it('lets less light out of a thicker slab, and most in the wings', () => {
    fc.assert(
      fc.property(between(1e-6, 9.9), between(0.01, 0.1), (depth, more) => {
        for (const escape of [peakEscape, gaussianAreaEscape, lorentzianAreaEscape]) {
          expect(escape(depth + more)).toBeLessThan(escape(depth));
          expect(escape(depth)).toBeLessThanOrEqual(1);
          expect(escape(depth + more)).toBeGreaterThan(0);
        }
        expect(peakEscape(depth)).toBeLessThan(gaussianAreaEscape(depth));
        expect(gaussianAreaEscape(depth)).toBeLessThan(lorentzianAreaEscape(depth));
      }),
    );
  });
});
