/**
 * Ai, Ai′ and ∫Ai by their Maclaurin series.
 */
import { logThreeFixed, piFixed, remembered } from "./constants.ts";
import { withBits } from "./enclosure.ts";
import { exponentialFixed } from "./exponential.ts";
import { log2OfFixed, numberFromFixed } from "./fixed-point.ts";
import { gammaOfRational } from "./gamma.ts";

function gammaOfThird(bits: bigint): bigint {
  return withBits(gammaOfRational({ numerator: 1n, denominator: 3n }, bits + 4n), bits).value;
}

/** 3^{1/3} within three units. */
function cubeRootOfThree(bits: bigint): bigint {
  return exponentialFixed(logThreeFixed(bits) / 3n, bits);
}

/** Ai(0) = 3^{−2/3}/Γ(2/3) = 3^{−1/6} Γ(1/3)/(2π) at `bits`: at most one unit off (DLMF 9.2.3, 5.5.3). */
export const airyAtZero: (bits: bigint) => bigint = remembered((bits) => {
  // 3^{−2/3}/Γ(2/3) = 3^{−2/3} Γ(1/3) √3/(2π); squared root avoided: 3^{−1/6} = e^{−log 3/6}
  const root = exponentialFixed(-logThreeFixed(bits) / 6n, bits);
  return (root * gammaOfThird(bits)) / (2n * piFixed(bits));
});

/** −Ai′(0) = 3^{−1/3}/Γ(1/3) at `bits`: at most one unit off (DLMF 9.2.4). */
export const airySlopeAtZero: (bits: bigint) => bigint = remembered(
  (bits) => (1n << (3n * bits)) / (cubeRootOfThree(bits) * gammaOfThird(bits)),
);

/** Ai, Ai′ and, when asked for, ∫_x^∞ Ai. */
export interface AiryTriple {
  readonly value: bigint;
  readonly slope: bigint;
  readonly integral: bigint;
}

/**
 * Ai(x), Ai′(x), ∫_x^∞ Ai at `bits`: each at most one unit off.
 *
 * DLMF 9.4.1: Ai(x) = Ai(0) f(x) + Ai′(0) g(x), terms of f in x^{3k}, of g in x^{3k+1}; f, g/x and the like are at most
 * cosh ζ, ζ = ⅔|x|^{3/2}, with |x| for x, term by term ((3k−1)(3k) ≥ (9/4)(2k−1)(2k)). An error of a few units in one
 * term grows in the later ones no faster than the terms do, so that all K terms together are within 4 K cosh ζ units,
 * the weighted sums for Ai′ within 3K times that, divided by |x|: ζ log2 e + 2 log2 K + max(0, −log2|x|) guard bits.
 * About eζ + 0.1 `bits` terms of two products each.
 *
 * @param x - Fixed-point number at `bits`, taken as exact.
 */
export function airyMaclaurin(x: bigint, bits: bigint, withIntegral = false): AiryTriple {
  if (x === 0n) {
    const integral = (1n << bits) / 3n;
    return { value: airyAtZero(bits), slope: -airySlopeAtZero(bits), integral };
  }
  const zeta = (2 / 3) * Math.abs(numberFromFixed(x, bits)) ** 1.5;
  const small = Math.max(0, -Math.floor(log2OfFixed(x, bits)));
  const most = Number(bits) + 6 * zeta + small;
  const guard = BigInt(Math.ceil(zeta * Math.LOG2E) + 2 * Math.ceil(Math.log2(most)) + small + 8);
  const work = bits + guard;
  const cube = (x * x * x) >> (2n * bits >= guard ? 2n * bits - guard : 0n);
  const cubeScaled = 2n * bits >= guard ? cube : cube << (guard - 2n * bits);
  let even = airyAtZero(work);
  let odd = -((airySlopeAtZero(work) * x) >> bits);
  let value = even + odd;
  let slope = odd; // x Ai′(x)
  let first = even; // Σ of the terms of ∫Ai, divided by x
  let second = odd / 2n;
  for (let k = 3; !vanishes(even) || !vanishes(odd); k += 3) {
    even = ((even * cubeScaled) >> work) / BigInt(k * (k - 1));
    odd = ((odd * cubeScaled) >> work) / BigInt(k * (k + 1));
    value += even + odd;
    slope += BigInt(k) * even + BigInt(k + 1) * odd;
    if (withIntegral) {
      first += even / BigInt(k + 1);
      second += odd / BigInt(k + 2);
    }
  }
  const integral = withIntegral ? (1n << work) / 3n - (((first + second) * x) >> bits) : 0n;
  return {
    value: rounded(value, guard),
    slope: rounded((slope << bits) / x, guard),
    integral: rounded(integral, guard),
  };
}

function vanishes(term: bigint): boolean {
  return term === 0n || term === -1n;
}

/** a · 2^−drop to the nearest integer. */
function rounded(a: bigint, drop: bigint): bigint {
  return ((a >> (drop - 1n)) + 1n) >> 1n;
}
