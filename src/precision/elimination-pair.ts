/**
 * The structured elimination of elimination.ts for an antisymmetric pair of generators without derivatives: plain
 * fixed-point numbers, the case in which time matters. It also carries what a solution needs:
 *
 * - rows beyond the pivots: afterwards their diagonal entry is the resolvent kernel R(x, x), R = K (I − K)⁻¹;
 * - a bordering column c and row r: afterwards c at a carried row is ((I − K)⁻¹ c)(x), and the corner has become
 *   corner − ⟨r, (I − K)⁻¹ c⟩ (r with its weights).
 */
import { absolute, bitLength } from "./fixed-point.ts";

/** Everything is overwritten. */
export interface PairMatrix {
  readonly x: bigint[];
  /** Weights, z included; only of the pivot rows. */
  readonly weight: bigint[];
  readonly a: bigint[];
  readonly b: bigint[];
  readonly diagonal: bigint[];
  readonly border?: { readonly column: bigint[]; readonly row: bigint[]; corner: bigint };
}

/** A determinant value · 2^−scale. */
export interface PairDeterminant {
  readonly value: bigint;
  readonly scale: bigint;
  /** log2 of the smallest |pivot|. */
  readonly smallestPivot: number;
}

/**
 * Eliminates the rows that have weights.
 *
 * @param ordered - Whether the pivots may be taken as they come (positive definite I − K); else the largest is next.
 * @returns `undefined` when the pivots vanish within half of the bits.
 */
export function eliminatePair(m: PairMatrix, ordered: boolean, bits: bigint): PairDeterminant | undefined {
  const { x, weight, a, b, diagonal, border } = m;
  const pivots = weight.length;
  const rows = x.length;
  const one = 1n << bits;
  let value = one;
  let scale = bits;
  let smallest = 0;
  for (let q = 0; q < pivots; q++) {
    if (!ordered) exchangeLargest(m, q, one, bits);
    const w = weight[q];
    const pivot = one - ((w * diagonal[q]) >> bits);
    const length = bitLength(pivot);
    if (length <= Number(bits) / 2) return undefined;
    smallest = Math.min(smallest, length - Number(bits));
    const shift = BigInt(Math.max(0, bitLength(value) + length - Number(bits) - 1));
    value = (value * pivot) >> shift;
    scale += bits - shift;
    const scaled = (w << bits) / pivot;
    const xq = x[q];
    const aq = a[q];
    const bq = b[q];
    const sa = (aq * scaled) >> bits;
    const sb = (bq * scaled) >> bits;
    const sc = border ? (border.column[q] * scaled) >> bits : 0n;
    // r is already the row of the bordered matrix times its weight: what remains of it is divided by the pivot alone.
    const rq = border ? border.row[q] : 0n;
    if (border) border.corner -= (rq * border.column[q]) / pivot;
    const rs = border ? (rq << bits) / pivot : 0n;
    for (let i = q + 1; i < rows; i++) {
      const v = (a[i] * bq - b[i] * aq) / (x[i] - xq);
      a[i] += (v * sa) >> bits;
      b[i] += (v * sb) >> bits;
      diagonal[i] += (((v * v) >> bits) * scaled) >> bits;
      if (border) {
        border.column[i] += (v * sc) >> bits;
        if (i < pivots) border.row[i] += (((v * rs) >> bits) * weight[i]) >> bits;
      }
    }
  }
  return { value, scale, smallestPivot: smallest };
}

function exchangeLargest(
  { x, weight, a, b, diagonal, border }: PairMatrix,
  q: number,
  one: bigint,
  bits: bigint,
): void {
  let best = q;
  let most = -1n;
  for (let i = q; i < weight.length; i++) {
    const size = absolute(one - ((weight[i] * diagonal[i]) >> bits));
    if (size > most) {
      most = size;
      best = i;
    }
  }
  if (best === q) return;
  for (const list of [x, weight, a, b, diagonal, border?.column, border?.row]) {
    if (!list) continue;
    const kept = list[q];
    list[q] = list[best];
    list[best] = kept;
  }
}
