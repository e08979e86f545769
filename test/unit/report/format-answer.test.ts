import { describe, expect, it } from 'vitest';
import type { Diagnosis } from '../../../shared-core/diagnosis/diagnosis.ts';
import { formatDensity, formatTemperature } from '../../../shared-core/report/format-answer.ts';

const measured: Diagnosis['temperature'] = {
  status: 'measured',
  kelvin: 6210,
  sigmaKelvin: 95,
  lowKelvin: 6030,
  highKelvin: 6401,
  coverage: 0.95,
  chiSquare: 2.1,
  degreesOfFreedom: 3,
  effectiveDegreesOfFreedom: null,
  birgeRatio: null,
  widening: 1,
  responseCorrected: true,
  text: '',
};
const density: Diagnosis['electronDensity'] = {
  status: 'measured',
  perCubicMetre: 4.1e20,
  lowPerCubicMetre: 3.2e20,
  highPerCubicMetre: 5.1e20,
  coverage: 0.95,
  line: 'H-beta',
  text: '',
};
const thinned = (text: string) => text.replaceAll('\u202f', ' ');

describe('formatTemperature', () => {
  it('gives value and interval to the place of the standard uncertainty', () => {
    expect(formatTemperature(measured)).toBe('6\u202f210 K (6\u202f030 to 6\u202f401 K, 95\u202f%)');
    expect(formatTemperature(measured, 'ascii')).toBe('6210 K (6030 to 6401 K, 95 %)');
  });

  it('goes by the interval when no standard uncertainty is given', () => {
    expect(thinned(formatTemperature({ ...measured, sigmaKelvin: null }))).toBe(
      '6 210 K (6 030 to 6 400 K, 95 %)',
    );
  });

  it('gives a lower limit as a limit, rounded to the side that claims less', () => {
    const limit = {
      ...measured,
      status: 'lower-limit',
      kelvin: 7777,
      lowKelvin: 4590,
      highKelvin: null,
    } as const;
    expect(thinned(formatTemperature(limit))).toBe('> 4 500 K (95 %)');
    expect(thinned(formatTemperature({ ...limit, lowKelvin: 4600 }))).toBe('> 4 600 K (95 %)');
  });

  it('prints no number for what is not determined, whatever the fields hold', () => {
    expect(formatTemperature({ ...measured, status: 'not-determined' })).toBe('not determined');
    expect(formatTemperature({ ...measured, lowKelvin: null })).toBe('not determined');
    expect(formatTemperature({ ...measured, status: 'lower-limit', lowKelvin: null })).toBe('not determined');
  });
});

describe('formatDensity', () => {
  it('gives value and interval with one power of ten', () => {
    expect(thinned(formatDensity(density))).toBe('4.1 × 10²⁰ m⁻³ (3.2 to 5.1 × 10²⁰ m⁻³, 95 %)');
    expect(formatDensity(density, 'ascii')).toBe('4.1e20 m^-3 (3.2e20 to 5.1e20 m^-3, 95 %)');
  });

  it('keeps one power of ten when the value rounds up a decade', () => {
    const near = { ...density, perCubicMetre: 9.96e20, lowPerCubicMetre: 8.9e20, highPerCubicMetre: 1.11e21 };
    expect(thinned(formatDensity(near))).toBe('1.00 × 10²¹ m⁻³ (0.89 to 1.11 × 10²¹ m⁻³, 95 %)');
  });

  it('gives each end its own power of ten when the interval spans decades', () => {
    expect(thinned(formatDensity({ ...density, lowPerCubicMetre: 1e18 }))).toBe(
      '4.1 × 10²⁰ m⁻³ (1.0 × 10¹⁸ to 5.1 × 10²⁰ m⁻³, 95 %)',
    );
  });

  it('gives an upper limit as a limit, rounded up', () => {
    const limit = {
      ...density,
      status: 'upper-limit',
      perCubicMetre: 2e19,
      highPerCubicMetre: 3.11e19,
    } as const;
    expect(thinned(formatDensity(limit))).toBe('< 3.2 × 10¹⁹ m⁻³ (95 %)');
    expect(formatDensity(limit, 'ascii')).toBe('< 3.2e19 m^-3 (95 %)');
  });

  it('prints no number for what is not determined', () => {
    expect(formatDensity({ ...density, status: 'not-determined' })).toBe('not determined');
  });
});
