import { describe, expect, test } from 'vitest';
import { hydrogenLine } from '../../../shared-core/physics/hydrogen.ts';
import { atomicProfile, lostLight } from '../../../shared-core/simulation/lost-light.ts';
import { simulateRecording } from '../../../shared-core/simulation/simulate-recording.ts';
import { knownBench } from '../../support/diagnose-simulated.ts';

const alpha = hydrogenLine(3);
/** So broad that the fine structure is nothing beside it. */
const broadKelvin = 1e9;
const broadNm = 5;

/**
 * (1/tau) integral of 1 - exp(-tau p): Gauss sum (-tau)^m / ((m+1)! sqrt(m+1)), Lorentz exp(-tau/2) (I0 + I1)(tau/2); R.
 * Ladenburg, F. Reiche, Ann. Phys. 42, 181 (1913). Values by mpmath, 30 digits.
 */
const escapes = [
  [0.5, 0.8448917106, 0.8891297908],
  [1, 0.7250651521, 0.8014560736],
  [2, 0.5564851985, 0.6736700229],
  [5, 0.3187383922, 0.4766310911],
] as const;

const lostShare = (gasKelvin: number, lorentzianNm: number, depth: number, gatherNm: number): number => {
  const profile = atomicProfile(alpha, gasKelvin, lorentzianNm);
  return lostLight(profile, depth / profile.peakPerNm, gatherNm).reduce((sum, { share }) => sum + share, 0);
};

describe('light that a homogeneous slab keeps', () => {
  test.each(escapes)(
    'depth %d: Gauss and Lorentz shapes let out what theory says',
    (depth, gauss, lorentz) => {
      expect(1 - lostShare(broadKelvin, 1e-4, depth, 0.5)).toBeCloseTo(gauss, 3);
      expect(1 - lostShare(300, broadNm, depth, 0.1)).toBeCloseTo(lorentz, 3);
    },
  );

  test('how finely it is gathered changes neither its sum nor its centroid', () => {
    const profile = atomicProfile(alpha, 1000, 0.01);
    const moments = (gatherNm: number) => {
      const lost = lostLight(profile, 3 / profile.peakPerNm, gatherNm);
      const share = lost.reduce((sum, part) => sum + part.share, 0);
      const first = lost.reduce((sum, part) => sum + part.share * part.shiftNm, 0);
      const second = lost.reduce(
        (sum, { share: part, shiftNm, fwhmNm }) =>
          sum + part * (shiftNm ** 2 + (fwhmNm / 2.3548200450309493) ** 2),
        0,
      );
      return [share, first, second] as const;
    };
    const fine = moments(0.001);
    const coarse = moments(0.02);
    for (const [index, value] of fine.entries()) expect(coarse[index]! / value).toBeCloseTo(1, 10);
  });

  /** Own quadrature of the seven components with Doppler widths of 300, 1000 and 5000 K: peak over that of one Gaussian. */
  test.each([
    [300, 0.545],
    [1000, 0.622],
    [5000, 0.892],
  ])('at %d K the fine structure lowers the peak to %d of a plain Doppler profile', (kelvin, factor) => {
    const dopplerNm = 7.162326e-7 * alpha.wavelengthVacuumNm * Math.sqrt(kelvin / 1.00782503);
    const plain = (2 * Math.sqrt(Math.LN2 / Math.PI)) / dopplerNm;
    // Means over cells lie a little below the peak.
    expect(atomicProfile(alpha, kelvin, 1e-6).peakPerNm / plain).toBeCloseTo(factor, 2);
  });
});

test('a thick H-alpha loses light as its depth says, H-beta hardly any', () => {
  const areas = (hAlphaOpticalDepth: number) =>
    simulateRecording({
      bench: { ...knownBench, lamp: { gasTemperatureK: 1000 } },
      kelvin: 6000,
      electronsPerCubicMetre: 1e18,
      seed: 1,
      hAlphaOpticalDepth,
    }).trueAreaElectrons;
  const thin = areas(0);
  const thick = areas(3);
  const relative = (id: string): number =>
    thick.get(id)! / thick.get('H-8')! / (thin.get(id)! / thin.get('H-8')!);
  // Between a Gauss profile (0.450) and one with two humps and wings (below 0.55).
  expect(relative('H-alpha')).toBeGreaterThan(0.42);
  expect(relative('H-alpha')).toBeLessThan(0.55);
  // Its depth is 0.138 of H-alpha's times a factor near one for the shapes, 0.41: 1 - 0.41/(2 sqrt 2).
  expect(relative('H-beta')).toBeGreaterThan(0.82);
  expect(relative('H-beta')).toBeLessThan(0.92);
});
