/**
 * One Nyström determinant: det(I − zK) on given nodes (F. Bornemann, Math. Comp. 79 (2010) 871), by the structured or
 * the dense elimination, with an estimate of what rounding and kernel evaluation did to it (`rounding-model.ts`).
 */
import { InvalidArgumentError } from "../core/errors.ts";
import { Workspace } from "../core/workspace.ts";
import { eliminateDensePivoted, eliminateDenseUnpivoted } from "../linalg/dense-general.ts";
import { eliminateDenseSymmetric } from "../linalg/dense-symmetric.ts";
import { summarizePivots } from "../linalg/pivots.ts";
import { eliminateStructuredGeneral } from "../linalg/structured-general.ts";
import { eliminateStructuredSymmetric } from "../linalg/structured-symmetric.ts";
import type { Panel } from "../quadrature/panels.ts";
import type { IntegrableKernel, Kernel, SmoothKernel } from "./kernel.ts";
import {
  addDiagonal,
  type Discretized,
  exhausted,
  leastPivot,
  newSize,
  type Size,
  withNoise,
} from "./rounding-model.ts";
import {
  asymmetry,
  evaluateMatrix,
  formMatrix,
  mirror,
  type Scene,
  sampleGenerators,
  sceneOf,
} from "./scene.ts";

/**
 * The determinant on `order` points a panel.
 *
 * @param extra - A point at which the resolvent is wanted as well.
 * @param workspace - Work space that successive orders share; says which arithmetic to use.
 */
export function discretizedDeterminant(
  kernel: Kernel,
  panels: readonly Panel[],
  order: number,
  z: number,
  extra: number | undefined,
  workspace = new Workspace(8 * (order + 1) * panels.length),
): Discretized {
  workspace.reset();
  const scene = sceneOf(kernel, panels, order, z, extra, workspace);
  if (kernel.kind === "smooth") return smoothDeterminant(scene, kernel);
  if (extra !== undefined && meetsNode(scene, order)) {
    // The entry between two equal points is 0/0. One point more moves all nodes: neighbouring rules have none in common.
    return discretizedDeterminant(kernel, panels, order + 1, z, extra, workspace);
  }
  return kernel.antisymmetricPair ? pairDeterminant(scene, kernel) : generalDeterminant(scene, kernel);
}

/** Whether the extra point lies so near to a node that divided differences between them have lost digits. */
function meetsNode({ nodes, pivots }: Scene, order: number): boolean {
  const point = nodes[pivots];
  const reach = (1e-3 * Math.abs(nodes[pivots - 1] - nodes[0])) / (order * order);
  for (let i = 0; i < pivots; i++) if (Math.abs(nodes[i] - point) <= reach) return true;
  return false;
}

/** Two generators, symmetric: the fast route. */
function pairDeterminant(scene: Scene, kernel: IntegrableKernel): Discretized {
  const { z, nodes, roots, pivots, rows, workspace } = scene;
  const a = workspace.take(rows);
  const b = workspace.take(rows);
  const e = workspace.take(rows);
  kernel.sample(nodes, rows, [a, b], [], e, workspace.arithmetic);
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
  const done = eliminateStructuredSymmetric(nodes, a, b, e, pivots, rows, least, workspace.arithmetic);
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
  const { nodes, roots, pivots, rows } = scene;
  const half = kernel.symmetric && !symmetryIsToBeChecked(rows);
  const matrix = evaluateMatrix(scene, kernel, half);
  let symmetric = kernel.symmetric;
  if (half) mirror(matrix, rows);
  else {
    const found = asymmetry(matrix, rows, nodes, kernel);
    if (kernel.symmetryDeclared && kernel.symmetric && found !== undefined) {
      throw new InvalidArgumentError(`kernel (${kernel.name})`, "K(x, y) = K(y, x), as declared", found);
    }
    symmetric = found === undefined;
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
