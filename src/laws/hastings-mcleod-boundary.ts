/**
 * The boundary value problem of the Hastings–McLeod function, q'' = s q + 2 q³ with q given at both ends, on panels.
 *
 * On a panel of half-length h the unknown is v = q'' at the Chebyshev points; q = (chord through the end values) +
 * h² G v, G the inverse of the second derivative with zero ends: collocation of the integrated equation, free of the
 * large condition numbers of differentiation (L. Greengard, SIAM J. Numer. Anal. 28 (1991) 1071). Newton's step solves
 * every panel by itself, for its residual and for a unit change of either end value; continuity of q' leaves a
 * tridiagonal system for the values at the breaks.
 *
 * Why panels: the cost is linear in their number, and each keeps its own scale, so that q has relative accuracy where
 * it is exponentially small. s + 6q² > 0 on the whole line, so the tridiagonal matrix needs no pivoting.
 */
import { chebyshevCoefficients, chebyshevPoints, clenshaw } from "../approximation/chebyshev.ts";
import { antiderivative, atLeft, atRight } from "../approximation/chebyshev-calculus.ts";

/** The operators of the reference interval [−1, 1] with n Chebyshev points. */
interface Reference {
  readonly points: Float64Array;
  /** G, row-major n × n: values of v to values of u, u'' = v, u(±1) = 0. */
  readonly inverse: Float64Array;
  /** u'(−1) and u'(1) as linear forms of v. */
  readonly leftSlope: Float64Array;
  readonly rightSlope: Float64Array;
}

/** How a panel answers: δv = own + left · δq(left end) + right · δq(right end). */
interface Response {
  readonly own: Float64Array;
  readonly left: Float64Array;
  readonly right: Float64Array;
}

const MOST_STEPS = 30;
// Newton squares the relative size of its step: below this one more step is below rounding.
const LAST_STEP = 1e-9;

/**
 * Values of q at the n Chebyshev points of every panel.
 *
 * @param breaks - Ends of the P panels, increasing, length P + 1.
 * @param guess - Approximate q at the breaks, exact at the first and the last.
 * @param n - Points a panel.
 *
 * **Cost.** O(P n³) a Newton step, about six steps.
 */
export function solvePanels(breaks: readonly number[], guess: Float64Array, n: number): Float64Array[] {
  const reference = referenceInterval(n);
  const panels = breaks.length - 1;
  const ends = guess.slice();
  const v = Array.from({ length: panels }, () => new Float64Array(n));
  const q = Array.from({ length: panels }, () => new Float64Array(n));
  const augmented = new Float64Array(n * (n + 3));
  const evaluate = (): void => {
    for (let p = 0; p < panels; p++) panelValues(reference, breaks, p, v[p], ends[p], ends[p + 1], q[p]);
  };
  evaluate();
  for (let step = 0; step < MOST_STEPS; step++) {
    const responses = q.map((values, p) => respond(reference, breaks, p, values, v[p], augmented));
    const change = matchSlopes(reference, breaks, ends, v, responses);
    const before = q.map((values) => values.slice());
    for (let p = 0; p < panels; p++) {
      const { own, left, right } = responses[p];
      for (let i = 0; i < n; i++) v[p][i] += own[i] + left[i] * change[p] + right[i] * change[p + 1];
    }
    for (let b = 0; b <= panels; b++) ends[b] += change[b];
    evaluate();
    if (q.every((values, p) => relativeChange(before[p], values) < LAST_STEP)) break;
  }
  return q;
}

function referenceInterval(n: number): Reference {
  const points = chebyshevPoints(n, -1, 1);
  const inverse = new Float64Array(n * n);
  const leftSlope = new Float64Array(n);
  const rightSlope = new Float64Array(n);
  const unit = new Float64Array(n);
  for (let j = 0; j < n; j++) {
    unit[j] = 1;
    const first = antiderivative(chebyshevCoefficients(unit, n - 1), 1);
    unit[j] = 0;
    const second = antiderivative(first, 1);
    const left = atLeft(second);
    const chord = 0.5 * (atRight(second) - left);
    for (let i = 0; i < n; i++) {
      inverse[i * n + j] = clenshaw(second, 0, n + 1, points[i]) - left - chord * (points[i] + 1);
    }
    leftSlope[j] = atLeft(first) - chord;
    rightSlope[j] = atRight(first) - chord;
  }
  return { points, inverse, leftSlope, rightSlope };
}

function halfLength(breaks: readonly number[], p: number): number {
  return 0.5 * (breaks[p + 1] - breaks[p]);
}

/** q = chord + h² G v into `out`. */
function panelValues(
  reference: Reference,
  breaks: readonly number[],
  p: number,
  v: Float64Array,
  left: number,
  right: number,
  out: Float64Array,
): void {
  const n = v.length;
  const square = halfLength(breaks, p) ** 2;
  for (let i = 0; i < n; i++) {
    let sum = 0;
    for (let j = 0; j < n; j++) sum += reference.inverse[i * n + j] * v[j];
    const t = reference.points[i];
    out[i] = 0.5 * ((1 - t) * left + (1 + t) * right) + square * sum;
  }
}

/** Linearised problem of one panel: (I − h² D G) δv = −(v − s q − 2q³) + D δchord, D = diag(s + 6q²). */
function respond(
  reference: Reference,
  breaks: readonly number[],
  p: number,
  q: Float64Array,
  v: Float64Array,
  augmented: Float64Array,
): Response {
  const n = q.length;
  const stride = n + 3;
  const half = halfLength(breaks, p);
  const middle = 0.5 * (breaks[p] + breaks[p + 1]);
  for (let i = 0; i < n; i++) {
    const t = reference.points[i];
    const s = middle + half * t;
    const d = s + 6 * q[i] * q[i];
    const scale = -half * half * d;
    const row = i * stride;
    for (let j = 0; j < n; j++) augmented[row + j] = scale * reference.inverse[i * n + j];
    augmented[row + i] += 1;
    augmented[row + n] = q[i] * (s + 2 * q[i] * q[i]) - v[i];
    augmented[row + n + 1] = 0.5 * d * (1 - t);
    augmented[row + n + 2] = 0.5 * d * (1 + t);
  }
  solveInPlace(augmented, n, stride);
  const column = (k: number): Float64Array =>
    Float64Array.from({ length: n }, (_, i) => augmented[i * stride + n + k]);
  return { own: column(0), left: column(1), right: column(2) };
}

/**
 * Solves for the columns beyond n of an n × stride row-major array. No exchanges: −G is positive, D too, so that the
 * eigenvalues of I − h² D G are at least 1; and Newton's next residual corrects what rounding leaves. (Thousands of
 * small arrays are what makes a matrix object slow here.)
 */
function solveInPlace(augmented: Float64Array, n: number, stride: number): void {
  for (let k = 0; k < n; k++) {
    const pivotRow = k * stride;
    const inverse = 1 / augmented[pivotRow + k];
    for (let i = k + 1; i < n; i++) {
      const row = i * stride;
      const factor = augmented[row + k] * inverse;
      for (let j = k + 1; j < stride; j++) augmented[row + j] -= factor * augmented[pivotRow + j];
    }
  }
  for (let c = n; c < stride; c++) {
    for (let i = n - 1; i >= 0; i--) {
      const row = i * stride;
      let sum = augmented[row + c];
      for (let j = i + 1; j < n; j++) sum -= augmented[row + j] * augmented[j * stride + c];
      augmented[row + c] = sum / augmented[row + i];
    }
  }
}

/** Changes of the values at the breaks that make q' continuous; zero at both ends. */
function matchSlopes(
  reference: Reference,
  breaks: readonly number[],
  ends: Float64Array,
  v: readonly Float64Array[],
  responses: readonly Response[],
): Float64Array {
  const { leftSlope, rightSlope } = reference;
  const panels = responses.length;
  const change = new Float64Array(panels + 1);
  // Forward elimination of lower δ_{b−1} + diagonal δ_b + upper δ_{b+1} = value, b = 1 … P − 1.
  const ratio = new Float64Array(panels + 1);
  for (let b = 1; b < panels; b++) {
    const h = halfLength(breaks, b - 1);
    const k = halfLength(breaks, b);
    const before = responses[b - 1];
    const after = responses[b];
    // q'(b−) = (q_b − q_{b−1})/(2h) + h (right form of v), q'(b+) = (q_{b+1} − q_b)/(2k) + k (left form of v).
    const jump =
      (ends[b] - ends[b - 1]) / (2 * h) +
      h * (dot(rightSlope, v[b - 1]) + dot(rightSlope, before.own)) -
      (ends[b + 1] - ends[b]) / (2 * k) -
      k * (dot(leftSlope, v[b]) + dot(leftSlope, after.own));
    const lower = -1 / (2 * h) + h * dot(rightSlope, before.left);
    const diagonal =
      1 / (2 * h) + h * dot(rightSlope, before.right) + 1 / (2 * k) - k * dot(leftSlope, after.left);
    const upper = -1 / (2 * k) - k * dot(leftSlope, after.right);
    const pivot = diagonal - lower * ratio[b - 1];
    ratio[b] = upper / pivot;
    change[b] = (-jump - lower * change[b - 1]) / pivot;
  }
  for (let b = panels - 1; b > 0; b--) change[b] -= ratio[b] * change[b + 1];
  return change;
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i] * b[i];
  return sum;
}

/** Largest change over largest value. */
function relativeChange(before: Float64Array, after: Float64Array): number {
  let change = 0;
  let size = 0;
  for (let i = 0; i < after.length; i++) {
    change = Math.max(change, Math.abs(after[i] - before[i]));
    size = Math.max(size, Math.abs(after[i]));
  }
  return change / size;
}
