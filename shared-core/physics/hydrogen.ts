import { exp, log } from '../numeric/portable-math.ts';
import { invariant } from '../result/result.ts';
import { vacuumToAirNm } from './air-index.ts';
import {
  constants,
  reducedMassRatio,
  rydbergPerM,
  wavenumberPerEv,
  type HydrogenIsotope,
} from './constants.ts';

/** One Balmer line as an unresolved blend of its fine-structure components. */
export interface HydrogenLine {
  /** "H-alpha", "D-beta", "H-8". */
  readonly id: string;
  readonly isotope: HydrogenIsotope;
  readonly upperLevel: number;
  readonly lowerLevel: number;
  /** Centroid of the blend; air is dry, 15 C, 101 325 Pa. */
  readonly wavelengthVacuumNm: number;
  readonly wavelengthAirNm: number;
  readonly transitionProbabilityPerS: number;
  readonly upperWeight: number;
  readonly upperEnergyEv: number;
}

/** Balmer lines the program knows: upper levels 3 to 20. */
export const highestUpperLevel = 20;

const greekNames = ['alpha', 'beta', 'gamma', 'delta', 'epsilon'];

/**
 * Vacuum wavelength of the Balmer blends n = 3 to 12, nm, +-2e-5: gA-weighted mean wavenumber of all fine-structure
 * components (Dirac energies with recoil and Lamb shift), sublevels populated by weight, no pressure shift. Within the
 * uncertainty of the observed blends of J. Reader, Appl. Spectrosc. 58, 1469 (2004). A centroid from level averages
 * differs, by 0.17 pm for H-alpha, because the components of a blend are not all equally strong.
 */
const blendVacuumNm: Readonly<Record<HydrogenIsotope, readonly number[]>> = Object.freeze({
  H: [
    656.460809, 486.268292, 434.16837, 410.289221, 397.119507, 389.015068, 383.647193, 379.897575, 377.170121,
    375.121747,
  ],
  D: [
    656.282237, 486.136016, 434.050266, 410.177613, 397.011481, 388.909246, 383.542832, 379.794234,
    377.067521, 375.019705,
  ],
});

/** Ionisation energy from the ground state, cm^-1 (NIST Atomic Spectra Database, from memory, recomputed within 4e-6). */
const ionisationPerCm: Readonly<Record<HydrogenIsotope, number>> = Object.freeze({
  H: 109678.77174307,
  D: 109708.614553,
});

/**
 * The Balmer line from `upperLevel` (3 to 20) to n = 2.
 *
 * Beyond n = 12 the wavelength is that of the level centroids, within 2e-5 nm of the blend.
 * @source constants and closed forms of this file; wavelengths: see blendVacuumNm
 * @check  test/reference/hydrogen.test.ts
 */
export function hydrogenLine(upperLevel: number, isotope: HydrogenIsotope = 'H'): HydrogenLine {
  lines ??= { H: computeLines('H'), D: computeLines('D') };
  const line = lines[isotope][upperLevel - 3];
  invariant(line !== undefined, 'Balmer lines have upper levels 3 to 20');
  return line;
}

/** Computed once: every diagnosis asks for the same few lines many times. */
let lines: Record<HydrogenIsotope, readonly HydrogenLine[]> | null = null;

function computeLines(isotope: HydrogenIsotope): readonly HydrogenLine[] {
  return Array.from({ length: highestUpperLevel - 2 }, (_, index) =>
    Object.freeze(computeLine(index + 3, isotope)),
  );
}

function computeLine(upperLevel: number, isotope: HydrogenIsotope): HydrogenLine {
  const wavelengthVacuumNm =
    blendVacuumNm[isotope][upperLevel - 3] ??
    1e7 / (levelPerCm(upperLevel, isotope) - levelPerCm(2, isotope));
  return {
    id: `${isotope}-${greekNames[upperLevel - 3] ?? String(upperLevel)}`,
    isotope,
    upperLevel,
    lowerLevel: 2,
    wavelengthVacuumNm,
    wavelengthAirNm: vacuumToAirNm(wavelengthVacuumNm),
    transitionProbabilityPerS: transitionProbabilityPerS(upperLevel, 2, isotope),
    upperWeight: statisticalWeight(upperLevel),
    upperEnergyEv: levelEnergyEv(upperLevel, isotope),
  };
}

/**
 * Statistical weight of the hydrogen level n, all fine-structure states together: 2 n^2.
 * @check test/reference/hydrogen.test.ts
 */
export function statisticalWeight(n: number): number {
  return 2 * n * n;
}

/**
 * Energy of the level n above the ground state, eV, averaged over its states by weight.
 * @source levelPerCm
 * @check  test/reference/hydrogen.test.ts
 */
export function levelEnergyEv(n: number, isotope: HydrogenIsotope = 'H'): number {
  return levelPerCm(n, isotope) / wavenumberPerEv;
}

/**
 * Wavenumber of the level n >= 2 above the ground state, cm^-1; within 0.001 of the centroid of its states.
 *
 * I - R/n^2 [1 + (alpha^2/n) ((2n - 1)/n^2 - 3/(4n))] + 0.279/n^5: Rydberg term, mean of the Dirac fine structure over
 * the 2 n^2 states, and the Lamb shift of the two s states (1045 MHz at n = 2, falling as n^-3).
 * @source H. A. Bethe, E. E. Salpeter, Quantum Mechanics of One- and Two-Electron Atoms (1957), sections 14 and 19
 * @check  test/reference/hydrogen.test.ts
 */
export function levelPerCm(n: number, isotope: HydrogenIsotope = 'H'): number {
  if (n === 1) return 0;
  const alpha = constants.fineStructure.value;
  const fine = ((alpha * alpha) / n) * ((2 * n - 1) / (n * n) - 3 / (4 * n));
  const rydberg = rydbergPerM[isotope] / 100;
  return ionisationPerCm[isotope] - (rydberg / (n * n)) * (1 + fine) + 0.279 / (n * n * n * n * n);
}

/**
 * Transition probability of upper -> lower level, s^-1, averaged over the states of the upper level by weight.
 *
 * A = 8 pi^2 r_e c (R_inf (1/l^2 - 1/u^2))^2 (l^2/u^2) f mu/m_e. Agrees with the published tables within their last
 * digit; relative uncertainty below 1e-4 where the states of a level are populated by weight.
 *
 * @param upper  1 < upper <= 44
 * @param lower  1 <= lower < upper
 * @source W. L. Wiese, J. R. Fuhr, J. Phys. Chem. Ref. Data 38, 565 (2009), for the comparison
 * @check  test/reference/hydrogen.test.ts
 */
export function transitionProbabilityPerS(
  upper: number,
  lower: number,
  isotope: HydrogenIsotope = 'H',
): number {
  const eightPiSquared = 78.95683520871486;
  const wavenumber = constants.rydberg.value * (1 / (lower * lower) - 1 / (upper * upper));
  return (
    eightPiSquared *
    constants.classicalElectronRadius.value *
    constants.speedOfLight.value *
    wavenumber *
    wavenumber *
    ((lower * lower) / (upper * upper)) *
    oscillatorStrength(lower, upper) *
    reducedMassRatio[isotope]
  );
}

/**
 * Absorption oscillator strength lower -> upper, infinite nuclear mass (for an isotope divide by mu/m_e).
 *
 * f = 32/(3 sqrt3 pi) l^-5 u^-3 (1/l^2 - 1/u^2)^-3 g,
 * g = pi sqrt3 |((u-l)/(u+l))^(2u+2l) u l Delta/(u-l)|, Delta = F(1-u,-l;1;x)^2 - F(1-l,-u;1;x)^2, x = -4ul/(u-l)^2.
 * Relative error below 1e-13 for lower <= 20, upper <= 44.
 *
 * @source D. H. Menzel, C. L. Pekeris, Mon. Not. R. Astron. Soc. 96, 77 (1935)
 * @check  test/reference/hydrogen.test.ts
 */
export function oscillatorStrength(lower: number, upper: number): number {
  const x = (-4 * upper * lower) / ((upper - lower) * (upper - lower));
  const first = terminatingSeries(upper - 1, lower, x);
  const second = terminatingSeries(lower - 1, upper, x);
  const delta = first * first - second * second;
  const shrink = exp(2 * (upper + lower) * log((upper - lower) / (upper + lower)));
  const gaunt = Math.abs((shrink * upper * lower * delta) / (upper - lower));
  const gap = 1 / (lower * lower) - 1 / (upper * upper);
  const lower5 = lower * lower * lower * lower * lower;
  // 32/(3 sqrt3 pi) times pi sqrt3 is 32/3.
  return ((32 / 3) * gaunt) / (lower5 * upper * upper * upper * gap * gap * gap);
}

/** F(-a, -b; 1; x) for whole a, b >= 0: the sum ends by itself. */
function terminatingSeries(a: number, b: number, x: number): number {
  let term = 1;
  let sum = 1;
  for (let k = 0; k < Math.min(a, b); k++) {
    term *= ((a - k) * (b - k) * x) / ((k + 1) * (k + 1));
    sum += term;
  }
  return sum;
}
