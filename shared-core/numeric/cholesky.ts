/** First column of each row that is not zero for certain; lets sparse rows be skipped. All zero means a full matrix. */
export type RowStarts = Int32Array;

/** Zeros, for matrices that are full; grows to the largest. */
let fromFirstColumn: RowStarts = new Int32Array(64);
function fullRows(n: number): RowStarts {
  if (fromFirstColumn.length < n) fromFirstColumn = new Int32Array(2 * n);
  return fromFirstColumn;
}

/**
 * Cholesky factor of a symmetric positive definite matrix, in place: A = L L^T.
 *
 * @param matrix  row-major n x n; only the lower triangle is read, and L replaces it (the upper part is left alone)
 * @param starts  first column of each row that may differ from zero: the factor has the same envelope
 * @returns false when a pivot is not positive: the matrix is not positive definite and holds nothing of use then
 * @source [Golub2013] algorithm 4.2.1; envelope: [George1981] ch. 4
 * @check  test/unit/numeric/cholesky.test.ts, test/reference/cholesky.test.ts
 */
export function choleskyFactor(matrix: Float64Array, n: number, starts: RowStarts = fullRows(n)): boolean {
  for (let i = 0; i < n; i++) {
    const rowI = i * n;
    const from = starts[i]!;
    let diagonal = matrix[rowI + i]!;
    for (let j = from; j < i; j++) {
      const rowJ = j * n;
      let sum = matrix[rowI + j]!;
      for (let k = Math.max(from, starts[j]!); k < j; k++) sum -= matrix[rowI + k]! * matrix[rowJ + k]!;
      const value = sum / matrix[rowJ + j]!;
      matrix[rowI + j] = value;
      diagonal -= value * value;
    }
    if (!(diagonal > 0) || !Number.isFinite(diagonal)) return false;
    matrix[rowI + i] = Math.sqrt(diagonal);
  }
  return true;
}

/** Solves L L^T x = b in place of `right`; `factor` and `starts` from choleskyFactor. */
export function choleskySolve(
  factor: Float64Array,
  n: number,
  right: Float64Array,
  starts: RowStarts = fullRows(n),
): void {
  for (let i = 0; i < n; i++) {
    let sum = right[i]!;
    for (let k = starts[i]!; k < i; k++) sum -= factor[i * n + k]! * right[k]!;
    right[i] = sum / factor[i * n + i]!;
  }
  for (let i = n - 1; i >= 0; i--) {
    const value = right[i]! / factor[i * n + i]!;
    right[i] = value;
    for (let k = starts[i]!; k < i; k++) right[k] = right[k]! - factor[i * n + k]! * value;
  }
}

/** Inverse of the matrix whose factor is given, as M^T M with M = L^-1; row-major n x n, symmetric, full. */
export function choleskyInverse(
  factor: Float64Array,
  n: number,
  starts: RowStarts = fullRows(n),
): Float64Array {
  // Row j holds M's column j from its diagonal on, so that both products run along rows.
  const columns = new Float64Array(n * n);
  for (let j = 0; j < n; j++) {
    const at = j * n;
    columns[at + j] = 1 / factor[at + j]!;
    for (let i = j + 1; i < n; i++) {
      const row = i * n;
      let sum = 0;
      for (let k = Math.max(j, starts[i]!); k < i; k++) sum -= factor[row + k]! * columns[at + k]!;
      columns[at + i] = sum / factor[row + i]!;
    }
  }
  const inverse = new Float64Array(n * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j <= i; j++) {
      let sum = 0;
      for (let k = i; k < n; k++) sum += columns[i * n + k]! * columns[j * n + k]!;
      inverse[i * n + j] = sum;
      inverse[j * n + i] = sum;
    }
  }
  return inverse;
}
