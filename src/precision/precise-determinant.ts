/**
 * Fredholm determinants with any number of digits: Gauss–Legendre points (F. Bornemann, Math. Comp. 79 (2010) 871),
 * fixed-point elimination, orders raised until the value stands still, and the working precision raised until a run
 * with more bits confirms it. Derivatives in an end of the domain are those of the determinant itself: nodes, weights
 * and entries are power series in the displacement of that end.
 */
import { requireInteger } from "../core/check.ts";
import { InvalidArgumentError } from "../core/errors.ts";
import { type ExactInput, numberFromExact, type PreciseInput, readExact } from "./decimal.ts";
import { log2OfFixed } from "./fixed-point.ts";
import { difference, type Floating, log2OfFloating } from "./floating.ts";
import { MOST_NODES } from "./gauss-rules.ts";
import { type PreciseEstimate, preciseEstimate, requireDigits } from "./precise-estimate.ts";
import type { PreciseDomain, PreciseKernel } from "./precise-kernel.ts";
import { discretize, type PreciseScene } from "./precise-scene.ts";
import { type Attempt, expectedLoss, type Refined, refineOrders } from "./refinement.ts";

// A kernel by formula costs the cube of the order.
const MOST_DENSE = 400;

/** Options of {@link preciseDeterminant}. */
export interface PreciseDeterminantOptions {
  /** Significant digits of the determinant, of its complement and of each derivative, 1 to 1000. Default 50. */
  readonly digits?: number;
  /** Factor of the kernel in det(I − zK), exact. Default 1. */
  readonly z?: PreciseInput;
  /** Number of derivatives with respect to an end of the domain, 0 to 60. Default 0. */
  readonly derivatives?: number;
  /** The end that moves: the lower one by default on half-lines, the upper one on intervals. */
  readonly end?: "lower" | "upper";
  /** Most quadrature points. Default 2000, for kernels by formula 400. */
  readonly maxOrder?: number;
}

/** A determinant and what belongs to it. */
export interface PreciseDeterminant extends PreciseEstimate {
  /** 1 − det with full relative accuracy. */
  readonly complement: PreciseEstimate;
  /** First, second, … derivative in the moving end, as many as asked. */
  readonly derivatives: readonly PreciseEstimate[];
}

/**
 * det(I − zK) on an interval or half-line, with as many digits as asked.
 *
 * @param kernel - A precise kernel: built in or by {@link preciseIntegrableKernel}, {@link preciseSmoothKernel}.
 * @param domain - {@link preciseInterval} or {@link preciseHalfLine}; half-lines need a kernel with decay.
 * @param options - Digits, z, derivatives, which end moves.
 * @throws {@link InvalidArgumentError} for bad options, a domain the kernel does not serve, generators that return
 *   something else than bigints or do not satisfy Σ f g = 0. Whatever the kernel's own functions throw passes through.
 * @returns Value, complement and derivatives, each with its error; `converged: false` where the digits were not
 *   reached, as for a determinant that vanishes.
 *
 * **Error.** Estimate: the change to the last order, less what the observed rate says the last step gained, the change when the
 * working precision is raised, and the decay beyond the cut of a half-line.
 * **Cost.** O(n²) bigint products for integrable kernels, n some 1.2 points a digit (F2(−2)); (1 + k)²/2 times that
 * with k derivatives; O(n³) for kernels by formula.
 *
 * @example
 * preciseDeterminant(preciseAiryKernel(), preciseHalfLine(-2), { digits: 30 }).value; // "0.41322414250512255…"
 *
 * @category Precise determinants
 * @since 0.2.0
 */
export function preciseDeterminant(
  kernel: PreciseKernel,
  domain: PreciseDomain,
  options: PreciseDeterminantOptions = {},
): PreciseDeterminant {
  const digits = requireDigits("options.digits", options.digits ?? 50);
  const { entries, errors, order } = determinantSeries(kernel, domain, options);
  const pack = ({ value, scale }: Floating, error: number): PreciseEstimate =>
    preciseEstimate(value, scale, error, digits, order, "estimate");
  let factorial = 1n;
  const derivatives = entries.slice(2).map((c, k) => {
    factorial *= BigInt(k + 1);
    return pack({ value: c.value * factorial, scale: c.scale }, errors[k + 2] + log2OfFixed(factorial, 0n));
  });
  return { ...pack(entries[0], errors[0]), complement: pack(entries[1], errors[1]), derivatives };
}

/** det, 1 − det and the coefficients of ε, ε², … for further computation. */
export function determinantSeries(
  kernel: PreciseKernel,
  domain: PreciseDomain,
  options: PreciseDeterminantOptions,
): Refined {
  const digits = requireDigits("options.digits", options.digits ?? 50);
  const z = readExact("options.z", options.z ?? 1);
  const derivatives = requireInteger("options.derivatives", options.derivatives ?? 0, 0, 60);
  const most = kernel.kind === "integrable" ? MOST_NODES : MOST_DENSE;
  const maxOrder = requireInteger("options.maxOrder", options.maxOrder ?? most, 8, MOST_NODES);
  const scene = sceneOf(kernel, domain, options, z, derivatives);
  return refineOrders(
    (order, bits) => attempt(scene, order, bits),
    digits,
    12 + Math.ceil(0.35 * digits),
    maxOrder,
  );
}

function attempt(scene: PreciseScene, order: number, bits: bigint): Attempt {
  const { determinant, truncation, trace } = discretize(scene, order, bits);
  const { value, scale, smallestPivot } = determinant;
  const det = { value: value[0], scale };
  const complement = difference({ value: 1n, scale: 0n }, det);
  const entries = [det, complement, ...value.slice(1).map((c) => ({ value: c, scale }))];
  const logs = entries.map(log2OfFloating);
  const most = Math.max(logs[0], ...logs.slice(2));
  // Near its zeros a derivative is judged by its neighbours.
  // A complement that is 0 because z is needs no digits.
  const sizes = logs.map((l, k) => (k < 2 ? (scene.z.numerator === 0n ? 0 : l) : Math.max(l, most - 20)));
  const vanished = smallestPivot === Number.NEGATIVE_INFINITY;
  const lost = vanished ? 0 : Math.max(-2.4 * smallestPivot, expectedLoss(logs[0], trace));
  const small = Number.isFinite(logs[1]) ? -logs[1] : 0;
  return {
    entries,
    sizes,
    // What lies beyond the cut is felt as much more as the smallest pivot is small.
    truncation: truncation + (vanished ? 0 : -smallestPivot) + Math.max(0, small),
    needed:
      complement.value === 0n && scene.z.numerator !== 0n
        ? 2 * Number(bits)
        : Math.ceil(Math.max(lost, small)),
    vanishing: smallestPivot <= 64 - Number(bits),
  };
}

function sceneOf(
  kernel: PreciseKernel,
  domain: PreciseDomain,
  options: PreciseDeterminantOptions,
  z: ExactInput,
  derivatives: number,
): PreciseScene {
  const halfLine = domain.upper === undefined;
  const { end } = options;
  if (end !== undefined && end !== "lower" && end !== "upper") {
    throw new InvalidArgumentError("options.end", '"lower" or "upper"', end);
  }
  if (halfLine && end === "upper")
    throw new InvalidArgumentError("options.end", '"lower" on a half-line', end);
  if (halfLine && kernel.decay === undefined) {
    throw new InvalidArgumentError(
      "domain",
      `an interval: the kernel ${kernel.name} states no decay`,
      "a half-line",
    );
  }
  if (kernel.kind === "smooth" && derivatives > kernel.mostDerivatives) {
    throw new InvalidArgumentError(
      "options.derivatives",
      `at most ${kernel.mostDerivatives} for the kernel ${kernel.name}`,
      derivatives,
    );
  }
  const weighted = kernel.kind === "integrable" && kernel.weightExponent !== undefined;
  if (weighted && (halfLine || domain.lower.numerator !== 0n || end === "lower")) {
    throw new InvalidArgumentError(
      "domain",
      `an interval (0, b) for the kernel ${kernel.name}`,
      numberFromExact(domain.lower),
    );
  }
  return { kernel, domain, z, derivatives, end: end ?? (halfLine ? "lower" : "upper") };
}
