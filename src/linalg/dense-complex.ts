/**
 * Complex log-determinant by LU with partial pivoting, real and imaginary parts in separate arrays.
 */

/** log |det| and the argument of det in (−π, π], with the smallest |pivot|. */
export interface ComplexLogDeterminant {
  readonly logAbs: number;
  readonly argument: number;
  readonly smallestPivot: number;
}

/**
 * Eliminates an n × n complex matrix in place.
 *
 * @param re - Real parts, row-major with row length `stride`; overwritten.
 * @param im - Imaginary parts; overwritten.
 * @param n - Order.
 * @param stride - Row length of the storage; a power of two is better avoided (cache sets).
 * @returns log |det| (−∞ for a singular matrix) and arg det.
 *
 * Cost: 4 n³/3 real multiply–adds, no allocation.
 */
export function eliminateDenseComplex(
  re: Float64Array,
  im: Float64Array,
  n: number,
  stride: number,
): ComplexLogDeterminant {
  let logAbs = 0;
  let argument = 0;
  let smallestPivot = Number.POSITIVE_INFINITY;
  for (let q = 0; q < n; q++) {
    const rowQ = q * stride;
    let best = q;
    let size = -1;
    for (let i = q; i < n; i++) {
      const x = re[i * stride + q];
      const y = im[i * stride + q];
      const s = x * x + y * y;
      if (s > size) {
        size = s;
        best = i;
      }
    }
    if (best !== q) {
      exchangeRows(re, rowQ, best * stride, q, n);
      exchangeRows(im, rowQ, best * stride, q, n);
      argument += Math.PI;
    }
    const pr = re[rowQ + q];
    const pi = im[rowQ + q];
    const modulus = Math.hypot(pr, pi);
    logAbs += Math.log(modulus);
    argument += Math.atan2(pi, pr);
    smallestPivot = Math.min(smallestPivot, modulus);
    if (modulus === 0) continue;
    const ir = pr / modulus / modulus;
    const ii = -pi / modulus / modulus;
    for (let i = q + 1; i < n; i++) {
      const row = i * stride;
      const ar = re[row + q];
      const ai = im[row + q];
      if (ar === 0 && ai === 0) continue;
      const fr = ar * ir - ai * ii;
      const fi = ar * ii + ai * ir;
      for (let j = q + 1; j < n; j++) {
        const ur = re[rowQ + j];
        const ui = im[rowQ + j];
        re[row + j] -= fr * ur - fi * ui;
        im[row + j] -= fr * ui + fi * ur;
      }
    }
  }
  return { logAbs, argument: Math.atan2(Math.sin(argument), Math.cos(argument)), smallestPivot };
}

function exchangeRows(values: Float64Array, p: number, q: number, from: number, to: number): void {
  for (let j = from; j < to; j++) {
    const kept = values[p + j];
    values[p + j] = values[q + j];
    values[q + j] = kept;
  }
}
