/**
 * Tails of the Tracy–Widom laws as asymptotic series with exact coefficients.
 *
 * Right tails. With z = s^{−3/2}, ζ = (2/3) s^{3/2},
 *
 *   β = 1:  1 − F ≃ ½ ∫_s^∞ Ai            = e^{−ζ} / (4√π s^{3/4}) Σ c_k z^k
 *   β = 2:  1 − F ≃ ∫_s^∞ (x − s) Ai(x)² dx = e^{−2ζ} / (16π s^{3/2}) Σ c_k z^k
 *   β = 4 (unscaled): 1 − F ≃ ⅛ ∫_s^∞ (x − s)² Ai(x) J(x) dx, J(x) = ∫_x^∞ (t − x) Ai(t) dt,
 *                                           = e^{−2ζ} / (128π s³) Σ c_k z^k
 *
 * What is left out is of relative size 1 − F. Each is an iterated integral of a product of Airy series, and the integral
 * of e^{−κζ} s^{−p} Σ a_k z^k is e^{−κζ} s^{−p−1/2} Σ b_k z^k with, since d/ds e^{−κζ} = −κ √s e^{−κζ},
 *
 *   κ b_k = a_k − (p + ½ + (3/2)(k − 1)) b_{k−1}.
 *
 * Ai = e^{−ζ} / (2√π s^{1/4}) Σ (−1)^k u_k ζ^{−k}: DLMF 9.7.5, u_k = (6k − 5)(6k − 3)(6k − 1) / (216 k (2k − 1)) u_{k−1}.
 *
 * Left tails. The Hastings–McLeod function is q(−x) = √(x/2) Σ a_k x^{−3k} (recursion from q″ = s q + 2 q³), and
 *
 *   log F2(−x) = −x³/12 − (log x)/8 + (log 2)/24 + ζ′(−1) + Σ_{k≥1} b_k x^{−3k},  3k (3k + 1) b_k = −½ [x^{−3(k+1)}] (Σ a_j x^{−3j})²,
 *   μ(−x) = ½ log 2 + Σ (a_k/√2) x^{3/2−3k} / (3/2 − 3k),  log F1 = ½ (log F2 − μ),  log F4 = ½ log F2 + log cosh(μ/2).
 *
 * P. Deift, A. Its, I. Krasovsky, Commun. Math. Phys. 278 (2008) 643; J. Baik, R. Buckingham, J. DiFranco, Commun. Math.
 * Phys. 280 (2008) 463.
 */
import { addFractions, divideFractions, type Fraction, fraction, multiplyFractions } from "./rational.ts";

/** prefactor · e^{−κζ(s)} s^{−power} Σ c_k s^{−3k/2}, the prefactor being factor / π^{piPower/2}. */
export interface TailSeries {
  /** κ of e^{−κζ}. */
  readonly kappa: number;
  readonly power: Fraction;
  /** Rational part of the prefactor, so that c_0 = 1. */
  readonly factor: Fraction;
  /** 1 for 1/√π, 2 for 1/π. */
  readonly piPower: number;
  /** c_0, c_1, …, exact. */
  readonly coefficients: readonly Fraction[];
}

const ZERO = fraction(0n);

/** e^{−κζ} s^{−power} Σ c_k z^k without normalization. */
interface Series {
  readonly kappa: number;
  readonly power: Fraction;
  readonly piPower: number;
  readonly terms: readonly Fraction[];
}

/** Ai(s). */
function airySeries(count: number): Series {
  const terms: Fraction[] = [];
  let u = fraction(1n);
  for (let k = 0n; k < BigInt(count); k++) {
    if (k > 0n)
      u = multiplyFractions(
        u,
        fraction((6n * k - 5n) * (6n * k - 3n) * (6n * k - 1n), 216n * k * (2n * k - 1n)),
      );
    // ζ^{−k} = (3/2)^k z^k; ½ from the prefactor 1/(2√π).
    terms.push(multiplyFractions(u, fraction((k % 2n === 0n ? 1n : -1n) * 3n ** k, 2n ** (k + 1n))));
  }
  return { kappa: 1, power: fraction(1n, 4n), piPower: 1, terms };
}

/** ∫_s^∞ of a series. */
function integrated({ kappa, power, piPower, terms }: Series): Series {
  const out: Fraction[] = [];
  const next = addFractions(power, fraction(1n, 2n));
  terms.forEach((a, k) => {
    let right = a;
    if (k > 0) {
      const factor = addFractions(next, fraction(3n * BigInt(k - 1), 2n));
      right = addFractions(a, multiplyFractions(fraction(-1n), multiplyFractions(factor, out[k - 1])));
    }
    out.push(divideFractions(right, fraction(BigInt(kappa))));
  });
  return { kappa, power: next, piPower, terms: out };
}

function product(a: Series, b: Series): Series {
  const terms = a.terms.map((_, k) => {
    let sum = ZERO;
    for (let i = 0; i <= k; i++) sum = addFractions(sum, multiplyFractions(a.terms[i], b.terms[k - i]));
    return sum;
  });
  return {
    kappa: a.kappa + b.kappa,
    power: addFractions(a.power, b.power),
    piPower: a.piPower + b.piPower,
    terms,
  };
}

function normalized({ kappa, power, piPower, terms }: Series, scale: Fraction): TailSeries {
  const factor = multiplyFractions(terms[0], scale);
  return { kappa, power, piPower, factor, coefficients: terms.map((c) => divideFractions(c, terms[0])) };
}

/**
 * The right tail of a law, `count` terms.
 *
 * @param beta - 1, 2 or 4 (unscaled).
 * @param what - 1 − F or F′.
 */
export function rightTailSeries(beta: 1 | 2 | 4, what: "survival" | "density", count: number): TailSeries {
  const ai = airySeries(count);
  if (beta === 1) return normalized(what === "density" ? ai : integrated(ai), fraction(1n, 2n));
  if (beta === 2) {
    const density = integrated(product(ai, ai));
    return normalized(what === "density" ? density : integrated(density), fraction(1n));
  }
  // ∫ (x − s)^n f / n! is the (n + 1)-fold integral.
  const density = integrated(integrated(product(ai, integrated(integrated(ai)))));
  return normalized(what === "density" ? density : integrated(density), fraction(1n, 4n));
}

/** Coefficients of the left tails. */
export interface LeftTailSeries {
  /** a_0 = 1, a_1 = −1/8, …: q(−x) = √(x/2) Σ a_k x^{−3k}. */
  readonly painleve: readonly Fraction[];
  /** b_0 = 0, b_1 = 3/64, …: the corrections in log F2(−x). */
  readonly logarithm: readonly Fraction[];
}

/** The left tails, a_0 … a_count and b_0 … b_{count − 1}. */
export function leftTailSeries(count: number): LeftTailSeries {
  const a = [fraction(1n)];
  const sumOfProducts = (p: readonly Fraction[], q: readonly Fraction[], total: number): Fraction => {
    let sum = ZERO;
    for (let i = 0; i <= total; i++)
      if (i < p.length && total - i < q.length)
        sum = addFractions(sum, multiplyFractions(p[i], q[total - i]));
    return sum;
  };
  for (let m = 1; m <= count; m++) {
    // [x^{−3m}] of the cube without the three products that hold a_m: a is known up to m − 1.
    const squares = Array.from({ length: m + 1 }, (_, k) => sumOfProducts(a, a, k));
    const cube = sumOfProducts(squares, a, m);
    const n = BigInt(3 * (m - 1));
    const linear = multiplyFractions(fraction(4n * n * n - 1n, 4n), a[m - 1]);
    a.push(multiplyFractions(fraction(1n, 2n), addFractions(linear, multiplyFractions(fraction(-1n), cube))));
  }
  const b = [ZERO];
  for (let k = 1; k < count; k++) {
    const n = BigInt(3 * k);
    b.push(multiplyFractions(sumOfProducts(a, a, k + 1), fraction(-1n, 2n * n * (n + 1n))));
  }
  return { painleve: a, logarithm: b };
}
