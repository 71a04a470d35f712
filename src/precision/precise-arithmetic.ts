/**
 * The arithmetic handed to user-given kernels: fixed point at the precision of the computation.
 */

import { airyTaylorFixed } from "./airy-fixed.ts";
import { piFixed } from "./constants.ts";
import { fixedFromExact, type PreciseInput, readExact } from "./decimal.ts";
import { exponentialFixed } from "./exponential.ts";
import { divide, multiply, numberFromFixed, squareRoot } from "./fixed-point.ts";
import { logarithmFixed } from "./logarithm.ts";
import { sineCosineFixed } from "./trigonometric.ts";

/**
 * Fixed-point operations at `bits` binary digits after the point; numbers are bigints in units of 2^−bits, results within a
 * few units.
 *
 * @category Precise determinants
 * @since 0.2.0
 */
export interface PreciseArithmetic {
  /** Digits after the binary point. */
  readonly bits: bigint;
  /** The number 1. */
  readonly one: bigint;
  /** A double, a bigint or a decimal string as a fixed-point number. */
  from(x: PreciseInput): bigint;
  /** The nearest double. */
  toNumber(x: bigint): number;
  /** x · y, at most one unit too low. */
  multiply(x: bigint, y: bigint): bigint;
  /** x / y. */
  divide(x: bigint, y: bigint): bigint;
  /** √x, x ≥ 0. */
  squareRoot(x: bigint): bigint;
  /** e^x. */
  exponential(x: bigint): bigint;
  /** log x, x > 0. */
  logarithm(x: bigint): bigint;
  /** sin x. */
  sine(x: bigint): bigint;
  /** cos x. */
  cosine(x: bigint): bigint;
  /** Ai(x), Ai′(x), Ai″(x)/2, …, `order` + 1 coefficients. */
  airyTaylor(x: bigint, order: number): bigint[];
  /** π. */
  readonly pi: bigint;
}

/** The arithmetic at `bits`. */
export function preciseArithmetic(bits: bigint): PreciseArithmetic {
  return {
    bits,
    one: 1n << bits,
    from: (x) => fixedFromExact(readExact("x", x), bits),
    toNumber: (x) => numberFromFixed(x, bits),
    multiply: (x, y) => multiply(x, y, bits),
    divide: (x, y) => divide(x, y, bits),
    squareRoot: (x) => squareRoot(x, bits),
    exponential: (x) => exponentialFixed(x, bits),
    logarithm: (x) => logarithmFixed(x, bits, bits),
    sine: (x) => sineCosineFixed(x, bits, bits)[0],
    cosine: (x) => sineCosineFixed(x, bits, bits)[1],
    airyTaylor: (x, order) => airyTaylorFixed(x, bits, order),
    get pi() {
      return piFixed(bits);
    },
  };
}
