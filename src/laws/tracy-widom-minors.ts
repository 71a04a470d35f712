/**
 * Minors of the Airy sum kernel, for the β = 4 law in its right tail.
 *
 * ½ (det(I − V) + det(I + V)) = 1 + e₂ + e₄ + e₆ + …, e_k = sum over the k × k minors of V. e₂ has a closed form
 * without cancellation (`tracy-widom-far.ts`); here come e₄ + e₆ + e₈, by Newton's identities from the power sums
 * t_j = tr V^j: k e_k = Σ_{j=1}^k (−1)^{j−1} e_{k−j} t_j. These are 1e-5 of e₂ and less right of s = −1, so that
 * their own cancellation does not show.
 */
import { gaussLegendreShared } from "../quadrature/gauss-legendre.ts";
import { airyAi } from "../special/airy.ts";

/** e₄ + e₆ + e₈ at s, its derivative, and what rounding may have done to both. */
export interface HigherMinors {
  readonly value: number;
  readonly derivative: number;
  readonly error: number;
  readonly order: number;
}

const ORDER = 40;
const MOST = 8;

/**
 * e₄ + e₆ + e₈ of V on (s, ∞) and the derivative in s, from t_j' = −j V^j(s, s).
 */
export function fourthMinors(s: number): HigherMinors {
  const { nodes, weights } = gaussLegendreShared(ORDER);
  // Ai((x + y)/2)² has fallen below 1e-20 once the mean argument passes 10.6.
  const half = 0.5 * Math.max(2 * (10.6 - s), 4);
  const n = ORDER;
  const x = Float64Array.from(nodes, (t) => s + half * (1 + t));
  const root = Float64Array.from(weights, (w) => Math.sqrt(half * w));
  const v = new Float64Array(n * n);
  const column = new Float64Array(n); // √w_i V(x_i, s)
  for (let i = 0; i < n; i++) {
    column[i] = 0.5 * root[i] * airyAi(0.5 * (x[i] + s));
    for (let j = 0; j <= i; j++) {
      const value = 0.5 * root[i] * root[j] * airyAi(0.5 * (x[i] + x[j]));
      v[i * n + j] = value;
      v[j * n + i] = value;
    }
  }
  const traces = powerSums(v, n);
  const corner = cornerPowers(v, column, n, 0.5 * airyAi(s));
  const e = [1];
  const slope = [0];
  for (let k = 1; k <= MOST; k++) {
    let sum = 0;
    let sumSlope = 0;
    for (let j = 1; j <= k; j++) {
      const sign = j % 2 === 1 ? 1 : -1;
      sum += sign * e[k - j] * traces[j];
      sumSlope += sign * (slope[k - j] * traces[j] - e[k - j] * j * corner[j]);
    }
    e.push(sum / k);
    slope.push(sumSlope / k);
  }
  return {
    value: e[4] + e[6] + e[8],
    derivative: slope[4] + slope[6] + slope[8],
    error: 2 ** -51 * traces[1] ** 4,
    order: ORDER,
  };
}

/** t_1 … t_8: t_{2k} = ‖V^k‖², t_{2k+1} = ⟨V^k, V^{k+1}⟩. */
function powerSums(v: Float64Array, n: number): number[] {
  const inner = (p: Float64Array, q: Float64Array): number => {
    let sum = 0;
    for (let i = 0; i < n * n; i++) sum += p[i] * q[i];
    return sum;
  };
  const powers = [v];
  for (let k = 1; k < MOST / 2; k++) powers.push(multiply(powers[k - 1], v, n));
  const t = [n, 0];
  for (let i = 0; i < n; i++) t[1] += v[i * n + i];
  for (let j = 2; j <= MOST; j++) t.push(inner(powers[(j >> 1) - 1], powers[((j + 1) >> 1) - 1]));
  return t;
}

function multiply(p: Float64Array, q: Float64Array, n: number): Float64Array {
  const out = new Float64Array(n * n);
  for (let i = 0; i < n; i++) {
    for (let k = 0; k < n; k++) {
      const f = p[i * n + k];
      for (let j = 0; j < n; j++) out[i * n + j] += f * q[k * n + j];
    }
  }
  return out;
}

/** V^j(s, s) for j = 1 … 8. */
function cornerPowers(v: Float64Array, column: Float64Array, n: number, first: number): number[] {
  const out = [1, first];
  let current = column;
  for (let j = 2; j <= MOST; j++) {
    let sum = 0;
    for (let i = 0; i < n; i++) sum += column[i] * current[i];
    out.push(sum);
    const next = new Float64Array(n);
    for (let i = 0; i < n; i++) for (let k = 0; k < n; k++) next[i] += v[i * n + k] * current[k];
    current = next;
  }
  return out;
}
