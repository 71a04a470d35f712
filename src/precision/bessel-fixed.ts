/**
 * Bessel functions in fixed point: J_ν, J_ν′, I_ν and the entire form J_ν(√x)/x^{ν/2}.
 */
import { besselFar, hankelReach } from "./bessel-asymptotic.ts";
import { confluentLimitPair, log2OfConfluentLimit, orderAsNumber } from "./bessel-series.ts";
import type { Rational } from "./decimal.ts";
import { enclosedPi, realPower } from "./enclosed-functions.ts";
import {
  add,
  type Enclosure,
  exactInteger,
  negate,
  over,
  rootOf,
  settled,
  shiftEnclosure,
  times,
} from "./enclosure.ts";
import { log2OfFixed, numberFromFixed } from "./fixed-point.ts";
import { gammaOfRational } from "./gamma.ts";

/** ν + 1. */
export function nextOrder({ numerator, denominator }: Rational): Rational {
  return { numerator: numerator + denominator, denominator };
}

let remembered: { readonly key: string; readonly value: Enclosure } | undefined;

/** Γ(ν + 1) to `precision` digits; the last one is remembered, since kernels ask for one order at many points. */
function gammaOfNext(order: Rational, precision: bigint): Enclosure {
  const block = (precision / 128n + 1n) * 128n; // so that nearby precisions share it
  const key = `${order.numerator}/${order.denominator}/${block}`;
  if (remembered?.key !== key) remembered = { key, value: freshGammaOfNext(order, block) };
  return remembered.value;
}

function freshGammaOfNext(order: Rational, precision: bigint): Enclosure {
  const { numerator, denominator } = order;
  // Whole and half orders below 500: products of integers. Γ(n + ½ + 1) = √π Π (2j + 1)/2, j = 0, …, n.
  if (denominator <= 2n && numerator < 1000n) {
    let product = 1n;
    for (let j = denominator === 1n ? 1n : numerator & 1n; j <= numerator; j += denominator) {
      product *= j === 0n ? 1n : j;
    }
    const whole = exactInteger(product);
    if (denominator === 1n) return whole;
    const halves = (numerator + 1n) / 2n;
    return times(shiftEnclosure(whole, -halves), rootOf(enclosedPi(precision + 4n), precision), precision);
  }
  return gammaOfRational(nextOrder(order), precision);
}

/** x^ν / (2^ν Γ(ν + 1)) to about `precision` digits; without x, the factor of the entire form. */
function factor(order: Rational, x: Enclosure | undefined, precision: bigint): Enclosure {
  const half = x === undefined ? { value: 1n, bits: 1n, units: 0n } : shiftEnclosure(x, -1n);
  return over(realPower(half, order, precision + 4n), gammaOfNext(order, precision + 4n), precision);
}

/** Rough log2 of (x/2)^ν / Γ(ν + 1): the size of J_ν(x) below its first zero. */
export function log2OfFactor(order: Rational, log2OfX: number): number {
  // Γ(ν + 1) = Γ(ν + 2)/(ν + 1): ν + 1 may be too small for doubles.
  const nu = orderAsNumber(order);
  return nu * (log2OfX - 1) - log2OfGamma(nu + 2) + log2OfNextOrder(order);
}

/** log2(ν + 1). */
export function log2OfNextOrder({ numerator, denominator }: Rational): number {
  return log2OfFixed(numerator + denominator, 0n) - log2OfFixed(denominator, 0n);
}

function log2OfGamma(z: number): number {
  // Stirling from z + 8 on, moved back.
  let product = 1;
  for (let i = 0; i < 8; i++) product *= z + i;
  const w = z + 8;
  return ((w - 0.5) * Math.log(w) - w + 0.5 * Math.log(2 * Math.PI)) * Math.LOG2E - Math.log2(product);
}

/**
 * J_ν(x) and J_{ν+1}(x) with an absolute error of about 2^−bits (relative where J_ν is large, for ν < 0 and small x).
 *
 * @param x - Fixed-point number > 0 at `xBits`, taken as exact.
 */
export function besselEnclosures(
  order: Rational,
  x: bigint,
  xBits: bigint,
  bits: bigint,
): [Enclosure, Enclosure] {
  const nu = orderAsNumber(order);
  const size = numberFromFixed(x, xBits);
  const exact = { value: x, bits: xBits, units: 0n };
  if (size > 8) {
    const next = nextOrder(order);
    const digits = Number(bits);
    const largest = hankelReach(nu, size, digits);
    const largestOfNext = hankelReach(nu + 1, size, digits);
    if (largest !== undefined && largestOfNext !== undefined) {
      return [besselFar(order, exact, bits, largest), besselFar(next, exact, bits, largestOfNext)];
    }
  }
  // factor · ₀F₁: the second to the digits that the size of the first leaves.
  const lead = log2OfFactor(order, log2OfFixed(x, xBits));
  const relative = BigInt(Math.max(16, Math.ceil(Number(bits) + lead) + 4));
  const [first, second] = confluentLimitPair(order, -x * x, 2n * xBits + 2n, relative);
  const prefix = factor(order, exact, relative);
  // (x/2)^{ν+1}/Γ(ν+2) = factor · (x/2)/(ν + 1)
  const step = over(
    { value: x * order.denominator, bits: xBits + 1n, units: 0n },
    exactInteger(order.numerator + order.denominator),
    relative,
  );
  return [times(prefix, first, relative), times(times(prefix, step, relative), second, relative)];
}

/**
 * J_ν(x) and J_ν′(x) = (ν/x) J_ν − J_{ν+1} at `bits`: each at most one unit off (DLMF 10.6.2).
 *
 * One product a term: about 1.4 x + `bits`/8 terms below the digits' reach of Hankel's expansion (x of about
 * 0.35 `bits`), fewer beyond.
 *
 * @param order - ν > −1.
 * @param x - Fixed-point number > 0 at `bits`, taken as exact.
 */
export function besselPairFixed(order: Rational, x: bigint, bits: bigint): [value: bigint, slope: bigint] {
  const [value, slope] = settled(bits, (precision) => {
    const [first, second] = besselEnclosures(order, x, bits, precision);
    return [first, slopeOf(order, x, bits, first, second, precision)];
  });
  return [value, slope];
}

/** (ν/x) J_ν − J_{ν+1}. */
export function slopeOf(
  order: Rational,
  x: bigint,
  xBits: bigint,
  first: Enclosure,
  second: Enclosure,
  precision: bigint,
): Enclosure {
  if (order.numerator === 0n) return negate(second);
  const ratio = over(
    { value: order.numerator << xBits, bits: 0n, units: 0n },
    { value: x * order.denominator, bits: 0n, units: 0n },
    precision,
  );
  return add(times(first, ratio, precision), negate(second));
}

/**
 * φ_ν(x) = J_ν(√x)/x^{ν/2} and φ_{ν+1}(x) at `bits`: each at most one unit off, for any real x.
 *
 * φ_ν(x) = 2^−ν Σ (−x/4)^k / (k! Γ(ν + k + 1)) is entire (DLMF 10.2.2), φ_ν′ = −φ_{ν+1}/2 (10.6.6), and
 * φ_ν(−x) = I_ν(√x)/x^{ν/2}.
 *
 * @param order - ν > −1.
 * @param x - Fixed-point number at `bits`, taken as exact.
 */
export function besselEntirePairFixed(
  order: Rational,
  x: bigint,
  bits: bigint,
): [first: bigint, second: bigint] {
  const nu = orderAsNumber(order);
  const size = numberFromFixed(x, bits);
  const [first, second] = settled(bits, (precision) => {
    if (size > 64) {
      const digits = Number(precision) + 16;
      const root = Math.sqrt(size);
      const largest = hankelReach(nu, root, digits);
      const largestOfNext = hankelReach(nu + 1, root, digits);
      if (largest !== undefined && largestOfNext !== undefined) {
        const work = precision + 16n;
        const argument = rootOf({ value: x, bits, units: 0n }, work + BigInt(Math.ceil(Math.log2(size))));
        const power = realPower(argument, order, work);
        const value = over(besselFar(order, argument, work, largest), power, work);
        const next = besselFar(nextOrder(order), argument, work, largestOfNext);
        return [value, over(next, times(power, argument, work), work)];
      }
    }
    const lead = log2OfFactor(order, 0) + (size < 0 ? log2OfConfluentLimit(nu, -size / 4) : 0);
    const relative = BigInt(Math.max(16, Math.ceil(Number(precision) + lead) + 4));
    const [a, b] = confluentLimitPair(order, -x, bits + 2n, relative);
    const prefix = factor(order, undefined, relative);
    const twice = over(
      exactInteger(order.denominator),
      exactInteger(2n * (order.numerator + order.denominator)),
      relative,
    );
    return [times(prefix, a, relative), times(times(prefix, twice, relative), b, relative)];
  });
  return [first, second];
}

/**
 * I_ν(x) with a relative error of about 2^−precision (DLMF 10.25.2): all terms are positive.
 *
 * @param x - Fixed-point number > 0 at `xBits`, taken as exact.
 */
export function modifiedBesselEnclosure(
  order: Rational,
  x: bigint,
  xBits: bigint,
  precision: bigint,
): Enclosure {
  const [sum] = confluentLimitPair(order, x * x, 2n * xBits + 2n, precision);
  return times(factor(order, { value: x, bits: xBits, units: 0n }, precision), sum, precision);
}

/** I_ν(x) at `bits`: at most one unit off. About 1.4 x + `bits`/8 terms; arguments as {@link besselPairFixed}. */
export function modifiedBesselFixed(order: Rational, x: bigint, bits: bigint): bigint {
  return settled(bits, (precision) => [modifiedBesselEnclosure(order, x, bits, precision)])[0];
}
