/**
 * Kolmogorov–Smirnov distance between a sample and a fully specified continuous law: its p-value P(D_n ≥ d).
 *
 * Of two routes the one with the smaller error is taken, x = √n d:
 * - the tail: twice Smirnov's one-sided sum (kolmogorov-tail.ts). It counts twice the samples that deviate by d on both
 *   sides. For d ≥ ½ there are none; below, their probability is at most 3e^{−8x²} (it tends to 2e^{−8x²}; against exact
 *   values for n ≤ 200 the ratio to e^{−8x²} was 1.73 at most).
 * - the body: Durbin's matrix (kolmogorov-durbin.ts) for n ≤ 2000, beyond it the expansion of Pelz and Good
 *   (kolmogorov-limit.ts), whose error falls like n^{−2}.
 */
import { requireBetween, requireInteger } from "../core/check.ts";
import { durbinCdf } from "./kolmogorov-durbin.ts";
import { pelzGoodSurvival } from "./kolmogorov-limit.ts";
import { doubledSmirnovSurvival } from "./kolmogorov-tail.ts";
import { fromLog, fromValue, type TailProbability } from "./tail-probability.ts";

const MOST_EXACT = 2000;

/**
 * P(D_n ≥ d) for n independent observations of the law itself.
 *
 * @param n - Number of observations, 1 to 1e9.
 * @param d - Distance, strictly between 0 and 1.
 * @returns The probability and its logarithm with their errors: relative about 1e-13 in the tail (x² ≥ 4 or d ≥ ½),
 *   absolute 1e-13 + 1e-15 n in the body for n ≤ 2000, 0.1/n² beyond.
 * @throws {@link InvalidArgumentError} for n or d outside their range.
 *
 * Cost: some thousand exponentials in the tail and for n > 2000; 8 (nd)³ log₂ n in the body (0.1 s at worst).
 */
export function kolmogorovSurvival(n: number, d: number): TailProbability {
  requireInteger("n", n, 1, 1e9);
  requireBetween("d", d, 0, 1);
  if (n * d <= 0.5) return { value: 1, error: 0, log: 0, logError: 0 };
  const twoSided = d >= 0.5 ? 0 : 3 * Math.exp(-8 * n * d * d);
  const bodyError = n <= MOST_EXACT ? 1e-13 + 1e-15 * n : 0.1 / (n * n) + 1e-15;
  if (twoSided > bodyError) {
    const value = n <= MOST_EXACT ? 1 - durbinCdf(n, d) : pelzGoodSurvival(n, Math.sqrt(n) * d);
    return fromValue(Math.max(0, value), bodyError);
  }
  const tail = doubledSmirnovSurvival(n, d, Math.log1p(-d));
  // As a ratio of logarithms, since both may underflow.
  const countedTwice = d >= 0.5 ? 0 : 3 * Math.exp(-8 * n * d * d - tail.log);
  return fromLog(tail.log, tail.logError + countedTwice);
}

/**
 * P(D_n ≥ d) for a distance d ≥ ½ given by log(1 − d), which keeps the digits of distances next to 1.
 *
 * @param n - Number of observations, 1 to 1e9.
 * @param logComplement - log(1 − d), finite, ≤ −log 2.
 */
export function kolmogorovFarSurvival(n: number, logComplement: number): TailProbability {
  requireInteger("n", n, 1, 1e9);
  requireBetween("logComplement", logComplement, Number.NEGATIVE_INFINITY, -Math.LN2 + 1e-15);
  return doubledSmirnovSurvival(n, -Math.expm1(logComplement), logComplement);
}
