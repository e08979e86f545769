import { describe, expect, test } from 'vitest';
import { coverageCases } from '../accuracy/coverage-cases.ts';
import { runCoverageCase } from '../accuracy/run-coverage.ts';
import { diagnoseSimulated, knownBench } from '../support/diagnose-simulated.ts';
import { molecularBackground } from '../support/molecular-background.ts';

const drawCount = 120;
/** Three binomial errors of the share that is promised. */
const slack = 3 * Math.sqrt((0.95 * 0.05) / drawCount);
const molecular = coverageCases.find(({ name }) => name === 'molecular background')!;

describe('bands of nitrogen under the lines, on a bent continuum', () => {
  // Between the temperatures that the fit chooses from, where it is furthest off.
  test.each([450, 780, 1270, 2000])(
    'rotation at %d K: the intervals of temperature and density hold the truth',
    (rotationalKelvin) => {
      const { temperature, density } = runCoverageCase(
        {
          ...molecular,
          input: { ...molecular.input, backgroundAt: molecularBackground(rotationalKelvin) },
        },
        drawCount,
      );
      expect(temperature.measured).toBe(drawCount);
      expect(temperature.covered / drawCount).toBeGreaterThanOrEqual(0.95 - slack);
      expect(density.covered / drawCount).toBeGreaterThanOrEqual(0.95 - slack);
    },
  );

  test('where they are plain they are named', () => {
    const faint = molecularBackground(600);
    const { evidence } = diagnoseSimulated({
      bench: knownBench,
      kelvin: 7000,
      electronsPerCubicMetre: 1e20,
      seed: 5,
      continuumElectrons: 20,
      backgroundAt: (nm) => 5 * faint(nm),
      brightestPixelElectrons: 240_000,
      rangeNm: [370, 700],
    });
    const bands = evidence.fits.companions.filter(({ species }) => species === 'N2');
    const plain = bands.filter(({ area, areaSigma }) => area > 5 * areaSigma);
    expect(plain.map(({ lineId, referenceNm }) => `${referenceNm} under ${lineId}`)).toContain(
      '434.36 under H-gamma',
    );
  });
});
