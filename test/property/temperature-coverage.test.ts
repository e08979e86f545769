import { describe, expect, test } from 'vitest';
import { diagnoseSimulated, knownBench } from '../support/diagnose-simulated.ts';
import { fisherBounds } from '../support/fisher-bound.ts';

const drawCount = 200;
const electronsPerCubicMetre = 1e19;
const continuumElectrons = 20;
/** Electrons in the brightest pixel: 240 000 fills three quarters of the converter, 4 000 about one eightieth. */
const lights = { bright: 240_000, faint: 4000 } as const;

interface Draws {
  readonly covered: number;
  readonly rmsErrorK: number;
  readonly meanPull: number;
}

function draw(kelvin: number, brightestPixelElectrons: number, seed: number): Draws {
  let covered = 0;
  let squares = 0;
  let pulls = 0;
  for (let index = 0; index < drawCount; index++) {
    const { diagnosis } = diagnoseSimulated({
      bench: knownBench,
      kelvin,
      electronsPerCubicMetre,
      seed: seed + index,
      brightestPixelElectrons,
      continuumElectrons,
    });
    const { status, kelvin: found, sigmaKelvin, lowKelvin, highKelvin } = diagnosis.temperature;
    // Every draw counts: a refusal would be a failure here.
    expect(status, `seed ${String(seed + index)}`).toBe('measured');
    if (lowKelvin! <= kelvin && kelvin <= highKelvin!) covered++;
    squares += (found! - kelvin) ** 2;
    pulls += (found! - kelvin) / sigmaKelvin!;
  }
  return {
    covered: covered / drawCount,
    rmsErrorK: Math.sqrt(squares / drawCount),
    meanPull: pulls / drawCount,
  };
}

/** Own simulation with known truth: 370 to 700 nm, 3,648 pixels, 0.18 nm, two pixels a width. */
describe.each([4000, 6000, 8000, 12_000])('at %d K', (kelvin) => {
  test.each(Object.entries(lights))(
    '%s light: the interval holds the truth and is as sharp as the data allow',
    (light, peak) => {
      const { kelvin: bound } = fisherBounds({
        kelvin,
        brightestPixelElectrons: peak,
        continuumElectrons,
        electronsPerCubicMetre,
        fwhmNm: Math.hypot(0.18, 0.0129),
        fwhmSigmaNm: 0.004,
        readNoiseElectrons: 12,
        gainElectronsPerCount: 5,
        pixelNm: 330 / 3647,
        firstNm: 370,
        lastNm: 700,
        halfWindowNm: 2.5,
        // The simulator follows the width laws here.
        starkErrors: false,
      });
      const seed = 100_000 + kelvin + (light === 'bright' ? 0 : 500_000);
      const found = draw(kelvin, peak, seed);
      const ratio = found.rmsErrorK / bound;
      console.info(
        `${String(kelvin)} K ${light}: coverage ${String(found.covered)}, rms ${found.rmsErrorK.toFixed(1)} K = ${ratio.toFixed(3)} bounds, mean pull ${found.meanPull.toFixed(3)}`,
      );
      expect(found.covered).toBeGreaterThanOrEqual(0.92);
      expect(found.covered).toBeLessThanOrEqual(0.98);
      expect(ratio).toBeLessThanOrEqual(1.1);
      // Far below the bound would mean that the bound, or the simulation, is wrong.
      expect(ratio).toBeGreaterThanOrEqual(0.85);
      expect(Math.abs(found.meanPull)).toBeLessThanOrEqual(0.2);
    },
  );
});
