/**
 * Antiderivatives of Chebyshev expansions: ∫ T_k = T_{k+1}/(2(k + 1)) − T_{k−1}/(2(k − 1)) (C. W. Clenshaw,
 * A. R. Curtis, Numer. Math. 2 (1960) 197).
 */

/**
 * Coefficients of an antiderivative on an interval, one degree higher, with constant term 0.
 *
 * @param c - Coefficients of Σ c_k T_k(t).
 * @param half - Half the length of the interval: dx = half · dt.
 */
export function antiderivative(c: Float64Array, half: number): Float64Array {
  const n = c.length;
  const out = new Float64Array(n + 1);
  for (let k = 1; k <= n; k++) {
    const before = k === 1 ? 2 * c[0] : c[k - 1];
    const after = k + 1 < n ? c[k + 1] : 0;
    out[k] = (half * (before - after)) / (2 * k);
  }
  return out;
}

/** Value at the right end, t = 1. */
export function atRight(c: Float64Array): number {
  let sum = 0;
  for (let k = c.length - 1; k >= 0; k--) sum += c[k];
  return sum;
}

/** Value at the left end, t = −1. */
export function atLeft(c: Float64Array): number {
  let sum = 0;
  for (let k = c.length - 1; k >= 0; k--) sum += k % 2 === 0 ? c[k] : -c[k];
  return sum;
}
