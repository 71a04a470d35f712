/**
 * The gamma function of a positive argument and its logarithm.
 */
import { bernoulliNumbers } from "./bernoulli.ts";
import { piFixed } from "./constants.ts";
import { floorDivide, type Rational } from "./decimal.ts";
import { exponentialOf } from "./enclosed-functions.ts";
import { type Enclosure, over } from "./enclosure.ts";
import { absolute, bitLength, numberFromFixed, rescale } from "./fixed-point.ts";
import { logarithmFixed } from "./logarithm.ts";

/** Γ(x) = e^`logarithm` / `product`: the argument moved to the right until Stirling's series serves. */
interface ShiftedGamma {
  readonly logarithm: Enclosure;
  readonly product: Enclosure;
}

/** log Γ(x + n) at `bits` and x (x + 1) ⋯ (x + n − 1) to as many binary digits, x + n ≥ bits/2. */
function shiftedGamma(x: bigint, xBits: bigint, bits: bigint): ShiftedGamma {
  const least = BigInt(Math.ceil(0.5 * Number(bits)) + 6);
  const missing = least - (x >> xBits);
  const n = missing > 0n ? missing : 0n;
  const product = risingProduct(x, xBits, Number(n), bits);
  return { logarithm: stirling(x + (n << xBits), xBits, bits), product };
}

/** x (x + 1) ⋯ (x + n − 1), within 4n + 2 units. */
function risingProduct(x: bigint, xBits: bigint, n: number, precision: bigint): Enclosure {
  if (n === 0) return { value: 1n, bits: 0n, units: 0n };
  const work = precision + BigInt(bitLength(BigInt(n))) + 4n;
  let value = x;
  let bits = xBits;
  const first = work - BigInt(bitLength(x));
  if (first > 0n) {
    value <<= first;
    bits += first;
  } else {
    value >>= -first;
    bits += first;
  }
  // The product is kept at `work` to `work` + 2 digits by the doubles' logarithm of the factors, all above 1.
  const start = numberFromFixed(x, xBits);
  let factor = x;
  let size = 0;
  let shifted = 0;
  for (let i = 1; i < n; i++) {
    factor += 1n << xBits;
    size += Math.log2(start + i);
    const drop = Math.floor(size) - shifted;
    shifted += drop;
    value = (value * factor) >> (xBits + BigInt(drop));
    bits -= BigInt(drop);
  }
  return { value, bits, units: n === 1 && first >= 0n ? 0n : BigInt(4 * n + 2) };
}

/**
 * log Γ(z) = (z − ½) log z − z + ½ log 2π + Σ B_{2k} / (2k (2k − 1) z^{2k−1}) at `bits`, for z ≥ bits/2.
 *
 * The error of the series is below its first neglected term (DLMF 5.11(ii)); with z ≥ bits/2 about 0.08 `bits` terms
 * suffice. Summed from the last term, so that no power of 1/z is ever rounded beside a large Bernoulli number.
 */
function stirling(z: bigint, zBits: bigint, bits: bigint): Enclosure {
  const work = bits + BigInt(bitLength(z)) - zBits + 8n;
  const at = numberFromFixed(z, zBits);
  // log2 of the first term left out; |B_{2k}| = 2 (2k)! ζ(2k) / (2π)^{2k}, ζ falls.
  let count = 0;
  for (let size = -Math.log2(12 * at); size > -Number(work) - 2; ) {
    count++;
    size += Math.log2((2 * count * (2 * count - 1)) / (2 * Math.PI * at) ** 2);
    if (2 * count > 6 * at) throw new RangeError("Stirling's series does not reach this precision");
  }
  const numbers = bernoulliNumbers(count);
  const inverse = (1n << (work + zBits)) / z;
  const square = (inverse * inverse) >> work;
  let sum = 0n;
  for (let k = count; k >= 1; k--) {
    const { numerator, denominator } = numbers[k - 1];
    const factor = BigInt(2 * k * (2 * k - 1));
    sum = ((sum * square) >> work) + floorDivide(numerator << work, denominator * factor);
  }
  sum = (sum * inverse) >> work;
  const logarithm = logarithmFixed(z, zBits, work);
  const half = 1n << (zBits - 1n);
  const main = ((z - half) * logarithm) >> zBits;
  const constant = logarithmFixed(piFixed(work), work - 1n, work) >> 1n; // ½ log 2π
  // z units of the logarithm, the rest below 16; `work` has log2 z + 8 digits more than asked for.
  return { value: (main - rescale(z, zBits, work) + constant + sum) >> (work - bits), bits, units: 2n };
}

/**
 * Γ(x) with a relative error of about 2^−precision, x > 0 a fixed-point number taken as exact.
 *
 * Costs `precision`/2 products and 0.08 `precision` terms of Stirling's series for moderate x.
 */
export function gammaEnclosure(x: bigint, xBits: bigint, precision: bigint): Enclosure {
  if (xBits < 1n) return gammaEnclosure(x << (1n - xBits), 1n, precision);
  const { logarithm, product } = shiftedGamma(x, xBits, precision + 8n);
  return over(exponentialOf(logarithm, precision + 8n), product, precision);
}

/** Γ(p/q) for p/q > 0 with a relative error of about 2^−precision. */
export function gammaOfRational({ numerator, denominator }: Rational, precision: bigint): Enclosure {
  const small = BigInt(bitLength(denominator) - bitLength(numerator));
  const bits = precision + 8n + (small > 0n ? small : 0n);
  const x = (numerator << bits) / denominator;
  const gamma = gammaEnclosure(x, bits, precision);
  return x * denominator === numerator << bits
    ? gamma
    : { ...gamma, units: gamma.units + argumentSpread(gamma.value, x, x, bits) };
}

/**
 * What an error of one unit in the argument x does to Γ(x), relative to `size`: |ψ(x)| ≤ 1/d + log(|x| + 2) + 1, d the
 * distance to the nearest pole (DLMF 5.5.2, 5.5.4), with a factor 2 for the interval in which the argument lies.
 */
export function argumentSpread(size: bigint, x: bigint, distance: bigint, bits: bigint): bigint {
  const slope = (1n << bits) / distance + BigInt(bitLength(x >> bits)) + 3n;
  const magnitude = absolute(size);
  return ((2n * magnitude * slope) >> bits) + 1n;
}

/**
 * log Γ(x) at `bits`: at most one unit off.
 *
 * @param x - Fixed-point number > 0 at `xBits`, taken as exact.
 */
export function logGammaFixed(x: bigint, xBits: bigint, bits: bigint): bigint {
  if (xBits < 1n) return logGammaFixed(x << (1n - xBits), 1n, bits);
  const work = bits + 4n;
  const { logarithm, product } = shiftedGamma(x, xBits, work + 4n);
  // 2^−4 · 2 units, the product's relative 2^−work/4, the logarithm's unit: below 2 of 16; half a unit for rounding.
  const value = (logarithm.value >> 4n) - logarithmFixed(product.value, product.bits, work);
  return ((value >> (work - bits - 1n)) + 1n) >> 1n;
}
