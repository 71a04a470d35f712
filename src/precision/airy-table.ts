/**
 * Ai and its integral on an interval, for many points: centres one unit apart, the equation w″ = x w gives the
 * coefficients there, a_{k+2} = (c a_k + a_{k−1})/((k + 1)(k + 2)) (DLMF 9.4), and from centre to centre the series is
 * continued from right to left, in which direction Ai does not decay and errors do not grow beside it.
 */
import { airyPairFixed } from "./airy-fixed.ts";
import { multiply } from "./fixed-point.ts";

/** Taylor coefficients of Ai and of ∫_x^∞ Ai at points of an interval, `order` + 1 of each within 2 units. */
export interface AiryTable {
  /** Ai(x), Ai′(x), Ai″(x)/2, …. */
  ai(x: bigint): bigint[];
  /** ∫_x^∞ Ai; its further coefficients are −Ai(x), −Ai′(x)/2, …. */
  integral(x: bigint): bigint;
}

/** The table for points of [lower, upper]. */
export function airyTable(bits: bigint, lower: number, upper: number, order: number): AiryTable {
  // The centres include 0, where the integral is known.
  const first = Math.min(0, Math.floor(lower) - 1);
  const last = Math.max(0, Math.ceil(upper) + 1);
  // An error at the right end grows as Ai does on the way to the left: by e^ζ, ζ = (2/3) x^{3/2}.
  const guard = BigInt(24 + Math.ceil((2 / 3) * Math.max(0, last) ** 1.5 * Math.LOG2E));
  const inner = bits + guard;
  const rows: bigint[][] = [];
  let pair = airyPairFixed(BigInt(last) << inner, inner);
  for (let c = last; c >= first; c--) {
    rows[c - first] = coefficients(c, pair, order);
    pair = [
      evaluate(rows[c - first], -1n << inner, 0, inner),
      evaluate(rows[c - first], -1n << inner, 1, inner),
    ];
  }
  const locate = (x: bigint): readonly [number, bigint] => {
    const at = x << guard;
    const index = Number((at + (1n << (inner - 1n))) >> inner) - first;
    return [index, at - (BigInt(first + index) << inner)];
  };
  let integrals: readonly bigint[][] | undefined;
  return {
    ai(x) {
      const [index, t] = locate(x);
      const out: bigint[] = [];
      for (let k = 0; k <= order; k++) out.push(evaluate(rows[index], t, k, inner) >> guard);
      return out;
    },
    integral(x) {
      integrals ??= integralRows(rows, first, inner);
      const [index, t] = locate(x);
      return evaluate(integrals[index], t, 0, inner) >> guard;
    },
  };
}

/** Coefficients of ∫_x^∞ Ai at the centres, from its value ⅓ at 0 outwards. The centres must reach 0. */
function integralRows(rows: readonly (readonly bigint[])[], first: number, bits: bigint): bigint[][] {
  const out: bigint[][] = rows.map((a) => [0n, ...a.map((c, k) => -c / BigInt(k + 1))]);
  const zero = -first;
  out[zero][0] = (1n << bits) / 3n;
  for (let j = zero; j > 0; j--) out[j - 1][0] = evaluate(out[j], -1n << bits, 0, bits);
  for (let j = zero; j + 1 < out.length; j++) out[j + 1][0] = evaluate(out[j], 1n << bits, 0, bits);
  return out;
}

/** Taylor coefficients at the integer c until |t| = 1 adds nothing, and `order` more. */
function coefficients(c: number, pair: readonly [bigint, bigint], order: number): bigint[] {
  const a = [pair[0], pair[1], (BigInt(c) * pair[0]) >> 1n];
  const centre = BigInt(c);
  for (let k = 1; ; k++) {
    a.push((centre * a[k] + a[k - 1]) / BigInt((k + 1) * (k + 2)));
    const m = a.length - 1;
    if (m > order + 3 && isTiny(a[m]) && isTiny(a[m - 1]) && isTiny(a[m - 2]) && k * k > 4 * Math.abs(c))
      break;
  }
  return a;
}

function isTiny(x: bigint): boolean {
  return x < 16n && x > -16n;
}

/** Σ_j binomial(j, k) a_j t^{j−k}. */
function evaluate(a: readonly bigint[], t: bigint, k: number, bits: bigint): bigint {
  let sum = 0n;
  if (k === 0) {
    for (let j = a.length - 1; j >= 0; j--) sum = multiply(sum, t, bits) + a[j];
    return sum;
  }
  for (let j = a.length - 1; j >= k; j--) sum = multiply(sum, t, bits) + binomial(j, k) * a[j];
  return sum;
}

const pascal: bigint[][] = [[1n]];

function binomial(n: number, k: number): bigint {
  while (pascal.length <= n) {
    const row = pascal[pascal.length - 1];
    pascal.push([1n, ...row.map((x, i) => x + (row[i + 1] ?? 0n))]);
  }
  return pascal[n][k] ?? 0n;
}
