/**
 * Bessel functions of the first kind by Hankel's expansion.
 */
import { orderAsNumber } from "./bessel-series.ts";
import type { Rational } from "./decimal.ts";
import { enclosedPi, exponentOf, sineCosineOf } from "./enclosed-functions.ts";
import {
  add,
  type Enclosure,
  exactInteger,
  negate,
  over,
  rootOf,
  shiftEnclosure,
  times,
  withBits,
} from "./enclosure.ts";
import { bitLength } from "./fixed-point.ts";

/** Guard bits of the sums beside those of the largest term: for the square of the number of terms. */
function guardBits(order: number, bits: number): number {
  return 2 * Math.ceil(Math.log2(bits + order + 16)) + 8;
}

/**
 * log2 of the largest term of Hankel's expansion if its terms get below the units of {@link besselFar} at `bits`,
 * otherwise `undefined`. Doubles suffice: the answer only chooses the method and the guard bits.
 */
export function hankelReach(order: number, x: number, bits: number): number | undefined {
  let size = 0;
  let largest = 0;
  const square = 4 * order * order;
  const wanted = bits + guardBits(order, bits) + 4;
  for (let k = 1; ; k++) {
    const odd = 2 * k - 1;
    size += Math.log2(Math.abs(square - odd * odd) / (8 * k * x));
    largest = Math.max(largest, size);
    if (size < -wanted - largest && k >= order + 1) return largest;
    if (k > 2 * x + order + 2 || size > 2 * x) return undefined;
  }
}

/** cos and sin of ω = x − νπ/2 − π/4 at `work`. */
function phase(order: Rational, x: Enclosure, work: bigint): [sine: Enclosure, cosine: Enclosure] {
  // (2ν + 1)/4 modulo 2 as a fraction, so that large orders cost no digits.
  const denominator = 4n * order.denominator;
  const turns = (2n * order.numerator + order.denominator) % (2n * denominator);
  const pi = enclosedPi(work + 4n);
  const shift = over(times(exactInteger(turns), pi, work + 8n), exactInteger(denominator), work + 8n);
  return sineCosineOf(add(x, negate(shift)), work);
}

/**
 * J_ν(x) with an absolute error of about 2^−precision for large x.
 *
 * DLMF 10.17.3: √(2/(πx)) (cos ω Σ (−1)^k a_{2k}(ν) x^−2k − sin ω Σ (−1)^k a_{2k+1}(ν) x^−2k−1),
 * a_k = (4ν² − 1²)(4ν² − 3²)⋯(4ν² − (2k − 1)²) / (k! 8^k). Stopped at k ≥ ν + 1 the error of each sum is below its first
 * neglected term (10.17(iii)). One product a term. The order stays exact.
 *
 * @param x - x > 0; {@link hankelReach} must hold with `precision` digits.
 * @param largest - log2 of the largest term, from {@link hankelReach}.
 */
export function besselFar(order: Rational, x: Enclosure, precision: bigint, largest: number): Enclosure {
  const { numerator: p, denominator: q } = order;
  const work = precision + BigInt(Math.ceil(largest) + guardBits(orderAsNumber(order), Number(precision)));
  const exponent = exponentOf(x);
  const place = work + (exponent > 0n ? exponent : 0n); // 1/x to `work` digits of its own
  const inverse = withBits(over(exactInteger(1n), x, work + 8n), place);
  const sums = [0n, 0n, 0n, 0n];
  const least = Number((p > 0n ? p : 0n) / q) + 2;
  const most = least + 2 * Math.ceil(2 ** Number(exponent)) + 8; // the terms grow beyond 2x
  let term = 1n << work;
  let k = 0;
  for (;;) {
    sums[k & 3] += term;
    k++;
    const odd = BigInt(2 * k - 1) * q;
    term = ((term * inverse.value * (4n * p * p - odd * odd)) >> place) / (8n * BigInt(k) * q * q);
    if (k >= least && term <= 2n && term >= -2n) break;
    if (k > most) throw new RangeError("Hankel's expansion does not reach this precision");
  }
  // A step adds 2 units of rounding and, δ being the units of 1/x, 2δ times the term; later terms are at most the largest
  // one times earlier ones (the ratios above 1 come first). So each of the k terms is within k (2 + 2δ) units times the
  // largest (one binary digit for the doubles it comes from); the first ones left out are at most 2.
  const growth = BigInt(Math.ceil(largest) + 1);
  const units = ((BigInt(k) ** 2n * (2n + 2n * inverse.units)) << growth) + 4n;
  const even = { value: sums[0] - sums[2], bits: work, units };
  const uneven = { value: sums[1] - sums[3], bits: work, units };
  const [sine, cosine] = phase(order, x, work);
  const wave = add(times(cosine, even, work), negate(times(sine, uneven, work)));
  const root = rootOf(
    shiftEnclosure(over(exactInteger(1n), times(x, enclosedPi(work), work), work), 1n),
    work,
  );
  return times(wave, root, precision + BigInt(bitLength(precision)));
}
