/**
 * Cholesky factor of a symmetric positive definite matrix, in place: A = L L^T.
 *
 * @param matrix  row-major n x n; only the lower triangle is read, and L replaces it (the upper part is left alone)
 * @returns false when a pivot is not positive: the matrix is not positive definite and holds nothing of use then
 * @source G. H. Golub, C. F. Van Loan, Matrix Computations, 4th ed., algorithm 4.2.1
 * @check  test/unit/numeric/cholesky.test.ts, test/reference/cholesky.test.ts
 */
export function choleskyFactor(matrix: Float64Array, n: number): boolean {
  for (let j = 0; j < n; j++) {
    const rowJ = j * n;
    let diagonal = matrix[rowJ + j]!;
    for (let k = 0; k < j; k++) diagonal -= matrix[rowJ + k]! * matrix[rowJ + k]!;
    if (!(diagonal > 0) || !Number.isFinite(diagonal)) return false;
    const root = Math.sqrt(diagonal);
    matrix[rowJ + j] = root;
    for (let i = j + 1; i < n; i++) {
      const rowI = i * n;
      let sum = matrix[rowI + j]!;
      for (let k = 0; k < j; k++) sum -= matrix[rowI + k]! * matrix[rowJ + k]!;
      matrix[rowI + j] = sum / root;
    }
  }
  return true;
}

/** Solves L L^T x = b in place of `right`; `factor` from choleskyFactor. */
export function choleskySolve(factor: Float64Array, n: number, right: Float64Array): void {
  for (let i = 0; i < n; i++) {
    let sum = right[i]!;
    for (let k = 0; k < i; k++) sum -= factor[i * n + k]! * right[k]!;
    right[i] = sum / factor[i * n + i]!;
  }
  for (let i = n - 1; i >= 0; i--) {
    let sum = right[i]!;
    for (let k = i + 1; k < n; k++) sum -= factor[k * n + i]! * right[k]!;
    right[i] = sum / factor[i * n + i]!;
  }
}

/** Inverse of the matrix whose factor is given, as M^T M with M = L^-1; row-major n x n, symmetric. */
export function choleskyInverse(factor: Float64Array, n: number): Float64Array {
  // M^T row by row, so that both products run along rows: row j holds M's column j from its diagonal on.
  const columns = new Float64Array(n * n);
  for (let j = 0; j < n; j++) {
    const at = j * n;
    columns[at + j] = 1 / factor[at + j]!;
    for (let i = j + 1; i < n; i++) {
      const row = i * n;
      let sum = 0;
      for (let k = j; k < i; k++) sum -= factor[row + k]! * columns[at + k]!;
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
