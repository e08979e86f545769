import { chiSquareUpperTail } from '../numeric/distributions.ts';
import { choleskyFactor, choleskySolve } from '../numeric/cholesky.ts';
import { log } from '../numeric/portable-math.ts';
import { caseB, type CaseB } from '../physics/case-b.ts';
import { hydrogenLine, type HydrogenLine } from '../physics/hydrogen.ts';
import type { Ordinates } from './ordinates.ts';

/**
 * The recombining gas (case B) whose line ratios fit these populations best, one common factor free; null when none fits
 * (p < 0.05), or when fewer than three of its lines are there to compare.
 *
 * @param plot   ordinates ln(population per sublevel) with their covariance
 * @param lines  of each ordinate
 * @source caseB; generalised least squares [Aitken1936]
 * @check  test/unit/populations/case-b-match.test.ts
 */
export function matchCaseB(plot: Ordinates, lines: readonly HydrogenLine[]): CaseB | null {
  const highest = caseB[0]!.ratios.length + 2;
  const compared = [...lines.keys()].filter(
    (i) => lines[i]!.lowerLevel === 2 && lines[i]!.upperLevel <= highest,
  );
  const n = compared.length;
  if (n < 3) return null;
  const factor = Float64Array.from(
    compared.flatMap((i) => compared.map((j) => plot.ordinateCovariance[i * lines.length + j]!)),
  );
  if (!choleskyFactor(factor, n)) return null;
  // Weights of a common constant, by generalised least squares.
  const weights = new Float64Array(n).fill(1);
  choleskySolve(factor, n, weights);
  const total = weights.reduce((sum, weight) => sum + weight, 0);
  const difference = new Float64Array(n);
  const solved = new Float64Array(n);
  let best: CaseB | null = null;
  let least = Infinity;
  for (const [index, gas] of caseB.entries()) {
    for (const [row, i] of compared.entries())
      difference[row] = plot.ordinate[i]! - lnPopulation[index]![lines[i]!.upperLevel - 3]!;
    solved.set(difference);
    choleskySolve(factor, n, solved);
    let chiSquare = 0;
    let mean = 0;
    for (let row = 0; row < n; row++) {
      chiSquare += difference[row]! * solved[row]!;
      mean += (weights[row]! / total) * difference[row]!;
    }
    chiSquare -= total * mean * mean;
    if (chiSquare >= least) continue;
    least = chiSquare;
    best = gas;
  }
  return chiSquareUpperTail(least, n - 1) < 0.05 ? null : best;
}

/** ln(population per sublevel) of each gas and level, relative: energy over h nu gives photons, those over g A the population. */
const lnPopulation: readonly (readonly number[])[] = caseB.map(({ ratios }) =>
  ratios.map((ratio, index) => {
    const { wavelengthVacuumNm, upperWeight, transitionProbabilityPerS } = hydrogenLine(index + 3);
    return log((ratio * wavelengthVacuumNm) / (upperWeight * transitionProbabilityPerS));
  }),
);
