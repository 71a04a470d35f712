/**
 * Elementary functions of a number with a bound: the fixed-point functions, with the bound of the argument carried on.
 */
import { piFixed } from "./constants.ts";
import type { Rational } from "./decimal.ts";
import { type Enclosure, exactInteger, over, powerOf, rootOf, times, withBits } from "./enclosure.ts";
import { exponentialEnclosure } from "./exponential.ts";
import { absolute, bitLength } from "./fixed-point.ts";
import { logarithmFixed } from "./logarithm.ts";
import { sineCosineFixed } from "./trigonometric.ts";

/** π at `bits`. */
export function enclosedPi(bits: bigint): Enclosure {
  return { value: piFixed(bits), bits, units: 1n };
}

/** e^a to `precision` binary digits. The bound of a must be below 1/2. */
export function exponentialOf(a: Enclosure, precision: bigint): Enclosure {
  if (a.bits < 1n) return exponentialOf(withBits(a, 1n), precision);
  if (2n * a.units > 1n << a.bits) throw new RangeError("the argument is not known well enough");
  const e = exponentialEnclosure(a.value, a.bits, precision);
  // e^{a ± δ} differs from e^a by less than 2 δ e^a for δ ≤ 1/2.
  const spread = a.units === 0n ? 0n : ((2n * (e.value + e.units) * a.units) >> a.bits) + 1n;
  return { value: e.value, bits: e.bits, units: e.units + spread };
}

/** log a at `bits`. The bound of a must be less than half of a. */
export function logarithmOf(a: Enclosure, bits: bigint): Enclosure {
  if (a.value <= 2n * a.units) throw new RangeError("the logarithm of a number not known to be positive");
  // |log(a ± δ) − log a| ≤ 2 δ/a.
  const spread = ((2n * a.units) << bits) / a.value + 1n;
  return { value: logarithmFixed(a.value, a.bits, bits), bits, units: 1n + (a.units === 0n ? 0n : spread) };
}

/** sin a and cos a at `bits`. */
export function sineCosineOf(a: Enclosure, bits: bigint): [sine: Enclosure, cosine: Enclosure] {
  const [sine, cosine] = sineCosineFixed(a.value, a.bits, bits);
  const spread = a.units === 0n ? 0n : withBits({ value: 0n, bits: a.bits, units: a.units }, bits).units;
  return [
    { value: sine, bits, units: 2n + spread },
    { value: cosine, bits, units: 2n + spread },
  ];
}

/** Binary exponent of a number: |a| < 2^this, and 2^(this − 1) ≤ |a| unless it is 0. */
export function exponentOf(a: Enclosure): bigint {
  return BigInt(bitLength(absolute(a.value))) - a.bits;
}

/** a^ν for a > 0 to about `precision` digits: whole power below 2^20, root or exponential of the rest. */
export function realPower(a: Enclosure, { numerator, denominator }: Rational, precision: bigint): Enclosure {
  const nearest = numerator / denominator; // towards 0
  const whole = bitLength(nearest) <= 20 ? nearest : 0n;
  const rest = numerator - whole * denominator;
  const work = precision + 8n + BigInt(bitLength(whole));
  let power = powerOf(a, whole < 0n ? -whole : whole, work);
  if (whole < 0n) power = over(exactInteger(1n), power, work);
  if (rest === 0n) return power;
  const size = rest < 0n ? -rest : rest;
  let part: Enclosure;
  if (2n * size === denominator) part = rootOf(a, work);
  else {
    const long = work + BigInt(bitLength(exponentOf(a)) + bitLength(nearest));
    const exponent = over(
      times(logarithmOf(a, long), exactInteger(size), long),
      exactInteger(denominator),
      long,
    );
    part = exponentialOf(exponent, work);
  }
  return rest < 0n ? over(power, part, precision) : times(power, part, precision);
}
