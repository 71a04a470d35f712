/**
 * ζ'(−1), the constant of the left tails of the Tracy–Widom laws.
 */
import { logTwoFixed, piFixed, remembered } from "./constants.ts";
import { eulerGammaFixed } from "./euler-gamma.ts";
import { bitLength } from "./fixed-point.ts";
import { logarithmFixed } from "./logarithm.ts";

/**
 * log 1, …, log count at `bits`: primes from their neighbours, log p = ½ (log(p − 1) + log(p + 1)) + artanh(1/(2p² − 1)),
 * composites by addition.
 *
 * log n is within C log2 n units, C = `bits`/8 + 8: an artanh has at most `bits`/8 + 2 terms of about one unit each, and
 * with log2(p ± 1) = 1 + log2((p ± 1)/2), where log 2 has one unit, C − 1 of ½ C (log2(p − 1) + log2(p + 1)) is spared.
 */
function logarithmsOfIntegers(count: number, bits: bigint): bigint[] {
  const factor = new Int32Array(count + 2);
  for (let p = 2; p <= count + 1; p++) {
    if (factor[p] === 0) for (let m = p; m <= count + 1; m += p) if (factor[m] === 0) factor[m] = p;
  }
  const logs = new Array<bigint>(count + 2).fill(0n);
  logs[2] = logTwoFixed(bits);
  const composite = (n: number): bigint => {
    const p = factor[n];
    return logs[p] + (p === n ? 0n : logs[n / p] || composite(n / p));
  };
  for (let n = 3; n <= count; n++) {
    if (factor[n] < n) logs[n] = logs[factor[n]] + logs[n / factor[n]];
    else
      logs[n] = ((logs[n - 1] + composite(n + 1)) >> 1n) + inverseTangentOf(2n * BigInt(n) ** 2n - 1n, bits);
  }
  return logs;
}

/** artanh(1/q) for a large integer q, within two units a term. */
function inverseTangentOf(q: bigint, bits: bigint): bigint {
  const square = q * q;
  let power = (1n << bits) / q;
  let sum = 0n;
  for (let k = 1n; power !== 0n; k += 2n) {
    sum += power / k;
    power /= square;
  }
  return sum;
}

/**
 * ζ'(−1) at `bits`: at most one unit off.
 *
 * ζ'(−1) = (1 − γ − log 2π)/12 + ζ'(2)/(2π²) (DLMF 25.4.2 differentiated), and from η(s) = (1 − 2^{1−s}) ζ(s),
 * ζ'(2) = 2 η'(2) − ζ(2) log 2, η'(2) = Σ (−1)^k log(k)/k². The alternating series is accelerated after H. Cohen,
 * F. Rodriguez Villegas, D. Zagier, Convergence acceleration of alternating series, Experiment. Math. 9 (2000),
 * algorithm 1: log(k+1)/(k+1)² = ∫₀^∞ e^{−(k+1)t} t (ψ(2) − log t) dt, so that with n terms the error is at most
 * 2 (3 + √8)^{−n} ∫ e^{−t} t |ψ(2) − log t| dt < 6 (3 + √8)^{−n}.
 */
export const zetaPrimeFixed: (bits: bigint) => bigint = remembered((bits) => {
  const work = bits + BigInt(2 * bitLength(bits) + 8);
  const n = Math.ceil((Number(work) + 4) / Math.log2(3 + Math.sqrt(8)));
  const logs = logarithmsOfIntegers(n, work);
  // (3 + √8)^n + (3 − √8)^n is an integer: a_{n+1} = 6 a_n − a_{n−1}.
  let [before, d] = [2n, 6n];
  for (let k = 1; k < n; k++) [before, d] = [d, 6n * d - before];
  d /= 2n;
  let b = -1n;
  let c = -d;
  let sum = 0n;
  const total = BigInt(n);
  for (let k = 0n; k < total; k++) {
    c = b - c;
    sum += c * (logs[Number(k) + 1] / ((k + 1n) * (k + 1n)));
    b = (b * (k + total) * (k - total) * 2n) / ((2n * k + 1n) * (k + 1n));
  }
  // sum/d = Σ_{k≥0} (−1)^k log(k+1)/(k+1)² = −η'(2)
  const etaPrime = -sum / d;
  const pi = piFixed(work);
  const piSquare = (pi * pi) >> work;
  const logTwo = logTwoFixed(work);
  // ζ'(2)/(2π²) = η'(2)/π² − log 2 / 12, since ζ(2) = π²/6.
  const logPi = logarithmFixed(pi, work, work);
  const twelfth = ((1n << work) - eulerGammaFixed(work) - 2n * logTwo - logPi) / 12n;
  return (twelfth + (etaPrime << work) / piSquare) >> (work - bits);
});
