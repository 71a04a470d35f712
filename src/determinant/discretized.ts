/**
 * One Nyström determinant: det(I − zK) on given nodes (F. Bornemann, Math. Comp. 79 (2010) 871), by the structured or
 * the dense elimination, with an estimate of what rounding and kernel evaluation did to it.
 *
 * The rounding model (docs/mathematics.md, "Error of a determinant"): a perturbation δA of the matrix changes
 * log det(I − A) by −tr((I − A)⁻¹ δA) = −tr δA − tr(A (I − A)⁻¹ δA). The first part is bounded by the error of the
 * diagonal, the second by ‖A‖ ‖δA‖ / (smallest pivot). For a kernel given by generators the entries of δA come from
 * the cancellation in f(x)g(y) − g(x)f(y) at neighbouring nodes; their size is read off the first off-diagonal.
 */
import { InvalidArgumentError } from "../core/errors.ts";
import { eliminateDensePivoted, eliminateDenseUnpivoted } from "../linalg/dense-general.ts";
import { eliminateDenseSymmetric } from "../linalg/dense-symmetric.ts";
import { type PivotSummary, summarizePivots } from "../linalg/pivots.ts";
import { eliminateStructuredGeneral } from "../linalg/structured-general.ts";
import { eliminateStructuredSymmetric } from "../linalg/structured-symmetric.ts";
import { fillPanels, type Panel } from "../quadrature/panels.ts";
import type { IntegrableKernel, Kernel, SmoothKernel } from "./kernel.ts";

/** A determinant at one order, and its rounding error. */
export interface Discretized extends PivotSummary {
  /** Estimated absolute rounding error of `value`. */
  readonly noise: number;
  /** Estimated absolute rounding error of `complement`. */
  readonly complementNoise: number;
  /** Estimated rounding error of `logAbs`. */
  readonly logNoise: number;
  /** z R(s, s) with R the resolvent kernel K (I − zK)⁻¹ at the extra point, NaN if none was asked for. */
  readonly resolvent: number;
  /** Estimated absolute rounding error of `resolvent`. */
  readonly resolventNoise: number;
}

const EPS = 2 ** -53;
// A pivot below this many roundings of the matrix is noise.
const NOISE_PIVOT = 4;
// Safety factors of the rounding model, set so that no case of the honesty sweep comes within a factor 1.5.
const ENTRY_FACTOR = 2; // entries of the matrix
const SHIFT_FACTOR = 8; // rounding of nodes far from the origin
const COMMON_FACTOR = 1.5; // errors that do not average out along the diagonal
const INDEPENDENT_FACTOR = 3; // errors that do

interface Scene {
  readonly kernel: Kernel;
  readonly z: number;
  readonly nodes: Float64Array;
  readonly roots: Float64Array; // square roots of the weights; 1 at the extra point
  readonly pivots: number;
  readonly rows: number;
  readonly offset: number; // largest |node| over the panel lengths, when the panel sits far from the origin
  readonly nodeRoundings: number; // how many roundings a node has behind it
}

/**
 * The determinant on `order` points a panel.
 *
 * @param extra - A point at which the resolvent is wanted as well.
 */
export function discretizedDeterminant(
  kernel: Kernel,
  panels: readonly Panel[],
  order: number,
  z: number,
  extra: number | undefined,
): Discretized {
  const pivots = order * panels.length;
  const rows = pivots + (extra === undefined ? 0 : 1);
  const nodes = new Float64Array(rows);
  const roots = new Float64Array(rows);
  fillPanels(panels, order, nodes, roots);
  for (let i = 0; i < pivots; i++) roots[i] = Math.sqrt(roots[i]);
  if (extra !== undefined) {
    nodes[pivots] = extra;
    roots[pivots] = 1;
  }
  const scene: Scene = {
    kernel,
    z,
    nodes,
    roots,
    pivots,
    rows,
    offset: farOffset(panels),
    nodeRoundings: panels.some((panel) => panel.mapped) ? 4 : 1,
  };
  if (kernel.kind === "smooth") return smoothDeterminant(scene, kernel);
  return kernel.antisymmetricPair ? pairDeterminant(scene, kernel) : generalDeterminant(scene, kernel);
}

function farOffset(panels: readonly Panel[]): number {
  let most = 0;
  for (const { lower, upper, mapped } of panels) {
    if (!mapped) most = Math.max(most, Math.max(Math.abs(lower), Math.abs(upper)) / (upper - lower));
  }
  return most > 4 ? most : 0;
}

/** Two generators, symmetric: the fast route. */
function pairDeterminant(scene: Scene, kernel: IntegrableKernel): Discretized {
  const { z, nodes, roots, pivots, rows } = scene;
  const a = new Float64Array(rows);
  const b = new Float64Array(rows);
  const e = new Float64Array(rows);
  kernel.sample(nodes, rows, [a, b], [], e);
  const size = newSize();
  for (let i = 0; i < rows; i++) {
    const root = roots[i];
    a[i] *= z * root;
    b[i] *= root;
    e[i] *= z * root * root;
  }
  for (let i = 0; i < pivots; i++) {
    addDiagonal(size, scene, i, e[i], e[i > 0 ? i - 1 : 0]);
    if (i > 0) {
      const gap = nodes[i] - nodes[i - 1];
      const p = a[i] * b[i - 1];
      const q = b[i] * a[i - 1];
      const c = (Math.abs(p) + Math.abs(q)) / gap;
      size.cancellation += c * c;
    }
  }
  const positive = kernel.contraction && Math.abs(z) <= 1;
  size.square = size.diagonal;
  const least = positive ? leastPivot(size) : 1e-3;
  const done = eliminateStructuredSymmetric(nodes, a, b, e, pivots, rows, least);
  if (done === pivots) return withNoise(scene, summarizePivots(e, pivots), e, size, kernel.evaluationError);
  if (positive) return exhausted(scene, size, summarizePivots(e, done).largestPivot, least);
  // Not positive definite: nothing guards the pivots in their natural order, so the matrix is formed and exchanged.
  return denseDeterminant(scene, formMatrix(scene, kernel), true, size, kernel.evaluationError);
}

/** Any rank, any symmetry. */
function generalDeterminant(scene: Scene, kernel: IntegrableKernel): Discretized {
  const { z, nodes, roots, pivots, rows } = scene;
  const { left, right, e } = sampleGenerators(scene, kernel);
  const rank = kernel.rank;
  const f = new Float64Array(rows * rank);
  const g = new Float64Array(rows * rank);
  const size = newSize();
  for (let i = 0; i < rows; i++) {
    e[i] *= z * roots[i] * roots[i];
    for (let k = 0; k < rank; k++) {
      f[i * rank + k] = left[k][i] * z * roots[i];
      g[i * rank + k] = right[k][i] * roots[i];
    }
  }
  for (let i = 0; i < pivots; i++) {
    addDiagonal(size, scene, i, e[i], e[i > 0 ? i - 1 : 0]);
    if (i === 0) continue;
    let c = 0;
    for (let k = 0; k < rank; k++) {
      c +=
        Math.abs(f[i * rank + k] * g[(i - 1) * rank + k]) + Math.abs(f[(i - 1) * rank + k] * g[i * rank + k]);
    }
    c *= 0.5 / (nodes[i] - nodes[i - 1]);
    size.cancellation += c * c;
  }
  size.square = size.diagonal;
  const { done, growth } = eliminateStructuredGeneral(nodes.slice(), f, g, e, rank, pivots, rows);
  if (done === pivots && growth < 1e3) {
    const summary = summarizePivots(e, pivots);
    size.cancellation *= growth * growth;
    if (summary.smallestPivot > 1e-6) return withNoise(scene, summary, e, size, kernel.evaluationError);
  }
  return denseDeterminant(scene, formMatrix(scene, kernel), false, size, kernel.evaluationError);
}

/** Formula only. */
function smoothDeterminant(scene: Scene, kernel: SmoothKernel): Discretized {
  const { z, nodes, roots, pivots, rows } = scene;
  const matrix = new Float64Array(rows * rows);
  const half = kernel.symmetric && !symmetryIsToBeChecked(rows);
  for (let i = 0; i < rows; i++) {
    for (let j = 0; j < (half ? i + 1 : rows); j++) {
      const value = kernel.evaluate(nodes[i], nodes[j]);
      if (typeof value !== "number" || !Number.isFinite(value)) {
        throw new InvalidArgumentError(
          `kernel (${kernel.name})`,
          `a finite number at (x, y) = (${nodes[i]}, ${nodes[j]})`,
          value,
        );
      }
      matrix[i * rows + j] = z * roots[i] * value * roots[j];
    }
  }
  let symmetric = kernel.symmetric;
  if (half) mirror(matrix, rows);
  else {
    const found = isSymmetric(matrix, rows, nodes, kernel);
    if (kernel.symmetryDeclared && kernel.symmetric && found !== true) {
      throw new InvalidArgumentError(`kernel (${kernel.name})`, "K(x, y) = K(y, x), as declared", found);
    }
    symmetric = found === true;
  }
  const size = newSize();
  for (let i = 0; i < pivots; i++) {
    const before = i > 0 ? i - 1 : 0;
    addDiagonal(size, scene, i, matrix[i * rows + i], matrix[before * rows + before]);
    for (let j = 0; j < pivots; j++) {
      const entry = matrix[i * rows + j];
      const tilt = (nodes[i] * (entry / roots[i] - matrix[before * rows + j] / roots[before])) / roots[i];
      size.square += entry * entry;
      size.tilt += tilt * tilt;
    }
  }
  return denseDeterminant(scene, matrix, symmetric, size, kernel.evaluationError);
}

/** Small matrices are cheap: there a declared symmetry is checked. */
function symmetryIsToBeChecked(rows: number): boolean {
  return rows <= 26;
}

function isSymmetric(
  matrix: Float64Array,
  n: number,
  nodes: Float64Array,
  kernel: SmoothKernel,
): true | string {
  let most = 0;
  for (let i = 0; i < n * n; i++) most = Math.max(most, Math.abs(matrix[i]));
  const allowed = 16 * (kernel.evaluationError + EPS);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < i; j++) {
      const p = matrix[i * n + j];
      const q = matrix[j * n + i];
      if (Math.abs(p - q) > allowed * (Math.abs(p) + Math.abs(q)) + EPS * EPS * most) {
        return `K(${nodes[i]}, ${nodes[j]}) ≠ K(${nodes[j]}, ${nodes[i]})`;
      }
    }
  }
  return true;
}

function mirror(matrix: Float64Array, n: number): void {
  for (let i = 0; i < n; i++) for (let j = 0; j < i; j++) matrix[j * n + i] = matrix[i * n + j];
}

/** Sums over the matrix A that the rounding model reads. */
interface Size {
  trace: number; // Σ |A_ii|
  diagonal: number; // Σ A_ii²
  slope: number; // Σ |x_i| |K_ii − K_(i−1)(i−1)|: roundings of the argument move the trace by so many units
  cancellation: number; // Σ of squares of what cancels in neighbouring entries (generators only)
  square: number; // Σ A_ij², as far as the entries are known
  tilt: number; // the same for the squares of all entries (dense only)
}

function newSize(): Size {
  return { trace: 0, diagonal: 0, slope: 0, cancellation: 0, square: 0, tilt: 0 };
}

/** Reads the weighted diagonal entries into the size. */
function addDiagonal(size: Size, scene: Scene, i: number, entry: number, before: number): void {
  const { roots, nodes } = scene;
  size.trace += Math.abs(entry);
  size.diagonal += entry * entry;
  if (i > 0)
    size.slope += Math.abs(
      nodes[i] * (entry / (roots[i] * roots[i]) - before / (roots[i - 1] * roots[i - 1])),
    );
}

function denseDeterminant(
  scene: Scene,
  matrix: Float64Array,
  symmetric: boolean,
  size: Size,
  evaluationError: number,
): Discretized {
  const { kernel, z, pivots, rows } = scene;
  const e = new Float64Array(rows);
  const kept = matrix.slice();
  if (symmetric) {
    const within = kernel.contraction && Math.abs(z) <= 1;
    const least = within ? leastPivot(size) : 1e-3;
    const done = eliminateDenseSymmetric(matrix, e, new Float64Array(rows), pivots, rows, rows, least);
    if (done === pivots) return withNoise(scene, summarizePivots(e, pivots), e, size, evaluationError);
    if (within) return exhausted(scene, size, summarizePivots(e, done).largestPivot, least);
  } else {
    const done = eliminateDenseUnpivoted(matrix, e, pivots, rows, rows, 0.25);
    if (done === pivots) return withNoise(scene, summarizePivots(e, pivots), e, size, evaluationError);
  }
  matrix.set(kept);
  let resolvent = Number.NaN;
  if (rows > pivots) resolvent = 1 - borderedRatio(kept, e, pivots, rows);
  const odd = eliminateDensePivoted(matrix, e, pivots, rows);
  const summary = summarizePivots(e, pivots, odd);
  const direct = { ...summary, complement: 1 - summary.value };
  const result = withNoise(scene, direct, e, size, evaluationError);
  // Exchanges lose the direct complement: its error is that of the determinant.
  return { ...result, complementNoise: Math.max(result.noise, result.complementNoise), resolvent };
}

/** det(I − A) with the extra row over det(I − A) without: 1 − (extra row's e), whatever the pivots did. */
function borderedRatio(matrix: Float64Array, e: Float64Array, pivots: number, rows: number): number {
  const full = matrix.slice();
  const oddFull = eliminateDensePivoted(full, e, rows, rows);
  const whole = summarizePivots(e, rows, oddFull);
  const part = matrix.slice();
  const oddPart = eliminateDensePivoted(part, e, pivots, rows);
  const rest = summarizePivots(e, pivots, oddPart);
  return whole.sign * rest.sign * Math.exp(whole.logAbs - rest.logAbs);
}

function leastPivot(size: Size): number {
  return NOISE_PIVOT * EPS * (1 + Math.sqrt(size.cancellation + size.square));
}

function withNoise(
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
  // Σ e_final − trace = Σ v²/m over all eliminated entries: twice that is the squared norm of the off-diagonal part.
  const raised = Math.max(0, Math.abs(final) - size.trace);
  const norm = Math.sqrt(size.square + 2 * raised * Math.max(1, summary.largestPivot));
  const unit = EPS + evaluationError;
  const shift = scene.offset * EPS * Math.sqrt(size.cancellation);
  const entries =
    ENTRY_FACTOR *
      (unit * Math.sqrt(3.3 * size.cancellation + size.square) + EPS * (norm + Math.sqrt(size.tilt))) +
    SHIFT_FACTOR * shift;
  const smallest = Math.max(summary.smallestPivot, EPS);
  // Independent errors of the diagonal add in squares; a common factor (a rounded constant in the kernel) does not.
  const trace =
    COMMON_FACTOR * EPS * (size.trace + scene.nodeRoundings * size.slope) +
    INDEPENDENT_FACTOR * evaluationError * Math.sqrt(size.diagonal);
  const relative = trace + (Math.min(norm, 1 + norm * smallest) * entries) / smallest + SHIFT_FACTOR * shift;
  const logNoise = relative + EPS * (Math.abs(summary.logAbs) + Math.sqrt(pivots));
  const value = Math.abs(summary.value);
  const complementNoise =
    relative * (value || Number.MIN_VALUE) +
    EPS * (Math.abs(summary.complement) < 0.5 ? absolute : 1 + value);
  const resolvent = rows > pivots ? e[pivots] : Number.NaN;
  return {
    ...summary,
    noise: relative * value + EPS * (value + Math.min(1, Math.abs(summary.complement))),
    complementNoise,
    logNoise,
    resolvent,
    resolventNoise: Math.abs(resolvent) * (relative + 4 * unit),
  };
}

/**
 * A contraction whose next pivot is all rounding. I − zA is then positive with eigenvalues at most 2, and the
 * elimination after such a pivot would be noise multiplied. What stands: a determinant of this size, its error that of
 * the matrix in the trace norm.
 */
function exhausted(scene: Scene, size: Size, largestPivot: number, least: number): Discretized {
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
    logNoise: Number.POSITIVE_INFINITY,
    resolvent: scene.rows > scene.pivots ? Number.POSITIVE_INFINITY : Number.NaN,
    resolventNoise: Number.POSITIVE_INFINITY,
  };
}

function sampleGenerators(
  scene: Scene,
  kernel: IntegrableKernel,
): { left: Float64Array[]; right: Float64Array[]; e: Float64Array } {
  const make = (): Float64Array[] => Array.from({ length: kernel.rank }, () => new Float64Array(scene.rows));
  const left = make();
  const right = kernel.antisymmetricPair ? [] : make();
  const e = new Float64Array(scene.rows);
  kernel.sample(scene.nodes, scene.rows, left, right, e);
  if (kernel.antisymmetricPair) return { left, right: [left[1], left[0].map((f) => -f)], e };
  return { left, right, e };
}

/** The weighted matrix zA of an integrable kernel, for the dense routes. */
function formMatrix(scene: Scene, kernel: IntegrableKernel): Float64Array {
  const { z, nodes, roots, rows } = scene;
  const { left, right, e } = sampleGenerators(scene, kernel);
  const matrix = new Float64Array(rows * rows);
  for (let i = 0; i < rows; i++) {
    for (let j = 0; j < rows; j++) {
      let value = e[i];
      if (i !== j) {
        value = 0;
        for (let k = 0; k < kernel.rank; k++) value += left[k][i] * right[k][j];
        value /= nodes[i] - nodes[j];
      }
      matrix[i * rows + j] = z * roots[i] * value * roots[j];
    }
  }
  return matrix;
}
