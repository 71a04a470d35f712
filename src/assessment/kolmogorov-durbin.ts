/**
 * The exact Kolmogorov distribution by Durbin's matrix (J. Durbin, 1968; G. Marsaglia, W. W. Tsang, J. Wang, J. Stat.
 * Softw. 8 (2003) 18). Powers of two are taken out on the way, so that nothing overflows or underflows.
 */

/**
 * P(D_n < d) = n! n^{−n} (H^n)_{kk}, with k = ⌈nd⌉, h = k − nd and Durbin's matrix H of order 2k − 1.
 *
 * Cost: about 8 (nd)³ log₂ n. Absolute error below 1e-13 + 1e-15 n.
 */
export function durbinCdf(n: number, d: number): number {
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
