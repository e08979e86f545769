import { toRegisteredNm } from '../axis/axis-polynomial.ts';
import type { RecordedAxisMap } from '../axis/recorded-axis-map.ts';
import { exp } from '../numeric/portable-math.ts';
import { gaussianFwhmPerSigma } from '../numeric/voigt-run.ts';
import { companionAt, narrowStick, neighbourSpecies, type Companion } from './companion.ts';
import { instrumentIndex } from './joint-problem.ts';
import { lineShape } from './line-shape.ts';
import { voigtFwhmNm } from '../numeric/voigt-pixel.ts';
import type { SolvedFit } from './solved-fit.ts';

/** Nearer to a line than this, in its widths, what is left over speaks of that line's shape. */
const clearWidths = 1.5;

/**
 * The place in a segment, clear of its lines, where a narrow line would explain most of what the fit leaves over: the top of
 * the residuals' matched filter.
 *
 * @returns null where nothing reaches `leastSignificance` standard deviations
 * @source matched filter: [Turin1960]
 * @check  test/property/additions.test.ts
 */
export function residualLine(
  { problem, model, solution }: SolvedFit,
  map: RecordedAxisMap,
  segmentIndex: number,
  leastSignificance: number,
): Companion | null {
  const { firstPx, endPx, lines } = problem.segments[segmentIndex]!;
  const { wavelengthNm, netSignal } = problem.recording;
  const pixelNm = (wavelengthNm[endPx - 1]! - wavelengthNm[firstPx]!) / (endPx - 1 - firstPx);
  const sigmaPx = Math.max(0.5, solution.values[instrumentIndex]! / gaussianFwhmPerSigma / pixelNm);
  const reach = Math.ceil(2.5 * sigmaPx);
  const kernel = Float64Array.from({ length: 2 * reach + 1 }, (_, k) => {
    const deviate = (k - reach) / sigmaPx;
    return exp(-0.5 * deviate * deviate);
  });
  const statistic = new Float64Array(endPx - firstPx);
  let top = -1;
  for (let px = firstPx; px < endPx; px++) {
    let sum = 0;
    let norm = 0;
    for (let k = -reach; k <= reach; k++) {
      const at = px + k;
      if (at < firstPx || at >= endPx || problem.masked[at] === 1) continue;
      const weight = kernel[k + reach]! / model.variance[at]!;
      sum += weight * (netSignal[at]! - model.modelled[at]!);
      norm += weight * kernel[k + reach]!;
    }
    const z = norm > 0 ? sum / Math.sqrt(norm) : 0;
    statistic[px - firstPx] = z;
    if (z > leastSignificance && (top < 0 || z > statistic[top]!)) top = px - firstPx;
  }
  if (top < 0) return null;
  const before = statistic[top - 1] ?? 0;
  const after = statistic[top + 1] ?? 0;
  const bend = before - 2 * statistic[top]! + after;
  const shift = bend < 0 ? Math.max(-0.5, Math.min(0.5, (0.5 * (before - after)) / bend)) : 0;
  const recordedNm = wavelengthNm[firstPx + top]! + shift * pixelNm;
  let hostId = '';
  let nearest = Infinity;
  for (const line of lines) {
    const { centreNm, gaussianFwhmNm, lorentzianFwhmNm } = lineShape(problem, solution.values, line);
    const distance = Math.abs(centreNm - recordedNm);
    const widthNm = Math.max(voigtFwhmNm(gaussianFwhmNm, Math.max(0, lorentzianFwhmNm)), 1.5 * pixelNm);
    if (distance < clearWidths * widthNm) return null;
    if (distance >= nearest || problem.lines[line]!.starkRatio === 0) continue;
    nearest = distance;
    hostId = problem.lines[line]!.id;
  }
  const referenceNm = toRegisteredNm(map, recordedNm);
  return companionAt(hostId, neighbourSpecies, referenceNm, recordedNm, [narrowStick(referenceNm, 28)]);
}
