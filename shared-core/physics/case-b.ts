/** Balmer emissivities of a recombining gas that reabsorbs its Lyman lines (case B), over H-beta's, in energy. */
export interface CaseB {
  readonly kelvin: number;
  readonly electronsPerCubicMetre: number;
  /** By upper level, from n = 3. */
  readonly ratios: readonly number[];
}

/**
 * Case B at densities of discharge tubes and below. Populations set by capture and cascade, none by equilibrium; yet on a
 * Boltzmann plot those of 10 000 K lie on a straight line of about 30 000 K.
 * @source [Storey1995], case B
 * @check  test/unit/populations/case-b-match.test.ts
 */
export const caseB: readonly CaseB[] = Object.freeze([
  { kelvin: 5000, electronsPerCubicMetre: 1e10, ratios: [3.0009, 1, 0.45998, 0.25252, 0.15481, 0.10234] },
  { kelvin: 5000, electronsPerCubicMetre: 1e14, ratios: [2.73903, 1, 0.49743, 0.29913, 0.20297, 0.14792] },
  { kelvin: 5000, electronsPerCubicMetre: 1e16, ratios: [2.55168, 1, 0.54449, 0.36078, 0.27573, 0.2273] },
  { kelvin: 10_000, electronsPerCubicMetre: 1e10, ratios: [2.84677, 1, 0.46911, 0.2596, 0.15944, 0.10532] },
  { kelvin: 10_000, electronsPerCubicMetre: 1e14, ratios: [2.70084, 1, 0.49256, 0.28724, 0.18702, 0.13121] },
  { kelvin: 10_000, electronsPerCubicMetre: 1e16, ratios: [2.62402, 1, 0.51926, 0.32487, 0.23159, 0.17742] },
  { kelvin: 20_000, electronsPerCubicMetre: 1e10, ratios: [2.73941, 1, 0.47564, 0.26438, 0.16254, 0.1073] },
  { kelvin: 20_000, electronsPerCubicMetre: 1e14, ratios: [2.66706, 1, 0.4898, 0.27883, 0.17475, 0.11792] },
  { kelvin: 20_000, electronsPerCubicMetre: 1e16, ratios: [2.6975, 1, 0.49382, 0.29224, 0.19497, 0.13981] },
]);
