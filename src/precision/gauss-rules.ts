/**
 * Gauss rules at any precision for the weight x^α on (0, 1), α > −1; α = 0 is Gauss–Legendre.
 *
 * Orthogonal polynomials p_{k+1} = 4 (x − a_k) p_k − 16 b_k p_{k−1} (4^k times the monic ones: of size 1) with
 *
 *   a_k = ½ (1 + α² / ((2k + α)(2k + 2 + α))),   b_k = k² (k + α)² / ((2k + α)² ((2k + α)² − 1))
 *
 * (Jacobi polynomials shifted to (0, 1); W. Gautschi, Orthogonal Polynomials: Computation and Approximation, 2004,
 * Table 1.1). Starting values are the eigenvalues of the Jacobi matrix by bisection on its inertia in double
 * precision, then Newton's iteration with growing precision. Weights w = h / (p_n′ p_{n−1}), h = 4 Π 16 b_k / (α + 1).
 */
import { requireInteger } from "../core/check.ts";
import { decimalFromFixed, type ExactInput, formatDecimal, numberFromExact } from "./decimal.ts";
import { fixedFromNumber, rescale } from "./fixed-point.ts";
import { bitsFor, requireDigits } from "./precise-estimate.ts";

/** A rule on (0, 1) in fixed point: nodes increasing, both arrays within 2 units. */
export interface FixedRule {
  readonly nodes: readonly bigint[];
  readonly weights: readonly bigint[];
}

/** Largest order served. */
export const MOST_NODES = 2000;

const ZERO: ExactInput = { numerator: 0n, twos: 0, tens: 0 };
const cache = new Map<string, FixedRule>();
const CACHED = 64;

/**
 * The rule of `order` points for the weight x^α on (0, 1) at `bits`.
 *
 * **Error.** Nodes and weights within 2 units 2^−bits (guard digits cover the recurrence).
 * **Cost.** About 10 order² bigint products; cached.
 */
export function gaussRule(order: number, bits: bigint, alpha: ExactInput = ZERO): FixedRule {
  // Computed in steps of 128 bits, so that neighbouring precisions share one rule.
  const step = ((bits + 127n) / 128n) * 128n;
  const key = `${order} ${step} ${alpha.numerator} ${alpha.twos} ${alpha.tens}`;
  let rule = cache.get(key);
  if (!rule) {
    rule = computeRule(order, step, alpha);
    if (cache.size >= CACHED) cache.delete(cache.keys().next().value!);
    cache.set(key, rule);
  }
  const cut = step - bits;
  return { nodes: rule.nodes.map((x) => x >> cut), weights: rule.weights.map((w) => w >> cut) };
}

/** a_k and 16 b_k: exact fractions of integers, to fixed point. */
function recurrence(order: number, bits: bigint, alpha: ExactInput): { a: bigint[]; b: bigint[] } {
  // α = A/D. Then (2k + α) = (2kD + A)/D and everything is a quotient of integers.
  const D = (10n ** BigInt(alpha.tens)) << BigInt(alpha.twos);
  const A = alpha.numerator;
  const a: bigint[] = [];
  const b: bigint[] = [];
  for (let k = 0n; k < BigInt(order); k++) {
    const s = 2n * k * D + A;
    const shifted =
      A === 0n ? 0n : k === 0n ? ratio(A, s + 2n * D, bits) : ratio(A * A, s * (s + 2n * D), bits);
    a.push(((1n << bits) + shifted) >> 1n);
    const t = k * (k * D + A);
    // For k = 1 the factor 2 + α − 1 = 1 + α cancels one of the numerator: it may be tiny.
    if (k === 1n) b.push(ratio(16n * (D + A) * D * D, (2n * D + A) ** 2n * (3n * D + A), bits));
    else b.push(k === 0n ? 0n : ratio(16n * t * t * D * D, s * s * (s * s - D * D), bits));
  }
  return { a, b };
}

function ratio(numerator: bigint, denominator: bigint, bits: bigint): bigint {
  return (numerator << bits) / denominator;
}

function computeRule(order: number, bits: bigint, alpha: ExactInput): FixedRule {
  const start = doubleNodes(order, numberFromExact(alpha));
  const guard = BigInt(
    4 * Math.ceil(Math.log2(order + 1)) + 32 + Math.ceil(2 * Math.abs(numberFromExact(alpha))),
  );
  const full = bits + guard;
  const steps: bigint[] = [];
  // A step squares the error and multiplies it by about order² (the curvature of p_n against the spacing of its zeros).
  const loss = 2 * Math.ceil(Math.log2(order + 1)) + 2;
  for (let right = Number(bits); ; right = Math.ceil(right / 2) + loss) {
    steps.unshift(BigInt(right) + guard);
    if (right <= 100 - loss || right <= 2 * loss) break;
  }
  const coefficients = new Map<bigint, { a: bigint[]; b: bigint[] }>();
  for (const at of [...steps, full])
    if (!coefficients.has(at)) coefficients.set(at, recurrence(order, at, alpha));
  const { b } = coefficients.get(full)!;
  const D = (10n ** BigInt(alpha.tens)) << BigInt(alpha.twos);
  let h = ratio(4n * D, D + alpha.numerator, full);
  for (let k = 1; k < order; k++) h = (h * b[k]) >> full;
  const nodes: bigint[] = [];
  const weights: bigint[] = [];
  // Gauss–Legendre is symmetric about ½: its upper half is enough.
  const mirrored = alpha.numerator === 0n;
  for (let i = mirrored ? order >> 1 : 0; i < order; i++) {
    let x = fixedFromNumber(start[i], steps[0]);
    let at = steps[0];
    for (const precision of steps) {
      x = rescale(x, at, precision);
      at = precision;
      const [p, slope] = polynomial(x, coefficients.get(at)!, order, at);
      x -= (p << at) / slope;
    }
    const [, slope, before] = polynomial(x, coefficients.get(full)!, order, full);
    nodes.push(x >> guard);
    weights.push(((h << (2n * full)) / (slope * before)) >> guard);
  }
  if (mirrored) {
    const one = 1n << bits;
    for (let i = (order & 1) === 1 ? 1 : 0; nodes.length < order; i += 2) {
      nodes.unshift(one - nodes[i]);
      weights.unshift(weights[i]);
    }
  }
  return { nodes, weights };
}

/** p_n, p_n′ and p_{n−1} at x. */
function polynomial(
  x: bigint,
  { a, b }: { readonly a: readonly bigint[]; readonly b: readonly bigint[] },
  order: number,
  bits: bigint,
): readonly [bigint, bigint, bigint] {
  let before = 0n;
  let p = 1n << bits;
  let slopeBefore = 0n;
  let slope = 0n;
  for (let k = 0; k < order; k++) {
    const t = (x - a[k]) << 2n;
    const next = (t * p - b[k] * before) >> bits;
    const slopeNext = (p << 2n) + ((t * slope - b[k] * slopeBefore) >> bits);
    before = p;
    p = next;
    slopeBefore = slope;
    slope = slopeNext;
  }
  return [p, slope, before];
}

/** Eigenvalues of the Jacobi matrix: bisection on the number of negative pivots of J − x. */
function doubleNodes(order: number, alpha: number): Float64Array {
  const a = new Float64Array(order);
  const b = new Float64Array(order);
  for (let k = 0; k < order; k++) {
    const s = 2 * k + alpha;
    a[k] = k === 0 ? (alpha + 1) / (alpha + 2) : 0.5 * (1 + (alpha * alpha) / (s * (s + 2)));
    if (k === 1) b[k] = (1 + alpha) / ((2 + alpha) ** 2 * (3 + alpha));
    else if (k > 1) b[k] = (k * (k + alpha)) ** 2 / (s * s * (s * s - 1));
  }
  const below = (x: number): number => {
    let count = 0;
    let d = 1;
    for (let k = 0; k < order; k++) {
      d = a[k] - x - (k === 0 ? 0 : b[k] / d);
      if (d === 0) d = 1e-300;
      if (d < 0) count++;
    }
    return count;
  };
  const nodes = new Float64Array(order);
  for (let i = 0; i < order; i++) {
    let low = i === 0 ? 0 : nodes[i - 1];
    let high = 1;
    while (high - low > 2 ** -51 * high) {
      const middle = 0.5 * (low + high);
      if (below(middle) > i) high = middle;
      else low = middle;
    }
    nodes[i] = 0.5 * (low + high);
  }
  return nodes;
}

/** Nodes and weights on [−1, 1] as decimal strings. */
export interface PreciseQuadratureRule {
  readonly nodes: readonly string[];
  readonly weights: readonly string[];
}

/**
 * Gauss–Legendre rule on [−1, 1] with many digits.
 *
 * @param order - Number of points, 1 to 2000.
 * @param options - `digits`, 1 to 1000, default 50.
 * @returns Nodes in increasing order and weights, decimal strings.
 * @throws {@link InvalidArgumentError} for an order or a number of digits outside these ranges.
 *
 * **Error.** Absolute, below 10^−digits (nodes), relative 10^−digits (weights).
 * **Cost.** About 10 order² bigint products: 3 ms for 40 points at 50 digits; cached.
 * **Source.** DLMF 3.5.
 *
 * @example
 * preciseGaussLegendre(2, { digits: 30 }).nodes[1]; // "0.57735026918962576450914878050196"
 *
 * @category Precise quadrature
 * @since 0.2.0
 */
export function preciseGaussLegendre(
  order: number,
  options: { readonly digits?: number } = {},
): PreciseQuadratureRule {
  requireInteger("order", order, 1, MOST_NODES);
  const digits = requireDigits("options.digits", options.digits ?? 50);
  // Weights get as small as 1/order².
  const bits = BigInt(bitsFor(digits + 2) + 2 * Math.ceil(Math.log2(order + 1)) + 8);
  const { nodes, weights } = gaussRule(order, bits);
  const one = 1n << bits;
  const show = (a: bigint): string => formatDecimal(decimalFromFixed(a, bits, digits + 2));
  // The middle node of an odd order is 0.
  const middle = order % 2 === 1 ? (order - 1) / 2 : -1;
  return {
    nodes: nodes.map((x, i) => (i === middle ? "0" : show(2n * x - one))),
    weights: weights.map((w) => show(2n * w)),
  };
}
