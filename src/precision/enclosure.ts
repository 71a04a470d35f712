/**
 * Numbers with an error bound: what the functions of this room pass to each other when a result needs a relative
 * accuracy, hence a place of its own for the binary point.
 */
import { absolute, bitLength, integerSquareRoot } from "./fixed-point.ts";

/** A number known within a bound: |value · 2^−bits − true| ≤ units · 2^−bits. `bits` may be negative. */
export interface Enclosure {
  readonly value: bigint;
  readonly bits: bigint;
  readonly units: bigint;
}

/** The integer n, exactly. */
export function exactInteger(n: bigint): Enclosure {
  return { value: n, bits: 0n, units: 0n };
}

/** The same number with at most `precision` binary digits; the digits dropped (one unit at most) join the bound. */
export function trim(a: Enclosure, precision: bigint): Enclosure {
  const drop = BigInt(bitLength(a.value)) - precision;
  return drop <= 0n ? a : withBits(a, a.bits - drop);
}

/** The same number at another place of the binary point. */
export function withBits(a: Enclosure, bits: bigint): Enclosure {
  const drop = a.bits - bits;
  if (drop <= 0n) return { value: a.value << -drop, bits, units: a.units << -drop };
  // 1 for the digits dropped of the value, 1 for those of the bound.
  return { value: a.value >> drop, bits, units: (a.units >> drop) + 2n };
}

/** a + b, without rounding. */
export function add(a: Enclosure, b: Enclosure): Enclosure {
  if (b.bits > a.bits) return add(b, a);
  const c = withBits(b, a.bits);
  return { value: a.value + c.value, bits: a.bits, units: a.units + c.units };
}

/** −a. */
export function negate(a: Enclosure): Enclosure {
  return { value: -a.value, bits: a.bits, units: a.units };
}

/** a · 2^k, without rounding. */
export function shiftEnclosure(a: Enclosure, k: bigint): Enclosure {
  return { value: a.value, bits: a.bits - k, units: a.units };
}

/** a · b to `precision` binary digits. */
export function times(a: Enclosure, b: Enclosure, precision: bigint): Enclosure {
  const units = absolute(a.value) * b.units + absolute(b.value) * a.units + a.units * b.units;
  return trim({ value: a.value * b.value, bits: a.bits + b.bits, units }, precision);
}

/**
 * a / b to about `precision` binary digits. The bound of b must be less than half of |b|.
 *
 * |A/B − a/b| ≤ (δa + |a/b| δb) / |B| with |B| ≥ |b| − δb.
 */
export function over(a: Enclosure, b: Enclosure, precision: bigint): Enclosure {
  const size = absolute(b.value);
  if (2n * b.units >= size) throw new RangeError("division by a number not known to differ from 0");
  const lift = precision + BigInt(bitLength(b.value) - bitLength(a.value)) + 2n;
  const up = lift > 0n ? lift : 0n;
  const value = (a.value << up) / b.value;
  const spread = (a.units << up) + (absolute(value) + 1n) * b.units;
  return { value, bits: a.bits - b.bits + up, units: spread / (size - b.units) + 2n };
}

/** √a to `precision` binary digits, for a > 0. The bound of a must be less than half of a. */
export function rootOf(a: Enclosure, precision: bigint): Enclosure {
  if (a.value <= 2n * a.units) throw new RangeError("the square root of a number not known to be positive");
  let up = 2n * precision + 2n - BigInt(bitLength(a.value));
  if (up < 0n) up = 0n;
  if ((a.bits + up) % 2n !== 0n) up++;
  const value = integerSquareRoot(a.value << up);
  // |√A − √a| ≤ δ / √a (1 + …): with δ < a/2, at most δ / (√a + √(a − δ)) ≤ 0.59 δ/√a.
  return { value, bits: (a.bits + up) / 2n, units: (a.units << up) / value + 2n };
}

/** a^n for n ≥ 0 to `precision` binary digits. */
export function powerOf(a: Enclosure, n: bigint, precision: bigint): Enclosure {
  let result = exactInteger(1n);
  let square = a;
  for (let rest = n; rest > 0n; rest >>= 1n) {
    if (rest & 1n) result = times(result, square, precision);
    if (rest > 1n) square = times(square, square, precision);
  }
  return result;
}

/** a at `bits` to the nearest unit if its bound allows a result at most one unit off; otherwise undefined. */
export function settle(a: Enclosure, bits: bigint): bigint | undefined {
  const drop = a.bits - bits;
  if (drop <= 0n) return a.units === 0n ? a.value << -drop : undefined;
  return 2n * a.units > 1n << drop ? undefined : ((a.value >> (drop - 1n)) + 1n) >> 1n;
}

/**
 * Several numbers at `bits`, each at most one unit off: `evaluate` is asked for a larger precision until its bounds
 * allow that.
 */
export function settled(bits: bigint, evaluate: (precision: bigint) => readonly Enclosure[]): bigint[] {
  for (let precision = bits + 8n; ; ) {
    const all = evaluate(precision);
    const found = all.map((a) => settle(a, bits));
    if (found.every((value) => value !== undefined)) return found;
    // What is missing, from the widest bound.
    let largest = 8n;
    const excess = all.map((a) => BigInt(bitLength(a.units)) - a.bits + bits + 2n);
    for (const more of excess) if (more > largest) largest = more;
    precision += largest;
  }
}
