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
 * The compiled form (assembly/structured-symmetric.ts) runs the same operations in the same order: same bits.
 */
import { even, ROLE } from "../core/linear-memory.ts";
import { type Arithmetic, type Compiled, compiled } from "../core/web-assembly.ts";

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
 * @param least - Elimination stops before a pivot that is not above this.
 * @param arithmetic - Compiled or plain loops; the bits are the same.
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
  arithmetic: Arithmetic = "automatic",
): number {
  if (arithmetic !== "plain" && (arithmetic === "wasm" || rows >= COMPILED_FROM)) {
    const done = eliminateCompiled(x, a, b, e, pivots, rows, least, arithmetic);
    if (done >= 0) return done;
  }
  return eliminatePlain(x, a, b, e, pivots, rows, least);
}

/** The compiled form; −1, and nothing done, where it cannot be had or does not pay. */
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
  const { routines, memory } = found;
  const px = memory.placeOf(x, ROLE.nodes);
  const pa = px < 0 ? -1 : memory.placeOf(a, ROLE.first);
  const pb = pa < 0 ? -1 : memory.placeOf(b, ROLE.second);
  const pe = pb < 0 ? -1 : memory.placeOf(e, ROLE.diagonal);
  if (pe >= 0) {
    return routines.eliminateStructuredSymmetric(px, pa, pb, pe, pivots, rows, least);
  }
  const pays = arithmetic === "wasm" || rows >= COPIED_FROM;
  if (!pays || 4 * even(rows) > memory.free) return -1;
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
  for (let i = 0, at = mark; i < rows; i++, at++) {
    a[i] = numbers[at + step];
    b[i] = numbers[at + 2 * step];
    e[i] = numbers[at + 3 * step];
  }
  return done;
}

/** The plain form. */
function eliminatePlain(
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
