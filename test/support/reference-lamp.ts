import { correctRecording } from '../../shared-core/noise/correct-recording.ts';
import type { CorrectedRecording } from '../../shared-core/noise/corrected-recording.ts';
import { createRandom } from '../../shared-core/numeric/random.ts';
import type { Recording } from '../../shared-core/recording/recording.ts';
import { asRecording, knownBench } from './diagnose-simulated.ts';

/** What a line of zero width looks like: light per nm at a distance from it, area 1. */
export type Shape = (nm: number) => number;

/** Places of Hg I in air, nm, rounded, with photons relative to the strongest. */
const lines = [
  [404.656, 0.4],
  [435.833, 1],
  [546.075, 0.9],
  [576.961, 0.15],
  [579.067, 0.15],
  [690.75, 0.1],
] as const;

export const pseudoVoigt =
  (fwhmNm: number, lorentzShare: number): Shape =>
  (nm) => {
    const x = nm / fwhmNm;
    const gauss = (Math.sqrt((4 * Math.LN2) / Math.PI) / fwhmNm) * Math.exp(-4 * Math.LN2 * x * x);
    const lorentz = 2 / (Math.PI * fwhmNm * (1 + 4 * x * x));
    return (1 - lorentzShare) * gauss + lorentzShare * lorentz;
  };

/** A wide slit: a rectangle through a Gaussian of the optics, by midpoints. */
export const slit =
  (widthNm: number, opticsNm: number): Shape =>
  (nm) => {
    const optics = pseudoVoigt(opticsNm, 0);
    const steps = 60;
    let sum = 0;
    for (let k = 0; k < steps; k++) sum += optics(nm - widthNm * ((k + 0.5) / steps - 0.5));
    return sum / steps;
  };

/** A lamp with sharp lines, 370 to 700 nm on 3648 pixels; pixels are integrated over by ten midpoints. */
export function referenceLamp(
  shapeAt: (lineNm: number) => Shape,
  { seed = 1, brightestElectrons = 150_000, reachNm = 8 } = {},
): Recording {
  const random = createRandom(seed);
  const pixelNm = 330 / 3647;
  const phase = pixelNm * random.uniform();
  const wavelengthNm = Float64Array.from({ length: 3648 }, (_, px) => 370 + phase + px * pixelNm);
  const photons = new Float64Array(3648);
  for (const [lineNm, strength] of lines) {
    const shape = shapeAt(lineNm);
    const from = Math.max(0, Math.floor((lineNm - reachNm - 370) / pixelNm));
    const to = Math.min(3647, Math.ceil((lineNm + reachNm - 370) / pixelNm));
    for (let px = from; px <= to; px++) {
      let sum = 0;
      for (let k = 0; k < 10; k++)
        sum += shape(wavelengthNm[px]! + pixelNm * ((k + 0.5) / 10 - 0.5) - lineNm);
      photons[px] = photons[px]! + (strength * sum) / 10;
    }
  }
  const top = Math.max(...photons);
  const { offsetCounts, gainElectronsPerCount, readNoiseElectrons } = knownBench.detector!;
  const signal = photons.map((value) => {
    const electrons =
      random.poisson(20 + (brightestElectrons * value) / top) + readNoiseElectrons! * random.normal();
    return Math.round(offsetCounts! + electrons / gainElectronsPerCount!);
  });
  return { ...asRecording(wavelengthNm, signal), name: 'reference-lamp.csv' };
}

export function correctedLamp(...args: Parameters<typeof referenceLamp>): CorrectedRecording {
  const corrected = correctRecording(referenceLamp(...args), null, knownBench);
  if (!corrected.ok) throw new Error(corrected.problem.code);
  return corrected.value;
}
