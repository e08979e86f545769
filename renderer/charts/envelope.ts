import { envelopeIndices } from '../../shared-core/report/envelope.ts';

export interface ChartPoint {
  readonly x: number;
  readonly y: number;
}

/**
 * The part of a curve between `fromX` and `toX`, and one point more on either side, thinned so that in each
 * column of the drawing the first, lowest, highest and last sample stay: no peak is lost however narrow it is.
 * `x` increases; both arrays are equally long.
 */
export function visibleCurve(
  x: Float64Array,
  y: Float64Array,
  view: { readonly fromX: number; readonly toX: number; readonly columnCount: number },
): ChartPoint[] {
  const start = Math.max(0, lowerBound(x, view.fromX) - 1);
  const end = Math.min(x.length, lowerBound(x, view.toX) + 2);
  const columnWidth = (view.toX - view.fromX) / view.columnCount;
  const positions = x.subarray(start, end);
  return envelopeIndices(positions, y.subarray(start, end), columnWidth).map((index) => ({
    x: positions[index] ?? 0,
    y: y[start + index] ?? 0,
  }));
}

/** Index of the first element that is not below `value`; `x.length` when all are. */
export function lowerBound(x: Float64Array, value: number): number {
  let low = 0;
  let high = x.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((x[middle] ?? 0) < value) low = middle + 1;
    else high = middle;
  }
  return low;
}

/** Index of the element nearest to `value`; `x` increases and is not empty. */
export function nearestIndex(x: Float64Array, value: number): number {
  const above = Math.min(x.length - 1, lowerBound(x, value));
  const below = Math.max(0, above - 1);
  return value - (x[below] ?? 0) <= (x[above] ?? 0) - value ? below : above;
}
