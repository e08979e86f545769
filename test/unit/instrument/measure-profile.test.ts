import { describe, expect, test } from 'vitest';
import type { InstrumentTerm } from '../../../shared-core/instrument/instrument-term.ts';
import { measureProfile, type MeasuredProfile } from '../../../shared-core/instrument/measure-profile.ts';
import { correctedLamp, pseudoVoigt, slit, type Shape } from '../../support/reference-lamp.ts';

function measured(...args: Parameters<typeof correctedLamp>): MeasuredProfile {
  const profile = measureProfile(correctedLamp(...args));
  if (typeof profile === 'string') throw new Error(profile);
  return profile;
}

/** The shape that the terms make, light per nm. */
const drawn = ({ terms, fwhmNm }: MeasuredProfile): Shape => {
  const one = ({ weight, gaussianShare, lorentzianShare, shiftShare }: InstrumentTerm, nm: number): number =>
    weight *
    (lorentzianShare > 0 ? pseudoVoigt(lorentzianShare * fwhmNm, 1) : pseudoVoigt(gaussianShare * fwhmNm, 0))(
      nm - shiftShare * fwhmNm,
    );
  return (nm) => terms.reduce((sum, term) => sum + one(term, nm), 0);
};
const rms = (values: readonly number[]): number =>
  Math.sqrt(values.reduce((sum, value) => sum + value * value, 0) / values.length);

describe('the profile of an instrument', () => {
  test.each([
    [0.2, 0],
    [0.2, 0.3],
    [0.35, 0.6],
  ])('pseudo-Voigt, FWHM %d nm, Lorentz share %d: found, and covered by what is stated', (fwhmNm, share) => {
    const profiles = Array.from({ length: 60 }, (_, seed) =>
      measured(() => pseudoVoigt(fwhmNm, share), { seed }),
    );
    expect(profiles.every(({ shape }) => shape === 'pseudo-voigt')).toBe(true);
    const widthPulls = profiles.map((each) => (each.fwhmNm - fwhmNm) / each.fwhmSigmaNm);
    expect(rms(widthPulls)).toBeLessThan(1.35);
    expect(Math.max(...profiles.map((each) => each.fwhmSigmaNm))).toBeLessThan(0.01 * fwhmNm);
    for (const each of profiles) expect(Math.abs(each.lorentzShare! - share)).toBeLessThan(0.02);
    if (share > 0) {
      const sharePulls = profiles.map((each) => (each.lorentzShare! - share) / each.lorentzShareSigma!);
      expect(rms(sharePulls)).toBeGreaterThan(0.6);
      expect(rms(sharePulls)).toBeLessThan(1.4);
    }
  });

  test('behind a wide slit it is no pseudo-Voigt, and is tabulated', () => {
    const truth = slit(0.35, 0.12);
    for (const seed of [1, 2, 3, 4]) {
      const profile = measured(() => truth, { seed });
      expect(profile.shape).toBe('tabulated');
      expect(profile.chiSquare).toBeLessThan(1.25 * profile.degreesOfFreedom);
      expect(Math.abs(profile.fwhmNm / 0.35 - 1)).toBeLessThan(0.02);
      const shape = drawn(profile);
      for (let nm = 0; nm < 0.6; nm += 0.02)
        expect(Math.abs(shape(nm) - truth(nm))).toBeLessThan(0.05 * truth(0));
      const weight = profile.terms.reduce((sum, term) => sum + term.weight, 0);
      expect(weight).toBeCloseTo(1, 12);
    }
  });

  test('a width that changes over the range widens its uncertainty to hold both ends', () => {
    const profile = measured((nm) => pseudoVoigt(0.2 * (1 + 0.06 * ((nm - 545) / 145)), 0.1));
    expect(profile.fwhmSigmaNm).toBeGreaterThan(0.003);
    expect(Math.abs(profile.fwhmNm - 0.2)).toBeLessThan(2 * profile.fwhmSigmaNm);
  });

  test('a smoothed export and a recording without lines give none, and say why', () => {
    const lamp = correctedLamp(() => pseudoVoigt(0.2, 0.1));
    const smoothed = { ...lamp, noise: { ...lamp.noise, runningMeanPoints: 5 } };
    expect(measureProfile(smoothed)).toBe('smoothed');
    const dark = correctedLamp(() => () => 0, { brightestElectrons: 0 });
    expect(measureProfile(dark)).toBe('no-lines');
  });

  test('clipped lines are left out', () => {
    const lamp = correctedLamp(() => pseudoVoigt(0.2, 0.1), { brightestElectrons: 900_000 });
    const profile = measureProfile(lamp);
    if (typeof profile === 'string') throw new Error(profile);
    expect(profile.linesNm.every((nm) => Math.abs(nm - 435.833) > 1 && Math.abs(nm - 546.075) > 1)).toBe(
      true,
    );
    expect(profile.fwhmNm).toBeCloseTo(0.2, 2);
  });
});
