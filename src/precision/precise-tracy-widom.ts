/**
 * The Tracy–Widom laws with any number of digits, all three from one structured elimination of the Airy kernel K on
 * (s, ∞): with B(x) = ∫_x^∞ Ai,
 *
 *   F2 = det(I − K),   G = 1 − ⟨(I − K)⁻¹ Ai, 1 − B⟩ = e^{−μ},   R = R(s, s),   q = ((I − K)⁻¹ Ai)(s),
 *   F1 = √(F2 G),   F4 (unscaled) = ½ (F1 + F2/F1),
 *   (log F2)′ = R,   (log F1)′ = ½ (R + q),   (log F2/F1)′ = ½ (R − q),
 *
 * q being the Hastings–McLeod function and μ = ∫_s^∞ q. C. Tracy, H. Widom, Commun. Math. Phys. 159 (1994) 151 and
 * 177 (1996) 727; P. Ferrari, H. Spohn, J. Phys. A 38 (2005) L557.
 */
import { InvalidArgumentError } from "../core/errors.ts";
import { preciseAiryKernel } from "./airy-kernels.ts";
import { airyTable } from "./airy-table.ts";
import { type ExactInput, fixedFromExact, numberFromExact, type PreciseInput, readExact } from "./decimal.ts";
import { eliminatePair } from "./elimination-pair.ts";
import { fixedFromNumber, numberFromFixed } from "./fixed-point.ts";
import { difference, type Floating, log2OfFloating, product, quotient, root, sum } from "./floating.ts";
import { gaussRule, MOST_NODES } from "./gauss-rules.ts";
import { type PreciseEstimate, preciseEstimate, requireDigits } from "./precise-estimate.ts";
import { cutOf } from "./precise-scene.ts";
import { type Attempt, expectedLoss, GUARD, type Refined, refineOrders } from "./refinement.ts";

const ONE: Floating = { value: 1n, scale: 0n };

/** Everything one elimination gives. */
export interface EdgeValues {
  readonly f2: Floating;
  /** e^{−μ}. */
  readonly g: Floating;
  readonly resolvent: Floating;
  readonly q: Floating;
}

/** log2 of a bound of ∫_x^∞ Ai. */
function singleDecay(x: number): number {
  return x < 1 ? 8 - x : -(2 / 3) * x ** 1.5 * Math.LOG2E;
}

/** At one order and precision. */
function edgeAttempt(
  s: ExactInput,
  bordered: boolean,
  order: number,
  bits: bigint,
): EdgeValues & { truncation: number; pivot: number; trace: number } {
  const start = numberFromExact(s);
  // K decays like Ai², the border like Ai.
  const decay = bordered ? singleDecay : preciseAiryKernel().decay!;
  const cut = cutOf(decay, start, GUARD - 8 - Number(bits), "Airy");
  const lower = fixedFromExact(s, bits);
  const length = fixedFromNumber(cut, bits) - lower;
  const rule = gaussRule(order, bits);
  const table = airyTable(bits, start, cut, 1);
  const one = 1n << bits;
  const x = [...rule.nodes.map((t) => lower + ((length * t) >> bits)), lower];
  const pairs = x.map((t) => table.ai(t));
  const a = pairs.map((p) => p[0]);
  const b = pairs.map((p) => p[1]);
  const weight = rule.weights.map((w) => (length * w) >> bits);
  // K(x, x) = Ai′² − x Ai².
  const diagonal = x.map((t, i) => (b[i] * b[i] - ((t * a[i]) >> bits) * a[i]) >> bits);
  let trace = 0;
  weight.forEach((w, i) => {
    trace += numberFromFixed(w * diagonal[i], 2n * bits);
  });
  const border = !bordered
    ? undefined
    : {
        column: a.slice(),
        row: weight.map((w, i) => (w * (one - table.integral(x[i]))) >> bits),
        corner: one,
      };
  const found = eliminatePair({ x, weight, a, b, diagonal, ...(border ? { border } : {}) }, true, bits);
  const failed = { value: 0n, scale: bits, smallestPivot: -Number(bits) / 2 };
  const { value, scale, smallestPivot } = found ?? failed;
  return {
    f2: { value, scale },
    g: { value: border?.corner ?? one, scale: bits },
    resolvent: { value: diagonal[order], scale: bits },
    q: { value: border?.column[order] ?? 0n, scale: bits },
    truncation: decay(cut, start),
    trace,
    pivot: smallestPivot,
  };
}

/** F, 1 − F, F′ of the law β from the values of one elimination. */
function lawEntries(beta: 1 | 2 | 4, { f2, g, resolvent, q }: EdgeValues, bits: bigint): Floating[] {
  const half = (a: Floating): Floating => ({ value: a.value, scale: a.scale + 1n });
  if (beta === 2) return [f2, difference(ONE, f2), product(f2, resolvent, bits)];
  const f1 = root(product(f2, g, bits), bits);
  const slope1 = product(f1, half(sum(resolvent, q)), bits);
  if (beta === 1) return [f1, difference(ONE, f1), slope1];
  const plus = quotient(f1, g, bits);
  const f4 = half(sum(f1, plus));
  const slopePlus = product(plus, half(difference(resolvent, q)), bits);
  return [f4, difference(ONE, f4), half(sum(slope1, slopePlus))];
}

/** F, 1 − F, F′ for each β asked for (β = 4 unscaled), one after another; with `painleve` R, q and G follow. */
export function edgeLaws(
  s: ExactInput,
  betas: readonly (1 | 2 | 4)[],
  painleve: boolean,
  digits: number,
): Refined {
  const bordered = painleve || betas.some((beta) => beta !== 2);
  const run = (order: number, bits: bigint): Attempt => {
    const values = edgeAttempt(s, bordered, order, bits);
    const entries = betas.flatMap((beta) => lawEntries(beta, values, bits));
    if (painleve) entries.push(values.resolvent, values.q, values.g);
    const sizes = entries.map(log2OfFloating);
    const least = Math.min(
      0,
      ...sizes.filter((l, k) => (k % 3 !== 0 || k >= 3 * betas.length) && Number.isFinite(l)),
    );
    const lost =
      Math.max(-2.4 * values.pivot, expectedLoss(log2OfFloating(values.f2), values.trace)) -
      (values.g.value > 0n ? Math.min(0, log2OfFloating(values.g)) : 0);
    // The density is small on both sides; on the left it is a product of numbers that are not.
    const small = numberFromExact(s) > 0 ? -least : 0;
    return {
      entries,
      sizes,
      truncation: values.truncation - values.pivot + small,
      needed: entries.some((e, k) => k % 3 === 1 && e.value === 0n)
        ? 2 * Number(bits)
        : Math.ceil(Math.max(lost, small)),
      vanishing: false,
    };
  };
  const start = Math.abs(numberFromExact(s));
  return refineOrders(run, digits, 12 + Math.ceil(0.5 * digits + 1.5 * start), MOST_NODES);
}

/** Options of {@link preciseTracyWidom}. */
export interface PreciseTracyWidomOptions {
  /** Significant digits of each result, 1 to 1000. Default 50. */
  readonly digits?: number;
}

/** A Tracy–Widom law at one point. */
export interface PreciseLawValues {
  readonly cdf: PreciseEstimate;
  readonly survival: PreciseEstimate;
  readonly pdf: PreciseEstimate;
}

/**
 * A Tracy–Widom law at one point with many digits, each result to full relative accuracy.
 *
 * @param beta - 1, 2 or 4; β = 4 in the unscaled variable: F(s) = ½ (F1(s) + F2(s)/F1(s)).
 * @param s - Point, −60 to 1000, taken exactly.
 * @param options - `digits`.
 * @throws {@link InvalidArgumentError} for another β, a point outside that range, bad digits.
 *
 * **Error.** As {@link preciseDeterminant}.
 * **Cost.** At −2: 0.06 s for 50 digits, 0.3 s for 100.
 *
 * @example
 * preciseTracyWidom(2, -2, { digits: 20 }).cdf.value; // "0.4132241425051225546881"
 *
 * @category Precise laws
 * @since 0.2.0
 */
export function preciseTracyWidom(
  beta: 1 | 2 | 4,
  s: PreciseInput,
  options: PreciseTracyWidomOptions = {},
): PreciseLawValues {
  if (beta !== 1 && beta !== 2 && beta !== 4) throw new InvalidArgumentError("beta", "1, 2 or 4", beta);
  const digits = requireDigits("options.digits", options.digits ?? 50);
  const exact = readExact("s", s);
  const near = numberFromExact(exact);
  if (!(near >= -60 && near <= 1000)) throw new InvalidArgumentError("s", "a number from -60 to 1000", s);
  const { entries, errors, order } = edgeLaws(exact, [beta], false, digits);
  const [cdf, survival, pdf] = entries.map((e, k) =>
    preciseEstimate(e.value, e.scale, errors[k], digits, order, "estimate"),
  );
  return { cdf, survival, pdf };
}
