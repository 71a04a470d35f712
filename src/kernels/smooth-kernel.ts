/**
 * A kernel given by its formula only: the fallback when no generators are known.
 */
import { requireFunction } from "../core/check.ts";
import type { Decay, SmoothKernel } from "../determinant/kernel.ts";

/** What may be said about a {@link smoothKernel}. */
export interface SmoothKernelOptions {
  /** Whether K(x, y) = K(y, x); checked. Left out, it is found out at the cost of evaluating both halves. */
  readonly symmetric?: boolean;
  /** Name for messages. Default "smooth kernel". */
  readonly name?: string;
  /** Set when K is self-adjoint of norm ≤ 1, as for a determinantal point process. Default false. */
  readonly contraction?: boolean;
  /** Relative error of the formula. Default 4.5e-16 (2 units in the last place). */
  readonly evaluationError?: number;
  /** Decay towards +∞; without it the engine probes the kernel on half-lines. */
  readonly decay?: Decay;
}

/**
 * Makes a kernel from K(x, y).
 *
 * The determinant converges as fast as the kernel is smooth: exponentially for analytic kernels, like n⁻² when the
 * first derivative jumps across the diagonal, which the engine extrapolates. Cost of order n: n² evaluations and n³/3 multiply–adds.
 *
 * @param evaluate - K(x, y), finite on the domain.
 * @param options - What else is known.
 * @throws {@link InvalidArgumentError} if `evaluate` is not a function.
 *
 * @example
 * const green = smoothKernel((x, y) => Math.min(x, y) * (1 - Math.max(x, y)), { symmetric: true });
 */
export function smoothKernel(
  evaluate: (x: number, y: number) => number,
  options: SmoothKernelOptions = {},
): SmoothKernel {
  requireFunction("evaluate", evaluate);
  return {
    kind: "smooth",
    name: options.name ?? "smooth kernel",
    symmetric: options.symmetric ?? false,
    symmetryDeclared: options.symmetric !== undefined,
    contraction: options.contraction ?? false,
    evaluationError: options.evaluationError ?? 4.5e-16,
    decay: options.decay,
    evaluate,
  };
}
