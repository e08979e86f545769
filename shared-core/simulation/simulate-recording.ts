import type { Bench } from '../bench/bench.ts';
import { exp } from '../numeric/portable-math.ts';
import { createRandom } from '../numeric/random.ts';
import { voigtPixel, type PixelShare } from '../numeric/voigt-pixel.ts';
import { balmerAbsorption } from '../physics/balmer-absorption.ts';
import { hydrogenLine, type HydrogenLine } from '../physics/hydrogen.ts';
import { boltzmannEvPerK } from '../physics/constants.ts';
import { lorentzianBeforehandNm, thermalFwhmSquaredNm2 } from '../physics/line-widths.ts';
import { starkWidthOfLine } from '../physics/stark.ts';

/** What to simulate; everything but temperature, density and seed has a default, see `simulationDefaults`. */
export interface SimulationInput {
  /** Instrument, detector, axis and lamp; missing fields take the defaults below. */
  readonly bench: Bench;
  readonly kelvin: number;
  readonly electronsPerCubicMetre: number;
  /** Whole number, 0 to 2^32 - 1: the same seed gives the same recording. */
  readonly seed: number;
  readonly pixelCount?: number;
  /** nm of the first and last pixel; used when the bench gives no axis coefficients. */
  readonly rangeNm?: readonly [number, number];
  /** Expected electrons in the brightest pixel. */
  readonly brightestPixelElectrons?: number;
  /** Continuum under the lines, electrons per pixel. */
  readonly continuumElectrons?: number;
  /** Relative response, counts per photon, at a wavelength in nm; flat when absent. */
  readonly responseAt?: (nm: number) => number;
  /** What the axis writes instead of the true wavelength, both nm. */
  readonly recordedNm?: (trueNm: number) => number;
  /** Relative population per sublevel of each upper level, in place of exp(-E/kT). */
  readonly populationOf?: (upperLevel: number) => number;
  /** Optical depth at the centre of H-alpha of a homogeneous tube; the other lines follow. */
  readonly hAlphaOpticalDepth?: number;
  /** Further narrow lines: true wavelength in nm and area relative to H-alpha. */
  readonly extraLines?: readonly { readonly wavelengthNm: number; readonly relativeArea: number }[];
}

export const simulationDefaults = Object.freeze({
  pixelCount: 3648,
  rangeNm: Object.freeze([370, 700] as const),
  instrumentFwhmNm: 0.18,
  gainElectronsPerCount: 5,
  readNoiseElectrons: 12,
  offsetCounts: 1000,
  saturationCounts: 65535,
  /** Of full scale, for the brightest pixel. */
  brightestShare: 0.75,
});

export interface SimulatedRecording {
  /** nm as the axis writes it, increasing. */
  readonly wavelengthNm: Float64Array;
  /** Counts, whole, offset included, clipped at saturation. */
  readonly signal: Float64Array;
  /** Expected electrons of each line, by id. */
  readonly trueAreaElectrons: ReadonlyMap<string, number>;
}

/** Balmer lines up to this level are put in, whether analysed or not: the series goes on in a real tube. */
const highestLevel = 12;

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
  return { wavelengthNm: trueNm.map(recordedNm), signal, trueAreaElectrons: expected.areas };
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
  const { bench, kelvin, electronsPerCubicMetre } = input;
  const instrument = bench.instrument?.fwhmNm ?? simulationDefaults.instrumentFwhmNm;
  const response = input.responseAt ?? ((): number => 1);
  const isAir = bench.axis?.medium !== 'vacuum';
  const n = centreNm.length;
  const firstNm = centreNm[0]!;
  const lastNm = centreNm[n - 1]!;
  const electrons = new Float64Array(n);
  const relative = new Map<string, number>();
  const profiles: { id: string; centreNm: number; gaussianFwhmNm: number; lorentzianFwhmNm: number }[] = [];
  const lowest = hydrogenLine(3);
  for (let level = 3; level <= highestLevel; level++) {
    const line = hydrogenLine(level);
    const nm = isAir ? line.wavelengthAirNm : line.wavelengthVacuumNm;
    if (nm < firstNm - 2 || nm > lastNm + 2) continue;
    const population =
      input.populationOf?.(level) ??
      exp((lowest.upperEnergyEv - line.upperEnergyEv) / (boltzmannEvPerK * kelvin));
    relative.set(
      line.id,
      response(nm) * line.upperWeight * line.transitionProbabilityPerS * population * escapeOf(input, line),
    );
    profiles.push({
      id: line.id,
      centreNm: nm,
      gaussianFwhmNm: Math.sqrt(instrument * instrument + thermalFwhmSquaredNm2(line, bench.lamp ?? {})),
      lorentzianFwhmNm:
        lorentzianBeforehandNm(line, bench.lamp ?? {}) +
        starkWidthOfLine(line.upperLevel, electronsPerCubicMetre),
    });
  }
  const alpha = response(lowest.wavelengthAirNm) * lowest.upperWeight * lowest.transitionProbabilityPerS;
  for (const [index, extra] of (input.extraLines ?? []).entries()) {
    const id = `extra-${String(index + 1)}`;
    relative.set(id, alpha * extra.relativeArea);
    profiles.push({ id, centreNm: extra.wavelengthNm, gaussianFwhmNm: instrument, lorentzianFwhmNm: 0 });
  }
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
      electrons[px] = electrons[px]! + relative.get(profile.id)! * share.share;
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
    electrons: electrons.map((value) => value * scale + continuum),
    areas: new Map([...relative].map(([id, value]) => [id, value * scale])),
  };
}

/** Share of a line's light that leaves a tube of this depth; the instrument hides that it leaves wider, too. */
function escapeOf(
  { bench, electronsPerCubicMetre, hAlphaOpticalDepth }: SimulationInput,
  line: HydrogenLine,
): number {
  if (hAlphaOpticalDepth === undefined) return 1;
  const [absorption] = balmerAbsorption([line], bench.lamp ?? {}, electronsPerCubicMetre, hydrogenLine(3));
  return absorption!.curve.escapeAt(hAlphaOpticalDepth * absorption!.relativeDepth).share;
}
