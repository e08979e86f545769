import { log } from '../numeric/portable-math.ts';
import { constants, reducedMassRatio, wavenumberPerEv, type HydrogenIsotope } from './constants.ts';

/** m_e c/h = 2 R_inf/alpha^2, cm^-1: the electron's rest energy as a wavenumber, by its best known factors. */
const electronRestPerCm =
  (2 * constants.rydberg.value) / (constants.fineStructure.value * constants.fineStructure.value) / 100;

/** Bethe logarithms ln k0(n, l) by l, for n = 1, 2, ...; the last of each row serves all higher n. */
const betheLogarithms: readonly (readonly number[])[] = [
  [2.984128556, 2.811769893, 2.767663612, 2.74981184, 2.740823728, 2.735664207, 2.732429129, 2.7226],
  [NaN, -0.030016709, -0.038190229, -0.041954895, -0.04403, -0.045312, -0.049],
  [NaN, NaN, -0.005232148, -0.006740939, -0.0076, -0.0081, -0.009],
];

/**
 * What the leading terms miss of the Lamb shift of s states: higher orders, nearly the same share for all n. Set so that
 * 1s and 2s come to the measured 8172.84 and 1045.0 MHz within 1 MHz.
 */
const higherOrders = 1.0072;

/**
 * Energy of the fine-structure state n, l, j below ionisation, cm^-1 (negative): Dirac energy with recoil and Lamb shift.
 *
 * m c^2 [mu (f - 1) - mu^2/(2 M) (f - 1)^2], f = [1 + (alpha/(n - d))^2]^(-1/2), d = j + 1/2 - sqrt((j + 1/2)^2 - alpha^2);
 * Lamb shift in leading order with Bethe logarithms. Centre of the hyperfine structure. Within 1e-4 cm^-1.
 *
 * @param twiceJ  2 j: 2 l - 1 (l > 0) or 2 l + 1
 * @source [Bethe1957] sec. 14, 19, 42; Bethe logarithms from memory [Drake1990]
 * @check  test/reference/hydrogen.test.ts
 */
export function statePerCm(n: number, l: number, twiceJ: number, isotope: HydrogenIsotope): number {
  const alpha = constants.fineStructure.value;
  const k = (twiceJ + 1) / 2;
  const defect = (alpha * alpha) / (k + Math.sqrt(k * k - alpha * alpha));
  const x = (alpha / (n - defect)) * (alpha / (n - defect));
  // f - 1 without the cancellation of 1 - 1.
  const root = Math.sqrt(1 + x);
  const binding = -x / (root * (1 + root));
  const mu = reducedMassRatio[isotope];
  const nucleus =
    isotope === 'H' ? constants.protonPerElectronMass.value : constants.deuteronPerElectronMass.value;
  const recoil = ((mu * mu) / (2 * (1 + nucleus))) * binding * binding;
  return electronRestPerCm * (mu * binding - recoil) + lambShiftPerCm(n, l, twiceJ, isotope);
}

/**
 * Lamb shift in leading order, cm^-1: (4/3) alpha^5 m c^2/(pi n^3) [ln(1/alpha^2) - ln k0 + 19/30] for s states, with
 * (3/8) c/(2 l + 1) - ln k0 in the bracket for l > 0, c = 1/(l + 1) or -1/l for j above or below l.
 */
function lambShiftPerCm(n: number, l: number, twiceJ: number, isotope: HydrogenIsotope): number {
  const alpha = constants.fineStructure.value;
  const alpha5 = alpha * alpha * alpha * alpha * alpha;
  const mu = reducedMassRatio[isotope];
  const scale = ((4 / (3 * 3.141592653589793)) * alpha5 * electronRestPerCm * mu * mu * mu) / (n * n * n);
  const row = betheLogarithms[l];
  const betheLogarithm = row === undefined ? 0 : (row[n - 1] ?? row.at(-1)!);
  if (l === 0) return scale * higherOrders * (-2 * log(alpha) - betheLogarithm + 19 / 30);
  const c = twiceJ > 2 * l ? 1 / (l + 1) : -1 / l;
  return scale * ((3 / 8) * (c / (2 * l + 1)) - betheLogarithm);
}

/**
 * Wavenumber of the level n above the ground state, cm^-1: the mean of its states by weight.
 * @source statePerCm
 * @check  test/reference/hydrogen.test.ts
 */
export function levelPerCm(n: number, isotope: HydrogenIsotope = 'H'): number {
  if (n === 1) return 0;
  let sum = 0;
  for (let l = 0; l < n; l++) {
    for (const twiceJ of l === 0 ? [1] : [2 * l - 1, 2 * l + 1])
      sum += (twiceJ + 1) * statePerCm(n, l, twiceJ, isotope);
  }
  return sum / (2 * n * n) - statePerCm(1, 0, 1, isotope);
}

/**
 * Energy that takes the electron from the ground state, cm^-1.
 * @source statePerCm
 * @check  test/reference/hydrogen.test.ts
 */
export const ionisationPerCm = (isotope: HydrogenIsotope = 'H'): number => -statePerCm(1, 0, 1, isotope);

/**
 * Energy of the level n above the ground state, eV, averaged over its states by weight.
 * @source levelPerCm
 * @check  test/reference/hydrogen.test.ts
 */
export function levelEnergyEv(n: number, isotope: HydrogenIsotope = 'H'): number {
  return levelPerCm(n, isotope) / wavenumberPerEv;
}
