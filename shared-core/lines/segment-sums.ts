import type { Evaluation } from './joint-problem.ts';
import type { SegmentBasis } from './segment-basis.ts';

/** Weighted sums of one segment over its pixels, in columns: lower triangle of B^T W B, and B^T W r. */
export interface SegmentSums {
  readonly normal: Float64Array;
  readonly right: Float64Array;
}

export function createSegmentSums({ columnCount, pixelCount }: SegmentBasis): SegmentSums {
  if (weighted.length < pixelCount) weighted = new Float64Array(2 * pixelCount);
  return { normal: new Float64Array(columnCount * columnCount), right: new Float64Array(columnCount) };
}

/** One weighted column, overwritten by every sum; grows to the longest segment. */
let weighted = new Float64Array(256);

/**
 * Sums one segment over its pixels.
 * @param weight    1/variance of each of its pixels, 0 where masked
 * @param residual  recorded less modelled
 */
export function sumSegment(
  { columns, columnCount, pixelCount }: SegmentBasis,
  weight: Float64Array,
  residual: Float64Array,
  { normal, right }: SegmentSums,
): void {
  for (let i = 0; i < columnCount; i++) {
    const a = i * pixelCount;
    let sum = 0;
    for (let k = 0; k < pixelCount; k++) {
      const scaled = weight[k]! * columns[a + k]!;
      weighted[k] = scaled;
      sum += scaled * residual[k]!;
    }
    right[i] = sum;
    for (let j = 0; j <= i; j++) {
      const b = j * pixelCount;
      let product = 0;
      for (let k = 0; k < pixelCount; k++) product += weighted[k]! * columns[b + k]!;
      normal[i * columnCount + j] = product;
    }
  }
}

/**
 * Adds the sums of a segment to the equations of the active parameters, lower triangle, by the chain rule.
 * @param position  of each parameter among the active ones, -1 for those held fixed
 */
export function addToEquations(
  { links, columnCount }: SegmentBasis,
  { normal, right }: SegmentSums,
  position: Int32Array,
  size: number,
  out: Evaluation,
): void {
  for (const a of links) {
    const row = position[a.parameter]!;
    if (row < 0) continue;
    out.right[row] = out.right[row]! + a.weight * right[a.column]!;
    for (const b of links) {
      const column = position[b.parameter]!;
      if (column < 0 || column > row) continue;
      const sum =
        a.column >= b.column
          ? normal[a.column * columnCount + b.column]!
          : normal[b.column * columnCount + a.column]!;
      out.normal[row * size + column] = out.normal[row * size + column]! + a.weight * b.weight * sum;
    }
  }
}

/** The part of a parameter covariance that a segment's columns see: chain^T C chain, full square matrix. */
export function columnCovariance(
  { links, columnCount }: SegmentBasis,
  covariance: Float64Array,
  parameterCount: number,
): Float64Array {
  const out = new Float64Array(columnCount * columnCount);
  for (const a of links) {
    for (const b of links) {
      const at = a.column * columnCount + b.column;
      out[at] = out[at]! + a.weight * b.weight * covariance[a.parameter * parameterCount + b.parameter]!;
    }
  }
  return out;
}
