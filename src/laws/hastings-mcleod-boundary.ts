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
 * it is exponentially small. s + 6q² > 0 on the whole line, so neither system needs exchanges.
 */
import { chebyshevPoints, clenshaw } from "../approximation/chebyshev.ts";
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

interface Panel {
  readonly middle: number;
  readonly half: number;
  readonly v: Float64Array;
  readonly q: Float64Array;
  /** Answer of the panel: δv = own + left · δq(left end) + right · δq(right end). */
  readonly own: Float64Array;
  readonly left: Float64Array;
  readonly right: Float64Array;
}

// Few points first: they bring the steps with all points down to one or two.
const FIRST_POINTS = 10;
const MOST_STEPS = 30;
// Newton squares the relative size of its step: after such a step nothing is left to do.
const LAST_STEP = 1e-8;

/**
 * Values of q at the Chebyshev points of every panel.
 *
 * @param breaks - Ends of the P panels, increasing, length P + 1.
 * @param guess - Approximate q at the breaks, exact at the first and the last.
 * @param n - Points a panel, n > 10.
 *
 * **Cost.** O(P n³), twice.
 */
export function solvePanels(breaks: Float64Array, guess: Float64Array, n: number): Float64Array[] {
  const ends = guess.slice();
  const coarse = makePanels(breaks, FIRST_POINTS);
  iterate(coarse, ends);
  const fine = makePanels(breaks, n);
  const points = chebyshevPoints(n, -1, 1);
  const fit = fitMatrix(FIRST_POINTS);
  for (let p = 0; p < fine.length; p++) {
    const c = matrixTimes(fit, coarse[p].v);
    for (let i = 0; i < n; i++) fine[p].v[i] = clenshaw(c, 0, FIRST_POINTS - 1, points[i]);
  }
  iterate(fine, ends);
  return fine.map((panel) => panel.q);
}

/**
 * Matrix from values at the n Chebyshev points to Chebyshev coefficients, row-major n × n: (2/n) T_k(t_j), half of that
 * for k = 0. For one panel after another it spares the cosines of `chebyshevCoefficients`.
 */
export function fitMatrix(n: number): Float64Array {
  const fit = new Float64Array(n * n);
  for (let k = 0; k < n; k++) {
    const scale = (k === 0 ? 1 : 2) / n;
    for (let j = 0; j < n; j++) {
      // t_j = cos θ, θ = π (n − j − ½)/n; the multiple of θ is reduced as an integer.
      fit[k * n + j] = scale * Math.cos((Math.PI * ((k * (2 * (n - j) - 1)) % (4 * n))) / (2 * n));
    }
  }
  return fit;
}

/** Row-major square matrix times vector. */
export function matrixTimes(matrix: Float64Array, v: Float64Array): Float64Array<ArrayBuffer> {
  const out = new Float64Array(v.length);
  for (let i = 0; i < v.length; i++) out[i] = product(matrix, i * v.length, v);
  return out;
}

function makePanels(breaks: Float64Array, n: number): Panel[] {
  const panels: Panel[] = [];
  for (let p = 0; p + 1 < breaks.length; p++) {
    panels.push({
      middle: 0.5 * (breaks[p] + breaks[p + 1]),
      half: 0.5 * (breaks[p + 1] - breaks[p]),
      v: new Float64Array(n),
      q: new Float64Array(n),
      own: new Float64Array(n),
      left: new Float64Array(n),
      right: new Float64Array(n),
    });
  }
  return panels;
}

/** Newton's method from v and the end values as they are; leaves the solution in them and in q. */
function iterate(panels: readonly Panel[], ends: Float64Array): void {
  const n = panels[0].v.length;
  const reference = referenceInterval(n);
  const augmented = new Float64Array(n * (n + 3));
  update(reference, panels, ends);
  for (let step = 0; step < MOST_STEPS; step++) {
    for (const panel of panels) respond(reference, panel, augmented);
    const change = matchSlopes(reference, panels, ends);
    for (let p = 0; p < panels.length; p++) {
      const { v, own, left, right } = panels[p];
      for (let i = 0; i < n; i++) v[i] += own[i] + left[i] * change[p] + right[i] * change[p + 1];
    }
    for (let b = 0; b < ends.length; b++) ends[b] += change[b];
    if (update(reference, panels, ends) < LAST_STEP) return;
  }
}

function referenceInterval(n: number): Reference {
  const points = chebyshevPoints(n, -1, 1);
  const inverse = new Float64Array(n * n);
  const leftSlope = new Float64Array(n);
  const rightSlope = new Float64Array(n);
  const fit = fitMatrix(n);
  const cardinal = new Float64Array(n);
  for (let j = 0; j < n; j++) {
    for (let k = 0; k < n; k++) cardinal[k] = fit[k * n + j]; // v = 1 at the j-th point, 0 at the others
    const first = antiderivative(cardinal, 1);
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

/** q = chord + h² G v on every panel; the largest change of q relative to the largest q of its panel. */
function update(reference: Reference, panels: readonly Panel[], ends: Float64Array): number {
  const { points, inverse } = reference;
  const n = points.length;
  let worst = 0;
  for (let p = 0; p < panels.length; p++) {
    const { half, v, q } = panels[p];
    let change = 0;
    let size = 0;
    for (let i = 0; i < n; i++) {
      const sum = product(inverse, i * n, v);
      const value = 0.5 * ((1 - points[i]) * ends[p] + (1 + points[i]) * ends[p + 1]) + half * half * sum;
      change = Math.max(change, Math.abs(value - q[i]));
      size = Math.max(size, Math.abs(value));
      q[i] = value;
    }
    worst = Math.max(worst, change / size);
  }
  return worst;
}

/** Linearised problem of one panel: (I − h² D G) δv = −(v − s q − 2q³) + D δchord, D = diag(s + 6q²). */
function respond(reference: Reference, panel: Panel, augmented: Float64Array): void {
  const { points, inverse } = reference;
  const { middle, half, v, q, own, left, right } = panel;
  const n = q.length;
  const stride = n + 3;
  for (let i = 0; i < n; i++) {
    const s = middle + half * points[i];
    const d = s + 6 * q[i] * q[i];
    const scale = -half * half * d;
    const row = i * stride;
    for (let j = 0; j < n; j++) augmented[row + j] = scale * inverse[i * n + j];
    augmented[row + i] += 1;
    augmented[row + n] = q[i] * (s + 2 * q[i] * q[i]) - v[i];
    augmented[row + n + 1] = 0.5 * d * (1 - points[i]);
    augmented[row + n + 2] = 0.5 * d * (1 + points[i]);
  }
  solveInPlace(augmented, n, stride);
  for (let i = 0; i < n; i++) {
    own[i] = augmented[i * stride + n];
    left[i] = augmented[i * stride + n + 1];
    right[i] = augmented[i * stride + n + 2];
  }
}

/**
 * Solves for the columns beyond n of an n × stride row-major array, without exchanges: −G and D are positive, so that
 * the eigenvalues of I − h² D G are at least 1, and Newton's next residual corrects what rounding leaves.
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
function matchSlopes(reference: Reference, panels: readonly Panel[], ends: Float64Array): Float64Array {
  const { leftSlope, rightSlope } = reference;
  const change = new Float64Array(ends.length);
  const ratio = new Float64Array(ends.length);
  // lower δ_{b−1} + diagonal δ_b + upper δ_{b+1} = −jump, b = 1 … P − 1, with
  // q'(b−) = (q_b − q_{b−1})/(2h) + h (right form of v), q'(b+) = (q_{b+1} − q_b)/(2k) + k (left form of v).
  for (let b = 1; b < panels.length; b++) {
    const before = panels[b - 1];
    const after = panels[b];
    const h = before.half;
    const k = after.half;
    const slopeBefore =
      (ends[b] - ends[b - 1]) / (2 * h) +
      h * (product(rightSlope, 0, before.v) + product(rightSlope, 0, before.own));
    const slopeAfter =
      (ends[b + 1] - ends[b]) / (2 * k) +
      k * (product(leftSlope, 0, after.v) + product(leftSlope, 0, after.own));
    const lower = -0.5 / h + h * product(rightSlope, 0, before.left);
    const diagonal =
      0.5 / h + h * product(rightSlope, 0, before.right) + 0.5 / k - k * product(leftSlope, 0, after.left);
    const upper = -0.5 / k - k * product(leftSlope, 0, after.right);
    const pivot = diagonal - lower * ratio[b - 1];
    ratio[b] = upper / pivot;
    change[b] = (slopeAfter - slopeBefore - lower * change[b - 1]) / pivot;
  }
  for (let b = panels.length - 1; b > 0; b--) change[b] -= ratio[b] * change[b + 1];
  return change;
}

/** Σ_j a[from + j] v[j]. */
function product(a: Float64Array, from: number, v: Float64Array): number {
  let sum = 0;
  for (let j = 0; j < v.length; j++) sum += a[from + j] * v[j];
  return sum;
}
