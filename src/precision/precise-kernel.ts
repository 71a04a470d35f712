/**
 * What the arbitrary-precision determinants take as kernel and as domain.
 */
import { requireFunction, requireInteger } from "../core/check.ts";
import { InvalidArgumentError } from "../core/errors.ts";
import { type ExactInput, type PreciseInput, readExact } from "./decimal.ts";
import type { PreciseArithmetic } from "./precise-arithmetic.ts";

/**
 * An integrable kernel by its generators:
 *
 *   K(x, y) = Σ_k f_k(x) g_k(y) / (x − y),   Σ_k f_k(x) g_k(x) = 0,   K(x, x) = Σ_k f_k′(x) g_k(x).
 */
export interface PreciseIntegrableKernel {
  readonly kind: "integrable";
  readonly name: string;
  /** Number r of generators f (and of g). */
  readonly rank: number;
  /** r = 2 and f_1 = g_2 = φ, f_2 = −g_1 = … : K = (φ(x) ψ(y) − ψ(x) φ(y))/(x − y). Then only φ, ψ are given. */
  readonly antisymmetricPair: boolean;
  /** Whether 0 ≤ K ≤ 1 as an operator: then pivots need no exchange for 0 ≤ z ≤ 1. */
  readonly contraction: boolean;
  /** Operators on (0, b) with respect to x^α dx; then intervals start at 0. */
  readonly weightExponent: ExactInput | undefined;
  /** Taylor coefficients at a point of [lower, upper]: see {@link PreciseKernelParts}. */
  readonly generators: (
    arithmetic: PreciseArithmetic,
    order: number,
    lower: number,
    upper: number,
  ) => (x: bigint) => readonly (readonly bigint[])[];
  /** See {@link PreciseKernelParts}. */
  readonly decay: ((x: number, lower: number) => number) | undefined;
}

/** A kernel by its formula; symmetric kernels are eliminated at half the cost. */
export interface PreciseSmoothKernel {
  readonly kind: "smooth";
  readonly name: string;
  readonly symmetric: boolean;
  /**
   * Taylor coefficients in ε of K(x + ε x₁, y + ε y₁), `order` + 1 of them, for points of [lower, upper].
   */
  readonly evaluator: (
    arithmetic: PreciseArithmetic,
    order: number,
    lower: number,
    upper: number,
  ) => PreciseEntry;
  readonly mostDerivatives: number;
  /** See {@link PreciseKernelParts}. */
  readonly decay: ((x: number, lower: number) => number) | undefined;
}

/** One matrix entry, as a series. */
export type PreciseEntry = (x: bigint, xSlope: bigint, y: bigint, ySlope: bigint) => readonly bigint[];

/** A kernel of either kind. */
export type PreciseKernel = PreciseIntegrableKernel | PreciseSmoothKernel;

/** What {@link preciseIntegrableKernel} needs. */
export interface PreciseKernelParts {
  /** Name, for messages. */
  readonly name: string;
  /**
   * Given the arithmetic (fixed point at a certain number of bits) and an order m, returns a function of the point x
   * (fixed point) that gives the Taylor coefficients f(x), f′(x), f″(x)/2, …, at least m + 1 of them, of
   *
   * - φ and ψ, for K = (φ(x) ψ(y) − ψ(x) φ(y)) / (x − y), when `rank` is not given;
   * - f_1, …, f_r, g_1, …, g_r, when `rank` is r.
   */
  generators(arithmetic: PreciseArithmetic, order: number): (x: bigint) => readonly (readonly bigint[])[];
  /** Number of generators on each side; leave it out for the antisymmetric pair. */
  readonly rank?: number;
  /**
   * For half-lines (lower, ∞): log2 of a bound of what is lost when the line is cut at x, decreasing without limit in x:
   * ∫_x^∞ |K(t, t)| dt + ∫_x^∞ ∫_lower^∞ |K(t, u) K(u, t)| du dt.
   */
  decay?(x: number, lower: number): number;
}

/**
 * A kernel from its own generators, for determinants with any number of digits.
 *
 * @param parts - See {@link PreciseKernelParts}. The diagonal follows from the Taylor coefficients.
 * @throws {@link InvalidArgumentError} for missing parts or a rank outside 1 … 16.
 *
 * @example
 * // The sine kernel.
 * preciseIntegrableKernel({
 *   name: "sine",
 *X
 * });
 *
 * @category Precise determinants
 * @since 0.2.0
 */
export function preciseIntegrableKernel(parts: PreciseKernelParts): PreciseIntegrableKernel {
  if (typeof parts !== "object" || parts === null)
    throw new InvalidArgumentError("parts", "an object", parts);
  if (typeof parts.name !== "string") throw new InvalidArgumentError("parts.name", "a string", parts.name);
  requireFunction("parts.generators", parts.generators);
  if (parts.decay !== undefined) requireFunction("parts.decay", parts.decay);
  const rank = parts.rank === undefined ? 2 : requireInteger("parts.rank", parts.rank, 1, 16);
  return Object.freeze({
    kind: "integrable",
    name: parts.name,
    rank,
    antisymmetricPair: parts.rank === undefined,
    contraction: false,
    weightExponent: undefined,
    generators: (arithmetic: PreciseArithmetic, order: number) => parts.generators(arithmetic, order),
    decay: parts.decay === undefined ? undefined : (x: number, lower: number) => parts.decay!(x, lower),
  });
}

/**
 * A kernel from its formula, for determinants with any number of digits.
 *
 * @param name - For messages.
 * @param evaluate - Given the arithmetic, a function of two fixed-point numbers that returns K(x, y) in fixed point.
 * @param options - `symmetric`: K(x, y) = K(y, x), default false; `decay` as in {@link PreciseKernelParts}.
 *
 * @category Precise determinants
 * @since 0.2.0
 */
export function preciseSmoothKernel(
  name: string,
  evaluate: (arithmetic: PreciseArithmetic) => (x: bigint, y: bigint) => bigint,
  options: { readonly symmetric?: boolean; decay?(x: number, lower: number): number } = {},
): PreciseSmoothKernel {
  if (typeof name !== "string") throw new InvalidArgumentError("name", "a string", name);
  requireFunction("evaluate", evaluate);
  if (options.decay !== undefined) requireFunction("options.decay", options.decay);
  return Object.freeze({
    kind: "smooth",
    name,
    symmetric: options.symmetric === true,
    evaluator: (arithmetic: PreciseArithmetic) => {
      const entry = evaluate(arithmetic);
      return (x: bigint, _u: bigint, y: bigint) => [entry(x, y)];
    },
    mostDerivatives: 0,
    decay: options.decay === undefined ? undefined : (x: number, lower: number) => options.decay!(x, lower),
  });
}

/** An interval or half-line with exact ends. */
export interface PreciseDomain {
  readonly lower: ExactInput;
  /** `undefined` for a half-line. */
  readonly upper: ExactInput | undefined;
}

/**
 * The interval (lower, upper), ends taken exactly.
 *
 * @throws {@link InvalidArgumentError} unless lower < upper.
 *
 * @category Precise determinants
 * @since 0.2.0
 */
export function preciseInterval(lower: PreciseInput, upper: PreciseInput): PreciseDomain {
  const a = readExact("lower", lower);
  const b = readExact("upper", upper);
  const factor = (p: ExactInput, q: ExactInput): bigint =>
    (p.numerator * 10n ** BigInt(q.tens)) << BigInt(q.twos);
  if (factor(a, b) >= factor(b, a)) throw new InvalidArgumentError("upper", `a number above ${lower}`, upper);
  return { lower: a, upper: b };
}

/**
 * The half-line (lower, ∞), its end taken exactly.
 *
 * @category Precise determinants
 * @since 0.2.0
 */
export function preciseHalfLine(lower: PreciseInput): PreciseDomain {
  return { lower: readExact("lower", lower), upper: undefined };
}
