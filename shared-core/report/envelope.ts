import { invariant } from '../result/result.ts';

/**
 * Thins a curve for drawing: in each column of the picture the first, lowest, highest and last sample stay.
 *
 * A line one pixel wide keeps its full height, and a dip its full depth, however many samples share a column.
 *
 * @param positions   horizontal positions in user units, length n, not decreasing
 * @param signal      ordinates, length n, finite
 * @param columnWidth user units, > 0
 * @returns indices into the arrays, ascending, without repeats
 * @source own; extremes rather than triangle sampling, which can drop a narrow line
 * @check  test/unit/report/envelope.test.ts
 */
export function envelopeIndices(
  positions: Float64Array,
  signal: Float64Array,
  columnWidth: number,
): readonly number[] {
  invariant(positions.length === signal.length, 'a curve has as many ordinates as positions');
  invariant(columnWidth > 0, 'a column has a width');
  const kept: number[] = [];
  let start = 0;
  while (start < positions.length) {
    const column = Math.floor((positions[start] ?? 0) / columnWidth);
    let end = start;
    let lowest = start;
    let highest = start;
    while (end < positions.length && Math.floor((positions[end] ?? 0) / columnWidth) === column) {
      if ((signal[end] ?? 0) < (signal[lowest] ?? 0)) lowest = end;
      if ((signal[end] ?? 0) > (signal[highest] ?? 0)) highest = end;
      end += 1;
    }
    const inColumn = [start, Math.min(lowest, highest), Math.max(lowest, highest), end - 1];
    for (const index of inColumn) if (index !== kept.at(-1)) kept.push(index);
    start = end;
  }
  return kept;
}
