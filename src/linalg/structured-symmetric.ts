/**
 * O(n²) elimination of I − A for a symmetric integrable kernel with two generators, no matrix formed.
 *
 *   A_ij = (a_i b_j − b_i a_j) / (x_i − x_j),   A_ii = e_i.
 *
 * Every Schur complement of I − A has the same form (a matrix of low displacement rank). Eliminating pivot q,
 * with m = 1 − e_q and v_i = A_iq, gives A'_ij = A_ij + v_i v_j / m, that is
 *
 *   a'_i = a_i + v_i a_q / m,   b'_i = b_i + v_i b_q / m,   e'_i = e_i + v_i² / m.
 *
 * The displacement does not determine the diagonal, so e is carried on its own, as 1 − pivot and never as the
 * pivot: that keeps 1 − det to full relative accuracy. Method: T. Kailath, S.-Y. Kung, M. Morf, J. Math. Anal.
 * Appl. 68 (1979) 395; I. Gohberg, T. Kailath, V. Olshevsky, Math. Comp. 64 (1995) 1557.
 */

/**
 * Eliminates the leading `pivots` rows in place; rows from `pivots` to `rows` − 1 are carried along but not
 * eliminated, so that afterwards their e is the diagonal of A + A (I − A)⁻¹ A seen from those rows: with weight 1
 * the resolvent kernel.
 *
 * @param x - Nodes, pairwise different, length ≥ `rows`.
 * @param a - First generator times square root of weight; overwritten.
 * @param b - Second generator times square root of weight; overwritten.
 * @param e - Diagonal of A; overwritten, entries below `pivots` become the pivot complements.
 * @param pivots - Number of rows to eliminate.
 * @param rows - Number of rows in all.
 * @param least - Elimination stops before a pivot that is not above this.
 * @returns Number of pivots done: `pivots`, or the index of the first pivot ≤ `least`.
 *
 * Cost: about 4 n² multiply–adds and n²/2 divisions, no allocation.
 */
export function eliminateStructuredSymmetric(
  x: Float64Array,
  a: Float64Array,
  b: Float64Array,
  e: Float64Array,
  pivots: number,
  rows: number,
  least: number,
): number {
  for (let q = 0; q < pivots; q++) {
    const m = 1 - e[q];
    if (!(m > least)) return q;
    const inverse = 1 / m;
    const xq = x[q];
    const aq = a[q];
    const bq = b[q];
    const sa = aq * inverse;
    const sb = bq * inverse;
    for (let i = q + 1; i < rows; i++) {
      const v = (a[i] * bq - b[i] * aq) / (x[i] - xq);
      a[i] += v * sa;
      b[i] += v * sb;
      e[i] += v * v * inverse;
    }
  }
  return pivots;
}
