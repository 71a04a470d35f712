/**
 * A kernel laid on nodes: the nodes with the square roots of their weights, the sampled generators, and the matrix
 * z √w K √w for the dense routes.
 */
import { InvalidArgumentError } from "../core/errors.ts";
import { Workspace } from "../core/workspace.ts";
import { fillPanels, type Panel } from "../quadrature/panels.ts";
import type { IntegrableKernel, Kernel, SmoothKernel } from "./kernel.ts";

const EPS = 2 ** -53;

/** A kernel on nodes; the last row may be an extra point of weight 1. */
export interface Scene {
  readonly kernel: Kernel;
  readonly z: number;
  readonly workspace: Workspace;
  readonly nodes: Float64Array;
  readonly roots: Float64Array; // square roots of the weights; 1 at the extra point
  readonly pivots: number;
  readonly rows: number;
  readonly offset: number; // largest |node| over the panel lengths, when the panel sits far from the origin
  readonly nodeRoundings: number; // how many roundings a node has behind it
}

/** Lays a kernel on `order` points a panel, with an extra point where one is wanted. */
export function sceneOf(
  kernel: Kernel,
  panels: readonly Panel[],
  order: number,
  z: number,
  extra: number | undefined,
  workspace: Workspace,
): Scene {
  const pivots = order * panels.length;
  const rows = pivots + (extra === undefined ? 0 : 1);
  const nodes = workspace.take(rows);
  const roots = workspace.take(rows);
  fillPanels(panels, order, nodes, roots);
  for (let i = 0; i < pivots; i++) roots[i] = Math.sqrt(roots[i]);
  if (extra !== undefined) {
    nodes[pivots] = extra;
    roots[pivots] = 1;
  }
  return {
    kernel,
    z,
    workspace,
    nodes,
    roots,
    pivots,
    rows,
    offset: farOffset(panels),
    nodeRoundings: panels.some((panel) => panel.mapped) ? 4 : 1,
  };
}

/** The matrix √w K √w on `order` points a panel, row-major: for routes that need it whole. */
export function kernelMatrix(kernel: Kernel, panels: readonly Panel[], order: number): Float64Array {
  const scene = sceneOf(kernel, panels, order, 1, undefined, new Workspace(4 * order * panels.length));
  return kernel.kind === "smooth" ? evaluateMatrix(scene, kernel, false) : formMatrix(scene, kernel);
}

function farOffset(panels: readonly Panel[]): number {
  let most = 0;
  for (const { lower, upper, mapped } of panels) {
    if (!mapped) most = Math.max(most, Math.max(Math.abs(lower), Math.abs(upper)) / (upper - lower));
  }
  return most > 4 ? most : 0;
}

/** z √w K √w from the formula; only the lower triangle when `half`. */
export function evaluateMatrix(scene: Scene, kernel: SmoothKernel, half: boolean): Float64Array {
  const { z, nodes, roots, rows } = scene;
  const matrix = new Float64Array(rows * rows);
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
  return matrix;
}

/** What shows that a matrix is not symmetric, up to rounding; undefined when it is. */
export function asymmetry(
  matrix: Float64Array,
  n: number,
  nodes: Float64Array,
  kernel: SmoothKernel,
): string | undefined {
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
  return undefined;
}

/** Copies the lower triangle to the upper one. */
export function mirror(matrix: Float64Array, n: number): void {
  for (let i = 0; i < n; i++) for (let j = 0; j < i; j++) matrix[j * n + i] = matrix[i * n + j];
}

/** f, g and the diagonal at the nodes. */
export function sampleGenerators(
  scene: Scene,
  kernel: IntegrableKernel,
): { left: Float64Array[]; right: Float64Array[]; e: Float64Array } {
  const make = (): Float64Array[] => Array.from({ length: kernel.rank }, () => new Float64Array(scene.rows));
  const left = make();
  const right = kernel.antisymmetricPair ? [] : make();
  const e = new Float64Array(scene.rows);
  kernel.sample(scene.nodes, scene.rows, left, right, e, scene.workspace.arithmetic);
  if (kernel.antisymmetricPair) return { left, right: [left[1], left[0].map((f) => -f)], e };
  return { left, right, e };
}

/** The weighted matrix zA of an integrable kernel, for the dense routes. */
export function formMatrix(scene: Scene, kernel: IntegrableKernel): Float64Array {
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
