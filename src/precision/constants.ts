/**
 * π and logarithms of small integers, by sums of rationals; remembered per precision.
 */
import { squareRoot } from "./fixed-point.ts";

const BLOCK = 256n;

/**
 * A constant remembered at multiples of 256 bits.
 *
 * Every precision is served from the block that holds it and 32 bits more, so that a result never depends on what was
 * asked for before. `compute(bits)` must be within 2^16 units; what comes back is at most one unit off.
 */
export function remembered(compute: (bits: bigint) => bigint): (bits: bigint) => bigint {
  const known = new Map<bigint, bigint>();
  return (bits) => {
    const block = ((bits + 32n) / BLOCK + 1n) * BLOCK;
    let value = known.get(block);
    if (value === undefined) {
      value = compute(block);
      known.set(block, value);
    }
    // To nearest: half a unit, and 2^16 units of the block are at most 2^−16 units here.
    return ((value >> (block - bits - 1n)) + 1n) >> 1n;
  };
}

/** Numerator, denominator and sum of the terms from `from` to `to` − 1, by halves. */
function chudnovsky(from: number, to: number): [bigint, bigint, bigint] {
  if (to - from === 1) {
    if (from === 0) return [1n, 1n, 13591409n];
    const k = BigInt(from);
    const p = -(6n * k - 5n) * (2n * k - 1n) * (6n * k - 1n);
    return [p, k * k * k * 10939058860032000n, p * (13591409n + 545140134n * k)];
  }
  const middle = (from + to) >> 1;
  const [p1, q1, t1] = chudnovsky(from, middle);
  const [p2, q2, t2] = chudnovsky(middle, to);
  return [p1 * p2, q1 * q2, q2 * t1 + p1 * t2];
}

/**
 * π at `bits`: at most one unit off.
 *
 * Source: D. and G. Chudnovsky, Approximations and complex multiplication according to Ramanujan (1988):
 * 1/π = 12 Σ (−1)^k (6k)! (13591409 + 545140134 k) / ((3k)! k!³ 640320^{3k+3/2}), 47 bits a term, terms alternating.
 */
export const piFixed: (bits: bigint) => bigint = remembered((bits) => {
  const [, q, t] = chudnovsky(0, Math.ceil(Number(bits) / 47) + 2);
  // 426880 √10005 = √(426880² · 10005)
  return (squareRoot((426880n * 426880n * 10005n) << bits, bits) * q) / t;
});

/** Σ_{from ≤ k < to} of 1/((2k+1) n^{2k+1}) as numerator / (denominator · power), power = n^{2(to−from)}. */
function inverseTangentSum(n2: bigint, from: number, to: number): [bigint, bigint, bigint] {
  if (to - from === 1) return [n2, BigInt(2 * from + 1), n2];
  const middle = (from + to) >> 1;
  const [t1, d1, p1] = inverseTangentSum(n2, from, middle);
  const [t2, d2, p2] = inverseTangentSum(n2, middle, to);
  return [t1 * d2 * p2 + t2 * d1, d1 * d2, p1 * p2];
}

/** artanh(1/n) = Σ 1/((2k+1) n^{2k+1}), within two units. */
function inverseTangent(n: bigint, bits: bigint): bigint {
  const terms = Math.ceil(Number(bits) / (2 * Math.log2(Number(n)))) + 2;
  const [sum, denominator, power] = inverseTangentSum(n * n, 0, terms);
  return (sum << bits) / (denominator * power * n);
}

/**
 * log 2, log 3, log 5 from artanh 1/31, artanh 1/49 and artanh 1/161: (1 + 1/n)/(1 − 1/n) is 16/15, 25/24, 81/80, and
 * three such relations determine the three logarithms.
 */
function smallLogarithm(a: bigint, b: bigint, c: bigint): (bits: bigint) => bigint {
  return remembered(
    (bits) => a * inverseTangent(31n, bits) + b * inverseTangent(49n, bits) + c * inverseTangent(161n, bits),
  );
}

/** log 2 at `bits`: at most one unit off. */
export const logTwoFixed: (bits: bigint) => bigint = smallLogarithm(14n, 10n, 6n);

/** log 3 at `bits`: at most one unit off. */
export const logThreeFixed: (bits: bigint) => bigint = smallLogarithm(22n, 16n, 10n);

/** log 10 at `bits`: at most one unit off. */
export const logTenFixed: (bits: bigint) => bigint = smallLogarithm(46n, 34n, 20n);
