export interface RoundedAxis {
  /** Smoothed, or as written where no smooth curve agrees with what is written. */
  readonly axis: Float64Array;
  /** One polynomial over all pixels, a polynomial over the neighbours of each, or neither. */
  readonly method: 'polynomial' | 'neighbours' | 'left';
  /** Degree of that polynomial; pixels on each side for `neighbours`; 0 for `left`. */
  readonly extent: number;
  /** Unit of the axis, as all below. */
  readonly roundingStep: number;
  readonly meanStep: number;
  readonly largestChange: number;
}

/** Rounding coarser than this share of the pixel step shifts line centres and areas noticeably. */
const COARSE_SHARE = 0.02;
/** Rounding moves a value by at most half a step; the rest allows for the fit. */
const ALLOWED_STEPS = 0.6;
const DEGREES = [1, 2, 3] as const;
const HALF_WIDTHS = [20, 15, 10, 8, 6, 4] as const;

/**
 * Undoes the rounding of an axis that is written with few decimals, such as steps of 0.6 and 0.7 nm in turn.
 *
 * Takes the stiffest curve that passes every written value within 0.6 rounding steps: one polynomial pixel ->
 * axis (degree 1 to 3), else at each pixel the parabola through its 20, 15, 10, 8, 6 or 4 neighbours on each side.
 * Null when the rounding is fine beside the pixel step or the steps are even already.
 *
 * @param axis         any unit, strictly monotonic
 * @param decimalCount digits after the decimal mark with which the axis is written
 * @source own derivation: rounding errors are uniform within half a step and average out over many pixels;
 *         parabola through neighbours: [Savitzky1964], here by the
 *         orthogonal polynomials of an even grid, and off centre at both ends
 * @check  test/unit/recording/smooth-rounded-axis.test.ts
 */
export function smoothRoundedAxis(axis: Float64Array, decimalCount: number): RoundedAxis | null {
  const count = axis.length;
  if (decimalCount > 6 || count < 16) return null;
  let tens = 1;
  for (let i = 0; i < decimalCount; i += 1) tens *= 10;
  const roundingStep = 1 / tens;
  const meanStep = Math.abs(axis[count - 1]! - axis[0]!) / (count - 1);
  if (roundingStep < COARSE_SHARE * meanStep) return null;
  let [smallest, largest] = [Infinity, 0];
  for (let i = 1; i < count; i += 1) {
    const step = Math.abs(axis[i]! - axis[i - 1]!);
    smallest = Math.min(smallest, step);
    largest = Math.max(largest, step);
  }
  if (largest - smallest < 0.5 * roundingStep) return null;
  const judge = (smooth: Float64Array): number | null => {
    let change = 0;
    for (let i = 0; i < count; i += 1) change = Math.max(change, Math.abs(smooth[i]! - axis[i]!));
    return change <= ALLOWED_STEPS * roundingStep && runsOneWay(smooth) ? change : null;
  };
  for (const degree of DEGREES) {
    const smooth = fitPolynomial(axis, degree);
    const largestChange = judge(smooth);
    if (largestChange === null) continue;
    return { axis: smooth, method: 'polynomial', extent: degree, roundingStep, meanStep, largestChange };
  }
  for (const halfWidth of HALF_WIDTHS) {
    if (count < 4 * halfWidth) continue;
    const smooth = fitNeighbours(axis, halfWidth);
    const largestChange = judge(smooth);
    if (largestChange === null) continue;
    return { axis: smooth, method: 'neighbours', extent: halfWidth, roundingStep, meanStep, largestChange };
  }
  return { axis, method: 'left', extent: 0, roundingStep, meanStep, largestChange: 0 };
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
 * @source [Forsythe1957]
 */
function fitPolynomial(values: Float64Array, degree: number): Float64Array {
  const count = values.length;
  const t = new Float64Array(count);
  for (let i = 0; i < count; i += 1) t[i] = (2 * i) / (count - 1) - 1;
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

/** At each pixel the least-squares parabola through the 2 h + 1 values around it (the nearest such at the ends). */
function fitNeighbours(values: Float64Array, halfWidth: number): Float64Array {
  const count = values.length;
  const h = halfWidth;
  const size = 2 * h + 1;
  const meanSquare = (h * (h + 1)) / 3;
  let quadraticNorm = 0;
  for (let x = -h; x <= h; x += 1) quadraticNorm += (x * x - meanSquare) * (x * x - meanSquare);
  const smooth = new Float64Array(count);
  for (let i = 0; i < count; i += 1) {
    const centre = Math.max(h, Math.min(count - 1 - h, i));
    let [mean, slope, curvature] = [0, 0, 0];
    for (let x = -h; x <= h; x += 1) {
      const value = values[centre + x]!;
      mean += value;
      slope += x * value;
      curvature += (x * x - meanSquare) * value;
    }
    const x = i - centre;
    smooth[i] =
      mean / size + (slope / (size * meanSquare)) * x + (curvature / quadraticNorm) * (x * x - meanSquare);
  }
  return smooth;
}
