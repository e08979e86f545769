import { describe, expect, test } from 'vitest';
import { findAbsorption, type FittedPlace } from '../../../shared-core/lines/find-absorption.ts';
import { createRandom } from '../../../shared-core/numeric/random.ts';
import { knownBench } from '../../support/diagnose-simulated.ts';
import { fitSimulated } from '../../support/fit-simulated.ts';

const pixelNm = 0.05;
const gauss = (nm: number, fwhmNm: number): number => Math.exp(-4 * Math.LN2 * (nm / fwhmNm) ** 2);

/** 121 pixels about 500 nm: what was recorded, what the fit made of it, and its noise, all as functions of nm from the centre. */
function place(
  recorded: (nm: number) => number,
  modelled: (nm: number) => number,
  { baseline = 400, sigma = 10, seed = 1, correlation = [] as number[] } = {},
): FittedPlace {
  const random = createRandom(seed);
  const nm = Array.from({ length: 121 }, (_, px) => (px - 60) * pixelNm);
  const noise = {
    fixedVariance: new Float64Array(121),
    variancePerSignal: 0,
    signalReference: 'zero' as const,
    origin: 'bench' as const,
    correlation,
    runningMeanPoints: 1,
    gainElectronsPerCount: 1,
  };
  return {
    recording: {
      wavelengthNm: Float64Array.from(nm, (at) => 500 + at),
      netSignal: Float64Array.from(nm, (at) => recorded(at) + sigma * random.normal()),
      clipped: new Uint8Array(121),
      noise,
    },
    modelled: Float64Array.from(nm, modelled),
    baseline: new Float64Array(121).fill(baseline),
    variance: new Float64Array(121).fill(sigma * sigma),
    centreNm: 500,
    fwhmNm: 0.3,
  };
}

describe('a line in absorption', () => {
  const dark = (depth: number) => (nm: number) => 400 * (1 - depth * gauss(nm, 0.3));

  test('is found, with the depth of its middle', () => {
    const found = findAbsorption(place(dark(0.3), dark(0.3)));
    expect(found?.kind).toBe('absorption');
    // Deepest of a few pixels with 2.5 % noise each.
    if (found?.kind === 'absorption') expect(found.depthFraction).toBeCloseTo(0.3, 1);
  });

  test('has no depth where the baseline is no continuum', () => {
    const found = findAbsorption(
      place(
        (nm) => dark(0.3)(nm) - 400,
        (nm) => dark(0.3)(nm) - 400,
        { baseline: 0 },
      ),
    );
    expect(found).toMatchObject({ kind: 'absorption', depthFraction: null });
  });

  test('is not claimed where nothing is missing, in 2000 draws', () => {
    let claimed = 0;
    for (let seed = 0; seed < 2000; seed++) {
      if (findAbsorption(place(() => 400, dark(0), { seed })) !== null) claimed++;
    }
    expect(claimed).toBe(0);
  });

  test('is not claimed on a background that the fit does not follow', () => {
    const wavy = (nm: number): number => 400 - 60 * Math.cos(nm / 0.25);
    expect(findAbsorption(place(wavy, () => 400))).toBeNull();
  });

  test('needs more where neighbours share their noise', () => {
    const faint = place(dark(0.068), dark(0.068));
    expect(findAbsorption(faint)?.kind).toBe('absorption');
    const { noise } = faint.recording;
    const shared = { ...faint.recording, noise: { ...noise, correlation: [0.8, 0.6, 0.4, 0.2] } };
    expect(findAbsorption({ ...faint, recording: shared })).toBeNull();
  });
});

describe('a self-reversed line', () => {
  const single = (nm: number): number => 400 + 3000 * gauss(nm, 0.4);
  const reversed = (nm: number): number => 400 + 4000 * gauss(nm, 0.4) * (1 - 0.5 * gauss(nm, 0.15));

  test('is found by the dip in its middle, with its size', () => {
    const found = findAbsorption(place(reversed, single));
    // Without noise: shoulders 2,873 and middle 2,000 above the baseline, so 30 %.
    expect(found?.kind).toBe('self-reversal');
    if (found?.kind === 'self-reversal') expect(found.dipFraction).toBeCloseTo(0.3, 1);
  });

  test('is not what the model shows as two peaks', () => {
    expect(findAbsorption(place(reversed, reversed))).toBeNull();
  });

  test('is no flat top', () => {
    const flat = (nm: number): number => Math.min(2600, 400 + 3000 * gauss(nm, 0.4));
    expect(findAbsorption(place(flat, single))).toBeNull();
  });

  test('is no dip between two lines', () => {
    const pair = (nm: number): number => 400 + 3000 * gauss(nm, 0.15) + 3000 * gauss(nm + 0.24, 0.15);
    expect(findAbsorption(place(pair, (nm) => 400 + 3000 * gauss(nm, 0.3)))).toBeNull();
  });

  test('is not claimed for a plain line, in 2000 draws', () => {
    let claimed = 0;
    for (let seed = 0; seed < 2000; seed++) {
      if (findAbsorption(place(single, single, { seed })) !== null) claimed++;
    }
    expect(claimed).toBe(0);
  });

  test('is not told from a clipped top', () => {
    const clipped = place(reversed, single);
    const core = clipped.recording.clipped.map((_, px) => (Math.abs(px - 60) < 8 ? 1 : 0));
    expect(findAbsorption({ ...clipped, recording: { ...clipped.recording, clipped: core } })).toBeNull();
  });
});

describe('in the fit of all lines', () => {
  const betaNm = 486.135;
  const alphaNm = 656.279;

  test.each([1, 2, 3, 4, 5])('H-beta in absorption is put aside, the others stand (seed %d)', (seed) => {
    const plain = fitSimulated({ seed, continuumElectrons: 20_000 });
    const fits = fitSimulated({
      seed,
      continuumElectrons: 20_000,
      // More than the light that H-beta gives (20,000 at its top): a dip of 60 % of the continuum is left.
      backgroundAt: (nm) => -32_000 * gauss(nm - betaNm, 0.25),
    });
    expect(fits.obstacles.get('H-beta')?.kind).toBe('absorption');
    expect(fits.fits.map(({ id }) => id)).not.toContain('H-beta');
    const area = (from: typeof fits): number => from.fits.find(({ id }) => id === 'H-alpha')!.area;
    expect(area(fits) / area(plain)).toBeCloseTo(1, 2);
    expect(plain.obstacles.size).toBe(0);
  });

  test.each([1, 2, 3])('a self-reversed H-alpha is put aside, the others stand (seed %d)', (seed) => {
    const bench = { ...knownBench, instrument: { fwhmNm: 0.4, fwhmSigmaNm: 0.008 } };
    const simulation = { seed, brightestPixelElectrons: 150_000, continuumElectrons: 40 };
    const plain = fitSimulated(simulation, bench);
    const fits = fitSimulated(
      { ...simulation, backgroundAt: (nm) => -90_000 * gauss(nm - alphaNm, 0.2) },
      bench,
    );
    expect(plain.obstacles.size).toBe(0);
    expect(fits.obstacles.get('H-alpha')?.kind).toBe('self-reversal');
    expect(fits.fits.map(({ id }) => id)).toEqual(['H-beta', 'H-gamma', 'H-delta', 'H-epsilon']);
    const beta = (from: typeof fits) => from.fits.find(({ id }) => id === 'H-beta')!;
    expect(Math.abs(beta(fits).area - beta(plain).area)).toBeLessThan(beta(plain).areaSigma);
  });
});
