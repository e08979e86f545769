import type { SolvedFit } from './solved-fit.ts';

/** What one more parameter would add to the signal of a segment's pixels, per unit of it. */
export interface SegmentColumn {
  readonly segment: number;
  readonly values: Float64Array;
}

/** How plainly the residuals of a fit ask for one more parameter. */
export interface Score {
  /** Its estimate over its standard uncertainty. */
  readonly z: number;
  /** Standard uncertainty the estimate would have. */
  readonly sigma: number;
  /** By what a parameter of the fit would move for one unit of the addition. */
  readonly shiftOf: (parameter: number) => number;
}

/** An addition's estimate, in its own unit, and by what a parameter of the fit would move for one unit of it. */
export interface Estimate {
  readonly amount: number;
  readonly shiftOf: Score['shiftOf'];
}

const untold: Score = Object.freeze({ z: 0, sigma: Infinity, shiftOf: () => 0 });

/**
 * Score test of one more parameter of a converged fit, without fitting it.
 *
 * With c the new column, W the weights, r the residuals, J the derivatives and C the covariance of the fit:
 * b = J^T W c, v = c^T W c - b^T C b, estimate c^T W r / v with variance 1/v; the parameters of the fit would move by -C b
 * for one unit of it.
 *
 * @param misfit  by what the fit misses beyond independent noise; widens sigma
 * @source [Rao1948]
 * @check  test/property/additions.test.ts
 */
export function scoreColumn(fit: SolvedFit, parts: readonly SegmentColumn[], misfit: number): Score {
  const { problem, model, solution } = fit;
  const { netSignal } = problem.recording;
  const b = new Float64Array(model.parameterCount);
  let gradient = 0;
  let plain = 0;
  for (const { segment, values } of parts) {
    const { columns, columnCount, pixelCount, links, segment: pixels } = model.bases[segment]!;
    const weighted = new Float64Array(pixelCount);
    for (let i = 0, px = pixels.firstPx; i < pixelCount; i++, px++) {
      if (problem.masked[px] === 1) continue;
      weighted[i] = values[i]! / model.variance[px]!;
      plain += weighted[i]! * values[i]!;
      gradient += weighted[i]! * (netSignal[px]! - model.modelled[px]!);
    }
    const projection = new Float64Array(columnCount);
    for (let column = 0; column < columnCount; column++) {
      let sum = 0;
      for (let i = 0; i < pixelCount; i++) sum += weighted[i]! * columns[column * pixelCount + i]!;
      projection[column] = sum;
    }
    for (const { column, parameter, weight } of links)
      b[parameter] = b[parameter]! + weight * projection[column]!;
  }
  const touched: number[] = [];
  for (let i = 0; i < model.active.length; i++) if (b[model.active[i]!] !== 0) touched.push(model.active[i]!);
  const shiftOf = (of: number): number => {
    let sum = 0;
    for (const parameter of touched)
      sum -= solution.covariance[of * model.parameterCount + parameter]! * b[parameter]!;
    return sum;
  };
  let information = plain;
  for (const parameter of touched) information += b[parameter]! * shiftOf(parameter);
  // What is left of a column that the fit can already make is rounding.
  if (!(information > 1e-9 * plain)) return untold;
  const root = Math.sqrt(information);
  return { z: gradient / root / misfit, sigma: misfit / root, shiftOf };
}
