import { exp, log } from '../numeric/portable-math.ts';
import { boltzmannEvPerK } from './constants.ts';
import { highestUpperLevel } from './hydrogen.ts';

/** Ionisation energy of hydrogen, eV. */
const ionisationEv = 13.598434599702;

/**
 * Electron density, m^-3, above which the level n and all higher ones are within 10 % of equilibrium with the free
 * electrons: 7e24 n^-8.5 (k T/E_H)^0.5.
 * @source H. R. Griem, Phys. Rev. 131, 1170 (1963); constant from memory
 * @check  test/reference/equilibrium.test.ts
 */
export function griemPartialEquilibriumDensity(n: number, kelvin: number): number {
  return 7e24 * exp(-8.5 * log(n)) * Math.sqrt((boltzmannEvPerK * kelvin) / ionisationEv);
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
 * @source R. W. P. McWhirter in Plasma Diagnostic Techniques, ed. R. H. Huddlestone, S. L. Leonard (1965); constant from memory
 * @check  test/reference/equilibrium.test.ts
 */
export function mcWhirterDensity(kelvin: number, gapEv: number): number {
  return 1.6e18 * Math.sqrt(kelvin) * gapEv * gapEv * gapEv;
}
