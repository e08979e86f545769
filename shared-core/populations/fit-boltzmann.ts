import { exp, log } from '../numeric/portable-math.ts';
import { fitStraightLine, type StraightLine } from '../numeric/fit-straight-line.ts';
import type { Ordinates } from './ordinates.ts';

/** The lines of a Boltzmann plot; arrays of equal length n >= 2. */
export interface BoltzmannInput {
  /** Line areas; may be negative where a line is lost in the noise. */
  readonly area: Float64Array;
  /** Covariance of the areas, row-major n x n, area^2. */
  readonly areaCovariance: Float64Array;
  /** Variance that each unit of the line's own area brings, area units: 1/gain for counts; 0 when not known. */
  readonly variancePerArea: number;
  /** Area that one unit of population per sublevel gives: response x weight x transition probability (x photon energy). */
  readonly areaPerPopulation: Float64Array;
  /** eV above the ground level. */
  readonly upperEnergyEv: Float64Array;
  /** Covariance of ln(area) errors that do not come from noise (response, axis), row-major n x n. */
  readonly relativeCovariance: Float64Array;
}

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

const maxIterations = 60;

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
  const { area, areaPerPopulation, upperEnergyEv, relativeCovariance } = input;
  const n = area.length;
  const start = startLine(input);
  if (start === null) return null;
  let intercept = start.intercept;
  let slope = start.slope;
  const expectedArea = new Float64Array(n);
  const ordinate = new Float64Array(n);
  const covariance = new Float64Array(n * n);
  let line: StraightLine | null = null;
  let isConverged = false;
  for (let round = 0; round < maxIterations; round++) {
    for (let i = 0; i < n; i++) {
      const lnPopulation = intercept + slope * upperEnergyEv[i]!;
      expectedArea[i] = areaPerPopulation[i]! * exp(lnPopulation);
      ordinate[i] = lnPopulation + (area[i]! - expectedArea[i]!) / expectedArea[i]!;
    }
    for (let i = 0; i < n; i++) {
      for (let j = 0; j < n; j++) {
        covariance[i * n + j] =
          expectedAreaCovariance(input, i, j, expectedArea[i]!) / (expectedArea[i]! * expectedArea[j]!) +
          relativeCovariance[i * n + j]!;
      }
    }
    line = fitStraightLine(upperEnergyEv, ordinate, covariance);
    if (line === null) return null;
    // At most a factor e a round in any expected area: keeps a poor start from overflowing.
    let change = 0;
    for (let i = 0; i < n; i++) {
      change = Math.max(
        change,
        Math.abs(line.intercept - intercept + (line.slope - slope) * upperEnergyEv[i]!),
      );
    }
    const length = change > 1 ? 1 / change : 1;
    intercept += length * (line.intercept - intercept);
    slope += length * (line.slope - slope);
    if (change < 1e-11) {
      isConverged = true;
      break;
    }
  }
  if (line === null) return null;
  return {
    inverseKtPerEv: -slope,
    inverseKtSigmaPerEv: Math.sqrt(line.slopeVariance),
    line,
    expectedArea,
    ordinate,
    ordinateCovariance: covariance,
    upperEnergyEv,
    isConverged,
  };
}

/**
 * Covariance of the areas had the line the area the fit expects: its own shot noise grows with its light. Without this
 * a line that fluctuated low would look better measured than one that fluctuated high, and pull the result down.
 */
export function expectedAreaCovariance(
  { area, areaCovariance, variancePerArea }: BoltzmannInput,
  i: number,
  j: number,
  expected: number,
): number {
  const fitted = areaCovariance[i * area.length + j]!;
  if (i !== j) return fitted;
  return Math.max(0.25 * fitted, fitted + variancePerArea * (expected - Math.max(0, area[i]!)));
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
