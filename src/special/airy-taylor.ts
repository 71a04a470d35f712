/**
 * Ai and Ai' on [−20, 20] by Taylor series about the centres c = −20, −19.75, …, 20.
 *
 * With Ai(c + t) = Σ a_k t^k the equation w″ = x w gives a_{k+2} = (c a_k + a_{k−1}) / ((k+1)(k+2)), so the table holds
 * Ai(c), Ai'(c) only and is expanded once, on first use. |t| ≤ 1/8 is exact, and (√20/8)^16/16! = 4e-18 ends the
 * series at degree 15. For x > 0 this is the decaying solution itself: the terms cancel by e^{2√x t} ≤ 3 at most, and
 * only below the leading one, so relative accuracy holds without an exponential. Leading terms carry their tail, so
 * that a value has one rounding of its own size, the last addition.
 *
 * Even and odd powers go separately: two short chains of dependent additions instead of a long one.
 */
import { PAIR_AT_CENTRES } from "./airy-tables.ts";

/** The table covers |x| ≤ TABLE_LIMIT. */
export const TABLE_LIMIT = 20;
/** Centres per unit length. */
export const PER_UNIT = 4;
/** Number of centres. */
export const CENTRES: number = 2 * TABLE_LIMIT * PER_UNIT + 1;
/** Highest power of t. */
export const DEGREE = 15;

/** Doubles a centre: tail of the leading term, then DEGREE + 1 coefficients, for Ai and then for Ai'. */
const SERIES = DEGREE + 2;
const STRIDE = 2 * SERIES;

/** Numbers in the table. */
export const INTERLEAVED_LENGTH: number = CENTRES * STRIDE;

let expanded: Float64Array | undefined;

/** The expanded table; built on first use (0.15 ms, 2 ms in a cold process), then only read. */
export function taylorTable(): Float64Array {
  expanded ??= expand();
  return expanded;
}

function expand(): Float64Array {
  const table = new Float64Array(CENTRES * STRIDE);
  const a = new Float64Array(DEGREE + 2);
  for (let j = 0; j < CENTRES; j++) {
    const at = j * STRIDE;
    airyTaylorCoefficients(j, a);
    table[at] = PAIR_AT_CENTRES[4 * j + 1];
    table[at + SERIES] = PAIR_AT_CENTRES[4 * j + 3];
    for (let k = 0; k <= DEGREE; k++) {
      table[at + 1 + k] = a[k];
      table[at + SERIES + 1 + k] = (k + 1) * a[k + 1];
    }
  }
  return table;
}

/** Coefficients a_0 … of Ai about centre j, as many as `a` has room for (without the tails of a_0 and a_1). */
export function airyTaylorCoefficients(j: number, a: Float64Array): void {
  const c = centre(j);
  a[0] = PAIR_AT_CENTRES[4 * j];
  a[1] = PAIR_AT_CENTRES[4 * j + 2];
  a[2] = 0.5 * c * a[0];
  for (let k = 3; k < a.length; k++) a[k] = (c * a[k - 2] + a[k - 3]) / (k * (k - 1));
}

/**
 * The table as the compiled form wants it: for each centre the numbers of Ai and of Ai' in turn, so that the two fill a
 * lane each. Length {@link INTERLEAVED_LENGTH}.
 */
export function interleaveTable(out: Float64Array): void {
  const table = taylorTable();
  for (let j = 0; j < CENTRES; j++) {
    for (let k = 0; k < SERIES; k++) {
      out[j * STRIDE + 2 * k] = table[j * STRIDE + k];
      out[j * STRIDE + 2 * k + 1] = table[j * STRIDE + SERIES + k];
    }
  }
}

/** Index of the centre nearest to x, |x| ≤ TABLE_LIMIT. */
export function nearestCentre(x: number): number {
  return (PER_UNIT * (x + TABLE_LIMIT) + 0.5) | 0;
}

/** Centre j. */
export function centre(j: number): number {
  return j / PER_UNIT - TABLE_LIMIT;
}

/** Ai at centre j plus t. */
export function taylorAi(table: Float64Array, j: number, t: number): number {
  return evaluate(table, j * STRIDE, t);
}

/** Ai' at centre j plus t. */
export function taylorAiPrime(table: Float64Array, j: number, t: number): number {
  return evaluate(table, j * STRIDE + SERIES, t);
}

function evaluate(p: Float64Array, at: number, t: number): number {
  const s = t * t;
  const even =
    ((((((p[at + 15] * s + p[at + 13]) * s + p[at + 11]) * s + p[at + 9]) * s + p[at + 7]) * s + p[at + 5]) *
      s +
      p[at + 3]) *
    s;
  const odd =
    ((((((p[at + 16] * s + p[at + 14]) * s + p[at + 12]) * s + p[at + 10]) * s + p[at + 8]) * s + p[at + 6]) *
      s +
      p[at + 4]) *
      s +
    p[at + 2];
  return p[at + 1] + (p[at] + (even + t * odd));
}
