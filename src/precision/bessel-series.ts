/**
 * The series behind the Bessel functions of fixed order.
 */
import type { Rational } from "./decimal.ts";
import type { Enclosure } from "./enclosure.ts";
import { absolute, bitLength, log2OfFixed, numberFromFixed } from "./fixed-point.ts";

/**
 * ₀F₁(; ν + 1; y) = Σ y^k / (k! (ν + 1)_k) and ₀F₁(; ν + 2; y) at `bits`, within one unit (DLMF 16.2.1).
 *
 * With |y| for y the sums are at most M = (1 + (1 + |y|^{1/4})/(ν + 1)) e^{min(2√|y|, |y|/(ν + 1))}, the latter because
 * (ν + 1)_k ≥ (ν + 1)^k and (½)_k, or (ν + 1)(k − 1)! for ν < −½. K terms, each within a few units that grow as the later
 * terms do, are within 4 K (1 + 1/(ν + 1)) M units. One product a term. The order stays exact.
 *
 * @param order - ν > −1.
 * @param y - Fixed-point number at `yBits`, taken as exact.
 */
export function confluentLimitPair(
  order: Rational,
  y: bigint,
  yBits: bigint,
  bits: bigint,
): [first: Enclosure, second: Enclosure] {
  const { denominator: q } = order;
  const p = order.numerator + q; // ν + 1 = p/q
  const size = Math.abs(numberFromFixed(y, yBits));
  const logOfFirst = log2OfFixed(p, 0n) - log2OfFixed(q, 0n); // log2(ν + 1)
  const growth = Math.min(2 * Math.sqrt(size), size * 2 ** -logOfFirst) * Math.LOG2E;
  const most = Number(bits) + 12 * Math.sqrt(size) + 16;
  const guard = BigInt(
    Math.ceil(growth + 2 * Math.max(0, 1 - logOfFirst) + Math.log2(most * (1 + size ** 0.25))) + 8,
  );
  const work = bits + guard;
  const place = yBits < work ? yBits : work; // a short argument stays short
  const scaled = y >> (yBits - place);
  let term = 1n << work;
  let first = term;
  let second = term;
  let bottom = p; // p + (k − 1) q
  for (let k = 1n; term !== 0n && term !== -1n; k++) {
    term = (((term * scaled) >> place) * q) / (k * bottom);
    bottom += q;
    first += term;
    second += (term * p) / bottom; // (ν + 1)_k / (ν + 2)_k = (ν + 1)/(ν + 1 + k)
  }
  const round = (a: bigint): Enclosure => ({ value: ((a >> (guard - 1n)) + 1n) >> 1n, bits, units: 1n });
  return [round(first), round(second)];
}

/** Rough log2 of the largest partial sum of ₀F₁(; ν + 1; y) for y > 0. */
export function log2OfConfluentLimit(order: number, y: number): number {
  return Math.min(2 * Math.sqrt(y), y / (order + 1)) * Math.LOG2E;
}

/** ν as a double. */
export function orderAsNumber({ numerator, denominator }: Rational): number {
  const drop = BigInt(Math.max(0, bitLength(denominator) - 900));
  return (
    numberFromFixed(((absolute(numerator) >> drop) << 64n) / (denominator >> drop), 64n) *
    (numerator < 0n ? -1 : 1)
  );
}
