import { erf } from '../../shared-core/numeric/error-function.ts';
import { createRandom, type Random } from '../../shared-core/numeric/random.ts';
import { fineStructureComponents } from '../../shared-core/physics/fine-structure.ts';
import { hydrogenLine, type HydrogenLine } from '../../shared-core/physics/hydrogen.ts';

/**
 * Recordings of a homogeneous tube with a mirror or a continuum source behind it, by brute force: the true profile in cells
 * of 0.5 pm, exponentials in every cell, then the instrument. Shares no formula with shared-core/optical-depth.
 */
export interface PairTruth {
  /** Atoms in n = 2 along the line of sight, m^-2. */
  readonly column: number;
  readonly gasKelvin: number;
  /** Lorentz FWHM of each line, nm; at least 0.5 pm, or the summation shows its grid. */
  readonly lorentzNm: (line: HydrogenLine) => number;
  readonly instrumentFwhmNm: number;
  /** Electrons of each line if the tube were thin. */
  readonly thinElectrons: (line: HydrogenLine) => number;
  readonly continuumElectrons: number;
  readonly mirrorGain: number;
  /** Electrons per pixel. */
  readonly sourceElectrons: number;
}

/** Expected electrons per pixel, by where the light comes from. */
export interface PairMeans {
  readonly wavelengthNm: Float64Array;
  /** The lamp alone. */
  readonly alone: Float64Array;
  /** What the mirror adds: the continuum, and each line by id. */
  readonly mirrorContinuum: Float64Array;
  readonly mirrorLines: ReadonlyMap<string, Float64Array>;
  readonly source: Float64Array;
  /** What the tube lets through of the source. */
  readonly transmitted: Float64Array;
  /** Optical depth at the peak of each line. */
  readonly peakDepth: ReadonlyMap<string, number>;
  /** Share of each line's light that leaves the tube. */
  readonly escape: ReadonlyMap<string, number>;
}

/** Edges of the cells, nm from the centre: fine where the atoms absorb, coarse in the wings. */
const edges = Float64Array.from([
  ...Array.from({ length: 780 }, (_, i) => -8 + 0.01 * i),
  ...Array.from({ length: 800 }, (_, i) => -0.2 + 0.0005 * i),
  ...Array.from({ length: 781 }, (_, i) => 0.2 + 0.01 * i),
]);
const cellCount = edges.length - 1;
const cellNm = (i: number): number => edges[i + 1]! - edges[i]!;
const pixelCount = 3648;
const firstNm = 370;
const pixelNm = 330 / (pixelCount - 1);
/** pi r_e, m; CODATA 2022. */
const piClassicalRadius = Math.PI * 2.8179403205e-15;
/** Absorption oscillator strengths of the Balmer series (W. L. Wiese, J. R. Fuhr, J. Phys. Chem. Ref. Data 38, 565 (2009)). */
const strengths: Readonly<Record<number, number>> = {
  3: 0.64108,
  4: 0.11938,
  5: 0.044694,
  6: 0.022105,
  7: 0.012711,
};

export function pairMeans(truth: PairTruth): PairMeans {
  const { continuumElectrons, mirrorGain, sourceElectrons } = truth;
  const wavelengthNm = Float64Array.from({ length: pixelCount }, (_, px) => firstNm + px * pixelNm);
  const flat = (level: number): Float64Array => new Float64Array(pixelCount).fill(level);
  const alone = flat(continuumElectrons);
  const transmitted = flat(sourceElectrons);
  const mirrorLines = new Map<string, Float64Array>();
  const peakDepth = new Map<string, number>();
  const escape = new Map<string, number>();
  for (const level of [3, 4, 5, 6, 7]) {
    const line = hydrogenLine(level);
    const phi = profileOf(line, truth.gasKelvin, truth.lorentzNm(line));
    const lambdaM = line.wavelengthVacuumNm * 1e-9;
    const depthNm = piClassicalRadius * strengths[level]! * lambdaM * lambdaM * truth.column * 1e9;
    const tau = phi.map((value) => depthNm * value);
    const lost = tau.map((depth) => -Math.expm1(-depth));
    const scale = truth.thinElectrons(line) / depthNm;
    const returned = flat(0);
    addThroughInstrument(
      line.wavelengthAirNm,
      truth.instrumentFwhmNm,
      wavelengthNm,
      (i) => [
        scale * lost[i]!,
        mirrorGain * scale * lost[i]! * Math.exp(-tau[i]!),
        (-sourceElectrons / pixelNm) * lost[i]!,
      ],
      [alone, returned, transmitted],
    );
    mirrorLines.set(line.id, returned);
    peakDepth.set(line.id, Math.max(...tau));
    // What lies beyond the cells is thin, and leaves whole.
    const kept = tau.reduce((sum, depth, i) => sum + (depth - lost[i]!) * cellNm(i), 0);
    escape.set(line.id, 1 - kept / depthNm);
  }
  return {
    wavelengthNm,
    alone,
    mirrorContinuum: flat(continuumElectrons * mirrorGain),
    mirrorLines,
    source: flat(sourceElectrons),
    transmitted,
    peakDepth,
    escape,
  };
}

/** Gauss of every fine-structure component folded with the Lorentz shape by summation; per nm. */
function profileOf(line: HydrogenLine, kelvin: number, lorentzNm: number): Float64Array {
  // 8 ln 2 k T/(m c^2) with k = 1.380649e-23 J/K, m(H) = 1.00782503 u, u = 1.66053907e-27 kg.
  const dopplerNm =
    line.wavelengthVacuumNm *
    Math.sqrt((8 * Math.LN2 * 1.380649e-23 * kelvin) / (1.00782503 * 1.66053907e-27 * 299792458 ** 2));
  const sigmaNm = dopplerNm / Math.sqrt(8 * Math.LN2);
  const gauss: { nm: number; weight: number }[] = [];
  for (const { wavenumberPerCm, share } of fineStructureComponents(line.upperLevel, 2)) {
    const shift = 1e7 / wavenumberPerCm - line.wavelengthVacuumNm;
    for (let k = -75; k <= 75; k++) {
      const x = (k / 75) * 5.5 * sigmaNm;
      gauss.push({ nm: shift + x, weight: share * Math.exp(-0.5 * (x / sigmaNm) ** 2) });
    }
  }
  const total = gauss.reduce((sum, { weight }) => sum + weight, 0);
  const half = lorentzNm / 2;
  // Share of the light below each edge.
  const below = edges.map((nm) =>
    gauss.reduce((sum, { nm: centre, weight }) => sum + weight * Math.atan((nm - centre) / half), 0),
  );
  return Float64Array.from(
    { length: cellCount },
    (_, i) => (below[i + 1]! - below[i]!) / (Math.PI * total * cellNm(i)),
  );
}

function addThroughInstrument(
  centreNm: number,
  fwhmNm: number,
  wavelengthNm: Float64Array,
  densities: (index: number) => readonly number[],
  targets: readonly Float64Array[],
): void {
  const sigmaNm = fwhmNm / Math.sqrt(8 * Math.LN2);
  const cumulative = (nm: number): number => 0.5 * (1 + erf(nm / (Math.SQRT2 * sigmaNm)));
  for (let i = 0; i < cellCount; i++) {
    const nm = centreNm + 0.5 * (edges[i]! + edges[i + 1]!);
    const values = densities(i);
    const from = Math.max(0, Math.ceil((nm - 6 * sigmaNm - firstNm) / pixelNm - 0.5));
    const to = Math.min(pixelCount - 1, Math.floor((nm + 6 * sigmaNm - firstNm) / pixelNm + 0.5));
    let below = cumulative(wavelengthNm[from]! - pixelNm / 2 - nm);
    for (let px = from; px <= to; px++) {
      const above = cumulative(wavelengthNm[px]! + pixelNm / 2 - nm);
      for (const [k, target] of targets.entries())
        target[px] = target[px]! + values[k]! * cellNm(i) * (above - below);
      below = above;
    }
  }
}

/** Offset, gain and read noise of the bench that the tests know. */
export const pairDetector = Object.freeze({
  offsetCounts: 1000,
  gainElectronsPerCount: 5,
  readNoiseElectrons: 12,
});

/** One recording of those means: Poisson electrons, read noise, whole counts. */
export function drawCounts(means: Float64Array, random: Random): Float64Array {
  const { offsetCounts, gainElectronsPerCount, readNoiseElectrons } = pairDetector;
  return means.map((mean) =>
    Math.round(
      offsetCounts +
        (random.poisson(Math.max(0, mean)) + readNoiseElectrons * random.normal()) / gainElectronsPerCount,
    ),
  );
}

/**
 * Recordings of one run: the mirror returns each line a little differently (1 %), the lamp has changed a little (0.5 %)
 * between the recordings with and without the source, as the program allows for.
 */
export function drawPair(
  means: PairMeans,
  seed: number,
): Record<'alone' | 'mirror' | 'source' | 'through', Float64Array> {
  const random = createRandom(seed);
  const mirror = means.alone.map((value, px) => value + means.mirrorContinuum[px]!);
  for (const added of means.mirrorLines.values()) {
    const share = 1 + 0.01 * random.normal();
    for (let px = 0; px < mirror.length; px++) mirror[px] = mirror[px]! + share * added[px]!;
  }
  const drift = 1 + 0.005 * random.normal();
  const through = means.transmitted.map((value, px) => value + drift * means.alone[px]!);
  return {
    alone: drawCounts(means.alone, random),
    mirror: drawCounts(mirror, random),
    source: drawCounts(means.source, random),
    through: drawCounts(through, random),
  };
}
