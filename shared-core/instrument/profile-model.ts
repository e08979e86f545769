import type { ModelFunction } from '../numeric/least-squares-problem.ts';
import { fillVoigtRun, voigtRunStride } from '../numeric/voigt-run.ts';
import type { InstrumentTerm } from './instrument-term.ts';
import type { ReferenceLine } from './reference-lines.ts';

/** Of every line: area, centre, level and slope of its baseline. */
export const lineParameterCount = 4;

/** A shape whose weights depend linearly on its parameters. */
export interface ProfileFamily {
  /** Terms in the order of their weights; lengths in units of the FWHM. */
  readonly terms: readonly InstrumentTerm[];
  /** Weight of each term at given shape parameters, and its derivative by each of them. */
  readonly weights: (shape: Float64Array) => Float64Array;
  readonly slopes: readonly Float64Array[];
  /** Number of the shape's parameters. */
  readonly parameterCount: number;
  /** nm; null where the FWHM is the first parameter, before those of the shape. */
  readonly fixedFwhmNm: number | null;
}

/**
 * Signal of all windows, one after the other: parameters are the FWHM where it is free, the shape's, then four a line.
 *
 * m = area sum_k w_k V_k(x - centre) + level + slope u, V_k integrated over each pixel; u runs from -1 to 1 over a window.
 */
export function profileModel(
  edgeNm: Float64Array,
  lines: readonly ReferenceLine[],
  family: ProfileFamily,
): ModelFunction {
  const { terms, slopes, parameterCount, fixedFwhmNm } = family;
  const rows = lines.reduce((sum, { firstPx, endPx }) => sum + endPx - firstPx, 0);
  const longest = Math.max(...lines.map(({ firstPx, endPx }) => endPx - firstPx));
  const run = new Float64Array(longest * voigtRunStride);
  const firstShape = fixedFwhmNm === null ? 1 : 0;
  const firstLine = firstShape + parameterCount;

  function eachPixel(
    values: Float64Array,
    visit: (row: number, line: number, u: number, parts: PixelParts) => void,
  ): void {
    const fwhmNm = fixedFwhmNm ?? values[0]!;
    const weights = family.weights(values.subarray(firstShape, firstLine));
    let row = 0;
    for (const [index, { firstPx, endPx }] of lines.entries()) {
      const count = endPx - firstPx;
      const centreNm = values[firstLine + index * lineParameterCount + 1]!;
      const shares = new Float64Array(count * terms.length);
      const byCentre = new Float64Array(count);
      const byWidth = new Float64Array(count);
      for (const [k, term] of terms.entries()) {
        const shape = {
          centreNm: centreNm + term.shiftShare * fwhmNm,
          gaussianFwhmNm: term.gaussianShare * fwhmNm,
          lorentzianFwhmNm: term.lorentzianShare * fwhmNm,
        };
        fillVoigtRun(shape, 1, edgeNm, firstPx, endPx, run);
        for (let i = 0, at = 0; i < count; i++, at += voigtRunStride) {
          const w = weights[k]!;
          shares[i * terms.length + k] = run[at]!;
          byCentre[i] = byCentre[i]! + w * run[at + 1]!;
          byWidth[i] =
            byWidth[i]! +
            w *
              (run[at + 1]! * term.shiftShare +
                run[at + 2]! * term.gaussianShare +
                run[at + 3]! * term.lorentzianShare);
        }
      }
      for (let i = 0; i < count; i++, row++) {
        const u = (2 * i - (count - 1)) / (count - 1);
        const each = shares.subarray(i * terms.length, (i + 1) * terms.length);
        visit(row, index, u, { shares: each, weights, byCentre: byCentre[i]!, byWidth: byWidth[i]! });
      }
    }
  }

  return {
    evaluate(values, modelled) {
      eachPixel(values, (row, line, u, { shares, weights }) => {
        const at = firstLine + line * lineParameterCount;
        modelled[row] = values[at]! * dot(weights, shares) + values[at + 2]! + values[at + 3]! * u;
      });
    },
    differentiate(values, jacobian) {
      jacobian.fill(0);
      eachPixel(values, (row, line, u, { shares, weights, byCentre, byWidth }) => {
        const at = firstLine + line * lineParameterCount;
        const area = values[at]!;
        if (fixedFwhmNm === null) jacobian[row] = area * byWidth;
        for (let p = 0; p < parameterCount; p++)
          jacobian[(firstShape + p) * rows + row] = area * dot(slopes[p]!, shares);
        jacobian[at * rows + row] = dot(weights, shares);
        jacobian[(at + 1) * rows + row] = area * byCentre;
        jacobian[(at + 2) * rows + row] = 1;
        jacobian[(at + 3) * rows + row] = u;
      });
    },
  };
}

interface PixelParts {
  /** Of each term. */
  readonly shares: Float64Array;
  readonly weights: Float64Array;
  readonly byCentre: number;
  readonly byWidth: number;
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let k = 0; k < a.length; k++) sum += a[k]! * b[k]!;
  return sum;
}
