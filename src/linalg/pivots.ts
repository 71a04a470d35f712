/**
 * From pivot complements to a determinant.
 *
 * Every elimination in this room factors I − A and stores, for pivot q, not the pivot m_q but its complement
 * e_q = 1 − m_q. For a small A the determinant is then Π(1 − e_q) and, without cancellation,
 *
 *   1 − det = Σ_q e_q Π_{p<q} (1 − e_p),
 *
 * a sum of like-signed terms when A is positive definite, so that tails keep their relative accuracy.
 */

/** What the pivots say about det(I − A). */
export interface PivotSummary {
  /** det(I − A); may underflow to 0 or overflow, `logAbs` does not. */
  readonly value: number;
  /** 1 − det(I − A), computed directly. */
  readonly complement: number;
  /** log |det(I − A)|. */
  readonly logAbs: number;
  /** Sign of the determinant: −1, 0 or 1. */
  readonly sign: number;
  /** Smallest |pivot|. */
  readonly smallestPivot: number;
  /** Largest |pivot|. */
  readonly largestPivot: number;
}

const LEAST = 2 ** -500;
const MOST = 2 ** 500;

/**
 * Reads the pivot complements of a finished elimination.
 *
 * @param e - Pivot complements e_q = 1 − pivot, entries 0 … count − 1 are read.
 * @param count - Number of pivots.
 * @param flipped - Whether row exchanges changed the sign of the determinant.
 */
export function summarizePivots(e: Float64Array, count: number, flipped = false): PivotSummary {
  let product = flipped ? -1 : 1;
  let carried = 0; // logarithm of what was taken out of `product` to keep it in range
  let complement = flipped ? 2 : 0; // 1 − (running determinant)
  let smallest = Number.POSITIVE_INFINITY;
  let largest = 0;
  for (let q = 0; q < count; q++) {
    const pivot = 1 - e[q];
    if (carried === 0) complement += e[q] * product;
    product *= pivot;
    const size = Math.abs(pivot);
    if (size < smallest) smallest = size;
    if (size > largest) largest = size;
    const p = Math.abs(product);
    if ((p < LEAST || p > MOST) && product !== 0) {
      carried += Math.log(p);
      product = product < 0 ? -1 : 1;
    }
  }
  if (carried === 0) {
    const nearOne = Math.abs(complement) < 0.5;
    const logAbs = nearOne ? Math.log1p(-complement) : Math.log(Math.abs(product));
    // Away from 1 the product has fewer roundings behind it than the sum.
    if (!nearOne) complement = 1 - product;
    return {
      value: product,
      complement,
      logAbs,
      sign: Math.sign(product),
      smallestPivot: smallest,
      largestPivot: largest,
    };
  }
  const logAbs = carried + Math.log(Math.abs(product));
  const value = Math.sign(product) * Math.exp(logAbs);
  return {
    value,
    complement: 1 - value,
    logAbs,
    sign: Math.sign(product),
    smallestPivot: smallest,
    largestPivot: largest,
  };
}
