import type { HydrogenIsotope } from './constants.ts';
import { statePerCm } from './hydrogen-levels.ts';
import { radialIntegrals } from './radial-integrals.ts';

/** One fine-structure component of a hydrogen line. */
export interface FineStructureComponent {
  readonly upper: { readonly l: number; readonly twiceJ: number };
  readonly lower: { readonly l: number; readonly twiceJ: number };
  /** cm^-1 in vacuum. */
  readonly wavenumberPerCm: number;
  /** Share of the line's light where the states of the upper level are populated by weight; 1 in all. */
  readonly share: number;
}

/**
 * Every allowed component n l j -> n' l' j' of a line: 7 for n' = 2, 3 for n' = 1.
 *
 * Light in proportion to the line strength: l R^2 (l the larger of the two) times the share of the doublet,
 * (l+1)(2l-1), 1 and (l-1)(2l+1) over 4 l^2 - 1 for j - j' as upper-upper, lower-upper and lower-lower of the doublet.
 *
 * @source line strengths of doublets: [Condon1935] ch. 9; radial integrals: radial-integrals.ts
 * @check  test/reference/fine-structure.test.ts
 */
export function fineStructureComponents(
  upper: number,
  lower: number,
  isotope: HydrogenIsotope = 'H',
): readonly FineStructureComponent[] {
  const { upperAbove, upperBelow } = radialIntegrals(upper, lower);
  const parts: { upper: State; lower: State; strength: number }[] = [];
  for (let l = 1; l <= lower; l++) {
    const norm = 4 * l * l - 1;
    const doublet = [
      [2 * l + 1, 2 * l - 1, (l + 1) * (2 * l - 1)],
      [2 * l - 1, 2 * l - 1, 1],
      [2 * l - 1, 2 * l - 3, (l - 1) * (2 * l + 1)],
    ] as const;
    for (const [twiceJ, twiceJBelow, part] of doublet) {
      if (part === 0) continue;
      const strength = (l * part) / norm;
      const high = { l, twiceJ };
      const low = { l: l - 1, twiceJ: twiceJBelow };
      parts.push({ upper: high, lower: low, strength: strength * upperAbove[l]! });
      if (l < lower) parts.push({ upper: low, lower: high, strength: strength * upperBelow[l]! });
    }
  }
  const total = parts.reduce((sum, { strength }) => sum + strength, 0);
  return parts.map(({ upper: from, lower: to, strength }) => ({
    upper: from,
    lower: to,
    wavenumberPerCm:
      statePerCm(upper, from.l, from.twiceJ, isotope) - statePerCm(lower, to.l, to.twiceJ, isotope),
    share: strength / total,
  }));
}

interface State {
  readonly l: number;
  readonly twiceJ: number;
}

/**
 * Mean wavenumber of a line's components by their light, and the rms spread about it, both cm^-1.
 * @source fineStructureComponents
 * @check  test/reference/fine-structure.test.ts
 */
export function blendCentroid(components: readonly FineStructureComponent[]): {
  readonly wavenumberPerCm: number;
  readonly rmsPerCm: number;
} {
  const first = components[0]!.wavenumberPerCm;
  let mean = 0;
  for (const { wavenumberPerCm, share } of components) mean += share * (wavenumberPerCm - first);
  let square = 0;
  for (const { wavenumberPerCm, share } of components) {
    const from = wavenumberPerCm - first - mean;
    square += share * from * from;
  }
  return { wavenumberPerCm: first + mean, rmsPerCm: Math.sqrt(square) };
}
