import { exp, log } from '../numeric/portable-math.ts';
import { boltzmannEvPerK, constants, photonEnergyEvNm } from './constants.ts';
import { highestUpperLevel } from './hydrogen.ts';

/** Ionisation energy of hydrogen, eV (NIST Atomic Spectra Database, from memory). */
export const ionisationEv = 13.598434599702;
/** Rydberg energy h c R_inf, eV. */
const rydbergEv = photonEnergyEvNm * constants.rydberg.value * 1e-9;

/**
 * Electron density, m^-3, above which the level n and all higher ones are within 10 % of equilibrium with the free
 * electrons: 7e24 n^-8.5 (k T/h c R_inf)^0.5.
 * @source [Griem1963]; constant from memory
 * @check  test/reference/equilibrium.test.ts
 */
export function griemPartialEquilibriumDensity(n: number, kelvin: number): number {
  return 7e24 * exp(-8.5 * log(n)) * Math.sqrt((boltzmannEvPerK * kelvin) / rydbergEv);
}

/**
 * Lowest level n >= 2 in partial equilibrium at this density and electron temperature; null when not even n = 20 is.
 * @source griemPartialEquilibriumDensity
 * @check  test/reference/equilibrium.test.ts
 */
export function lowestEquilibratedLevel(perCubicMetre: number, kelvin: number): number | null {
  for (let n = 2; n <= highestUpperLevel; n++) {
    if (perCubicMetre >= griemPartialEquilibriumDensity(n, kelvin)) return n;
  }
  return null;
}

/**
 * Electron density, m^-3, that local thermodynamic equilibrium needs across an energy gap: 1.6e18 T^0.5 gap^3.
 * Necessary, not sufficient: homogeneous, stationary, optically thin.
 * @source [McWhirter1965]; constant from memory
 * @check  test/reference/equilibrium.test.ts
 */
export function mcWhirterDensity(kelvin: number, gapEv: number): number {
  return 1.6e18 * Math.sqrt(kelvin) * gapEv * gapEv * gapEv;
}

/** Prefactor (2 pi m_e k/h^2)^1.5, m^-3 K^-1.5. */
const sahaPrefactor = (() => {
  const { electronMass, boltzmann, planck } = constants;
  const base = (6.283185307179586 * electronMass.value * boltzmann.value) / planck.value / planck.value;
  return base * Math.sqrt(base);
})();

/**
 * Ne Ni/N0 of hydrogen in equilibrium, m^-3: (2 Z_i/Z_0) (2 pi m_e k T/h^2)^1.5 exp(-E/(k T)), Z_i = 1.
 * @param partitionFunction  of the atom; 2 while excited states hold little
 * @param loweringEv         lowering of the ionisation energy by the plasma
 * @source [Saha1920]
 * @check  test/reference/equilibrium.test.ts
 */
export function sahaDensity(kelvin: number, partitionFunction = 2, loweringEv = 0): number {
  const boltzmannFactor = exp((loweringEv - ionisationEv) / (boltzmannEvPerK * kelvin));
  return (2 / partitionFunction) * sahaPrefactor * kelvin * Math.sqrt(kelvin) * boltzmannFactor;
}

/**
 * Electron density, m^-3, at which the Balmer lines merge above the upper level n: log10 Ne = 28.96 - 7.5 log10 n.
 * Good to a factor of 3, and only an upper bound: a coarse instrument merges lines by itself.
 * @source [Inglis1939]; constant from memory
 * @check  test/reference/equilibrium.test.ts
 */
export function seriesLimitDensity(highestResolvedLevel: number): number {
  return exp(2.302585092994046 * 28.96 - 7.5 * log(highestResolvedLevel));
}
