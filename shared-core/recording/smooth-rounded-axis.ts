export interface SmoothedAxis {
  readonly axis: Float64Array;
  readonly degree: number;
  /** Unit of the axis, as all below. */
  readonly roundingStep: number;
  readonly meanStep: number;
  readonly largestChange: number;
}

/** Rounding coarser than this share of the pixel step shifts line centres and areas noticeably. */
const COARSE_SHARE = 0.02;
/** Rounding moves a value by at most half a step; the rest allows for the fit. */
const ALLOWED_STEPS = 0.6;
const HIGHEST_DEGREE = 3;

/**
 * Undoes the rounding of an axis that is written with few decimals, such as steps of 0.6 and 0.7 nm in turn.
 *
 * Least-squares polynomial pixel -> axis of the lowest degree (1 to 3) that passes every value within 0.6
 * rounding steps; null when the rounding is fine, the steps are even, or no such polynomial exists.
 *
 * @param axis         any unit, strictly monotonic, length >= 8
 * @param decimalCount digits after the decimal mark with which the axis is written
 * @source own derivation: rounding errors are uniform within half a step and average out over many pixels
 * @check  test/unit/recording/smooth-rounded-axis.test.ts
 */
export function smoothRoundedAxis(axis: Float64Array, decimalCount: number): SmoothedAxis | null {
  const count = axis.length;
  if (decimalCount > 6 || count < 16) return null;
  let tenths = 1;
  for (let i = 0; i < decimalCount; i += 1) tenths *= 10;
  const roundingStep = 1 / tenths;
  const meanStep = Math.abs(axis[count - 1]! - axis[0]!) / (count - 1);
  if (roundingStep < COARSE_SHARE * meanStep) return null;
  let [smallest, largest] = [Infinity, 0];
  for (let i = 1; i < count; i += 1) {
    const step = Math.abs(axis[i]! - axis[i - 1]!);
    smallest = Math.min(smallest, step);
    largest = Math.max(largest, step);
  }
  if (largest - smallest < 0.5 * roundingStep) return null;
  for (let degree = 1; degree <= HIGHEST_DEGREE; degree += 1) {
    const smooth = fitPolynomial(axis, degree);
    let largestChange = 0;
    for (let i = 0; i < count; i += 1)
      largestChange = Math.max(largestChange, Math.abs(smooth[i]! - axis[i]!));
    if (largestChange > ALLOWED_STEPS * roundingStep || !runsOneWay(smooth)) continue;
    return { axis: smooth, degree, roundingStep, meanStep, largestChange };
  }
  return null;
}

function runsOneWay(values: Float64Array): boolean {
  const direction = values[values.length - 1]! > values[0]! ? 1 : -1;
  for (let i = 1; i < values.length; i += 1)
    if (!((values[i]! - values[i - 1]!) * direction > 0)) return false;
  return true;
}

/**
 * Least squares on the polynomials that are orthogonal over the pixel numbers themselves, so that no system
 * has to be solved: p[k+1] = (t - a[k]) p[k] - b[k] p[k-1], t from -1 to 1.
 *
 * @source G. E. Forsythe, J. Soc. Indust. Appl. Math. 5, 74 (1957)
 */
function fitPolynomial(values: Float64Array, degree: number): Float64Array {
  const count = values.length;
  const t = Float64Array.from({ length: count }, (_, i) => (2 * i) / (count - 1) - 1);
  const fitted = new Float64Array(count);
  let before = new Float64Array(count);
  let now = new Float64Array(count).fill(1);
  let normBefore = 0;
  for (let k = 0; k <= degree; k += 1) {
    let [norm, moment, projection] = [0, 0, 0];
    for (let i = 0; i < count; i += 1) {
      const square = now[i]! * now[i]!;
      norm += square;
      moment += square * t[i]!;
      projection += now[i]! * values[i]!;
    }
    const next = new Float64Array(count);
    const b = k === 0 ? 0 : norm / normBefore;
    for (let i = 0; i < count; i += 1) {
      fitted[i] = fitted[i]! + (projection / norm) * now[i]!;
      next[i] = (t[i]! - moment / norm) * now[i]! - b * before[i]!;
    }
    before = now;
    now = next;
    normBefore = norm;
  }
  return fitted;
}
