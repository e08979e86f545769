import { faddeeva } from '../numeric/faddeeva.ts';
import { exp, log } from '../numeric/portable-math.ts';
import { dopplerFwhmNm } from '../physics/broadening.ts';
import { atomicMassU, constants } from '../physics/constants.ts';
import { fineStructureComponents } from '../physics/fine-structure.ts';
import { oscillatorStrength, seriesLine, type HydrogenLine } from '../physics/hydrogen.ts';
import {
  defaultGasTemperatureK,
  lorentzianBeforehandNm,
  type LampConditions,
} from '../physics/line-widths.ts';
import { starkWidthOfLine } from '../physics/stark.ts';

/** The gas that absorbs, as far as its lines' shapes go. */
export interface AbsorbingAtoms {
  readonly lamp: LampConditions;
  /** 0 where the Stark width is not seen. */
  readonly electronsPerCubicMetre: number;
  /** Atoms of deuterium per atom of hydrogen. */
  readonly deuteriumRatio: number;
}

/** Shape in which atoms absorb, no instrument, at the nodes of a quadrature. */
export interface AbsorbingProfile {
  /** nm from the centroid of the hydrogen line. */
  readonly offsetNm: Float64Array;
  /** Weight of each node, nm. */
  readonly weightNm: Float64Array;
  /** Per nm, area 1. */
  readonly perNm: Float64Array;
  readonly peakPerNm: number;
  /** Optical depth integrated over wavelength, nm, that an atom in the lower level per m^2 gives. */
  readonly depthNmPerColumn: number;
}

interface Stick {
  readonly nm: number;
  readonly weight: number;
  readonly dopplerNm: number;
}

const twoSqrtLn2 = 1.6651092223153956;
const inverseSqrtPi = 0.5641895835477563;
/** Nodes per width of the narrowest stick, wherever a stick lies; the rule then converges beyond single precision. */
const nodesPerWidth = 5;
const coarsestStep = 0.1;
/** Lorentz widths to the ends: less than 1e-4 of the light lies beyond. */
const tailWidths = 5000;

/**
 * Doppler, Stark and pressure widths about every fine-structure component of both isotopes, sampled for the trapezoidal
 * rule in u with x = s sinh u.
 *
 * Integrated depth of one atom per m^2: pi r_e f lambda^2. Stimulated emission is left out; it takes exp(-h nu/kT) of the
 * depth, 3 % of that of H-alpha at 6000 K.
 *
 * @source [Mitchell1934] ch. 3; rule: [Trefethen2014]
 * @check  test/unit/optical-depth/absorbing-profile.test.ts
 */
export function absorbingProfile(line: HydrogenLine, atoms: AbsorbingAtoms): AbsorbingProfile {
  const lorentzNm =
    lorentzianBeforehandNm(line, atoms.lamp) +
    (atoms.electronsPerCubicMetre > 0 ? starkWidthOfLine(line.upperLevel, atoms.electronsPerCubicMetre) : 0);
  const sticks = sticksOf(line, atoms);
  const narrowest = sticks.reduce((so, { dopplerNm }) => Math.min(so, dopplerNm), Infinity);
  const farthest = sticks.reduce((so, { nm }) => Math.max(so, Math.abs(nm)), 0);
  const scale = Math.max(narrowest, 0.5 * lorentzNm);
  const step = Math.min(coarsestStep, scale / nodesPerWidth / Math.sqrt(scale * scale + farthest * farthest));
  const reach = (farthest + 8 * narrowest + tailWidths * lorentzNm) / scale;
  const half = Math.ceil(log(reach + Math.sqrt(reach * reach + 1)) / step);
  const count = 2 * half + 1;
  const offsetNm = new Float64Array(count);
  const weightNm = new Float64Array(count);
  const perNm = new Float64Array(count);
  const w = { re: 0, im: 0 };
  for (let i = 0; i < count; i++) {
    const grow = exp((i - half) * step);
    offsetNm[i] = (scale * (grow - 1 / grow)) / 2;
    weightNm[i] = (scale * step * (grow + 1 / grow)) / 2;
    for (const { nm, weight, dopplerNm } of sticks) {
      faddeeva((twoSqrtLn2 * (offsetNm[i]! - nm)) / dopplerNm, (twoSqrtLn2 * 0.5 * lorentzNm) / dopplerNm, w);
      perNm[i] = perNm[i]! + (weight * twoSqrtLn2 * inverseSqrtPi * Math.max(0, w.re)) / dopplerNm;
    }
  }
  const wavelengthM = line.wavelengthVacuumNm * 1e-9;
  const strength = oscillatorStrength(line.lowerLevel, line.upperLevel);
  return {
    offsetNm,
    weightNm,
    perNm,
    peakPerNm: peakOf(offsetNm, perNm),
    depthNmPerColumn:
      Math.PI * constants.classicalElectronRadius.value * strength * wavelengthM * wavelengthM * 1e9,
  };
}

function sticksOf(line: HydrogenLine, { lamp, deuteriumRatio }: AbsorbingAtoms): readonly Stick[] {
  const kelvin = lamp.gasTemperatureK ?? defaultGasTemperatureK;
  const ofIsotope = (isotope: 'H' | 'D', share: number): Stick[] => {
    const { wavelengthVacuumNm } = seriesLine(line.upperLevel, line.lowerLevel, isotope);
    const dopplerNm = dopplerFwhmNm(wavelengthVacuumNm, kelvin, atomicMassU[isotope]);
    return fineStructureComponents(line.upperLevel, line.lowerLevel, isotope).map((component) => ({
      nm: 1e7 / component.wavenumberPerCm - line.wavelengthVacuumNm,
      weight: share * component.share,
      dopplerNm,
    }));
  };
  const hydrogen = 1 / (1 + deuteriumRatio);
  return [
    ...ofIsotope('H', hydrogen),
    ...(deuteriumRatio > 0 ? ofIsotope('D', deuteriumRatio * hydrogen) : []),
  ];
}

/** Top of the parabola through the highest node and its neighbours. */
function peakOf(offsetNm: Float64Array, perNm: Float64Array): number {
  let top = 1;
  for (let i = 1; i < perNm.length - 1; i++) if (perNm[i]! > perNm[top]!) top = i;
  const [a, b, c] = [offsetNm[top - 1]!, offsetNm[top]!, offsetNm[top + 1]!];
  const rise = (perNm[top]! - perNm[top - 1]!) / (b - a);
  const fall = (perNm[top + 1]! - perNm[top]!) / (c - b);
  const curvature = (fall - rise) / (c - a);
  // Slope at the top node; the parabola rises from there by slope^2/(4 |curvature|).
  const slope = rise + curvature * (b - a);
  return curvature < 0 ? perNm[top]! - (slope * slope) / (4 * curvature) : perNm[top]!;
}
