/**
 * Ai, Ai′ and ∫Ai by their expansions for large |x|, with proved remainders.
 */
import { enclosedPi, exponentialOf, exponentOf, sineCosineOf } from "./enclosed-functions.ts";
import {
  add,
  type Enclosure,
  exactInteger,
  negate,
  over,
  rootOf,
  shiftEnclosure,
  times,
  withBits,
} from "./enclosure.ts";
import { bitLength } from "./fixed-point.ts";

/** Ai, Ai′, ∫_x^∞ Ai with their bounds. */
export interface EnclosedAiry {
  readonly value: Enclosure;
  readonly slope: Enclosure;
  readonly integral: Enclosure;
}

/**
 * Whether the series reach a relative 2^−bits. The least terms of those for Ai, Ai′ are about e^{−2ζ}, of that for the
 * integral e^{−ζ}.
 */
export function airySeriesReach(zeta: number, bits: number, withIntegral: boolean): boolean {
  return (withIntegral ? 1 : 2) * zeta * Math.LOG2E > bits + 2 * Math.log2(bits) + 20;
}

/** Guard bits of the sums: for the square of the number of terms, which is below 0.7 `precision`. */
function withGuard(precision: bigint): bigint {
  return precision + BigInt(2 * bitLength(precision) + 8);
}

/** Sums of u_k ζ^−k, v_k ζ^−k, w_k ζ^−k over k ≡ 0, 1, 2, 3 (mod 4). */
interface SeriesSums {
  readonly u: bigint[];
  readonly v: bigint[];
  readonly w: bigint[];
  readonly units: bigint;
}

/**
 * u_k, v_k as in DLMF 9.7.2; w_k = u_k + (k − ½) w_{k−1}, from ∫_x^∞ Ai by parts. Remainders, with
 * ζ = ⅔ |x|^{3/2}: K_{1/3} and K_{2/3} are, up to elementary factors and after the first term, Stieltjes functions
 * ∫ dμ(τ)/(1 + τ/ζ) with μ ≥ 0, hence the remainder is below the modulus of the first neglected term for real ζ and, as
 * |1 + iτ/ζ| ≥ 1, for imaginary ζ too (DLMF 9.7(iii), 10.40(ii)). For the integral,
 * ∫_ζ^∞ K_{1/3} = e^{−ζ} ∫₀^∞ e^{−ζs} cosh(θ/3) / (cosh θ sinh θ) ds, cosh θ = 1 + s; as a function of s the quotient
 * times √s is ∫ dν(σ)/(1 + σs), where ν has the mass cos(π/6) at σ = 1 and is negative, of total mass
 * cos(π/6) − 1/√2 = 0.159, on (0, ½]: the remainder is below 1.02/0.707 < 1.5 times the first neglected term.
 *
 * `units` covers remainder and rounding. Costs one product a term for all three.
 */
function seriesSums(zeta: Enclosure, work: bigint, withIntegral: boolean): SeriesSums {
  const inverse = withBits(over(exactInteger(1n), zeta, work + 8n), work);
  const z = inverse.value;
  const u = [0n, 0n, 0n, 0n];
  const v = [0n, 0n, 0n, 0n];
  const w = [0n, 0n, 0n, 0n];
  let termU = 1n << work;
  let termV = termU;
  let termW = termU;
  let k = 0;
  for (;;) {
    u[k & 3] += termU;
    v[k & 3] += termV;
    w[k & 3] += termW;
    k++;
    const last = withIntegral ? termW : termU;
    const numerator = BigInt((6 * k - 5) * (6 * k - 3) * (6 * k - 1));
    termU = ((termU * z * numerator) >> work) / BigInt(216 * k * (2 * k - 1));
    termV = (termU * BigInt(6 * k + 1)) / BigInt(1 - 6 * k);
    if (withIntegral) termW = termU + ((termW * z * BigInt(2 * k - 1)) >> (work + 1n));
    const size = withIntegral ? termW : termU;
    if (size <= 4n) break;
    if (size > last) throw new RangeError("the asymptotic series does not reach this precision");
  }
  // A step adds 2 units of rounding and, δ being the units of 1/ζ, δ ζ times the term, which is below δ since the terms
  // fall from 5/72ζ or 41/72ζ on. Falling ratios: u_k ζ^−k is within k (2 + δ) units, v_k within 7/5 of that and one, and
  // all k of them within k² (3 + 2δ) + k. For the integral k < ζ: ratios of u below ½, so u_k within 4 + 2δ, w_k within
  // k (5 + 3δ), the sum within the same bound. The first term left out is at most 4, times 1.5 for the integral.
  const units = BigInt(k) ** 2n * (3n + 2n * inverse.units) + BigInt(k) + 8n;
  return { u, v, w, units };
}

/** √x, ζ and |x|^{1/4} to `work` digits. */
function scales(x: Enclosure, work: bigint): { root: Enclosure; zeta: Enclosure; fourth: Enclosure } {
  const root = rootOf(x, work);
  const zeta = over(shiftEnclosure(times(x, root, work), 1n), exactInteger(3n), work);
  return { root, zeta, fourth: rootOf(root, work) };
}

function enclosed(value: bigint, work: bigint, units: bigint): Enclosure {
  return { value, bits: work, units };
}

/**
 * Ai, Ai′, ∫_x^∞ Ai for large x > 0 with a relative error of about 2^−precision (DLMF 9.7.5, 9.7.6):
 * e^{−ζ}/(2√π) times x^{−1/4} Σ(−1)^k u_k ζ^−k, −x^{1/4} Σ(−1)^k v_k ζ^−k, x^{−3/4} Σ(−1)^k w_k ζ^−k.
 *
 * @param x - At least 1; {@link airySeriesReach} must hold.
 */
export function airyFarRight(x: Enclosure, precision: bigint, withIntegral: boolean): EnclosedAiry {
  const work = withGuard(precision);
  const long = work + 2n * exponentOf(x); // ζ is exponentiated: its integer digits cost as many more
  const { root, zeta, fourth } = scales(x, long);
  const sums = seriesSums(zeta, work, withIntegral);
  const alternate = (s: bigint[]): Enclosure => enclosed(s[0] - s[1] + s[2] - s[3], work, sums.units);
  const scale = over(exponentialOf(negate(zeta), work), rootOf(enclosedPi(work), work), work);
  const half = shiftEnclosure(scale, -1n);
  const value = over(times(half, alternate(sums.u), work), fourth, precision);
  const slope = negate(times(times(half, alternate(sums.v), work), fourth, precision));
  const integral = withIntegral
    ? over(times(half, alternate(sums.w), work), times(root, fourth, work), precision)
    : exactInteger(0n);
  return { value, slope, integral };
}

/**
 * Ai(−x), Ai′(−x), ∫_{−x}^∞ Ai for large x > 0 with an absolute error of about 2^−precision (times x^{1/4} for Ai′).
 *
 * DLMF 9.7.9, 9.7.10 with ω = ζ − π/4. For the integral Ai(−t) = 2 Re e^{iπ/3} Ai(t e^{iπ/3}) (DLMF 9.2.14), so that
 * ∫_{−∞}^{−x} Ai = π^{−1/2} x^{−3/4} Re e^{−i(ζ + π/4)} Σ i^k w_k ζ^−k.
 *
 * @param x - At least 1; {@link airySeriesReach} must hold.
 */
export function airyFarLeft(x: Enclosure, precision: bigint, withIntegral: boolean): EnclosedAiry {
  const work = withGuard(precision);
  const long = work + 2n * exponentOf(x);
  const { root, zeta, fourth } = scales(x, long);
  const sums = seriesSums(zeta, work, withIntegral);
  const even = (s: bigint[]): Enclosure => enclosed(s[0] - s[2], work, sums.units);
  const odd = (s: bigint[]): Enclosure => enclosed(s[1] - s[3], work, sums.units);
  const [sine, cosine] = sineCosineOf(add(zeta, negate(shiftEnclosure(enclosedPi(long), -2n))), work);
  const combine = (a: Enclosure, p: Enclosure, b: Enclosure, q: Enclosure): Enclosure =>
    add(times(a, p, work), times(b, q, work));
  const rootPi = rootOf(enclosedPi(work), work);
  const value = over(
    combine(cosine, even(sums.u), sine, odd(sums.u)),
    times(rootPi, fourth, work),
    precision,
  );
  const slope = over(
    times(combine(sine, even(sums.v), negate(cosine), odd(sums.v)), fourth, work),
    rootPi,
    work,
  );
  if (!withIntegral) return { value, slope, integral: exactInteger(0n) };
  // ζ + π/4 = ω + π/2: its cosine is −sin ω, its sine cos ω.
  const tail = over(
    combine(negate(sine), even(sums.w), cosine, odd(sums.w)),
    times(times(rootPi, root, work), fourth, work),
    work,
  );
  return { value, slope, integral: add(exactInteger(1n), negate(tail)) };
}
