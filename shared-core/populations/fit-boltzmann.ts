import { log } from '../numeric/portable-math.ts';
import { fitStraightLine, type StraightLine } from '../numeric/fit-straight-line.ts';
import type { BoltzmannInput } from './boltzmann-input.ts';
import { createBoltzmannWorkspace, iterateBoltzmann } from './boltzmann-iteration.ts';
import type { Ordinates } from './ordinates.ts';

/** Ordinates are linearised: ln(population per sublevel) + (area - expected)/expected. */
export interface BoltzmannFit extends Ordinates {
  /** 1/(kT), per eV; may be zero or negative. */
  readonly inverseKtPerEv: number;
  readonly inverseKtSigmaPerEv: number;
  /** The generalised straight line through the linearised ordinates. */
  readonly line: StraightLine;
  /** Area the fit expects of each line. */
  readonly expectedArea: Float64Array;
  readonly isConverged: boolean;
}

/**
 * Boltzmann plot by generalised least squares: area_i = a_i exp(c - E_i/kT).
 *
 * ln(area) is linear in E, but for a faint line its logarithm is biased and its apparent weight follows its own
 * noise. Each round therefore takes the ordinate and the weight from the line fitted so far: y_i = ln(m_i/a_i) +
 * (area_i - m_i)/m_i with Cov(y) = Cov(area)/(m_i m_j) + relative covariance. The fixed point is the generalised
 * least-squares fit of the exponential to the areas themselves: lines lost in the noise take part as far as they
 * know something, negative areas included.
 *
 * @returns null when fewer than two lines or no start can be found
 * @source iteratively reweighted linearisation: [McCullagh1989] sec. 2.5; generalised least squares: fit-straight-line.ts
 * @check  test/reference/boltzmann-fit.test.ts
 */
export function fitBoltzmann(input: BoltzmannInput): BoltzmannFit | null {
  const { area, upperEnergyEv } = input;
  const start = startLine(input);
  if (start === null) return null;
  const work = createBoltzmannWorkspace(area.length);
  work.intercept = start.intercept;
  work.slope = start.slope;
  const isConverged = iterateBoltzmann(input, work);
  if (isConverged === null) return null;
  const line = fitStraightLine(upperEnergyEv, work.ordinate, work.covariance);
  if (line === null) return null;
  return {
    inverseKtPerEv: -work.slope,
    inverseKtSigmaPerEv: Math.sqrt(line.slopeVariance),
    line,
    expectedArea: work.expectedArea,
    ordinate: work.ordinate,
    ordinateCovariance: work.covariance,
    upperEnergyEv,
    isConverged,
  };
}

/** Plain logarithms of the lines that stand well out of the noise; all positive ones when they are too few. */
function startLine({
  area,
  areaCovariance,
  areaPerPopulation,
  upperEnergyEv,
}: BoltzmannInput): StraightLine | null {
  const n = area.length;
  for (const leastSignificance of [5, 2, 0]) {
    const chosen = [...area.keys()].filter(
      (i) => area[i]! > 0 && area[i]! > leastSignificance * Math.sqrt(areaCovariance[i * n + i]!),
    );
    if (chosen.length < 2) continue;
    const x = Float64Array.from(chosen, (i) => upperEnergyEv[i]!);
    const y = Float64Array.from(chosen, (i) => log(area[i]! / areaPerPopulation[i]!));
    const covariance = new Float64Array(chosen.length * chosen.length);
    for (const [row, i] of chosen.entries()) {
      covariance[row * chosen.length + row] = areaCovariance[i * n + i]! / (area[i]! * area[i]!) + 1e-4;
    }
    const line = fitStraightLine(x, y, covariance);
    if (line !== null) return line;
  }
  return null;
}
