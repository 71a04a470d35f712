/**
 * A user's integrable kernel from its generators and its diagonal limit.
 */
import { requireFunction } from "../core/check.ts";
import { InvalidArgumentError } from "../core/errors.ts";
import type { Decay, IntegrableKernel } from "../determinant/kernel.ts";

/** A real function of a real variable. */
export type RealFunction = (x: number) => number;

/** Ingredients of {@link integrableKernel}. */
export interface IntegrableKernelParts {
  /** f₁ … f_r, r ≥ 2. */
  readonly left: readonly RealFunction[];
  /**
   * g₁ … g_r with Σ_k f_k(x) g_k(x) = 0. May be left out when r = 2 and the kernel is symmetric: then g = (f₂, −f₁),
   * K(x, y) = (f₁(x) f₂(y) − f₂(x) f₁(y)) / (x − y).
   */
  readonly right?: readonly RealFunction[];
  /** K(x, x), the limit of K(x, y) for y → x. */
  readonly diagonal: RealFunction;
  /** Name for messages. Default "integrable kernel". */
  readonly name?: string;
  /** Set when K is self-adjoint of norm ≤ 1, as for a determinantal point process. Default false. */
  readonly contraction?: boolean;
  /** Relative error of the functions given. Default 4.5e-16 (2 units in the last place). */
  readonly evaluationError?: number;
  /** Decay towards +∞; without it the engine probes the kernel on half-lines. */
  readonly decay?: Decay;
}

// Rounding of Σ f g is about 1e-16 of Σ |f g|; a wrong generator is off by its own size.
const BALANCE = 1e-9;

/**
 * Makes an integrable kernel K(x, y) = Σ_k f_k(x) g_k(y) / (x − y).
 *
 * Its matrices have low displacement rank, so that a determinant of order n costs O(r n²) and n evaluations of each
 * function.
 *
 * @param parts - Generators, diagonal limit and what else is known.
 * @returns The kernel.
 * @throws {@link InvalidArgumentError} if the lists differ in length or have fewer than two functions. Later, when the
 *   kernel is sampled: if a function returns a value that is not finite (named with its argument), or if
 *   Σ f_k(x) g_k(x) is not 0.
 *
 * @example
 * // The sine kernel sin(π(x − y)) / (π(x − y)).
 * const sine = integrableKernel({
 *   left: [(x) => Math.sin(Math.PI * x) / Math.PI, (x) => Math.cos(Math.PI * x)],
 *   diagonal: () => 1,
 * });
 */
export function integrableKernel(parts: IntegrableKernelParts): IntegrableKernel {
  const { left, right, diagonal } = parts;
  if (!Array.isArray(left) || left.length < 2) {
    throw new InvalidArgumentError("left", "an array of at least two functions", left);
  }
  for (const [k, f] of left.entries()) requireFunction(`left[${k}]`, f);
  if (right === undefined && left.length !== 2) {
    throw new InvalidArgumentError(
      "right",
      `an array of ${left.length} functions (it may be left out only for r = 2)`,
      right,
    );
  }
  if (right !== undefined && (!Array.isArray(right) || right.length !== left.length)) {
    throw new InvalidArgumentError(
      "right",
      `an array of ${left.length} functions, one for each of left`,
      right,
    );
  }
  for (const [k, g] of right?.entries() ?? []) requireFunction(`right[${k}]`, g);
  requireFunction("diagonal", diagonal);
  const name = parts.name ?? "integrable kernel";
  const call = (label: string, f: RealFunction, x: number): number => {
    const value = f(x);
    if (typeof value !== "number" || !Number.isFinite(value)) {
      throw new InvalidArgumentError(`${label} of ${name}`, `a finite number at x = ${x}`, value);
    }
    return value;
  };
  return {
    kind: "integrable",
    name,
    rank: left.length,
    antisymmetricPair: right === undefined,
    symmetric: right === undefined,
    contraction: parts.contraction ?? false,
    evaluationError: parts.evaluationError ?? 4.5e-16,
    decay: parts.decay,
    sample(nodes, count, leftOut, rightOut, diagonalOut) {
      for (let i = 0; i < count; i++) {
        const x = nodes[i];
        let sum = 0;
        let size = 0;
        for (let k = 0; k < left.length; k++) {
          const f = call(`left[${k}]`, left[k], x);
          leftOut[k][i] = f;
          if (right !== undefined) {
            const g = call(`right[${k}]`, right[k], x);
            rightOut[k][i] = g;
            sum += f * g;
            size += Math.abs(f * g);
          }
        }
        if (Math.abs(sum) > BALANCE * size) {
          throw new InvalidArgumentError(
            `left, right of ${name}`,
            `generators with Σ f_k(x) g_k(x) = 0 (relative size at most ${BALANCE})`,
            `${sum} at x = ${x}`,
          );
        }
        diagonalOut[i] = call("diagonal", diagonal, x);
      }
    },
  };
}
