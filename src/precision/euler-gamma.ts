/**
 * Euler's constant.
 */
import { remembered } from "./constants.ts";
import { bitLength } from "./fixed-point.ts";
import { logarithmFixed } from "./logarithm.ts";

/**
 * Euler's γ at `bits`: at most one unit off.
 *
 * Source: R. P. Brent, E. M. McMillan, Some new algorithms for high-precision computation of Euler's constant, Math.
 * Comp. 34 (1980), algorithm B1: γ = U/V − log n − K₀(2n)/I₀(2n), U = Σ H_k (n^k/k!)², V = Σ (n^k/k!)² = I₀(2n), and
 * K₀(2n)/I₀(2n) < π e^{−4n}. Costs about 2.5 n products by small integers, n = 0.17 `bits`.
 */
export const eulerGammaFixed: (bits: bigint) => bigint = remembered((bits) => {
  const n = BigInt(Math.ceil((Number(bits) + 2) * (Math.LN2 / 4)) + 1);
  const work = bits + BigInt(2 * bitLength(bits) + 8);
  const square = n * n;
  // (n^k/k!)² and H_k (n^k/k!)²; their errors, a unit or two a step, grow like the terms, which V divides out again.
  let term = 1n << work;
  let weighted = 0n;
  let u = 0n;
  let v = term;
  for (let k = 1n; term !== 0n; k++) {
    term = (term * square) / (k * k);
    weighted = (weighted * square) / (k * k) + term / k;
    u += weighted;
    v += term;
  }
  return ((u << bits) / v - logarithmFixed(n, 0n, bits)) as bigint;
});
