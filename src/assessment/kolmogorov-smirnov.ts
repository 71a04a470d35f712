/**
 * Kolmogorov–Smirnov distance between a sample and a fully specified continuous law, and its p-value.
 *
 * P(D_n ≥ d), x = √n d:
 * - x² ≥ 6: twice Smirnov's one-sided sum (N. V. Smirnov, 1944; Z. W. Birnbaum, F. H. Tingey, Ann. Math. Statist. 22
 *   (1951) 592), all terms positive; what is left out is of relative size e^{−6x²} < 1e-15;
 * - n ≤ 2000: Durbin's matrix formula (J. Durbin, 1968; G. Marsaglia, W. W. Tsang, J. Wang, J. Stat. Softw. 8 (2003) 18);
 * - beyond: the limit law at the argument x + 1/(6√n) + (x − 1)/(4n) (J. Vrbik, Pioneer J. Theor. Appl. Statist. 15
 *   (2018) 15; from memory, tested against exact values), absolute error below 2 n^(−3/2).
 */
import { requireBetween, requireInteger } from "../core/check.ts";

/** Probability with its absolute error. */
export interface Probability {
  readonly value: number;
  readonly error: number;
}

const MOST_EXACT = 2000;

/**
 * P(D_n ≥ d) for n independent observations of the law itself.
 *
 * @param n - Number of observations, 1 to 1e9.
 * @param d - Distance, strictly between 0 and 1.
 */
export function kolmogorovSurvival(n: number, d: number): Probability {
  requireInteger("n", n, 1, 1e9);
  requireBetween("d", d, 0, 1);
  const square = n * d * d;
  if (n * d <= 0.5) return { value: 1, error: 0 };
  if (square >= 6 && n <= 1e6) {
    const value = Math.min(1, 2 * smirnovSurvival(n, d));
    return { value, error: value * (4e-15 * n + 1e-12) };
  }
  if (n <= MOST_EXACT) {
    const value = Math.max(0, 1 - durbinCdf(n, d));
    return { value, error: 1e-13 + 1e-15 * n };
  }
  const root = Math.sqrt(n);
  const x = root * d;
  const value = limitSurvival(x + 1 / (6 * root) + (x - 1) / (4 * n));
  return { value, error: Math.min(value, 2 * n ** -1.5) };
}

/** P(D_n⁺ ≥ d) = d Σ_{j ≤ n(1−d)} C(n, j) (d + j/n)^{j−1} (1 − d − j/n)^{n−j}. */
function smirnovSurvival(n: number, d: number): number {
  let sum = 0;
  let logBinomial = 0;
  const last = Math.floor(n * (1 - d));
  for (let j = 0; j <= last; j++) {
    if (j > 0) logBinomial += Math.log((n - j + 1) / j);
    const down = 1 - d - j / n;
    if (down <= 0) {
      if (j === n) sum += Math.exp(logBinomial + (j - 1) * Math.log(d + j / n));
      continue;
    }
    sum += Math.exp(logBinomial + (j - 1) * Math.log(d + j / n) + (n - j) * Math.log(down));
  }
  return d * sum;
}

/** P(D_n < d) = n! n^{−n} (H^n)_{kk}, with k = ⌈nd⌉, h = k − nd and Durbin's matrix H of order 2k − 1. */
function durbinCdf(n: number, d: number): number {
  const k = Math.ceil(n * d);
  const h = k - n * d;
  const m = 2 * k - 1;
  const matrix = new Float64Array(m * m);
  for (let i = 0; i < m; i++) for (let j = 0; j < Math.min(m, i + 2); j++) matrix[i * m + j] = 1;
  for (let i = 0; i < m; i++) {
    matrix[i * m] -= h ** (i + 1);
    matrix[(m - 1) * m + i] -= h ** (m - i);
  }
  if (2 * h - 1 > 0) matrix[(m - 1) * m] += (2 * h - 1) ** m;
  for (let i = 0; i < m; i++) {
    for (let j = 0; j < Math.min(m, i + 2); j++) for (let g = 2; g <= i - j + 1; g++) matrix[i * m + j] /= g;
  }
  const { entry, exponent } = powerCorner(matrix, m, n, k - 1);
  let result = entry;
  let shift = exponent;
  for (let i = 1; i <= n; i++) {
    result *= i / n;
    if (result < 2 ** -400) {
      result *= 2 ** 400;
      shift -= 400;
    }
  }
  return result * 2 ** shift;
}

/** Entry (c, c) of the n-th power, as entry · 2^exponent. */
function powerCorner(
  base: Float64Array,
  m: number,
  n: number,
  c: number,
): { entry: number; exponent: number } {
  // The row e_cᵀ H^n by repeated squaring of H: only a row is carried along.
  let row = new Float64Array(m);
  row[c] = 1;
  let rowExponent = 0;
  let square = base;
  let exponent = 0;
  for (let left = n; left > 0; left >>= 1) {
    if (left & 1) {
      const next = new Float64Array(m);
      for (let i = 0; i < m; i++) for (let j = 0; j < m; j++) next[j] += row[i] * square[i * m + j];
      row = next;
      rowExponent += exponent + rescale(row);
    }
    if (left > 1) {
      square = multiply(square, m);
      exponent = 2 * exponent + rescale(square);
    }
  }
  return { entry: row[c], exponent: rowExponent };
}

function multiply(a: Float64Array, m: number): Float64Array {
  const out = new Float64Array(m * m);
  for (let i = 0; i < m; i++) {
    for (let k = 0; k < m; k++) {
      const f = a[i * m + k];
      for (let j = 0; j < m; j++) out[i * m + j] += f * a[k * m + j];
    }
  }
  return out;
}

/** Divides by a power of two so that the largest entry is about 1; returns the exponent. */
function rescale(values: Float64Array): number {
  let most = 0;
  for (const value of values) most = Math.max(most, Math.abs(value));
  if (most === 0) return 0;
  const exponent = Math.ceil(Math.log2(most));
  const factor = 2 ** -exponent;
  for (let i = 0; i < values.length; i++) values[i] *= factor;
  return exponent;
}

/** 2 Σ_{k≥1} (−1)^{k−1} e^{−2k²x²}, by its theta transform for small x (A. N. Kolmogorov, 1933). */
function limitSurvival(x: number): number {
  if (x < 1) {
    let sum = 0;
    for (let k = 1; k <= 9; k += 2) sum += Math.exp((-k * k * Math.PI * Math.PI) / (8 * x * x));
    return 1 - (Math.sqrt(2 * Math.PI) / x) * sum;
  }
  let sum = 0;
  for (let k = 1; k <= 6; k++) sum += (k % 2 === 1 ? 1 : -1) * Math.exp(-2 * k * k * x * x);
  return 2 * sum;
}
