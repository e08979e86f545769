import { voigtFwhmNm } from '../numeric/voigt-pixel.ts';
import { pixelAt } from '../axis/pixel-at.ts';
import type { WindowPlan } from './choose-windows.ts';
import { findAbsorption, type AbsorptionFinding } from './find-absorption.ts';
import { lineShape } from './line-shape.ts';
import type { SolvedFit } from './solved-fit.ts';

/** A line that takes light out instead of adding it, and where. */
export interface MissingLight {
  readonly obstacle: AbsorptionFinding;
  readonly centreNm: number;
  readonly fwhmNm: number;
}

/** Squared pixel widths that a pixel adds to a squared FWHM: 8 ln 2 / 12. */
const pixelSpread = 0.4621;
/** Pixels within so many widths of a dip are no baseline for its neighbours. */
const maskedWidths = 1.5;

/** Asks each of the first `lineCount` lines of a fit whether it is in absorption or self-reversed; by line id. */
export function findMissingLight(
  { problem, model, solution }: SolvedFit,
  lineCount: number,
): ReadonlyMap<string, MissingLight> {
  const found = new Map<string, MissingLight>();
  if (solution.status !== 'converged') return found;
  const { recording } = problem;
  for (const [index, line] of problem.lines.slice(0, lineCount).entries()) {
    const { centreNm, gaussianFwhmNm, lorentzianFwhmNm } = lineShape(problem, solution.values, index);
    const px = pixelAt(recording.wavelengthNm, centreNm);
    const pixelNm = recording.edgeNm[px + 1]! - recording.edgeNm[px]!;
    const ownNm = voigtFwhmNm(gaussianFwhmNm, Math.max(0, lorentzianFwhmNm));
    const fwhmNm = Math.sqrt(ownNm * ownNm + pixelSpread * pixelNm * pixelNm);
    const obstacle = findAbsorption({ recording, ...model, centreNm, fwhmNm });
    if (obstacle !== null) found.set(line.id, { obstacle, centreNm, fwhmNm });
  }
  return found;
}

/** The plan with the pixels of the dips left out and the lines named among the obstacles. */
export function withoutMissingLight(
  plan: WindowPlan,
  wavelengthNm: Float64Array,
  missing: ReadonlyMap<string, MissingLight>,
): WindowPlan {
  const masked = plan.masked.slice();
  const obstacles = new Map(plan.obstacles);
  for (const [id, { obstacle, centreNm, fwhmNm }] of missing) {
    obstacles.set(id, obstacle);
    const to = pixelAt(wavelengthNm, centreNm + maskedWidths * fwhmNm);
    for (let px = pixelAt(wavelengthNm, centreNm - maskedWidths * fwhmNm); px <= to; px++) masked[px] = 1;
  }
  return { ...plan, masked, obstacles };
}
