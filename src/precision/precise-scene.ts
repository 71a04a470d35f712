/**
 * A kernel on the points of a rule, at one precision: nodes, weights and entries as power series in the displacement ε
 * of one end, and the determinant of that matrix.
 */
import { InvalidArgumentError } from "../core/errors.ts";
import { type ExactInput, fixedFromExact, numberFromExact, rationalFromExact } from "./decimal.ts";
import {
  eliminateDense,
  eliminateStructured,
  eliminateSymmetric,
  type FixedDeterminant,
} from "./elimination.ts";
import { eliminatePair } from "./elimination-pair.ts";
import { exponentialFixed } from "./exponential.ts";
import { absolute, fixedFromNumber, numberFromFixed } from "./fixed-point.ts";
import { gaussRule } from "./gauss-rules.ts";
import { composeLinear, divideJets, type Jet, multiplyJets, padded, subtractJets } from "./jet.ts";
import { logarithmFixed } from "./logarithm.ts";
import { preciseArithmetic } from "./precise-arithmetic.ts";
import type {
  PreciseDomain,
  PreciseIntegrableKernel,
  PreciseKernel,
  PreciseSmoothKernel,
} from "./precise-kernel.ts";
import { GUARD } from "./refinement.ts";

/** What does not change with order and precision. */
export interface PreciseScene {
  readonly kernel: PreciseKernel;
  readonly domain: PreciseDomain;
  readonly z: ExactInput;
  readonly derivatives: number;
  readonly end: "lower" | "upper";
}

/** A determinant and log2 of the part of the trace beyond the cut of a half-line (−∞ on intervals). */
export interface Discretization {
  readonly determinant: FixedDeterminant;
  readonly truncation: number;
  /** Trace of a positive kernel, infinite for others. */
  readonly trace: number;
}

/** Nodes x_i + ε slope_i and weights (times z) as jets. */
interface Nodes {
  readonly x: bigint[];
  readonly slope: bigint[];
  readonly weight: Jet[];
  readonly lower: number;
  readonly upper: number;
}

/** The determinant with `order` points at `bits`. */
export function discretize(scene: PreciseScene, order: number, bits: bigint): Discretization {
  const { nodes, truncation } = placeNodes(scene, order, bits);
  if (scene.kernel.kind === "smooth") {
    const determinant = smooth(scene, scene.kernel, nodes, bits);
    return { determinant, truncation, trace: Number.POSITIVE_INFINITY };
  }
  return { ...integrable(scene, scene.kernel, nodes, bits), truncation };
}

function placeNodes(
  { kernel, domain, z, derivatives, end }: PreciseScene,
  order: number,
  bits: bigint,
): { readonly nodes: Nodes; readonly truncation: number } {
  const alpha = kernel.kind === "integrable" ? kernel.weightExponent : undefined;
  const rule = gaussRule(order, bits, alpha);
  const lower = fixedFromExact(domain.lower, bits);
  const halfLine = domain.upper === undefined;
  const start = numberFromExact(domain.lower);
  const size = Math.max(0, Math.log2(Math.abs(numberFromExact(z))));
  const cut = halfLine ? cutOf(kernel.decay!, start, GUARD - 8 - Number(bits) - size, kernel.name) : 0;
  const upper = halfLine ? fixedFromNumber(cut, bits) : fixedFromExact(domain.upper!, bits);
  const length = upper - lower;
  const one = 1n << bits;
  const jetLength = derivatives + 1;
  // A half-line moves as a whole. In an interval (a, b) the point a + (b − a) t moves with 1 − t or t.
  const x = rule.nodes.map((t) => lower + ((length * t) >> bits));
  const slope = rule.nodes.map((t) => (halfLine ? one : end === "upper" ? t : one - t));
  const factor = fixedFromExact(z, bits);
  // Total weight (b^{α+1} for the weight x^α) as a series in ε, times z.
  const total = halfLine
    ? padded([length], jetLength)
    : padded(end === "upper" ? [length, one] : [length, -one], jetLength);
  const scale = multiplyJets(
    alpha ? powerOfLength(length, alpha, jetLength, bits) : total,
    padded([factor], jetLength),
    bits,
  );
  const weight = rule.weights.map((w) => scale.map((c) => (c * w) >> bits));
  const truncation = halfLine ? kernel.decay!(cut, start) + size : Number.NEGATIVE_INFINITY;
  return {
    nodes: { x, slope, weight, lower: numberFromFixed(lower, bits), upper: numberFromFixed(upper, bits) },
    truncation,
  };
}

/** (b + ε)^{α+1} = b^{α+1} Σ_k binomial(α + 1, k) (ε/b)^k: the length of a weighted interval. */
function powerOfLength(length: bigint, alpha: ExactInput, terms: number, bits: bigint): Jet {
  const { numerator, denominator } = rationalFromExact(alpha);
  const inner = bits + 64n;
  const b = length << 64n;
  // The logarithm is multiplied by α + 1, and the power may be large.
  const exponent = (logarithmFixed(b, inner, inner) * (numerator + denominator)) / denominator;
  let term = exponentialFixed(exponent, inner);
  const out: bigint[] = [];
  for (let k = 0n; k < BigInt(terms); k++) {
    out.push(term >> 64n);
    // binomial(p, k + 1)/binomial(p, k) = (p − k)/(k + 1).
    term = (term * (numerator + denominator - k * denominator)) / (denominator * (k + 1n));
    term = (term << inner) / b;
  }
  return out;
}

/** Where the cut of a half-line loses less than 2^target, and less than a part 2^−40 of what there is. */
export function cutOf(
  decay: (x: number, lower: number) => number,
  lower: number,
  target: number,
  name: string,
): number {
  const threshold = Math.min(target, decay(lower, lower) - 40);
  let step = 1;
  let low = lower;
  for (let k = 0; ; k++) {
    const size = decay(lower + step, lower);
    if (Number.isNaN(size) || Number.isNaN(threshold) || k > 60) {
      throw new InvalidArgumentError(`kernel (${name}).decay`, "a bound that decreases without limit", size);
    }
    if (size <= threshold) break;
    low = lower + step;
    step *= 2;
  }
  let high = lower + step;
  while (high - low > 0.01 * (high - lower)) {
    const middle = 0.5 * (low + high);
    if (decay(middle, lower) <= threshold) high = middle;
    else low = middle;
  }
  return high;
}

function integrable(
  { derivatives, z }: PreciseScene,
  kernel: PreciseIntegrableKernel,
  nodes: Nodes,
  bits: bigint,
): { readonly determinant: FixedDeterminant; readonly trace: number } {
  const length = derivatives + 1;
  const { lower, upper } = nodes;
  const generators = kernel.generators(preciseArithmetic(bits), derivatives + 1, lower, upper);
  const count = kernel.antisymmetricPair ? 2 : 2 * kernel.rank;
  const left: Jet[][] = [];
  const right: Jet[][] = [];
  const diagonal: Jet[] = [];
  nodes.x.forEach((x, i) => {
    const taylor = generators(x);
    requireTaylor(kernel, taylor, count, derivatives + 2);
    const jets = taylor.map((f) => composeLinear(f, nodes.slope[i], length, bits));
    // f′ as a series of its own: coefficients (k + 1) a_{k+1}.
    const slopes = taylor.map((f) =>
      composeLinear(
        f.slice(1, length + 1).map((c, k) => c * BigInt(k + 1)),
        nodes.slope[i],
        length,
        bits,
      ),
    );
    if (kernel.antisymmetricPair) {
      left.push(jets);
      diagonal.push(
        subtractJets(multiplyJets(slopes[0], jets[1], bits), multiplyJets(slopes[1], jets[0], bits)),
      );
      return;
    }
    const f = jets.slice(0, kernel.rank);
    const g = jets.slice(kernel.rank);
    left.push(f);
    right.push(g);
    requireVanishing(kernel, f, g, x, bits);
    let sum: Jet = padded([], length);
    for (let k = 0; k < kernel.rank; k++) {
      const term = multiplyJets(slopes[k], g[k], bits);
      sum = sum.map((c, j) => c + term[j]);
    }
    diagonal.push(sum);
  });
  let trace = 0;
  diagonal.forEach((d, i) => {
    trace += numberFromFixed(d[0] * nodes.weight[i][0], 2n * bits);
  });
  if (!kernel.contraction) trace = Number.POSITIVE_INFINITY;
  const ordered = kernel.contraction && z.numerator >= 0n && numberFromExact(z) <= 1;
  if (kernel.antisymmetricPair && derivatives === 0) {
    const found = eliminatePair(
      {
        x: nodes.x.slice(),
        weight: nodes.weight.map((w) => w[0]),
        a: left.map((f) => f[0][0]),
        b: left.map((f) => f[1][0]),
        diagonal: diagonal.map((d) => d[0]),
      },
      ordered,
      bits,
    );
    if (found) return { determinant: { ...found, value: [found.value] }, trace };
    // Small pivots of a positive definite matrix ask for bits, not for exchanges.
    if (ordered)
      return { determinant: { value: [0n], scale: bits, smallestPivot: -Number(bits) / 2 }, trace };
  }
  const x = nodes.x.map((v, i) => padded([v, nodes.slope[i]], length));
  const found = eliminateStructured(
    {
      x: x.slice(),
      weight: nodes.weight.slice(),
      left: left.slice(),
      right: kernel.antisymmetricPair ? undefined : right.slice(),
      diagonal: diagonal.slice(),
    },
    bits,
  );
  if (found) return { determinant: found, trace };
  // Every symmetric pivot vanished: form the matrix and exchange rows.
  const rows = x.map((xi, i) =>
    x.map((xj, j) => {
      if (i === j) return multiplyJets(diagonal[i], nodes.weight[i], bits);
      let sum: Jet;
      if (kernel.antisymmetricPair) {
        sum = subtractJets(
          multiplyJets(left[i][0], left[j][1], bits),
          multiplyJets(left[i][1], left[j][0], bits),
        );
      } else {
        sum = padded([], length);
        for (let k = 0; k < kernel.rank; k++) {
          const term = multiplyJets(left[i][k], right[j][k], bits);
          sum = sum.map((c, m) => c + term[m]);
        }
      }
      return multiplyJets(divideJets(sum, subtractJets(xi, xj), bits), nodes.weight[j], bits);
    }),
  );
  return { determinant: eliminateDense(rows, bits), trace };
}

function smooth(
  { derivatives }: PreciseScene,
  kernel: PreciseSmoothKernel,
  { x, slope, weight, lower, upper }: Nodes,
  bits: bigint,
): FixedDeterminant {
  const length = derivatives + 1;
  const entry = kernel.evaluator(preciseArithmetic(bits), derivatives, lower, upper);
  const at = (i: number, j: number): Jet => {
    const found = entry(x[i], slope[i], x[j], slope[j]);
    if (!Array.isArray(found) || typeof found[0] !== "bigint") {
      throw new InvalidArgumentError(`kernel (${kernel.name})`, "values that are bigints", found?.[0]);
    }
    return padded(found, length);
  };
  if (kernel.symmetric) {
    const found = eliminateSymmetric(
      x.map((_, i) => x.slice(0, i + 1).map((_x, j) => at(i, j))),
      weight,
      bits,
    );
    if (found) return found;
  }
  return eliminateDense(
    x.map((_, i) => x.map((_x, j) => multiplyJets(at(i, j), weight[j], bits))),
    bits,
  );
}

function requireTaylor(kernel: PreciseIntegrableKernel, taylor: unknown, count: number, terms: number): void {
  const right =
    Array.isArray(taylor) &&
    taylor.length === count &&
    taylor.every((f) => Array.isArray(f) && f.length >= terms && f.every((c) => typeof c === "bigint"));
  if (!right) {
    const expected = `${count} arrays of at least ${terms} bigints (Taylor coefficients) from the generators`;
    throw new InvalidArgumentError(`kernel (${kernel.name})`, expected, taylor);
  }
}

/** Σ f g = 0, or the kernel has a pole on the diagonal. */
function requireVanishing(
  kernel: PreciseIntegrableKernel,
  f: readonly Jet[],
  g: readonly Jet[],
  x: bigint,
  bits: bigint,
): void {
  let sum = 0n;
  let size = 0n;
  f.forEach((fk, k) => {
    const term = fk[0] * g[k][0];
    sum += term;
    size += absolute(term);
  });
  if (absolute(sum) > (size >> (bits / 2n)) + (1n << (bits + bits / 2n))) {
    throw new InvalidArgumentError(
      `kernel (${kernel.name})`,
      "generators with Σ f_k(x) g_k(x) = 0",
      `${numberFromFixed(sum, 2n * bits)} at x = ${numberFromFixed(x, bits)}`,
    );
  }
}
