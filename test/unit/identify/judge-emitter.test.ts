import { describe, expect, test } from 'vitest';
import type { Emitter, Feature } from '../../../shared-core/identify/emitters.ts';
import { judgeEmitter } from '../../../shared-core/identify/judge-emitter.ts';
import type { Measurement } from '../../../shared-core/identify/measure-feature.ts';

const fwhmNm = 0.2;
const quiet = { places: [], spanNm: 400 };
const feature = (centreNm: number, strength: number): Feature => ({
  lines: [],
  fromNm: centreNm,
  toNm: centreNm,
  centreNm,
  toleranceNm: 0.005,
  shape: 'line',
  strength,
  upperEnergyEv: null,
});
const seen = (of: Feature, signalToNoise: number): Measurement => ({
  feature: of,
  status: 'seen',
  area: 10 * signalToNoise,
  sigma: 10,
  signalToNoise,
  recordedNm: of.centreNm,
  reachNm: 0.1,
  shading: null,
  isUnderHydrogen: false,
});
const absent = (of: Feature): Measurement => ({ ...seen(of, 0), status: 'absent', area: 0 });

const [a, b, c] = [feature(500, 1), feature(530, 0.8), feature(560, 0.5)];
const emitter: Emitter = { species: 'X', name: 'X I', features: [a, b, c], meaning: '' };
const judge = (measurements: readonly Measurement[]) =>
  judgeEmitter({ emitter, measurements }, quiet, fwhmNm);

describe('places of one emitter together', () => {
  test('three that agree: a claim that chance hardly makes', () => {
    const claim = judge([seen(a, 20), seen(b, 16), seen(c, 10)]);
    expect(claim?.agreeing).toHaveLength(3);
    expect(claim?.expectedCount).toBe(3);
    expect(claim!.lnChance).toBeLessThan(Math.log(1e-6));
  });

  test('one alone is never a claim, however strong', () => {
    expect(judge([seen(a, 500), absent(b), absent(c)])).toBeNull();
  });

  test('two, the strongest of three missing: no claim', () => {
    expect(judge([absent(a), seen(b, 80), seen(c, 50)])).toBeNull();
  });

  test('two of which one is barely there: no claim', () => {
    expect(judge([seen(a, 20), seen(b, 3.2), absent(c)])).toBeNull();
  });

  test('strengths that contradict the table do not agree', () => {
    const claim = judge([seen(a, 5), seen(b, 5), seen(c, 800)]);
    expect(claim === null || claim.agreeing.every(({ signalToNoise }) => signalToNoise < 10)).toBe(true);
  });

  test('among many stray peaks the same light says less', () => {
    const places = Array.from({ length: 80 }, (_, i) => ({ recordedNm: 400 + 5 * i + 2, signalToNoise: 30 }));
    const measured = [seen(a, 20), seen(b, 16), seen(c, 10)];
    const crowded = judgeEmitter({ emitter, measurements: measured }, { places, spanNm: 400 }, fwhmNm);
    expect(crowded!.lnChance).toBeGreaterThan(judge(measured)!.lnChance + 3);
  });
});
