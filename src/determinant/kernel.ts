/**
 * What the engine knows about kernels: types, never a particular one.
 *
 * An integrable kernel is its generators, K(x, y) = Σ_k f_k(x) g_k(y) / (x − y) with Σ_k f_k(x) g_k(x) = 0, and its
 * diagonal limit (A. Its, A. Izergin, V. Korepin, N. Slavnov, Int. J. Mod. Phys. B 4 (1990) 1003). A smooth kernel
 * is only its formula.
 */
import type { Arithmetic } from "../core/web-assembly.ts";

/** How fast a kernel dies out towards +∞, for truncating half-lines. */
export interface Decay {
  /**
   * Estimate from above of what is lost in |log det| when (lower, ∞) is replaced by (lower, cut).
   * It must decrease in `cut`; `tail(lower, lower)` is then the size of the whole.
   */
  tail(lower: number, cut: number): number;
}

/** What both kinds of kernel tell. */
export interface KernelTraits {
  /** Name for messages and reports. */
  readonly name: string;
  /** Whether K(x, y) = K(y, x). */
  readonly symmetric: boolean;
  /** Whether the operator is self-adjoint with norm at most 1 on every domain: I − zK is then positive for |z| ≤ 1. */
  readonly contraction: boolean;
  /** Relative error of one evaluation: of each generator and of the diagonal, or of the formula. */
  readonly evaluationError: number;
  /** Decay, where it is known; otherwise the engine probes the kernel. */
  readonly decay: Decay | undefined;
}

/** A kernel given by its generators; its matrices are eliminated in O(n²). */
export interface IntegrableKernel extends KernelTraits {
  readonly kind: "integrable";
  /** Number of generators r. */
  readonly rank: number;
  /**
   * Whether right = (f₂, −f₁) with r = 2, so that K(x, y) = (f₁(x) f₂(y) − f₂(x) f₁(y)) / (x − y); the right
   * generators are then not sampled.
   */
  readonly antisymmetricPair: boolean;
  /**
   * Samples the kernel at `count` nodes.
   * @param nodes - Nodes.
   * @param count - How many of them.
   * @param left - left[k][i] receives f_k(x_i).
   * @param right - right[k][i] receives g_k(x_i); empty for an antisymmetric pair.
   * @param diagonal - Receives K(x_i, x_i).
   * @param arithmetic - For kernels with compiled loops; the others ignore it.
   */
  sample(
    nodes: Float64Array,
    count: number,
    left: readonly Float64Array[],
    right: readonly Float64Array[],
    diagonal: Float64Array,
    arithmetic?: Arithmetic,
  ): void;
}

/** A kernel given by its formula only; its matrices are dense. */
export interface SmoothKernel extends KernelTraits {
  readonly kind: "smooth";
  /** Whether `symmetric` was declared (then checked) or is to be found out. */
  readonly symmetryDeclared: boolean;
  /** K(x, y). */
  evaluate(x: number, y: number): number;
}

/** A kernel the engine can discretize. */
export type Kernel = IntegrableKernel | SmoothKernel;
