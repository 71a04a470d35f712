/**
 * Zeros of the Legendre polynomial P_n and the Gauss weights in O(n) operations, rounded from double-double.
 *
 * In y = 1 − x, Legendre's equation reads y(2 − y) P'' + 2(1 − y) P' + n(n + 1) P = 0. Its Taylor coefficients at y₀
 * obey a recurrence of three terms, so that one can march from zero to zero (A. Glaser, X. Liu, V. Rokhlin, SIAM J.
 * Sci. Comput. 29 (2007) 1420). The march starts near x = 1, where the series at y = 0 with P_n(1) = 1 gives the
 * first zeros and the normalization at once, and runs inwards to x = 0, away from the singular point. All in
 * double-double, because the errors of the steps add up: at n = 100 000 about 1e-26 is left of 1e-31.
 *
 * Weights: w = 2 / ((1 − x²) P'(x)²) = 2 / (y (2 − y) P'(y)²).
 */
import { addInto, divideInto, multiplyInto } from "../core/double-double.ts";

/** Zeros in x > 0 from the outermost inwards, then 0 itself when n is odd. */
export interface LegendreZeros {
  /** 1 − x, rounded to nearest. */
  readonly distance: Float64Array;
  /** x, rounded to nearest. */
  readonly node: Float64Array;
  /** Weights. */
  readonly weight: Float64Array;
}

// Zeros taken from the series at y = 0: its terms grow like e^{j}, j the zero of J0, before they cancel. 16 digits of
// the 32 are spent at j ≈ 25; six zeros need j ≈ 18.
const FROM_SERIES = 6;
const MOST_TERMS = 120;
const SMALL = 1e-27;

/** The zeros and weights of P_n, n ≥ 1. */
export function legendreZeros(n: number): LegendreZeros {
  const count = (n + 1) >> 1;
  const odd = n % 2 === 1;
  const zeros = {
    distance: new Float64Array(count),
    node: new Float64Array(count),
    weight: new Float64Array(count),
  };
  const series = new Float64Array(2 * (MOST_TERMS + 2));
  const state = new Float64Array(6); // P, P' and y, each in two parts
  const interior = odd ? count - 1 : count;
  for (let k = 1; k <= interior; k++) {
    const guess = distanceGuess(n, k);
    if (k <= FROM_SERIES) refineZero(series, seriesAtOne(n, guess, series), 0, 0, guess, n, state);
    else {
      const h = guess - state[4];
      const terms = seriesAt(n, state[4], state[5], h, state[2], state[3], series);
      refineZero(series, terms, state[4], state[5], h, n, state);
    }
    record(zeros, k - 1, state);
  }
  if (odd) {
    // x = 0: only the derivative is wanted.
    const out = new Float64Array(2);
    if (interior < FROM_SERIES) evaluate(series, seriesAtOne(n, 1, series), 1, 0, state);
    else {
      addInto(out, 1, 0, -state[4], -state[5]);
      const h = out[0];
      const terms = seriesAt(n, state[4], state[5], h, state[2], state[3], series);
      evaluate(series, terms, 1, out[1] / h, state);
      divideInto(out, state[2], state[3], h, 0);
      state[2] = out[0];
      state[3] = out[1];
    }
    state[4] = 1;
    state[5] = 0;
    record(zeros, count - 1, state);
  }
  return zeros;
}

/**
 * 1 − cos θ_k, θ = ψ + (ψ cot ψ − 1)/(8 ψ (n + ½)²), ψ = j_k/(n + ½) (L. Gatteschi, in: Asymptotic and Computational
 * Analysis (1990) 597), j_k the zeros of J0 by McMahon's expansion (DLMF 10.21.19): a starting value.
 */
function distanceGuess(n: number, k: number): number {
  const m = n + 0.5;
  const b = (k - 0.25) * Math.PI;
  const c = 1 / (8 * b);
  const zero = b + c * (1 + c * c * (-124 / 3 + c * c * (120928 / 15)));
  const psi = (k === 1 ? 2.404825557695773 : zero) / m;
  const theta = psi + (psi / Math.tan(psi) - 1) / (8 * psi * m * m);
  const s = Math.sin(0.5 * theta);
  return 2 * s * s;
}

/** Scaled Taylor coefficients c_k h^k at y = 0: c₀ = 1, c_{k+1} = −(n − k)(n + k + 1) c_k / (2 (k + 1)²). */
function seriesAtOne(n: number, h: number, series: Float64Array): number {
  const out = new Float64Array(2);
  series[0] = 1;
  series[1] = 0;
  const terms = Math.min(n, MOST_TERMS);
  for (let k = 0; k < terms; k++) {
    // (n − k)(n + k + 1) = n(n + 1) − k(k + 1) is below 2⁵³: exact.
    multiplyInto(out, series[2 * k], series[2 * k + 1], -(n - k) * (n + k + 1), 0);
    multiplyInto(out, out[0], out[1], h, 0);
    divideInto(out, out[0], out[1], 2 * (k + 1) * (k + 1), 0);
    series[2 * k + 2] = out[0];
    series[2 * k + 3] = out[1];
  }
  return terms;
}

/**
 * Scaled Taylor coefficients b_k = a_k h^k at a zero y₀, with P'(y₀) given. From Legendre's equation
 * b_{k+2} = −[2(1 − y₀) h (k + 1)² b_{k+1} + (n − k)(n + k + 1) h² b_k] / (y₀(2 − y₀)(k + 2)(k + 1)),
 * until they are negligible.
 */
function seriesAt(
  n: number,
  y: number,
  yl: number,
  h: number,
  slope: number,
  slopeLow: number,
  series: Float64Array,
): number {
  const out = new Float64Array(2);
  addInto(out, 2, 0, -y, -yl);
  multiplyInto(out, out[0], out[1], y, yl);
  const a = out[0];
  const al = out[1];
  divideInto(out, h, 0, a, al);
  const ha = out[0];
  const hal = out[1];
  multiplyInto(out, ha, hal, -h, 0);
  const c = out[0]; // −h²/a
  const cl = out[1];
  addInto(out, 1, 0, -y, -yl);
  multiplyInto(out, out[0], out[1], ha, hal);
  const b = -2 * out[0]; // −2(1 − y₀) h/a
  const bl = -2 * out[1];
  multiplyInto(out, slope, slopeLow, h, 0);
  series[0] = 0;
  series[1] = 0;
  series[2] = out[0];
  series[3] = out[1];
  const limit = SMALL * Math.abs(out[0]);
  for (let k = 0; k + 2 <= MOST_TERMS; k++) {
    multiplyInto(out, b, bl, series[2 * k + 2], series[2 * k + 3]);
    multiplyInto(out, out[0], out[1], (k + 1) * (k + 1), 0);
    const p = out[0];
    const pl = out[1];
    multiplyInto(out, c, cl, series[2 * k], series[2 * k + 1]);
    multiplyInto(out, out[0], out[1], (n - k) * (n + k + 1), 0);
    addInto(out, p, pl, out[0], out[1]);
    divideInto(out, out[0], out[1], (k + 2) * (k + 1), 0);
    series[2 * k + 4] = out[0];
    series[2 * k + 5] = out[1];
    if (Math.abs(out[0]) < limit && Math.abs(series[2 * k + 2]) < limit) return k + 2;
  }
  return MOST_TERMS;
}

/** P and its derivative in r at y₀ + r h by Horner's rule: state[0..1], state[2..3]. */
function evaluate(series: Float64Array, terms: number, r: number, rl: number, state: Float64Array): void {
  const out = new Float64Array(2);
  let p = 0;
  let pl = 0;
  let d = 0;
  let dl = 0;
  for (let k = terms; k >= 0; k--) {
    multiplyInto(out, d, dl, r, rl);
    addInto(out, out[0], out[1], p, pl);
    d = out[0];
    dl = out[1];
    multiplyInto(out, p, pl, r, rl);
    addInto(out, out[0], out[1], series[2 * k], series[2 * k + 1]);
    p = out[0];
    pl = out[1];
  }
  state[0] = p;
  state[1] = pl;
  state[2] = d;
  state[3] = dl;
}

/**
 * Newton for the zero near y₀ + h, in units r of h; leaves P' and y of the zero in `state`.
 */
function refineZero(
  series: Float64Array,
  terms: number,
  y0: number,
  y0l: number,
  h: number,
  n: number,
  state: Float64Array,
): void {
  const out = new Float64Array(2);
  let r = 1;
  let rl = 0;
  let d = 0;
  let dl = 0;
  for (let k = 0; k < 8; k++) {
    evaluate(series, terms, r, rl, state);
    const p = state[0];
    d = state[2];
    dl = state[3];
    divideInto(out, -p, -state[1], d, dl);
    const step = out[0];
    addInto(out, r, rl, step, out[1]);
    r = out[0];
    rl = out[1];
    if (Math.abs(step) < 1e-10) {
      // Newton squares this. The derivative follows by Legendre's equation:
      // P'(y + δ) = P' + δ P'' + …, the next term is below 1e-20.
      const y = y0 + h * r;
      const second = (-2 * (1 - y) * h * d - n * (n + 1) * h * h * p) / (y * (2 - y));
      addInto(out, d, dl, second * step, 0);
      d = out[0];
      dl = out[1];
      break;
    }
  }
  divideInto(out, d, dl, h, 0);
  state[2] = out[0];
  state[3] = out[1];
  multiplyInto(out, r, rl, h, 0);
  addInto(out, y0, y0l, out[0], out[1]);
  state[4] = out[0];
  state[5] = out[1];
}

function record(
  zeros: { distance: Float64Array; node: Float64Array; weight: Float64Array },
  at: number,
  state: Float64Array,
): void {
  const out = new Float64Array(2);
  const y = state[4];
  const yl = state[5];
  zeros.distance[at] = y;
  addInto(out, 1, 0, -y, -yl);
  zeros.node[at] = out[0];
  addInto(out, 2, 0, -y, -yl);
  multiplyInto(out, out[0], out[1], y, yl);
  multiplyInto(out, out[0], out[1], state[2], state[3]);
  multiplyInto(out, out[0], out[1], state[2], state[3]);
  divideInto(out, 2, 0, out[0], out[1]);
  zeros.weight[at] = out[0];
}
