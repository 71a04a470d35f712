/**
 * Fixed-point numbers that each have their own scale: value · 2^−scale. For results whose sizes differ widely.
 */
import { bitLength, log2OfFixed, rescale, squareRoot } from "./fixed-point.ts";

/** value · 2^−scale. */
export interface Floating {
  readonly value: bigint;
  readonly scale: bigint;
}

/** log2 |a|; −∞ for 0. */
export function log2OfFloating({ value, scale }: Floating): number {
  return log2OfFixed(value, scale);
}

/** a − b, exact. */
export function difference(a: Floating, b: Floating): Floating {
  const scale = a.scale + (b.scale > a.scale ? b.scale - a.scale : 0n);
  return { value: rescale(a.value, a.scale, scale) - rescale(b.value, b.scale, scale), scale };
}

/** a + b, exact. */
export function sum(a: Floating, b: Floating): Floating {
  return difference(a, { value: -b.value, scale: b.scale });
}

/** a b, rounded to `bits` significant bits. */
export function product(a: Floating, b: Floating, bits: bigint): Floating {
  return shortened({ value: a.value * b.value, scale: a.scale + b.scale }, bits);
}

/** a / b to `bits` significant bits; 0 for b = 0, which only an order that resolves nothing brings about. */
export function quotient(a: Floating, b: Floating, bits: bigint): Floating {
  if (b.value === 0n) return b;
  const shift = bits + BigInt(Math.max(0, bitLength(b.value) - bitLength(a.value)));
  return { value: (a.value << shift) / b.value, scale: a.scale - b.scale + shift };
}

/** √a to `bits` significant bits; 0 for a ≤ 0, as for {@link quotient}. */
export function root(a: Floating, bits: bigint): Floating {
  if (a.value <= 0n) return { value: 0n, scale: a.scale };
  // An even scale, and 2 bits digits under the root.
  const more = BigInt(Math.max(0, 2 * Number(bits) - bitLength(a.value)));
  const scale = a.scale + more + ((a.scale + more) & 1n);
  return { value: squareRoot(rescale(a.value, a.scale, scale), 0n), scale: scale / 2n };
}

/** a rounded down to `bits` significant bits. */
export function shortened(a: Floating, bits: bigint): Floating {
  const cut = BigInt(Math.max(0, bitLength(a.value) - Number(bits)));
  return { value: a.value >> cut, scale: a.scale - cut };
}
