import { describe, expect, test } from 'vitest';
import { createRandom } from '../../shared-core/numeric/random.ts';
import type { ExtraLine } from '../../shared-core/simulation/simulation-input.ts';
import { knownBench } from '../support/diagnose-simulated.ts';
import { impureLamp } from '../support/impure-lamp.ts';
import { shippedLineTable } from '../support/line-table.ts';
import { nitrogenLight } from '../support/molecular-background.ts';

const drawCount = 100;
const seeds = Array.from({ length: drawCount }, (_, index) => 81_000 + index);

/** With the strengths of the table, which are those of a low-pressure lamp. */
const mercury: readonly ExtraLine[] = shippedLineTable()
  .filter(({ species }) => species === 'Hg')
  .map(({ wavelengthAirNm, relativeStrength }) => ({
    wavelengthNm: wavelengthAirNm,
    relativeArea: 0.02 * relativeStrength!,
  }));
const helium: readonly ExtraLine[] = [
  { wavelengthNm: 587.562, relativeArea: 0.03 },
  { wavelengthNm: 667.815, relativeArea: 0.01 },
  { wavelengthNm: 501.568, relativeArea: 0.005 },
  { wavelengthNm: 447.148, relativeArea: 0.006 },
  { wavelengthNm: 706.519, relativeArea: 0.006 },
];

describe('species that are there', () => {
  test('mercury is named in every draw, surely, and nothing else is', () => {
    for (const seed of seeds) {
      const { impurities, benchFindings } = impureLamp(seed, { extraLines: mercury });
      expect(impurities.map(({ emitter }) => emitter)).toEqual(['Hg I']);
      expect(impurities[0]!.confidence).toBe('sure');
      expect(benchFindings.map(({ id }) => id)).toEqual(['mercury']);
    }
  });

  test('mercury and helium together, on an axis that is off by half a nanometre', () => {
    for (const seed of seeds.slice(0, 30)) {
      const { impurities } = impureLamp(seed, {
        extraLines: [...mercury, ...helium],
        recordedNm: (nm) => nm + 0.5 + 2e-4 * (nm - 500),
      });
      expect(impurities.map(({ emitter }) => emitter).sort()).toEqual(['He I', 'Hg I']);
    }
  });

  test('nitrogen bands mean an air leak, and the missing OH is said', () => {
    const light = nitrogenLight(900);
    for (const seed of seeds.slice(0, 30)) {
      const { impurities, benchFindings } = impureLamp(seed, { backgroundAt: (nm) => 900 * light(nm) });
      expect(impurities.map(({ emitter }) => emitter)).toEqual(['N2']);
      const [leak] = benchFindings;
      expect(leak!.id).toBe('air-leak');
      expect(leak!.evidenceAgainst.join(' ')).toMatch(/OH at 306 to 309 nm recorded and not seen/);
    }
  });
});

describe('species that are not there', () => {
  test.each([1, 3, 12])('%d lines at random places are taken for a species in at most 1 of 100', (count) => {
    let claimed = 0;
    for (const seed of seeds.concat(seeds.map((each) => each + 1000))) {
      const random = createRandom(seed);
      const extraLines = Array.from({ length: count }, () => ({
        wavelengthNm: 310 + 580 * random.uniform(),
        relativeArea: 0.002 + 0.02 * random.uniform(),
      }));
      if (impureLamp(seed, { extraLines }).impurities.length > 0) claimed++;
    }
    // Two expected of 200; six or more have a chance below 2 %.
    expect(claimed).toBeLessThanOrEqual(5);
  });

  test.each([
    ['Na I', 589.592],
    ['Hg I', 546.075],
    ['He I', 587.562],
    ['CH', 431.42],
  ])(
    'one strong line where %s has one claims nothing, and is listed without a name',
    (name, wavelengthNm) => {
      for (const seed of seeds.slice(0, 10)) {
        const { impurities, unassignedPeaks } = impureLamp(seed, {
          extraLines: [{ wavelengthNm, relativeArea: 0.02 }],
        });
        expect(impurities).toEqual([]);
        expect(unassignedPeaks.count).toBe(1);
        expect(Math.abs(unassignedPeaks.strongest[0]!.wavelengthNm - wavelengthNm)).toBeLessThan(0.03);
        expect(unassignedPeaks.strongest[0]!.candidates.join(' ')).toContain(name);
      }
    },
  );

  test('lines of nitrogen where bands should be: narrow lines at its heads have no tails', () => {
    const extraLines = [337.13, 357.69, 380.49, 375.54].map((wavelengthNm) => ({
      wavelengthNm: wavelengthNm - 0.03,
      relativeArea: 0.01,
    }));
    for (const seed of seeds.slice(0, 10))
      expect(impureLamp(seed, { extraLines }).impurities.map(({ emitter }) => emitter)).not.toContain('N2');
  });

  test('a coarse instrument of 1.5 nm names the same mercury, and no more', () => {
    const bench = { ...knownBench, instrument: { fwhmNm: 1.5, fwhmSigmaNm: 0.05 } };
    for (const seed of seeds.slice(0, 20)) {
      const { impurities } = impureLamp(seed, { bench, extraLines: mercury });
      expect(impurities.map(({ emitter }) => emitter)).toEqual(['Hg I']);
    }
  });
});
