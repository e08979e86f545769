import { pixelAt } from '../axis/pixel-at.ts';
import type { SolvedFit } from './solved-fit.ts';
import { lineShape } from './line-shape.ts';
import { lineBase, type JointProblem } from './joint-problem.ts';
import type { LineObstacle } from './line-fit.ts';
import { voigtFwhmNm } from '../numeric/voigt-pixel.ts';

const leastSignificance = 6;
const leastDeficit = 0.06;
/** Soft clipping acts on the highest signals only: lines below half the highest peak are not suspected. */
const suspectHeightShare = 0.5;

/**
 * Looks for a line whose top lies below what its flanks and the shared widths demand.
 *
 * The brightest lines are fitted once more without the pixels inside their half width; when the area so predicted
 * exceeds the area from all pixels by more than 6 % and 6 sigma, the top was clipped softly, compressed or absorbed.
 *
 * @check test/property/soft-clipping.test.ts
 */
export function findCoreDeficit(
  fit: SolvedFit,
  balmerCount: number,
  solve: (problem: JointProblem) => SolvedFit,
): { readonly lineId: string; readonly obstacle: LineObstacle } | null {
  const { problem, model, solution } = fit;
  if (solution.status !== 'converged' || balmerCount < 2) return null;
  const size = model.parameterCount;
  const lines = problem.lines.slice(0, balmerCount);
  const heights = lines.map((line) => topOf(problem, line.nominalCentreNm));
  const highest = Math.max(...heights);
  for (const [index, line] of lines.entries()) {
    if (heights[index]! < suspectHeightShare * highest) continue;
    const area = lineBase(index);
    const fullArea = solution.values[area]!;
    const fullSigma = Math.sqrt(solution.covariance[area * size + area]!);
    if (!(fullArea > 50 * fullSigma) || !isMisfit(fit, index)) continue;
    const shape = lineShape(problem, solution.values, index);
    const halfNm = 0.5 * voigtFwhmNm(shape.gaussianFwhmNm, Math.max(0, shape.lorentzianFwhmNm));
    const masked = problem.masked.slice();
    const { wavelengthNm } = problem.recording;
    const from = pixelAt(wavelengthNm, shape.centreNm - halfNm);
    const to = pixelAt(wavelengthNm, shape.centreNm + halfNm);
    for (let px = from; px <= to; px++) masked[px] = 1;
    const flanks = solve({ ...problem, masked });
    if (flanks.solution.status !== 'converged') continue;
    const flankArea = flanks.solution.values[area]!;
    const flankSigma = Math.sqrt(flanks.solution.covariance[area * size + area]!);
    const significance = (flankArea - fullArea) / Math.sqrt(flankSigma * flankSigma + fullSigma * fullSigma);
    const deficitFraction = 1 - fullArea / flankArea;
    if (significance > leastSignificance && deficitFraction > leastDeficit) {
      return { lineId: line.id, obstacle: { kind: 'core-deficit', deficitFraction, significance } };
    }
  }
  return null;
}

/** Chi-square of the core pixels beyond what noise explains; without it the second fit is not worth its time. */
function isMisfit({ problem, model }: SolvedFit, index: number): boolean {
  const { recording, lines } = problem;
  const centre = pixelAt(recording.wavelengthNm, lines[index]!.nominalCentreNm);
  let sum = 0;
  let count = 0;
  for (let px = centre - 4; px <= centre + 4; px++) {
    if (px < 0 || px >= recording.netSignal.length || problem.masked[px] === 1 || !(model.variance[px]! > 0))
      continue;
    const residual = recording.netSignal[px]! - model.modelled[px]!;
    sum += (residual * residual) / model.variance[px]!;
    count++;
  }
  return sum > 3 * count;
}

function topOf(problem: JointProblem, centreNm: number): number {
  const { wavelengthNm, netSignal } = problem.recording;
  const centre = pixelAt(wavelengthNm, centreNm);
  let top = -Infinity;
  for (let px = Math.max(0, centre - 3); px <= Math.min(netSignal.length - 1, centre + 3); px++) {
    top = Math.max(top, netSignal[px]!);
  }
  return top;
}
