import { exp, log } from '../numeric/portable-math.ts';
import { invariant } from '../result/result.ts';
import { vacuumToAirNm } from './air-index.ts';
import { constants, reducedMassRatio, type HydrogenIsotope } from './constants.ts';
import { blendCentroid, fineStructureComponents } from './fine-structure.ts';
import { levelEnergyEv } from './hydrogen-levels.ts';

/** One hydrogen line as an unresolved blend of its fine-structure components. */
export interface HydrogenLine {
  /** "H-alpha", "D-beta", "H-8" in the Balmer series, "Lyman-alpha", "D Paschen-9" in the others. */
  readonly id: string;
  readonly isotope: HydrogenIsotope;
  readonly upperLevel: number;
  readonly lowerLevel: number;
  /** Mean of the components by their light; air is dry, 15 C, 101 325 Pa. */
  readonly wavelengthVacuumNm: number;
  readonly wavelengthAirNm: number;
  /** Rms spread of the components about it, nm. */
  readonly fineStructureRmsNm: number;
  readonly transitionProbabilityPerS: number;
  readonly upperWeight: number;
  readonly upperEnergyEv: number;
}

/** Highest upper level of the lines that the program knows. */
export const highestUpperLevel = 20;

/** Names of the series by their lower level. */
export const seriesNames: Readonly<Record<number, string>> = Object.freeze({
  1: 'Lyman',
  2: 'Balmer',
  3: 'Paschen',
  4: 'Brackett',
});

const greekNames = ['alpha', 'beta', 'gamma', 'delta', 'epsilon'];
/** Below this air lets no light through and wavelengths are stated in vacuum; the index formula ends there too. */
const shortestInAirNm = 185;

/**
 * The Balmer line from `upperLevel` (3 to 20) to n = 2.
 * @source seriesLine
 * @check  test/reference/hydrogen.test.ts
 */
export function hydrogenLine(upperLevel: number, isotope: HydrogenIsotope = 'H'): HydrogenLine {
  invariant(
    Number.isInteger(upperLevel) && upperLevel >= 3 && upperLevel <= highestUpperLevel,
    'Balmer lines have upper levels 3 to 20',
  );
  return seriesLine(upperLevel, 2, isotope);
}

/** Computed once: every diagnosis asks for the same few lines many times. */
const known: Record<HydrogenIsotope, (HydrogenLine | undefined)[]> = { H: [], D: [] };

/**
 * The line from `upper` to `lower`: Lyman, Balmer, Paschen and Brackett series (lower 1 to 4), upper up to 20.
 *
 * Wavelength: mean wavenumber of all fine-structure components by their light, sublevels populated by weight, no pressure
 * shift; within 2e-5 nm for the Balmer series. A centroid from averages of the levels differs, by 0.17 pm for H-alpha,
 * because the components of a blend are not all equally strong. Below 185 nm the air wavelength is that in vacuum.
 *
 * @source fine-structure.ts, transitionProbabilityPerS
 * @check  test/reference/hydrogen.test.ts
 */
export function seriesLine(upper: number, lower: number, isotope: HydrogenIsotope = 'H'): HydrogenLine {
  const place = lower * (highestUpperLevel + 1) + upper;
  let line = known[isotope][place];
  if (line === undefined) {
    invariant(
      seriesNames[lower] !== undefined &&
        Number.isInteger(upper) &&
        upper > lower &&
        upper <= highestUpperLevel,
      'hydrogen lines end on the levels 1 to 4 and begin above them, at most at 20',
    );
    line = Object.freeze(computeLine(upper, lower, isotope));
    known[isotope][place] = line;
  }
  return line;
}

function computeLine(upperLevel: number, lowerLevel: number, isotope: HydrogenIsotope): HydrogenLine {
  const { wavenumberPerCm, rmsPerCm } = blendCentroid(
    fineStructureComponents(upperLevel, lowerLevel, isotope),
  );
  const wavelengthVacuumNm = 1e7 / wavenumberPerCm;
  return {
    id: lineId(upperLevel, lowerLevel, isotope),
    isotope,
    upperLevel,
    lowerLevel,
    wavelengthVacuumNm,
    wavelengthAirNm:
      wavelengthVacuumNm < shortestInAirNm ? wavelengthVacuumNm : vacuumToAirNm(wavelengthVacuumNm),
    fineStructureRmsNm: (rmsPerCm / wavenumberPerCm) * wavelengthVacuumNm,
    transitionProbabilityPerS: transitionProbabilityPerS(upperLevel, lowerLevel, isotope),
    upperWeight: statisticalWeight(upperLevel),
    upperEnergyEv: levelEnergyEv(upperLevel, isotope),
  };
}

function lineId(upper: number, lower: number, isotope: HydrogenIsotope): string {
  const member = greekNames[upper - lower - 1] ?? String(upper);
  if (lower === 2) return `${isotope}-${member}`;
  return `${isotope === 'D' ? 'D ' : ''}${seriesNames[lower]!}-${member}`;
}

/**
 * Statistical weight of the hydrogen level n, all fine-structure states together: 2 n^2.
 * @check test/reference/hydrogen.test.ts
 */
export function statisticalWeight(n: number): number {
  return 2 * n * n;
}

/**
 * Transition probability of upper -> lower level, s^-1, averaged over the states of the upper level by weight.
 *
 * A = 8 pi^2 r_e c (R_inf (1/l^2 - 1/u^2))^2 (l^2/u^2) f mu/m_e. Agrees with the published tables within their last
 * digit; relative uncertainty below 1e-4 where the states of a level are populated by weight.
 *
 * @param upper  1 < upper <= 44
 * @param lower  1 <= lower < upper
 * @source [Wiese2009] for the comparison
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
 * @source [Menzel1935]
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
