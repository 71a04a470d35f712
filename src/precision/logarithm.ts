/**
 * The natural logarithm in fixed point.
 */
import { logTwoFixed } from "./constants.ts";
import { exponentialFixed } from "./exponential.ts";
import { bitLength, numberFromFixed, rescale } from "./fixed-point.ts";

/**
 * log x at `bits`: at most one unit off.
 *
 * x = m 2^k with 0.7 < m < 1.42. From y₀ near log m, log m = y₀ + 2 artanh u, u = (m − e^{y₀}) / (m + e^{y₀}), exactly;
 * y₀ is the logarithm to a third of the digits, so that two or three terms of artanh suffice.
 *
 * @param x - Fixed-point number > 0 at `xBits`, taken as exact.
 * @param xBits - Where its binary point is; any integer.
 */
export function logarithmFixed(x: bigint, xBits: bigint, bits: bigint): bigint {
  if (x <= 0n) throw new RangeError("the logarithm of a number that is not positive");
  const length = BigInt(bitLength(x));
  // m in [1/2, 1), and doubled below 0.7 (of which the leading 8 bits decide).
  const lead = length > 8n ? x >> (length - 8n) : x << (8n - length);
  const k = length - xBits - (lead < 179n ? 1n : 0n);
  const work = bits + 8n + BigInt(bitLength(k));
  const m = rescale(x, xBits + k, work); // x 2^−k; exact or one unit too low
  const sum = logarithmNearOne(m, work) + k * logTwoFixed(work);
  // Within 10 + |k| units of `work`, less than a quarter of a unit; half a unit for rounding.
  return ((sum >> (work - bits - 1n)) + 1n) >> 1n;
}

/** log m for 0.7 ≤ m ≤ 1.42, within 8 units. */
function logarithmNearOne(m: bigint, bits: bigint): bigint {
  if (m === 1n << bits) return 0n;
  const fewer = bits / 3n + 10n;
  // Below 64 bits the double's logarithm is the start: its 2^−50 cubed are less than a unit.
  const start =
    bits <= 64n
      ? BigInt(Math.round(Math.log(numberFromFixed(m, bits)) * 2 ** Number(bits)))
      : logarithmNearOne(m >> (bits - fewer), fewer) << (bits - fewer);
  const e = exponentialFixed(start, bits);
  const u = ((m - e) << bits) / (m + e);
  const square = (u * u) >> bits;
  let sum = 0n;
  let power = u;
  for (let k = 1n; power !== 0n && power !== -1n; k += 2n) {
    sum += power / k;
    power = (power * square) >> bits;
  }
  return start + 2n * sum;
}
