import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { vacuumToAirNm } from '../../shared-core/physics/air-index.ts';
import { bandLines } from '../../shared-core/physics/molecular-band.ts';

/**
 * K. P. Huber, G. Herzberg, Constants of Diatomic Molecules (1979), N2, from memory, per cm: term, then vibration and
 * rotation.
 */
const upper = { term: 89_136.9, vibration: [2047.18, -28.445, 2.0883, -0.535], b: 1.82473, alpha: 0.018683 };
const lower = { term: 59_619.3, vibration: [1733.39, -14.1221, -0.0569], b: 1.63745, alpha: 0.01791 };

const termPerCm = ({ term, vibration }: typeof upper, v: number): number =>
  vibration.reduce((sum, factor, power) => sum + factor * (v + 0.5) ** (power + 1), term);
const rotation = ({ b, alpha }: typeof upper, v: number): number => b - alpha * (v + 0.5);

/** R. W. B. Pearse, A. G. Gaydon, The Identification of Molecular Spectra (1976), as the line table has them. */
const heads = readFileSync(new URL('../../assets/lines/lines.csv', import.meta.url), 'utf8')
  .split('\n')
  .map((row) => /^N2,mol,([\d.]+),.*second positive C-B \((\d)-(\d)\)/.exec(row))
  .filter((match) => match !== null)
  .map(([, nm, v, w]) => ({ nm: Number(nm), v: Number(v), w: Number(w) }));

/** Heads to 0.05 nm, and the three spin components of a head, 3 per cm apart, that the constants do not know of. */
const mostMissNm = 0.13;

describe('rotational lines of a band', () => {
  test('the table holds the bands that are looked for', () => {
    expect(heads.length).toBeGreaterThan(8);
  });

  test.each(heads.filter(({ v }) => v < 3))(
    'the molecular constants put the head of ($v, $w) at $nm nm',
    ({ nm, v, w }) => {
      const [upperPerCm, lowerPerCm] = [rotation(upper, v), rotation(lower, w)];
      const lines = bandLines({ headNm: nm, upperPerCm, lowerPerCm }, 300);
      // R(0), m = 1, lies 2 B' above the origin of the band.
      const r0 = lines.reduce((so, next) => (next.m === 1 ? next : so));
      const originNm = nm + r0.shiftNm + 1e-7 * nm * nm * 2 * upperPerCm;
      const expectedNm = vacuumToAirNm(1e7 / (termPerCm(upper, v) - termPerCm(lower, w)));
      expect(Math.abs(originNm - expectedNm)).toBeLessThan(mostMissNm);
    },
  );

  test('shares are one together, and the hotter the band the longer its tail', () => {
    const tailNm = (kelvin: number): number => {
      const lines = bandLines({ headNm: 434.36, upperPerCm: 1.8154, lowerPerCm: 1.5659 }, kelvin);
      expect(lines.reduce((sum, { share }) => sum + share, 0)).toBeCloseTo(1, 12);
      expect(lines.every(({ shiftNm }) => shiftNm < 0.01)).toBe(true);
      return -lines.reduce((sum, { share, shiftNm }) => sum + share * shiftNm, 0);
    };
    expect(tailNm(300)).toBeGreaterThan(0.2);
    expect(tailNm(1000)).toBeGreaterThan(2 * tailNm(300));
    expect(tailNm(2000)).toBeGreaterThan(1.5 * tailNm(1000));
  });
});
