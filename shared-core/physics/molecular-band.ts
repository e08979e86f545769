import { exp } from '../numeric/portable-math.ts';
import { secondRadiationConstantMK } from './constants.ts';

/** A vibrational band of a diatomic molecule that is shaded to the violet. */
export interface MolecularBand {
  readonly headNm: number;
  /** Rotational constants of the upper and the lower level; the upper has to be the greater. */
  readonly upperPerCm: number;
  readonly lowerPerCm: number;
}

/** One rotational line of a band. */
export interface BandLine {
  /** -J in the P branch, J + 1 in the R branch, J that of the lower level. */
  readonly m: number;
  /** nm from the head; negative: to the violet. */
  readonly shiftNm: number;
  /** Photons, the whole band 1. */
  readonly share: number;
}

/** Rotational quanta followed: beyond these a band at 3000 K holds less than 1 % of its light. */
const mostQuanta = 60;

/**
 * Rotational lines of a violet-shaded band whose levels are populated at one temperature: P branch m = -J, R branch
 * m = J + 1, wavenumber offset from the origin (B' + B'') m + (B' - B'') m^2, strength |m| exp(-B' m (m - 1) hc/kT); the
 * head is the vertex of the parabola.
 *
 * Spin splitting, Lambda doubling, the weak Q branch and centrifugal stretching are left out: at bench resolution they
 * blur what is drawn here by 0.1 nm.
 *
 * @param kelvin  rotational temperature, above 0
 * @source [Herzberg1950] ch. IV
 * @check  test/reference/molecular-band.test.ts
 */
export function bandLines({ headNm, upperPerCm, lowerPerCm }: MolecularBand, kelvin: number): BandLine[] {
  const sum = upperPerCm + lowerPerCm;
  const difference = upperPerCm - lowerPerCm;
  const vertexPerCm = -(sum * sum) / (4 * difference);
  const nmPerWavenumber = 1e-7 * headNm * headNm;
  const lines: BandLine[] = [];
  let total = 0;
  for (let m = -mostQuanta; m <= mostQuanta; m++) {
    if (m === 0) continue;
    const fromHeadPerCm = sum * m + difference * m * m - vertexPerCm;
    const share = Math.abs(m) * exp((-100 * upperPerCm * m * (m - 1) * secondRadiationConstantMK) / kelvin);
    lines.push({ m, shiftNm: -fromHeadPerCm * nmPerWavenumber, share });
    total += share;
  }
  return lines.map((line) => ({ ...line, share: line.share / total }));
}
