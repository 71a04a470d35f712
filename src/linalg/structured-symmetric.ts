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
 *
 * Two pivots p, q go in one sweep over the rows, which halves the traffic of memory, and share one division,
 * 1/(x_i − x_p) = r (x_i − x_q) with r = 1/((x_i − x_p)(x_i − x_q)): two roundings more in v_i. Over many rows the
 * pivot's generators are divided by √m first (w_i = v_i/√m, a'_i = a_i + w_i a_q/√m, e'_i = e_i + w_i²), which saves
 * two products a row but waits for a square root.
 *
 * The compiled form (assembly/structured-symmetric.ts) runs the same operations in the same order: same bits.
 */
import { even, placeOf } from "../core/linear-memory.ts";
import { type Arithmetic, type Compiled, compiled } from "../core/web-assembly.ts";

/** Pivot pairs with at least so many rows from the first on are swept in scaled form. The compiled form agrees. */
const SCALED_FROM = 48;
/** From so many rows on the compiled form pays: with arrays in its memory, and with arrays to be copied. */
const COMPILED_FROM = 4;
const COPIED_FROM = 40;

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
 * @param least - Elimination stops before a pivot that is not above this; ≥ 0.
 * @param arithmetic - Compiled or plain; the bits are the same.
 * @returns Number of pivots done: `pivots`, or the index of the first pivot ≤ `least`; the rows below have then seen
 *   the pivots before it.
 *
 * Cost: about 4 n² multiply–adds and n²/4 divisions, no allocation.
 */
export function eliminateStructuredSymmetric(
  x: Float64Array,
  a: Float64Array,
  b: Float64Array,
  e: Float64Array,
  pivots: number,
  rows: number,
  least: number,
  arithmetic: Arithmetic = "automatic",
): number {
  if (arithmetic !== "plain" && (arithmetic === "wasm" || rows >= COMPILED_FROM)) {
    const done = eliminateCompiled(x, a, b, e, pivots, rows, least, arithmetic);
    if (done >= 0) return done;
  }
  if (gapsAreModerate(x, rows)) return eliminatePairs(x, a, b, e, pivots, rows, least);
  return eliminateOneByOne(x, a, b, e, pivots, rows, least);
}

/** The compiled form; −1, and nothing done, where it cannot be had, does not pay or does not take such nodes. */
function eliminateCompiled(
  x: Float64Array,
  a: Float64Array,
  b: Float64Array,
  e: Float64Array,
  pivots: number,
  rows: number,
  least: number,
  arithmetic: Arithmetic,
): number {
  const found = compiled();
  if (found === undefined) return -1;
  const px = placeOf(x);
  const pa = placeOf(a);
  const pb = placeOf(b);
  const pe = placeOf(e);
  if (px >= 0 && pa >= 0 && pb >= 0 && pe >= 0) {
    return found.routines.eliminateStructuredSymmetric(px, pa, pb, pe, pivots, rows, least);
  }
  const pays = arithmetic === "wasm" || rows >= COPIED_FROM;
  if (!pays || 4 * even(rows) > found.memory.free) return -1;
  return eliminateCopies(found, x, a, b, e, pivots, rows, least);
}

/** Copies into linear memory and back; nobody else runs in between, so the free part need not be lent. */
function eliminateCopies(
  { routines, memory }: Compiled,
  x: Float64Array,
  a: Float64Array,
  b: Float64Array,
  e: Float64Array,
  pivots: number,
  rows: number,
  least: number,
): number {
  const { numbers, mark } = memory;
  const step = even(rows);
  for (let i = 0, at = mark; i < rows; i++, at++) {
    numbers[at] = x[i];
    numbers[at + step] = a[i];
    numbers[at + 2 * step] = b[i];
    numbers[at + 3 * step] = e[i];
  }
  const start = 8 * mark;
  const done = routines.eliminateStructuredSymmetric(
    start,
    start + 8 * step,
    start + 16 * step,
    start + 24 * step,
    pivots,
    rows,
    least,
  );
  if (done < 0) return done;
  for (let i = 0, at = mark; i < rows; i++, at++) {
    a[i] = numbers[at + step];
    b[i] = numbers[at + 2 * step];
    e[i] = numbers[at + 3 * step];
  }
  return done;
}

/**
 * Whether products of two gaps and their reciprocals stay in range. Different doubles of which at most one is below
 * 2⁻⁴⁴⁰ in size differ by 2⁻⁴⁹³ or more.
 */
function gapsAreModerate(x: Float64Array, rows: number): boolean {
  let tiny = 0;
  for (let i = 0; i < rows; i++) {
    const size = Math.abs(x[i]);
    if (!(size < 2 ** 500)) return false;
    if (size < 2 ** -440) tiny++;
  }
  return tiny < 2;
}

/** The plain form. */
function eliminatePairs(
  x: Float64Array,
  a: Float64Array,
  b: Float64Array,
  e: Float64Array,
  pivots: number,
  rows: number,
  least: number,
): number {
  for (let p = 0; p < pivots; p += 2) {
    const m = 1 - e[p];
    if (!(m > least)) return p;
    const inverse = 1 / m;
    const q = p + 1;
    if (q === pivots) {
      sweepOne(x, a, b, e, p, rows, inverse);
      return pivots;
    }
    const v = (a[q] * b[p] - b[q] * a[p]) * (1 / (x[q] - x[p]));
    const t = v * inverse;
    const eq = e[q] + t * v;
    const mq = 1 - eq;
    if (!(mq > least)) {
      sweepOne(x, a, b, e, p, rows, inverse);
      return q;
    }
    a[q] += t * a[p];
    b[q] += t * b[p];
    e[q] = eq;
    if (rows - p < SCALED_FROM) sweepTwo(x, a, b, e, p, rows, inverse, 1 / mq);
    else sweepTwoScaled(x, a, b, e, p, rows, 1 / Math.sqrt(m), 1 / Math.sqrt(mq));
  }
  return pivots;
}

/** Rows after pivot p. */
function sweepOne(
  x: Float64Array,
  a: Float64Array,
  b: Float64Array,
  e: Float64Array,
  p: number,
  rows: number,
  inverse: number,
): void {
  const xp = x[p];
  const ap = a[p];
  const bp = b[p];
  for (let i = p + 1; i < rows; i++) {
    const v = (a[i] * bp - b[i] * ap) * (1 / (x[i] - xp));
    const t = v * inverse;
    a[i] += t * ap;
    b[i] += t * bp;
    e[i] += t * v;
  }
}

/** Rows after pivots p and p + 1, with the reciprocals of the two. */
function sweepTwo(
  x: Float64Array,
  a: Float64Array,
  b: Float64Array,
  e: Float64Array,
  p: number,
  rows: number,
  ip: number,
  iq: number,
): void {
  const xp = x[p];
  const ap = a[p];
  const bp = b[p];
  const xq = x[p + 1];
  const aq = a[p + 1];
  const bq = b[p + 1];
  for (let i = p + 2; i < rows; i++) {
    const gp = x[i] - xp;
    const gq = x[i] - xq;
    const r = 1 / (gp * gq);
    const vp = (a[i] * bp - b[i] * ap) * (r * gq);
    const tp = vp * ip;
    const ai = a[i] + tp * ap;
    const bi = b[i] + tp * bp;
    const vq = (ai * bq - bi * aq) * (r * gp);
    const tq = vq * iq;
    a[i] = ai + tq * aq;
    b[i] = bi + tq * bq;
    e[i] = e[i] + tp * vp + tq * vq;
  }
}

/** The same with the reciprocal roots of the two. */
function sweepTwoScaled(
  x: Float64Array,
  a: Float64Array,
  b: Float64Array,
  e: Float64Array,
  p: number,
  rows: number,
  sp: number,
  sq: number,
): void {
  const xp = x[p];
  const ap = a[p] * sp;
  const bp = b[p] * sp;
  const xq = x[p + 1];
  const aq = a[p + 1] * sq;
  const bq = b[p + 1] * sq;
  for (let i = p + 2; i < rows; i++) {
    const gp = x[i] - xp;
    const gq = x[i] - xq;
    const r = 1 / (gp * gq);
    const v = (a[i] * bp - b[i] * ap) * (r * gq);
    const ai = a[i] + v * ap;
    const bi = b[i] + v * bp;
    const u = (ai * bq - bi * aq) * (r * gp);
    a[i] = ai + u * aq;
    b[i] = bi + u * bq;
    e[i] = e[i] + v * v + u * u;
  }
}

/** For nodes of extreme scale: one pivot a sweep, every gap divided by on its own. Compiled or not, this form. */
function eliminateOneByOne(
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
