/**
 * O(r n²) elimination of I − A for an integrable kernel of rank r, symmetric or not, no matrix formed.
 *
 *   A_ij = Σ_k F_ik G_jk / (x_i − x_j)   (i ≠ j),   A_ii = e_i.
 *
 * Eliminating pivot q with m = 1 − e_q, column v_i = A_iq and row u_j = A_qj gives A'_ij = A_ij + v_i u_j / m, so
 *
 *   F'_i = F_i + (v_i / m) F_q,   G'_j = G_j + (u_j / m) G_q,   e'_i = e_i + v_i u_i / m.
 *
 * The displacement does not determine the diagonal, so only symmetric exchanges are possible: at each step the
 * largest remaining |1 − e_i| is taken as pivot, and the growth of the generators is watched. The caller falls
 * back to a dense matrix when the growth says that digits were lost.
 */

/** How a structured elimination went. */
export interface StructuredOutcome {
  /** Number of pivots done; less than asked when a pivot vanished. */
  readonly done: number;
  /** Largest generator entry met, over the largest at the start. */
  readonly growth: number;
}

/**
 * Eliminates in place, choosing the pivots among the leading `pivots` rows; later rows are carried along.
 *
 * @param x - Nodes; permuted.
 * @param left - F, row-major `rows` × `rank`, weights already in; overwritten.
 * @param right - G, row-major `rows` × `rank`; overwritten.
 * @param e - Diagonal of A; overwritten by the pivot complements in the order of elimination.
 * @param rank - Number of generators.
 * @param pivots - Number of rows to eliminate.
 * @param rows - Number of rows in all.
 */
export function eliminateStructuredGeneral(
  x: Float64Array,
  left: Float64Array,
  right: Float64Array,
  e: Float64Array,
  rank: number,
  pivots: number,
  rows: number,
): StructuredOutcome {
  const start = largestEntry(left, rows * rank) * largestEntry(right, rows * rank);
  let most = start;
  for (let q = 0; q < pivots; q++) {
    let best = q;
    for (let i = q + 1; i < pivots; i++) if (Math.abs(1 - e[i]) > Math.abs(1 - e[best])) best = i;
    if (best !== q) exchange(x, left, right, e, rank, q, best);
    const m = 1 - e[q];
    if (m === 0 || !Number.isFinite(m)) return { done: q, growth: most / start };
    const inverse = 1 / m;
    const xq = x[q];
    const rowQ = q * rank;
    let leftMost = 0;
    let rightMost = 0;
    for (let i = q + 1; i < rows; i++) {
      const rowI = i * rank;
      let v = 0;
      let u = 0;
      for (let k = 0; k < rank; k++) {
        v += left[rowI + k] * right[rowQ + k];
        u += left[rowQ + k] * right[rowI + k];
      }
      const gap = x[i] - xq;
      v /= gap;
      u /= -gap;
      const sv = v * inverse;
      const su = u * inverse;
      for (let k = 0; k < rank; k++) {
        const f = left[rowI + k] + sv * left[rowQ + k];
        const g = right[rowI + k] + su * right[rowQ + k];
        left[rowI + k] = f;
        right[rowI + k] = g;
        if (f > leftMost || -f > leftMost) leftMost = Math.abs(f);
        if (g > rightMost || -g > rightMost) rightMost = Math.abs(g);
      }
      e[i] += v * su;
    }
    if (leftMost * rightMost > most) most = leftMost * rightMost;
  }
  return { done: pivots, growth: start > 0 ? most / start : 1 };
}

function largestEntry(values: Float64Array, count: number): number {
  let most = 0;
  for (let i = 0; i < count; i++) most = Math.max(most, Math.abs(values[i]));
  return most;
}

function exchange(
  x: Float64Array,
  left: Float64Array,
  right: Float64Array,
  e: Float64Array,
  rank: number,
  p: number,
  q: number,
): void {
  swap(x, p, q);
  swap(e, p, q);
  for (let k = 0; k < rank; k++) {
    swap(left, p * rank + k, q * rank + k);
    swap(right, p * rank + k, q * rank + k);
  }
}

function swap(values: Float64Array, p: number, q: number): void {
  const kept = values[p];
  values[p] = values[q];
  values[q] = kept;
}
