import { fillVoigtRun, gaussianFwhmPerSigma, voigtRunStride } from '../numeric/voigt-run.ts';
import { exp } from '../numeric/portable-math.ts';
import { dopplerFwhmNm } from '../physics/broadening.ts';
import { atomicMassU } from '../physics/constants.ts';
import { fineStructureComponents } from '../physics/fine-structure.ts';
import { oscillatorStrength, type HydrogenLine } from '../physics/hydrogen.ts';

/** Profile of the atoms themselves, no instrument: unit area, sampled as means over cells about the line's centroid. */
interface AtomicProfile {
  /** Edges of the cells, nm from the centroid; one more than there are cells. */
  readonly edgeNm: Float64Array;
  /** Part of the area that falls on each cell. */
  readonly share: Float64Array;
  /** Largest share over width, per nm. */
  readonly peakPerNm: number;
}

/** Light that a slab keeps, gathered in a stretch as wide as `fwhmNm` tells. */
export interface LostLight {
  /** nm from the centroid of the line. */
  readonly shiftNm: number;
  /** 2.3548 times the rms spread of what was gathered, nm. */
  readonly fwhmNm: number;
  /** Part of the line's light. */
  readonly share: number;
}

/** Cells this much narrower than the profile; the light lost is then exact to 1e-3 of itself. */
const cellsPerWidth = 12;
/** Beyond so many widths less than 2e-4 of the light is lost at any depth that is simulated. */
const widthsOut = 8;

/**
 * Doppler, Stark and pressure widths about every fine-structure component of a line.
 *
 * @param gasKelvin         of the absorbing atoms
 * @param lorentzianFwhmNm  all Lorentz parts together
 * @check test/unit/simulation/lost-light.test.ts
 */
export function atomicProfile(
  line: HydrogenLine,
  gasKelvin: number,
  lorentzianFwhmNm: number,
): AtomicProfile {
  const gaussianFwhmNm = dopplerFwhmNm(line.wavelengthVacuumNm, gasKelvin, atomicMassU[line.isotope]);
  const wide = Math.max(gaussianFwhmNm, lorentzianFwhmNm);
  const components = fineStructureComponents(line.upperLevel, line.lowerLevel, line.isotope).map(
    ({ wavenumberPerCm, share }) => ({ nm: 1e7 / wavenumberPerCm - line.wavelengthVacuumNm, share }),
  );
  const reach = widthsOut * wide + components.reduce((most, { nm }) => Math.max(most, Math.abs(nm)), 0);
  const half = Math.ceil((reach * cellsPerWidth) / wide);
  const edgeNm = Float64Array.from(
    { length: 2 * half + 2 },
    (_, i) => ((i - half - 0.5) * wide) / cellsPerWidth,
  );
  const cellCount = edgeNm.length - 1;
  const share = new Float64Array(cellCount);
  const run = new Float64Array(cellCount * voigtRunStride);
  for (const component of components) {
    fillVoigtRun(
      { centreNm: component.nm, gaussianFwhmNm, lorentzianFwhmNm },
      component.share,
      edgeNm,
      0,
      cellCount,
      run,
    );
    for (let i = 0; i < cellCount; i++) share[i] = share[i]! + run[i * voigtRunStride]!;
  }
  const peak = share.reduce((most, value) => Math.max(most, value), 0);
  return { edgeNm, share, peakPerNm: (peak * cellsPerWidth) / wide };
}

/**
 * What a homogeneous slab keeps of a line, cell by cell: p - (1 - exp(-k p)) / k, p the profile of unit area, k the
 * optical depth times width that p is scaled to; gathered in stretches of `gatherNm` with centroid and spread kept, so
 * that no instrument wider than a few stretches can tell them from the cells.
 *
 * @param depthNm  optical depth integrated over wavelength, nm: depth at the centre / peak of the profile
 * @source [Mitchell1934] ch. 3
 * @check test/unit/simulation/lost-light.test.ts (areas and widths of absorbed lines from the literature)
 */
export function lostLight(
  { edgeNm, share }: AtomicProfile,
  depthNm: number,
  gatherNm: number,
): readonly LostLight[] {
  const lost: LostLight[] = [];
  let area = 0;
  let first = 0;
  let second = 0;
  let stretch = Math.floor(edgeNm[0]! / gatherNm);
  const flush = (): void => {
    if (area <= 0) return;
    const shiftNm = first / area;
    const variance = Math.max(0, second / area - shiftNm * shiftNm);
    lost.push({ shiftNm, fwhmNm: gaussianFwhmPerSigma * Math.sqrt(variance), share: area });
  };
  for (let i = 0; i < share.length; i++) {
    const width = edgeNm[i + 1]! - edgeNm[i]!;
    const nm = 0.5 * (edgeNm[i + 1]! + edgeNm[i]!);
    if (Math.floor(nm / gatherNm) !== stretch) {
      flush();
      stretch = Math.floor(nm / gatherNm);
      area = first = second = 0;
    }
    const depth = (depthNm * share[i]!) / width;
    const kept = share[i]! * (1 - escape(depth));
    area += kept;
    first += kept * nm;
    second += kept * (nm * nm + (width * width) / 12);
  }
  flush();
  return lost;
}

/** (1 - exp(-depth)) / depth. */
const escape = (depth: number): number =>
  depth < 1e-4 ? 1 - (depth / 2) * (1 - depth / 3) : (1 - exp(-depth)) / depth;

/** Optical depth integrated over wavelength goes with f lambda^2 for lines that end on the same level. */
export const absorptionStrength = ({
  lowerLevel,
  upperLevel,
  wavelengthVacuumNm: nm,
}: HydrogenLine): number => oscillatorStrength(lowerLevel, upperLevel) * nm * nm;
