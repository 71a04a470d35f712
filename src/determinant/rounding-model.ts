/**
 * What rounding and kernel evaluation do to det(I − A): an estimate from sums over the matrix.
 *
 * A perturbation δA changes log det(I − A) by −tr((I − A)⁻¹ δA) = −tr δA − tr(A (I − A)⁻¹ δA). The first part is
 * bounded by the error of the diagonal, the second by ‖A‖ ‖δA‖ / (smallest pivot). For a kernel given by generators
 * the entries of δA come from the cancellation in f(x)g(y) − g(x)f(y) at neighbouring nodes; their size is read off
 * the first off-diagonal. A function evaluated at x is taken to err as if x had been rounded.
 */
import type { PivotSummary } from "../linalg/pivots.ts";
import type { Scene } from "./scene.ts";

/** A determinant at one order, and its rounding error. */
export interface Discretized extends PivotSummary {
  /** Estimated absolute rounding error of `value`. */
  readonly noise: number;
  /** Estimated absolute rounding error of `complement`. */
  readonly complementNoise: number;
  /** z R(s, s) with R the resolvent kernel K (I − zK)⁻¹ at the extra point, NaN if none was asked for. */
  readonly resolvent: number;
  /** Estimated absolute rounding error of `resolvent`. */
  readonly resolventNoise: number;
}

const EPS = 2 ** -53;
// A pivot below this many roundings of the matrix is noise.
const NOISE_PIVOT = 4;
// Safety factors of the rounding model, set on sweeps of determinants with known values (docs/accuracy.md).
const ENTRY_FACTOR = 2; // entries of the matrix
const SHIFT_FACTOR = 12; // rounding of nodes far from the origin
const COMMON_FACTOR = 2; // errors that do not average out along the diagonal
const INDEPENDENT_FACTOR = 3; // errors that do

/** Sums over the matrix A that the rounding model reads. */
export interface Size {
  trace: number; // Σ |A_ii|
  sum: number; // Σ A_ii
  diagonal: number; // Σ A_ii²
  slope: number; // Σ |x_i| |K_ii − K_(i−1)(i−1)|: roundings of the argument move the trace by so many units
  cancellation: number; // Σ of squares of what cancels in neighbouring entries (generators only)
  square: number; // Σ A_ij², as far as the entries are known
  tilt: number; // the same for the squares of all entries (dense only)
}

/** All sums zero. */
export function newSize(): Size {
  return { trace: 0, sum: 0, diagonal: 0, slope: 0, cancellation: 0, square: 0, tilt: 0 };
}

/** Reads the weighted diagonal entries into the size. */
export function addDiagonal(size: Size, scene: Scene, i: number, entry: number, before: number): void {
  const { roots, nodes } = scene;
  size.trace += Math.abs(entry);
  size.sum += entry;
  size.diagonal += entry * entry;
  if (i > 0)
    size.slope += Math.abs(
      nodes[i] * (entry / (roots[i] * roots[i]) - before / (roots[i - 1] * roots[i - 1])),
    );
}

/** Pivots of a contraction below this are noise. */
export function leastPivot(size: Size): number {
  return NOISE_PIVOT * EPS * (1 + Math.sqrt(size.cancellation + size.square));
}

/** Adds the rounding errors to what the pivots say. */
export function withNoise(
  scene: Scene,
  summary: PivotSummary,
  e: Float64Array,
  size: Size,
  evaluationError: number,
): Discretized {
  const { pivots, rows } = scene;
  let absolute = 0;
  let final = 0;
  for (let q = 0; q < pivots; q++) {
    final += e[q];
    absolute += Math.abs(e[q]);
  }
  // Σ e_final − Σ A_ii = Σ v²/m over all eliminated entries: twice that is the squared norm of the off-diagonal part.
  const raised = Math.abs(final - size.sum);
  const norm = Math.sqrt(size.square + 2 * raised * Math.max(1, summary.largestPivot));
  const unit = EPS + evaluationError;
  const shift = scene.offset * EPS * Math.sqrt(size.cancellation);
  const entries =
    ENTRY_FACTOR *
      (unit * Math.sqrt(3.3 * size.cancellation + size.square) + EPS * (norm + Math.sqrt(size.tilt))) +
    SHIFT_FACTOR * shift;
  // The smallest eigenvalue lies between the determinant and the smallest pivot when all lie below 1; pivots in the order
  // of the nodes share it out among many, so their smallest alone would be too kind.
  const smallest = Math.max(Math.min(summary.smallestPivot, Math.sqrt(Math.abs(summary.value))), EPS);
  // Independent errors of the diagonal add in squares; a common factor (a rounded constant in the kernel) does not.
  const trace =
    COMMON_FACTOR * EPS * (size.trace + scene.nodeRoundings * size.slope) +
    INDEPENDENT_FACTOR * evaluationError * Math.sqrt(size.diagonal);
  const relative = trace + (Math.min(norm, 1 + norm * smallest) * entries) / smallest + SHIFT_FACTOR * shift;
  const value = Math.abs(summary.value);
  const complementNoise =
    relative * (value || Number.MIN_VALUE) +
    EPS * (Math.abs(summary.complement) < 0.5 ? absolute : 1 + value);
  const resolvent = rows > pivots ? e[pivots] : Number.NaN;
  return {
    // Field by field: spreading the summary costs more than the whole elimination at small orders.
    value: summary.value,
    complement: summary.complement,
    logAbs: summary.logAbs,
    sign: summary.sign,
    smallestPivot: summary.smallestPivot,
    largestPivot: summary.largestPivot,
    // The product of n pivots has n roundings of its own.
    noise: relative * value + EPS * (Math.sqrt(pivots) * value + Math.min(1, Math.abs(summary.complement))),
    complementNoise,
    resolvent,
    resolventNoise: Math.abs(resolvent) * (relative + 4 * unit),
  };
}

/**
 * A contraction whose next pivot is all rounding. I − zA is then positive with eigenvalues at most 2, and the
 * elimination after such a pivot would be noise multiplied. What stands: a determinant of this size, its error that of
 * the matrix in the trace norm.
 */
export function exhausted(scene: Scene, size: Size, largestPivot: number, least: number): Discretized {
  const bound = 2 * least * (1 + size.trace);
  return {
    value: 0,
    complement: 1,
    logAbs: Number.NEGATIVE_INFINITY,
    sign: 0,
    smallestPivot: 0,
    largestPivot,
    noise: bound,
    complementNoise: bound,
    resolvent: scene.rows > scene.pivots ? Number.POSITIVE_INFINITY : Number.NaN,
    resolventNoise: Number.POSITIVE_INFINITY,
  };
}
