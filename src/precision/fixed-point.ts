/**
 * Fixed-point arithmetic: the bigint `a` at `bits` stands for a · 2^−bits. One unit (of the last place) is 2^−bits.
 *
 * Every operation says by how many units its result may be off; sums are exact. Callers work with guard bits and add
 * these up. Rounding is downwards (a shift), so that an operation costs what the bigint operation costs.
 */

/** a · b, at most one unit too low. */
export function multiply(a: bigint, b: bigint, bits: bigint): bigint {
  return (a * b) >> bits;
}

/** a / b, at most one unit off (towards 0). The divisor must not be 0. */
export function divide(a: bigint, b: bigint, bits: bigint): bigint {
  return (a << bits) / b;
}

/** √a for a ≥ 0, at most one unit too low. */
export function squareRoot(a: bigint, bits: bigint): bigint {
  return integerSquareRoot(a << bits);
}

/** ⌊√n⌋ for n ≥ 0, by Newton's iteration with the precision doubled at each step. */
export function integerSquareRoot(n: bigint): bigint {
  if (n < 0n) throw new RangeError("the square root of a negative number");
  const length = bitLength(n);
  if (length <= 52) return BigInt(Math.floor(Math.sqrt(Number(n))));
  // The root of the leading half of the digits, scaled up, is a start with half of the digits right.
  const shift = BigInt((length >> 2) << 1) >> 1n;
  let x = (integerSquareRoot(n >> (2n * shift)) + 1n) << shift;
  for (;;) {
    const next = (x + n / x) >> 1n;
    if (next >= x) return x;
    x = next;
  }
}

/** Number of binary digits of |a|; 0 for 0. */
export function bitLength(a: bigint): number {
  const hex = (a < 0n ? -a : a).toString(16);
  return hex === "0" ? 0 : 4 * (hex.length - 1) + (32 - Math.clz32(Number.parseInt(hex[0], 16)));
}

/** |a|. */
export function absolute(a: bigint): bigint {
  return a < 0n ? -a : a;
}

/** The same number at another precision; exact when `to` ≥ `from`, else at most one unit too low. */
export function rescale(a: bigint, from: bigint, to: bigint): bigint {
  return to >= from ? a << (to - from) : a >> (from - to);
}

/** The double x as a fixed-point number; exact when it has no digits below the last place, else rounded down. */
export function fixedFromNumber(x: number, bits: bigint): bigint {
  const [mantissa, exponent] = splitNumber(x);
  const shift = BigInt(exponent) + bits;
  return shift >= 0n ? mantissa << shift : mantissa >> -shift;
}

/** x = mantissa · 2^exponent, exactly. */
export function splitNumber(x: number): readonly [bigint, number] {
  if (!Number.isFinite(x)) throw new RangeError(`${x} has no digits`);
  if (x === 0) return [0n, 0];
  let exponent = 0;
  let m = x;
  // A subnormal is made normal first; afterwards the mantissa is an integer of at most 53 bits.
  if (Math.abs(m) < 2 ** -1000) {
    m *= 2 ** 100;
    exponent -= 100;
  }
  const size = Math.floor(Math.log2(Math.abs(m))) - 53;
  const half = size >> 1; // in two steps: 2^−size itself may overflow
  m = m * 2 ** -half * 2 ** -(size - half);
  exponent += size;
  while (!Number.isInteger(m)) {
    m *= 2;
    exponent--;
  }
  return [BigInt(m), exponent];
}

/** The nearest double, or one of the two nearest; 0 or ±∞ outside the range. */
export function numberFromFixed(a: bigint, bits: bigint): number {
  if (a === 0n) return 0;
  const length = bitLength(a);
  const drop = length - 64;
  // 64 leading bits with a sticky last bit: converting them rounds correctly.
  let lead = drop > 0 ? absolute(a) >> BigInt(drop) : absolute(a);
  if (drop > 0 && lead << BigInt(drop) !== absolute(a)) lead |= 1n;
  const exponent = Math.max(drop, 0) - Number(bits);
  const half = exponent >> 1;
  const value = Number(lead) * 2 ** half * 2 ** (exponent - half);
  return a < 0n ? -value : value;
}

/** log2 |a · 2^−bits| as a double; −∞ for 0. */
export function log2OfFixed(a: bigint, bits: bigint): number {
  if (a === 0n) return Number.NEGATIVE_INFINITY;
  const drop = Math.max(0, bitLength(a) - 60);
  return Math.log2(Number(absolute(a) >> BigInt(drop))) + drop - Number(bits);
}
