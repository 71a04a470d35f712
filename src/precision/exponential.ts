/**
 * The exponential function in fixed point and with a binary exponent.
 */
import { logTwoFixed } from "./constants.ts";
import { floorDivide } from "./decimal.ts";
import type { Enclosure } from "./enclosure.ts";
import { bitLength, rescale } from "./fixed-point.ts";

/**
 * e^x with a relative error of at most 2^(1−precision), as a value in [2^precision, 2^(precision+1)] at its own place.
 *
 * x = k log 2 + r with 0 ≤ r < log 2; the Maclaurin series at r/2^j, its powers in four columns so that only every
 * fourth term costs a long product; j squarings. Each squaring doubles the error, which j guard bits hold.
 *
 * @param x - Fixed-point number at `bits`, taken as exact; |x| below 2^60 or so.
 * @param precision - Binary digits of the result, at least 8.
 */
export function exponentialEnclosure(x: bigint, bits: bigint, precision: bigint): Enclosure {
  const halvings = BigInt(Math.floor(0.9 * Math.sqrt(Number(precision))) + 2);
  // At most `work` terms of an error of two units each; powers of the columns and the squarings: 11 more.
  const work = precision + halvings + BigInt(bitLength(precision)) + 8n;
  const size = BigInt(bitLength(x)) - bits;
  const more = size > 0n ? size + 2n : 2n;
  const logTwo = logTwoFixed(work + more);
  const whole = rescale(x, bits, work + more);
  const k = floorDivide(whole, logTwo);
  const r = (whole - k * logTwo) >> more; // within 3 units: k log 2 is off by |k| ≤ 2^more units of the longer kind
  let power = seriesOfExponential(r >> halvings, work);
  for (let i = 0n; i < halvings; i++) power = (power * power) >> work;
  return { value: power >> (work - precision), bits: precision - k, units: 2n };
}

/** Σ θ^k/k! for 0 ≤ θ < 1/2, within 2 (number of terms) + 8 units. */
function seriesOfExponential(theta: bigint, bits: bigint): bigint {
  const two = (theta * theta) >> bits;
  const three = (two * theta) >> bits;
  const four = (two * two) >> bits;
  const columns = [0n, 0n, 0n, 0n];
  let term = 1n << bits;
  for (let k = 0; term !== 0n; ) {
    columns[k & 3] += term;
    k++;
    if ((k & 3) === 0) term = (term * four) >> bits;
    term /= BigInt(k);
  }
  return columns[0] + ((columns[1] * theta + columns[2] * two + columns[3] * three) >> bits);
}

/**
 * e^x at `bits`: at most two units off. Longer than `bits` when x is large; 0 when e^x is below a unit.
 *
 * @param x - Fixed-point number at `bits`, taken as exact.
 */
export function exponentialFixed(x: bigint, bits: bigint): bigint {
  // e^x ≤ 2^(3x/2) for x > 0, e^x ≤ 2^x for x < 0.
  const growth = x > 0n ? (3n * x) >> (bits + 1n) : x >> bits;
  const precision = bits + growth + 4n;
  if (precision <= 0n) return 0n;
  const e = exponentialEnclosure(x, bits, precision < 8n ? 8n : precision);
  return rescale(e.value, e.bits, bits);
}
