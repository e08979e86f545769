import { chiSquareUpperTail } from '../numeric/distributions.ts';
import { fitLinearModel } from '../numeric/fit-linear-model.ts';
import { log } from '../numeric/portable-math.ts';
import { caseB, type CaseB } from '../physics/case-b.ts';
import type { HydrogenLine } from '../physics/hydrogen.ts';
import type { Ordinates } from './ordinates.ts';

/**
 * The recombining gas (case B) whose line ratios fit these populations best, one common factor free; null when none fits
 * (p < 0.05), or when fewer than three of its lines are there to compare.
 *
 * @param plot   ordinates ln(population per sublevel) with their covariance
 * @param lines  of each ordinate
 * @source caseB; generalised least squares: fit-linear-model.ts
 * @check  test/unit/populations/case-b-match.test.ts
 */
export function matchCaseB(plot: Ordinates, lines: readonly HydrogenLine[]): CaseB | null {
  const highest = caseB[0]!.ratios.length + 2;
  const compared = [...lines.keys()].filter(
    (i) => lines[i]!.lowerLevel === 2 && lines[i]!.upperLevel <= highest,
  );
  const n = compared.length;
  if (n < 3) return null;
  const covariance = Float64Array.from(
    compared.flatMap((i) => compared.map((j) => plot.ordinateCovariance[i * lines.length + j]!)),
  );
  let best: CaseB | null = null;
  let least = Infinity;
  for (const gas of caseB) {
    // Energy over h nu gives photons, those over g A the population.
    const difference = Float64Array.from(compared, (i) => {
      const { upperLevel, wavelengthVacuumNm, upperWeight, transitionProbabilityPerS } = lines[i]!;
      const photons = gas.ratios[upperLevel - 3]! * wavelengthVacuumNm;
      return plot.ordinate[i]! - log(photons / (upperWeight * transitionProbabilityPerS));
    });
    const fit = fitLinearModel([new Float64Array(n).fill(1)], difference, covariance);
    if (fit === null || fit.chiSquare >= least) continue;
    least = fit.chiSquare;
    best = gas;
  }
  return chiSquareUpperTail(least, n - 1) < 0.05 ? null : best;
}
