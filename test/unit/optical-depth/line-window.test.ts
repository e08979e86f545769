import { expect, test } from 'vitest';
import {
  baselineAt,
  lineWindow,
  sideLevel,
  windowSum,
  windowVariance,
} from '../../../shared-core/optical-depth/line-window.ts';

const wavelengthNm = Float64Array.from({ length: 201 }, (_, px) => 500 + 0.1 * px);
const none = new Uint8Array(201);
const size = { coreHalfNm: 0.5, sideFromNm: 0.8, reachNm: 2 };
const window = lineWindow(wavelengthNm, none, 510, size)!;

test('takes any straight background out, and keeps what stands in the core', () => {
  const straight = Float64Array.from({ length: 201 }, (_, px) => 300 - 1.7 * px);
  expect(Math.abs(windowSum(window, straight))).toBeLessThan(1e-9);
  const withLine = straight.map((value, px) => value + (Math.abs(px - 100) <= 5 ? 40 : 0));
  expect(windowSum(window, withLine)).toBeCloseTo(11 * 40, 9);
  expect(sideLevel(window, straight)).toBeCloseTo(130, 9);
  expect(baselineAt(window, straight)(97)).toBeCloseTo(300 - 1.7 * 97, 9);
});

test('a straight background goes out with masked sides as well', () => {
  const masked = none.map((_, px) => (px > 108 && px < 116 ? 1 : 0));
  const lopsided = lineWindow(wavelengthNm, masked, 510, size)!;
  const straight = Float64Array.from({ length: 201 }, (_, px) => 300 + 2.3 * px + (masked[px]! ? 1e6 : 0));
  expect(Math.abs(windowSum(lopsided, straight))).toBeLessThan(1e-8);
});

test('its variance is that of the core and of the baseline under it', () => {
  // 11 core pixels, 26 side pixels: 11 + 121/26 where core and sides are symmetric.
  expect(window.sidePixels).toHaveLength(26);
  expect(windowVariance(window, new Float64Array(201).fill(4), [])).toBeCloseTo(4 * (11 + 121 / 26), 9);
  expect(windowVariance(window, new Float64Array(201).fill(4), [0.5])).toBeCloseTo(8 * (11 + 121 / 26), 9);
});

test('is not there where the core is masked, or a side is missing', () => {
  const inCore = none.map((_, px) => (px === 98 ? 1 : 0));
  expect(lineWindow(wavelengthNm, inCore, 510, size)).toBeNull();
  const noRight = none.map((_, px) => (px > 106 ? 1 : 0));
  expect(lineWindow(wavelengthNm, noRight, 510, size)).toBeNull();
  expect(lineWindow(wavelengthNm, none, 500.4, size)).toBeNull();
});
