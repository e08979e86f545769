import { describe, expect, it } from 'vitest';
import {
  bleedDownSeconds,
  bleedTimeAllowance,
  touchLimitVolts,
} from '../../../shared-core/safety/bleed-down.ts';
import { storedEnergyJoules } from '../../../shared-core/safety/stored-energy.ts';

describe('storedEnergyJoules', () => {
  it('gives 0.25 J for 0.02 uF at 5 kV, worked by hand: 0.5 * 2e-8 * 2.5e7', () => {
    expect(storedEnergyJoules({ capacitanceMicrofarads: 0.02, volts: 5000 })).toBeCloseTo(0.25, 12);
  });

  it('gives 50 J for 1 uF at 10 kV, worked by hand: 0.5 * 1e-6 * 1e8', () => {
    expect(storedEnergyJoules({ capacitanceMicrofarads: 1, volts: 10_000 })).toBeCloseTo(50, 10);
  });

  it('grows with the square of the voltage, and is nothing without a capacitor', () => {
    const at = (volts: number) => storedEnergyJoules({ capacitanceMicrofarads: 0.3, volts });
    expect(at(2000) / at(1000)).toBeCloseTo(4, 12);
    expect(storedEnergyJoules({ capacitanceMicrofarads: 0, volts: 5000 })).toBe(0);
  });

  it('throws on a negative capacitance', () => {
    expect(() => storedEnergyJoules({ capacitanceMicrofarads: -1, volts: 1 })).toThrow('not negative');
  });
});

describe('bleedDownSeconds', () => {
  it('gives 1.3269 s for 0.02 uF and 10 Mohm from 5 kV, worked by hand: 1.5 * 0.2 s * ln(83.333) = 0.3 * 4.42285', () => {
    const seconds = bleedDownSeconds({
      capacitanceMicrofarads: 0.02,
      bleedResistanceMegohms: 10,
      volts: 5000,
    });
    expect(seconds).toBeGreaterThan(1.32684);
    expect(seconds).toBeLessThan(1.32687);
  });

  it('is longer than the time without the allowance by exactly the allowance', () => {
    // V / V_limit = 8, so the bare time is 3 RC ln 2 = 3 * 1 s * 0.693147 (ln 2 from any table).
    const seconds = bleedDownSeconds({
      capacitanceMicrofarads: 1,
      bleedResistanceMegohms: 1,
      volts: 8 * touchLimitVolts,
    });
    expect(seconds / bleedTimeAllowance).toBeCloseTo(2.0794415, 6);
  });

  it('is 0 at or below the limit and with nothing to discharge', () => {
    const bleed = { capacitanceMicrofarads: 1, bleedResistanceMegohms: 1 };
    expect(bleedDownSeconds({ ...bleed, volts: 60 })).toBe(0);
    expect(bleedDownSeconds({ ...bleed, capacitanceMicrofarads: 0, volts: 5000 })).toBe(0);
  });

  it('throws without a bleed path', () => {
    expect(() =>
      bleedDownSeconds({ capacitanceMicrofarads: 1, bleedResistanceMegohms: 0, volts: 5000 }),
    ).toThrow('bleed path');
  });
});
