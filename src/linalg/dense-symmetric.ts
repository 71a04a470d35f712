/**
 * Elimination of I − A for a dense symmetric A, with the complement of each pivot carried on the diagonal.
 *
 * A is stored row-major; only entries with column ≤ row are read and written. Eliminating pivot q, with
 * m = 1 − A_qq and v_i = A_iq: A'_ij = A_ij + v_i v_j / m. The diagonal entry left behind at q is e_q = 1 − m_q.
 */

/**
 * Eliminates the leading `pivots` rows in place; later rows are carried along (see the structured route).
 *
 * @param matrix - A, row-major with row length `stride`; the lower triangle is overwritten.
 * @param e - Receives the diagonal after elimination, length ≥ `rows`.
 * @param scratch - Work space of length ≥ `rows`.
 * @param pivots - Number of rows to eliminate.
 * @param rows - Number of rows in all.
 * @param stride - Row length of the storage, ≥ `rows`.
 * @param least - Elimination stops before a pivot that is not above this.
 * @returns Number of pivots done.
 *
 * Cost: n³/6 multiply–adds.
 */
export function eliminateDenseSymmetric(
  matrix: Float64Array,
  e: Float64Array,
  scratch: Float64Array,
  pivots: number,
  rows: number,
  stride: number,
  least: number,
): number {
  let done = pivots;
  for (let q = 0; q < pivots; q++) {
    const m = 1 - matrix[q * stride + q];
    if (!(m > least)) {
      done = q;
      break;
    }
    const inverse = 1 / m;
    for (let i = q + 1; i < rows; i++) scratch[i] = matrix[i * stride + q];
    for (let i = q + 1; i < rows; i++) {
      const factor = scratch[i] * inverse;
      const row = i * stride;
      for (let j = q + 1; j <= i; j++) matrix[row + j] += factor * scratch[j];
    }
  }
  for (let i = 0; i < rows; i++) e[i] = matrix[i * stride + i];
  return done;
}
