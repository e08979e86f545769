import { createRandom } from '../numeric/random.ts';
import { voigtPixel, type PixelShare } from '../numeric/voigt-pixel.ts';
import { simulatedProfiles, type SimulatedProfile } from './simulated-profiles.ts';
import { exportCounts } from './export-counts.ts';
import { simulationDefaults, type SimulationInput } from './simulation-input.ts';

export { simulationDefaults, type SimulationInput } from './simulation-input.ts';

export interface SimulatedRecording {
  /** nm as the axis writes it, increasing. */
  readonly wavelengthNm: Float64Array;
  /** Counts, offset included, clipped at saturation; whole unless the export smooths them. */
  readonly signal: Float64Array;
  /** Expected electrons of each line, by id. */
  readonly trueAreaElectrons: ReadonlyMap<string, number>;
}

/**
 * Simulates what a bench records of a hydrogen plasma with Boltzmann populations: photon numbers proportional to
 * g A exp(-E/kT), Voigt profiles integrated over pixels, Poisson electrons, normal read noise, whole counts.
 *
 * @check test/reference/simulation.test.ts (areas and widths by numerical integration outside this program)
 */
export function simulateRecording(input: SimulationInput): SimulatedRecording {
  const { bench, seed } = input;
  const trueNm = pixelCentresNm(input);
  const expected = expectedElectrons(input, trueNm);
  const gain = bench.detector?.gainElectronsPerCount ?? simulationDefaults.gainElectronsPerCount;
  const readNoise = bench.detector?.readNoiseElectrons ?? simulationDefaults.readNoiseElectrons;
  const offset = bench.detector?.offsetCounts ?? simulationDefaults.offsetCounts;
  const saturation = bench.detector?.saturationCounts ?? simulationDefaults.saturationCounts;
  const random = createRandom(seed);
  const signal = expected.electrons.map((mean) => {
    const electrons = random.poisson(mean) + readNoise * random.normal();
    return Math.max(0, Math.min(saturation, Math.round(offset + electrons / gain)));
  });
  const recordedNm = input.recordedNm ?? ((nm: number): number => nm);
  return {
    wavelengthNm: trueNm.map(recordedNm),
    signal: exportCounts(signal, saturation, input),
    trueAreaElectrons: expected.areas,
  };
}

/** A dark frame of the same bench: offset and read noise, averaged over `frameCount` frames. */
export function simulateDark(
  input: Pick<SimulationInput, 'bench' | 'seed' | 'pixelCount' | 'rangeNm'>,
  frameCount = 16,
) {
  const { bench, seed } = input;
  const gain = bench.detector?.gainElectronsPerCount ?? simulationDefaults.gainElectronsPerCount;
  const readNoise = bench.detector?.readNoiseElectrons ?? simulationDefaults.readNoiseElectrons;
  const offset = bench.detector?.offsetCounts ?? simulationDefaults.offsetCounts;
  const random = createRandom(seed);
  const wavelengthNm = pixelCentresNm(input);
  const signal = wavelengthNm.map(() => {
    let sum = 0;
    for (let frame = 0; frame < frameCount; frame++)
      sum += Math.round(offset + (readNoise * random.normal()) / gain);
    return sum / frameCount;
  });
  return { wavelengthNm, signal };
}

function pixelCentresNm({
  bench,
  pixelCount,
  rangeNm,
}: Pick<SimulationInput, 'bench' | 'pixelCount' | 'rangeNm'>) {
  const count = pixelCount ?? simulationDefaults.pixelCount;
  const coefficients = bench.axis?.coefficientsNm;
  const [first, last] = rangeNm ?? simulationDefaults.rangeNm;
  return Float64Array.from({ length: count }, (_, px) =>
    coefficients === undefined
      ? first + ((last - first) * px) / (count - 1)
      : coefficients.reduceRight((sum, coefficient) => sum * px + coefficient, 0),
  );
}

/** Mean electrons per pixel and per line. */
export function expectedElectrons(
  input: SimulationInput,
  centreNm: Float64Array,
): { readonly electrons: Float64Array; readonly areas: ReadonlyMap<string, number> } {
  const { bench } = input;
  const n = centreNm.length;
  const electrons = new Float64Array(n);
  const profiles = simulatedProfiles(input, centreNm[0]!, centreNm[n - 1]!);
  const share: PixelShare = { share: 0, byCentre: 0, byGaussianFwhm: 0, byLorentzianFwhm: 0 };
  for (const profile of profiles) {
    for (let px = 0; px < n; px++) {
      const half =
        0.5 *
        ((centreNm[Math.min(n - 1, px + 1)]! - centreNm[Math.max(0, px - 1)]!) /
          (px === 0 || px === n - 1 ? 1 : 2));
      if (
        Math.abs(centreNm[px]! - profile.centreNm) >
        20 * profile.gaussianFwhmNm + 80 * profile.lorentzianFwhmNm
      )
        continue;
      voigtPixel(profile, centreNm[px]! - half, centreNm[px]! + half, share);
      electrons[px] = electrons[px]! + profile.relativeArea * share.share;
    }
  }
  const gain = bench.detector?.gainElectronsPerCount ?? simulationDefaults.gainElectronsPerCount;
  const offset = bench.detector?.offsetCounts ?? simulationDefaults.offsetCounts;
  const saturation = bench.detector?.saturationCounts ?? simulationDefaults.saturationCounts;
  const wanted =
    input.brightestPixelElectrons ?? simulationDefaults.brightestShare * (saturation - offset) * gain;
  const scale = wanted / electrons.reduce((most, value) => Math.max(most, value), 0);
  const continuum = input.continuumElectrons ?? 0;
  return {
    electrons: electrons.map(
      (value, px) => value * scale + continuum + (input.backgroundAt?.(centreNm[px]!) ?? 0),
    ),
    areas: totalsById(profiles, scale),
  };
}

function totalsById(profiles: readonly SimulatedProfile[], scale: number): ReadonlyMap<string, number> {
  const totals = new Map<string, number>();
  for (const { id, relativeArea } of profiles) totals.set(id, (totals.get(id) ?? 0) + relativeArea * scale);
  return totals;
}
