import { describe, expect, test } from 'vitest';
import type { Feature, FeatureShape } from '../../../shared-core/identify/emitters.ts';
import { measureFeature, type AxisInAir } from '../../../shared-core/identify/measure-feature.ts';
import { meterOver } from '../../support/light-at-places.ts';

const axis: AxisInAir = { recordedNm: (nm) => nm, sigmaNm: () => 0.01 };
const featureAt = (nm: number, shape: FeatureShape = 'line'): Feature => ({
  lines: [],
  fromNm: nm,
  toNm: nm,
  centreNm: nm,
  toleranceNm: 0.02,
  shape,
  strength: 1,
  upperEnergyEv: null,
});
/** A head at 560 nm whose tail is lines that crowd towards it. */
const band = Array.from({ length: 60 }, (_, i) => ({
  nm: 560 - 0.0012 * i * i,
  area: 300 * Math.exp(-0.0012 * i * i),
}));

describe('what a place of the table shows', () => {
  test('a line: seen, where it is and as strong as it is', () => {
    const found = measureFeature(meterOver([{ nm: 560.02, area: 1000 }]), axis, featureAt(560));
    expect(found.status).toBe('seen');
    expect(found.recordedNm).toBeCloseTo(560.02, 1);
    expect(Math.abs(found.area - 1000)).toBeLessThan(4 * found.sigma);
  });

  test('no line: absent, with the noise that bounds it', () => {
    const found = measureFeature(meterOver([]), axis, featureAt(560));
    expect(found.status).toBe('absent');
    expect(Math.abs(found.area)).toBeLessThan(3 * found.sigma);
    expect(found.sigma).toBeGreaterThan(10);
    expect(found.sigma).toBeLessThan(60);
  });

  test('a line a whole width away: not this one, and the place is not called dark', () => {
    const found = measureFeature(meterOver([{ nm: 560.35, area: 3000 }]), axis, featureAt(560));
    expect(found.status).toBe('hidden');
  });

  test('under excluded pixels: hidden; beyond the ends: out of range', () => {
    const meter = meterOver([], { excludedNm: [[559, 561]] });
    expect(measureFeature(meter, axis, featureAt(560)).status).toBe('hidden');
    expect(measureFeature(meter, axis, featureAt(480)).status).toBe('out-of-range');
  });

  test('a band: its head is found and its shading seen; to the wrong side it is refuted', () => {
    const meter = meterOver(band, { sigma: 4 });
    const found = measureFeature(meter, axis, featureAt(560, 'violet'));
    expect(found.status).toBe('seen');
    expect(found.shading).toBe('seen');
    expect(Math.abs(found.recordedNm - 560)).toBeLessThan(0.15);
    expect(measureFeature(meter, axis, featureAt(560, 'red')).shading).not.toBe('seen');
  });

  test('a strong narrow line where a band should be has no tail', () => {
    const meter = meterOver([{ nm: 559.95, area: 30_000 }], { sigma: 4 });
    const found = measureFeature(meter, axis, featureAt(560, 'violet'));
    expect(found.status === 'hidden' || found.shading === 'refuted').toBe(true);
  });
});
