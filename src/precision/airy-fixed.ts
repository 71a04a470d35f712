/**
 * Airy functions in fixed point: the series that serves at the precision asked for, and Taylor coefficients.
 */
import { airyFarLeft, airyFarRight, airySeriesReach, type EnclosedAiry } from "./airy-asymptotic.ts";
import { airyMaclaurin } from "./airy-maclaurin.ts";
import { add, type Enclosure, exactInteger, negate, settled, times, trim } from "./enclosure.ts";
import { numberFromFixed } from "./fixed-point.ts";

/** Binary digits by which Ai, Ai′ and the integral are small: e^{−ζ}, ζ = ⅔ x^{3/2}, for x > 0. */
export function airyShrink(x: number): number {
  return x > 0 ? Math.floor((2 / 3) * x ** 1.5 * Math.LOG2E) : 0;
}

/**
 * Ai(x), Ai′(x) and, when asked for, ∫_x^∞ Ai with an absolute error of about 2^−bits (and no more than a few binary
 * digits beyond that: far on the right the values are short).
 *
 * @param x - |x| ≤ 10^4 or so. Its bound, if any, is taken as by rounding down: the number lies in [x, x + units].
 */
export function airyEnclosure(x: Enclosure, bits: bigint, withIntegral: boolean): EnclosedAiry {
  const size = numberFromFixed(x.value, x.bits);
  const zeta = (2 / 3) * Math.abs(size) ** 1.5;
  const relative = Math.max(16, Number(bits) - airyShrink(size) + 4);
  if (airySeriesReach(zeta, relative, withIntegral)) {
    const digits = BigInt(relative) + 64n; // ζ is at most 2^20, and e^−ζ needs its digits after the point
    return size > 0
      ? airyFarRight(trim(x, digits), BigInt(relative), withIntegral)
      : airyFarLeft(trim(negate(x), digits), bits, withIntegral);
  }
  const place = bits > x.bits ? bits : x.bits;
  const near = airyMaclaurin(x.value << (place - x.bits), place, withIntegral);
  const enclose = (value: bigint): Enclosure => ({ value, bits: place, units: 1n });
  const value = enclose(near.value);
  const slope = enclose(near.slope);
  const integral = enclose(near.integral);
  if (x.units === 0n) return { value, slope, integral };
  // Derivatives Ai′, x Ai, −Ai. On the right their size falls, so that they are largest at x. On the left of 0,
  // |Ai| < 1, |Ai′| < 1 + |x|^{1/4}, and both are below 1 + |x|.
  const step = { value: 0n, bits: x.bits, units: x.units };
  const most = exactInteger(BigInt(Math.ceil(Math.abs(size)) + 2));
  const widen = (a: Enclosure, derivative: Enclosure): Enclosure => {
    const spread = times(step, derivative, bits);
    return add(a, { ...spread, value: 0n });
  };
  return {
    value: widen(value, size > 0 ? slope : most),
    slope: widen(slope, times(most, size > 0 ? value : exactInteger(1n), bits)),
    integral: widen(integral, size > 0 ? value : exactInteger(1n)),
  };
}

/**
 * Ai(x) and Ai′(x) at `bits`: each at most one unit off.
 *
 * Costs one product a term; the Maclaurin series has about 3ζ + `bits`/10 terms, ζ = ⅔|x|^{3/2}, and serves until
 * 2.9 ζ exceeds the digits wanted, the asymptotic one beyond.
 *
 * @param x - Fixed-point number at `bits`, taken as exact.
 */
export function airyPairFixed(x: bigint, bits: bigint): [value: bigint, slope: bigint] {
  const [value, slope] = settled(bits, (precision) => {
    const all = airyEnclosure({ value: x, bits, units: 0n }, precision, false);
    return [all.value, all.slope];
  });
  return [value, slope];
}

/** ∫_x^∞ Ai at `bits`: at most one unit off. Arguments and cost as for {@link airyPairFixed}. */
export function airyIntegralFixed(x: bigint, bits: bigint): bigint {
  return settled(bits, (precision) => [
    airyEnclosure({ value: x, bits, units: 0n }, precision, true).integral,
  ])[0];
}

/**
 * Coefficients a_0, …, a_order of Ai(x + ε) = Σ a_k ε^k at `bits`: each at most one unit off.
 *
 * a_{k+2} = (x a_k + a_{k−1}) / ((k + 1)(k + 2)), from w″ = t w. Errors obey the same recurrence with |x|: they stay
 * below the sum of those put in times w(1), where w″ = (|x| + ε) w, that is e^{√(|x| + 1)}; each step adds two units.
 *
 * @param x - Fixed-point number at `bits`, taken as exact.
 * @param order - Index of the last coefficient, ≥ 1.
 */
export function airyTaylorFixed(x: bigint, bits: bigint, order: number): bigint[] {
  const growth = Math.sqrt(Math.abs(numberFromFixed(x, bits)) + 1) * Math.LOG2E;
  const guard = BigInt(Math.ceil(growth + Math.log2(order + 2)) + 3);
  const work = bits + guard;
  const [value, slope] = airyPairFixed(x << guard, work);
  const a = [value, slope];
  for (let k = 0; k + 2 <= order; k++) {
    const shifted = k === 0 ? 0n : a[k - 1];
    a.push((((x * a[k]) >> bits) + shifted) / BigInt((k + 1) * (k + 2)));
  }
  return a.map((c) => ((c >> (guard - 1n)) + 1n) >> 1n);
}
