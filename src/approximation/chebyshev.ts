/**
 * Chebyshev expansions on an interval: interpolation from samples at Chebyshev points, evaluation by Clenshaw's
 * recurrence (C. W. Clenshaw, Math. Tables Aids Comput. 9 (1955) 118), and where to cut the coefficients.
 */

/** Chebyshev points of the first kind on [lower, upper], in increasing order. */
export function chebyshevPoints(count: number, lower: number, upper: number): Float64Array {
  const points = new Float64Array(count);
  const middle = 0.5 * (lower + upper);
  const half = 0.5 * (upper - lower);
  for (let i = 0; i < count; i++) points[i] = middle - half * Math.cos((Math.PI * (i + 0.5)) / count);
  return points;
}

/**
 * Coefficients c of Σ_k c_k T_k(t), t = (2x − lower − upper)/(upper − lower), through samples at
 * {@link chebyshevPoints}: c_k = (2/n) Σ_i f_i cos(kθ_i), half of that for k = 0.
 *
 * @param samples - Values at the points, in the order of the points.
 * @param degree - Highest degree kept, below the number of samples: the rest is dropped, which averages noise out.
 */
export function chebyshevCoefficients(samples: Float64Array, degree: number): Float64Array {
  const n = samples.length;
  const coefficients = new Float64Array(degree + 1);
  for (let k = 0; k <= degree; k++) {
    let sum = 0;
    let carry = 0; // compensated: the coefficients are what later digits rest on
    for (let i = 0; i < n; i++) {
      // The i-th point from the right has angle θ = π (i + ½)/n.
      const term = samples[n - 1 - i] * Math.cos((Math.PI * ((k * (2 * i + 1)) % (4 * n))) / (2 * n)) - carry;
      const next = sum + term;
      carry = next - sum - term;
      sum = next;
    }
    coefficients[k] = ((k === 0 ? 1 : 2) / n) * sum;
  }
  return coefficients;
}

/**
 * Σ_k c_k T_k(t) with coefficients c[from] … c[from + degree], −1 ≤ t ≤ 1.
 */
export function clenshaw(c: Float64Array, from: number, degree: number, t: number): number {
  const twice = 2 * t;
  let b1 = 0;
  let b2 = 0;
  for (let k = from + degree; k > from; k--) {
    const b0 = twice * b1 - b2 + c[k];
    b2 = b1;
    b1 = b0;
  }
  return t * b1 - b2 + c[from];
}
