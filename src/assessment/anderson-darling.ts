/**
 * Null law of the Anderson–Darling statistic for a fully specified continuous law, in the limit of large samples:
 * Σ_j Z_j² / (j (j + 1)), Z_j independent standard normal (T. W. Anderson, D. A. Darling, Ann. Math. Statist. 23 (1952)
 * 193).
 *
 * For Σ λ_j Z_j² with λ_1 > λ_2 > … Smirnov's formula (N. V. Smirnov, 1937; D. Slepian, Bell Syst. Tech. J. 37 (1958)
 * 163) reads
 *
 *   P(A² > x) = (1/π) Σ_k (−1)^{k+1} ∫_{1/λ_{2k−1}}^{1/λ_{2k}} e^{−xu/2} / (u √|D(u)|) du,
 *   D(u) = Π_j (1 − λ_j u) = −cos(½π √(1 + 4u)) / (π u)    (the Fredholm determinant of the kernel behind it).
 *
 * With v = √(1 + 4u) the intervals are 4k − 1 < v < 4k + 1; v = 4k − 1 + 2 sin²(θ/2) removes the square roots at both
 * ends. The terms fall like e^{−k(2k−1)x}, so that the right tail keeps its relative accuracy; e^{−x} is taken out, so
 * that its logarithm survives underflow. For small x the probability below x comes from the series of Anderson and
 * Darling (J. Amer. Statist. Assoc. 49 (1954) 765; from memory).
 */
import { requireNonNegative } from "../core/check.ts";
import { gaussLegendreShared } from "../quadrature/gauss-legendre.ts";
import { fromLog, type TailProbability } from "./tail-probability.ts";

const ORDER = 60;
const SMALL = 0.6;
const LEAST = 0.01; // P(A² ≤ 0.01) is below e^−120
const NEGLIGIBLE = 42; // e^−42 < 1e-18

/**
 * P(A² > x) in the limit.
 *
 * @param x - Statistic ≥ 0.
 * @returns The probability and its logarithm; relative error 1e-13 plus the rounding of x itself.
 * @throws {@link InvalidArgumentError} for a negative or infinite x.
 */
export function andersonDarlingLimitSurvival(x: number): TailProbability {
  requireNonNegative("x", x);
  if (x === 0) return { value: 1, error: 0, log: 0, logError: 0 };
  if (x < LEAST) return { value: 1, error: 1e-16, log: 0, logError: 1e-16 };
  if (x < SMALL) return fromLog(Math.log1p(-lowerSeries(x)), 1e-13);
  let sum = 0;
  for (let k = 1; k <= 40; k++) {
    const term = smirnovTerm(x, k);
    sum += k % 2 === 1 ? term : -term;
    if (term < 1e-18 * sum) break;
  }
  return fromLog(Math.log(sum) - x, 1e-13 + 4 * Number.EPSILON * x);
}

/** e^x (1/π) ∫ over the k-th interval. */
function smirnovTerm(x: number, k: number): number {
  const { nodes, weights } = gaussLegendreShared(ORDER);
  const low = 4 * k - 1;
  // xu/2 − x = x (u_low/2 − 1) + x δ (2 low + δ)/8, with δ = v − low and u_low = 2k (2k − 1).
  const base = x * (k * (2 * k - 1) - 1);
  const reach = 2 * Math.asin(Math.sqrt(Math.min(1, (2 * NEGLIGIBLE) / (low * x))));
  let sum = 0;
  for (let i = 0; i < ORDER; i++) {
    const theta = 0.5 * reach * (1 + nodes[i]);
    const delta = 2 * Math.sin(0.5 * theta) ** 2;
    const v = low + delta;
    const u = 0.25 * (v * v - 1);
    // |cos ½πv| = sin ½πδ; for δ > 1 from the other end of the interval, 2 − δ = 2 cos²(θ/2).
    const cosine = Math.sin(0.5 * Math.PI * Math.min(delta, 2 * Math.cos(0.5 * theta) ** 2));
    const exponent = base + (x * delta * (2 * low + delta)) / 8;
    sum +=
      (weights[i] * Math.exp(-exponent) * Math.sqrt(Math.PI / u) * v * Math.sin(theta)) / Math.sqrt(cosine);
  }
  return (0.25 * reach * sum) / Math.PI;
}

/**
 * P(A² ≤ x) = (√(2π)/x) Σ_j C(−½, j) (4j + 1) e^{−(4j+1)²π²/(8x)} ∫_0^∞ e^{x/(8(w²+1)) − (4j+1)²π²w²/(8x)} dw.
 */
function lowerSeries(x: number): number {
  const { nodes, weights } = gaussLegendreShared(ORDER);
  let sum = 0;
  let binomial = 1;
  for (let j = 0; j < 20; j++) {
    if (j > 0) binomial *= (0.5 - j) / j;
    const rate = ((4 * j + 1) ** 2 * Math.PI * Math.PI) / (8 * x);
    const reach = Math.sqrt(NEGLIGIBLE / rate);
    let integral = 0;
    for (let i = 0; i < ORDER; i++) {
      const w = 0.5 * reach * (1 + nodes[i]);
      integral += 0.5 * reach * weights[i] * Math.exp(x / (8 * (w * w + 1)) - rate * w * w);
    }
    const term = binomial * (4 * j + 1) * Math.exp(-rate) * integral;
    sum += term;
    if (Math.abs(term) < 1e-18 * Math.abs(sum)) break;
  }
  return (Math.sqrt(2 * Math.PI) / x) * sum;
}
