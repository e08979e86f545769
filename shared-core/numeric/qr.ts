/** Householder factors of a matrix, A P = Q R; all matrices column by column, as that is how the algorithm walks. */
export interface QrFactors {
  readonly rows: number;
  readonly columns: number;
  /** R on and above the diagonal, Householder vectors below it, column by column. */
  readonly matrix: Float64Array;
  /** First element of each Householder vector; the rest stands below R's diagonal. */
  readonly head: Float64Array;
  /** 2 / |v|^2 of each Householder vector v; 0 where nothing was reflected. */
  readonly factor: Float64Array;
  /** P: factored column k is column order[k] of A. */
  readonly order: Int32Array;
  /** Columns that are independent to working precision; R is upper triangular with this many usable rows. */
  readonly rank: number;
}

const epsilon = 2.220446049250313e-16;

/**
 * QR factors of a matrix with column pivoting, in place: of the columns left, the longest remainder comes next.
 *
 * Columns should have about equal length: the rank counts pivots above max(rows, columns) times the rounding unit times the first.
 *
 * @param matrix  column by column, rows x columns, rows >= columns; overwritten
 * @source [Golub2013] algorithms 5.1.1 and 5.4.1
 * @check  test/unit/numeric/qr.test.ts, test/reference/strd-linear.test.ts
 */
export function qrFactor(matrix: Float64Array, rows: number, columns: number): QrFactors {
  const head = new Float64Array(columns);
  const factor = new Float64Array(columns);
  const order = Int32Array.from({ length: columns }, (_, column) => column);
  let rank = 0;
  let largest = 0;
  for (let k = 0; k < columns; k++) {
    bringLongestForward(matrix, rows, columns, k, order);
    const start = k * rows;
    const length = Math.sqrt(squaredLength(matrix, start + k, start + rows));
    if (k === 0) largest = length;
    if (length > Math.max(rows, columns) * epsilon * largest) rank = k + 1;
    if (!(length > 0)) continue;
    // The reflection sends the column to -sign(first) |column| e1, so that nothing cancels.
    const first = matrix[start + k]!;
    const diagonal = first > 0 ? -length : length;
    head[k] = first - diagonal;
    factor[k] = 1 / (length * (length + Math.abs(first)));
    matrix[start + k] = diagonal;
    for (let j = k + 1; j < columns; j++) {
      const shift = j * rows - start;
      let sum = head[k]! * matrix[j * rows + k]!;
      for (let i = start + k + 1; i < start + rows; i++) sum += matrix[i]! * matrix[i + shift]!;
      sum *= factor[k]!;
      matrix[j * rows + k] = matrix[j * rows + k]! - sum * head[k]!;
      for (let i = start + k + 1; i < start + rows; i++)
        matrix[i + shift] = matrix[i + shift]! - sum * matrix[i]!;
    }
  }
  return { rows, columns, matrix, head, factor, order, rank };
}

/** Swaps columns so that of those from k on the one with the longest part below row k stands at k. */
function bringLongestForward(
  matrix: Float64Array,
  rows: number,
  columns: number,
  k: number,
  order: Int32Array,
): void {
  let longest = k;
  let best = -1;
  for (let j = k; j < columns; j++) {
    const squared = squaredLength(matrix, j * rows + k, j * rows + rows);
    if (squared > best) {
      best = squared;
      longest = j;
    }
  }
  if (longest === k) return;
  for (let i = 0; i < rows; i++) {
    const kept = matrix[k * rows + i]!;
    matrix[k * rows + i] = matrix[longest * rows + i]!;
    matrix[longest * rows + i] = kept;
  }
  const kept = order[k]!;
  order[k] = order[longest]!;
  order[longest] = kept;
}

function squaredLength(values: Float64Array, from: number, end: number): number {
  let sum = 0;
  for (let i = from; i < end; i++) sum += values[i]! * values[i]!;
  return sum;
}

/** vector := Q^T vector, length rows; the first `columns` elements are what R acts on. @check test/unit/numeric/qr.test.ts */
export function applyQTransposed(factors: QrFactors, vector: Float64Array): void {
  for (let k = 0; k < factors.columns; k++) reflect(factors, k, vector);
}

/** vector := Q vector, length rows. @check test/unit/numeric/qr.test.ts */
export function applyQ(factors: QrFactors, vector: Float64Array): void {
  for (let k = factors.columns - 1; k >= 0; k--) reflect(factors, k, vector);
}

function reflect({ rows, matrix, head, factor }: QrFactors, k: number, vector: Float64Array): void {
  const start = k * rows;
  let sum = head[k]! * vector[k]!;
  for (let i = k + 1; i < rows; i++) sum += matrix[start + i]! * vector[i]!;
  sum *= factor[k]!;
  vector[k] = vector[k]! - sum * head[k]!;
  for (let i = k + 1; i < rows; i++) vector[i] = vector[i]! - sum * matrix[start + i]!;
}

/** Solves R x = right in place of the first `columns` elements of `right`; full rank needed. @check test/unit/numeric/qr.test.ts */
export function solveUpper({ rows, columns, matrix }: QrFactors, right: Float64Array): void {
  for (let k = columns - 1; k >= 0; k--) {
    const value = right[k]! / matrix[k * rows + k]!;
    right[k] = value;
    for (let i = 0; i < k; i++) right[i] = right[i]! - value * matrix[k * rows + i]!;
  }
}

/** Solves R^T x = right in place of the first `columns` elements of `right`; full rank needed. @check test/unit/numeric/qr.test.ts */
export function solveUpperTransposed({ rows, columns, matrix }: QrFactors, right: Float64Array): void {
  for (let k = 0; k < columns; k++) {
    let sum = right[k]!;
    for (let i = 0; i < k; i++) sum -= matrix[k * rows + i]! * right[i]!;
    right[k] = sum / matrix[k * rows + k]!;
  }
}

/**
 * (A^T A)^-1 = P R^-1 R^-T P^T, the covariance of least-squares parameters for data of unit variance; row-major, full rank needed.
 * @source [Golub2013] section 5.3.8
 * @check  test/unit/numeric/qr.test.ts, test/reference/strd-linear.test.ts
 */
export function inverseOfNormal(factors: QrFactors): Float64Array {
  const { columns: n, order } = factors;
  // Row k of M is column k of R^-1.
  const inverse = new Float64Array(n * n);
  for (let k = 0; k < n; k++) {
    const column = inverse.subarray(k * n, (k + 1) * n);
    column[k] = 1;
    solveUpper(factors, column);
  }
  const result = new Float64Array(n * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j <= i; j++) {
      let sum = 0;
      for (let k = i; k < n; k++) sum += inverse[k * n + i]! * inverse[k * n + j]!;
      result[order[i]! * n + order[j]!] = sum;
      result[order[j]! * n + order[i]!] = sum;
    }
  }
  return result;
}
