/**
 * Elimination of I − A for a dense general A: without exchanges while A is small enough for that to be safe (the
 * complement then keeps its relative accuracy), with row exchanges otherwise.
 */

/**
 * Eliminates I − A without exchanges, carrying the complement of each pivot on the diagonal:
 * A'_ij = A_ij + A_iq A_qj / m, m = 1 − A_qq.
 *
 * @param matrix - A, row-major with row length `stride`; overwritten.
 * @param e - Receives the diagonal after elimination.
 * @param pivots - Number of rows to eliminate.
 * @param rows - Number of rows in all; rows beyond `pivots` are carried along.
 * @param stride - Row length of the storage.
 * @param least - Elimination stops before a pivot with |m| ≤ this: the caller must then use exchanges.
 * @returns Number of pivots done.
 */
export function eliminateDenseUnpivoted(
  matrix: Float64Array,
  e: Float64Array,
  pivots: number,
  rows: number,
  stride: number,
  least: number,
): number {
  let done = pivots;
  for (let q = 0; q < pivots; q++) {
    const rowQ = q * stride;
    const m = 1 - matrix[rowQ + q];
    if (!(Math.abs(m) > least)) {
      done = q;
      break;
    }
    const inverse = 1 / m;
    for (let i = q + 1; i < rows; i++) {
      const row = i * stride;
      const factor = matrix[row + q] * inverse;
      if (factor !== 0) for (let j = q + 1; j < rows; j++) matrix[row + j] += factor * matrix[rowQ + j];
    }
  }
  for (let i = 0; i < rows; i++) e[i] = matrix[i * stride + i];
  return done;
}

/**
 * Eliminates M = I − A with row exchanges (LU with partial pivoting).
 *
 * @param matrix - A on entry, row-major n × n with row length `stride`; overwritten.
 * @param e - Receives 1 − U_qq, so that the pivots can be read like those of the other routes.
 * @returns Whether the number of exchanges was odd.
 *
 * Cost: n³/3 multiply–adds. A zero pivot gives e = 1 there (determinant 0).
 */
export function eliminateDensePivoted(
  matrix: Float64Array,
  e: Float64Array,
  n: number,
  stride: number,
): boolean {
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) matrix[i * stride + j] = (i === j ? 1 : 0) - matrix[i * stride + j];
  }
  let odd = false;
  for (let q = 0; q < n; q++) {
    let best = q;
    for (let i = q + 1; i < n; i++) {
      if (Math.abs(matrix[i * stride + q]) > Math.abs(matrix[best * stride + q])) best = i;
    }
    if (best !== q) {
      odd = !odd;
      for (let j = 0; j < n; j++) {
        const kept = matrix[q * stride + j];
        matrix[q * stride + j] = matrix[best * stride + j];
        matrix[best * stride + j] = kept;
      }
    }
    const pivot = matrix[q * stride + q];
    e[q] = 1 - pivot;
    if (pivot === 0) continue;
    for (let i = q + 1; i < n; i++) {
      const factor = matrix[i * stride + q] / pivot;
      if (factor === 0) continue;
      for (let j = q + 1; j < n; j++) matrix[i * stride + j] -= factor * matrix[q * stride + j];
    }
  }
  return odd;
}
