import { describe, expect, test } from 'vitest';
import { absorbingProfile } from '../../../shared-core/optical-depth/absorbing-profile.ts';
import { lineWindow } from '../../../shared-core/optical-depth/line-window.ts';
import { slab } from '../../../shared-core/optical-depth/slab.ts';
import { depthAt, largestDepth } from '../../../shared-core/optical-depth/solve-depth.ts';
import { hydrogenLine } from '../../../shared-core/physics/hydrogen.ts';
import { starkWidthOfLine } from '../../../shared-core/physics/stark.ts';
import { checkKeys, checkValue, numberInput } from '../../support/check-values.ts';

const edgeNm = Float64Array.from({ length: 1001 }, (_, px) => 450 + 0.1 * px);
const centres = edgeNm.slice(1).map((nm) => nm - 0.05);
const line = hydrogenLine(4);
const window = lineWindow(centres, new Uint8Array(1000), line.wavelengthAirNm, {
  coreHalfNm: 1,
  sideFromNm: 1.5,
  reachNm: 5,
})!;

describe('pure shapes, published values', () => {
  test.each(checkKeys(/^self_absorption/))('%s', (key) => {
    const { inputs, expected } = checkValue(key);
    const depth = numberInput(inputs, 'tau0');
    const wanted = expected as Record<string, number>;
    // So hot that the fine structure drowns: a Gauss profile, 0.1 nm wide.
    const hot = slab(
      absorbingProfile(line, {
        lamp: { gasTemperatureK: 100_000 },
        electronsPerCubicMetre: 0,
        deuteriumRatio: 0,
      }),
      window,
      edgeNm,
      line.wavelengthAirNm,
      0.2,
    );
    expect(Math.abs(hot.escape(depth) - wanted['area_factor_gauss']!)).toBeLessThan(0.002);
    // So dense that the Doppler width drowns: a Lorentz profile.
    const dense = slab(
      absorbingProfile(line, {
        lamp: { gasTemperatureK: 300 },
        electronsPerCubicMetre: 1e24,
        deuteriumRatio: 0,
      }),
      window,
      edgeNm,
      line.wavelengthAirNm,
      0.2,
    );
    expect(Math.abs(dense.escape(depth) - wanted['area_factor_lorentz']!)).toBeLessThan(0.002);
  });
});

describe('an instrument that hides the line', () => {
  const gas = { lamp: { gasTemperatureK: 800 }, electronsPerCubicMetre: 0, deuteriumRatio: 0 };
  const profile = absorbingProfile(line, gas);
  const tube = slab(profile, window, edgeNm, line.wavelengthAirNm, 0.18);

  test('a window much wider than it sees the whole equivalent width: W = tau escape(tau)/peak', () => {
    for (const depth of [0.01, 0.5, 2, 10]) {
      const whole = (depth * tube.escape(depth)) / profile.peakPerNm;
      expect(Math.abs(tube.missingNm(depth) / whole - 1)).toBeLessThan(2e-3);
    }
  });

  test('the second passage leaves 2 E(2 tau)/E(tau) - 1', () => {
    for (const depth of [0.01, 0.5, 2, 10]) {
      const expected = (2 * tube.escape(2 * depth)) / tube.escape(depth) - 1;
      expect(Math.abs(tube.returned(depth) - expected)).toBeLessThan(2e-3);
    }
    expect(tube.returned(0)).toBe(1);
    expect(tube.escape(0)).toBe(1);
    expect(tube.missingNm(0)).toBe(0);
  });
});

// To the light of the wings that the sides take for baseline.
test('a pixel in the middle of a wide line sees the depth itself', () => {
  const gas = { lamp: { gasTemperatureK: 800 }, electronsPerCubicMetre: 3e22, deuteriumRatio: 0 };
  const widthNm = starkWidthOfLine(4, 3e22);
  const fine = Float64Array.from({ length: 8001 }, (_, px) => line.wavelengthAirNm - 40 + 0.01 * px);
  const middle = lineWindow(
    fine.slice(1).map((nm) => nm - 0.005),
    new Uint8Array(8000),
    line.wavelengthAirNm,
    { coreHalfNm: 0.02 * widthNm, sideFromNm: 12 * widthNm, reachNm: 18 * widthNm },
  )!;
  const tube = slab(absorbingProfile(line, gas), middle, fine, line.wavelengthAirNm, 0.02);
  for (const depth of [0.2, 1, 2])
    expect(Math.abs(tube.returned(depth) / Math.exp(-depth) - 1)).toBeLessThan(0.02);
});

test('the depth at which a growing function reaches a value', () => {
  expect(depthAt((depth) => depth * depth, 2.25)).toBeCloseTo(1.5, 6);
  expect(depthAt((depth) => depth + 1, 0.5)).toBe(0);
  expect(depthAt((depth) => Math.atan(depth), 2)).toBeNull();
  expect(depthAt((depth) => depth, largestDepth)).toBeCloseTo(largestDepth, 4);
});
