import { photonEnergyEvNm } from '../../shared-core/physics/constants.ts';
import { hydrogenLine } from '../../shared-core/physics/hydrogen.ts';
import type { SpectralLine } from '../../shared-core/physics/spectral-line.ts';

/** A row of `lampwright lines`: a hydrogen line that a diagnosis rests on, or one of the shipped table. */
export interface ListedLine extends Omit<SpectralLine, 'use'> {
  /** "H-alpha" as in a diagnosis; null for the lines of the table. */
  readonly id: string | null;
  readonly use: SpectralLine['use'] | 'diagnosis';
}

/** The highest upper level that a bench file may ask for. */
const highestLevel = 20;

/** Hydrogen lines and the table, by wavelength. */
export function listedLines(table: readonly SpectralLine[]): ListedLine[] {
  const balmer = Array.from({ length: highestLevel - 2 }, (_, index) => balmerLine(index + 3));
  const others = table.map((line) => ({ id: null, ...line }));
  return [...balmer, ...others].sort((a, b) => a.wavelengthAirNm - b.wavelengthAirNm);
}

function balmerLine(upperLevel: number): ListedLine {
  const line = hydrogenLine(upperLevel);
  const lowerEnergyEv = line.upperEnergyEv - photonEnergyEvNm / line.wavelengthVacuumNm;
  return {
    id: line.id,
    species: line.isotope,
    ionStage: 'I',
    wavelengthAirNm: Number(line.wavelengthAirNm.toFixed(5)),
    wavelengthToleranceNm: 0.0001,
    transitionProbabilityPerS: Number(line.transitionProbabilityPerS.toPrecision(6)),
    upperEnergyEv: Number(line.upperEnergyEv.toFixed(6)),
    upperWeight: line.upperWeight,
    lowerEnergyEv: Number(lowerEnergyEv.toFixed(6)),
    relativeStrength: null,
    transition: '',
    kind: 'line',
    shading: null,
    use: 'diagnosis',
    meaning: `${line.id}, upper level ${String(upperLevel)}`,
    source: 'blend centroid after J. Reader, Appl. Spectrosc. 58, 1469 (2004)',
    verified: 'computed',
  };
}
