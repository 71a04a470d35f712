/**
 * Smirnov's one-sided sum, in the logarithm and at a cost that does not grow with n:
 *
 *   P(D_n⁺ ≥ d) = d Σ_{j ≤ n(1−d)} C(n, j) (d + j/n)^{j−1} (1 − d − j/n)^{n−j}
 *
 * (N. V. Smirnov, 1944; Z. W. Birnbaum, F. H. Tingey, Ann. Math. Statist. 22 (1951) 592). All terms are positive.
 *
 * Term j is d/(d + j/n) times the binomial probability of j successes at success probability d + j/n, and that one is
 * taken in its saddle-point form (C. Loader's form, from memory): no sum of large logarithms, so that the relative
 * error grows with |log P| only. Its exponent is −n times a Kullback–Leibler divergence, concave in j: the terms have
 * one peak, and only a window around it counts. Where the peak is wide the terms are a smooth function that vanishes
 * at both ends of the window, and the trapezoidal rule with a stride gives their sum to rounding.
 */
import { fromLog, type TailProbability } from "./tail-probability.ts";

const WIDTHS = 12; // half-width of the window in standard deviations of the peak
const MARGIN = 60; // and this many terms more, for peaks of a few terms that are not Gaussian
const POINTS = 200; // points in one standard deviation where terms are skipped
const FLAT = 45; // terms at the ends are below e^−45 of the peak: then terms may be skipped

/**
 * Twice P(D_n⁺ ≥ d), which is P(D_n ≥ d) exactly for d ≥ ½ and an upper bound below.
 *
 * @param n - Number of observations.
 * @param d - Distance in (0, 1).
 * @param logComplement - log(1 − d), given apart so that distances next to 1 keep their digits.
 * @returns The probability; relative error 2e-14 plus a few units of rounding of its logarithm.
 */
export function doubledSmirnovSurvival(n: number, d: number, logComplement: number): TailProbability {
  const c = Math.exp(logComplement);
  const first = n * logComplement; // the term j = 0
  const last = Math.min(n - 1, Math.floor(n * c));
  let reference = first;
  let sum = 1;
  if (last >= 1) {
    const t = peak(d, c);
    const centre = Math.min(last, Math.max(1, Math.round(n * t)));
    const curvature = (d * d) / (t * (t + d) ** 2) + (d * d) / ((1 - t) * (c - t) ** 2);
    const width = Math.sqrt(n / curvature);
    const from = Math.max(1, Math.floor(centre - WIDTHS * width - MARGIN));
    const to = Math.min(last, Math.ceil(centre + WIDTHS * width + MARGIN));
    const top = logTerm(n, d, c, centre);
    const flat = Math.max(logTerm(n, d, c, from), logTerm(n, d, c, to)) < top - FLAT;
    const stride = flat ? Math.max(1, Math.floor(width / POINTS)) : 1;
    reference = Math.max(first, top);
    let rest = 0;
    for (let j = from; j <= to; j += stride) rest += Math.exp(logTerm(n, d, c, j) - reference);
    sum = Math.exp(first - reference) + stride * rest;
  }
  const log = Math.min(0, Math.LN2 + reference + Math.log(sum));
  return fromLog(log, 2e-14 + 8 * Number.EPSILON * Math.abs(log));
}

/** Where −KL(Bernoulli(t) ‖ Bernoulli(t + d)) is largest, by bisection of its decreasing derivative on (0, c). */
function peak(d: number, c: number): number {
  let low = 0;
  let high = c;
  for (let i = 0; i < 80; i++) {
    const t = 0.5 * (low + high);
    const left = Math.log1p(d / t) - d / (t + d);
    const right = Math.log1p(d / (c - t)) - d / (c - t);
    if (left + right > 0) low = t;
    else high = t;
  }
  return 0.5 * (low + high);
}

/** log of d/(d + j/n) · C(n, j) p^j (1 − p)^{n−j} at p = d + j/n, 1 ≤ j ≤ n − 1. */
function logTerm(n: number, d: number, c: number, j: number): number {
  const m = n - j;
  const left = n * c - j; // n (1 − p)
  if (!(left > 0)) return Number.NEGATIVE_INFINITY;
  const y = (n * d) / j;
  const z = (n * d) / m;
  const deviance = j * logResidual(y) + m * (z < 0.5 ? logResidual(-z) : -(Math.log(left / m) + z));
  return (
    stirlingError(n) -
    stirlingError(j) -
    stirlingError(m) -
    0.5 * Math.log((2 * Math.PI * j * m) / n) -
    deviance -
    Math.log1p(j / (n * d))
  );
}

/** y − log(1 + y) ≥ 0 without cancellation; with r = y/(2 + y), log(1 + y) = 2 artanh r. */
function logResidual(y: number): number {
  if (y > 0.5 || y < -0.5) return y - Math.log1p(y);
  const r = y / (2 + y);
  const square = r * r;
  let sum = 0;
  for (let k = 31; k >= 3; k -= 2) sum = sum * square + 1 / k;
  return r * (y - 2 * square * sum);
}

/** log n! − ((n + ½) log n − n + ½ log 2π). */
function stirlingError(n: number): number {
  if (n < SMALL_STIRLING.length) return SMALL_STIRLING[n];
  const s = 1 / (n * n);
  return (1 / 12 - s * (1 / 360 - s * (1 / 1260 - s * (1 / 1680 - s * (1 / 1188 - (s * 691) / 360360))))) / n;
}

/** From 16 downwards by δ(n) − δ(n + 1) = (n + ½) log(1 + 1/n) − 1; entry 0 is not used. */
const SMALL_STIRLING = smallStirlingErrors(16);

function smallStirlingErrors(count: number): Float64Array {
  const out = new Float64Array(count);
  const s = 1 / (count * count);
  let next = (1 / 12 - s * (1 / 360 - s * (1 / 1260 - s * (1 / 1680 - s / 1188)))) / count;
  for (let n = count - 1; n >= 1; n--) {
    next += (n + 0.5) * Math.log1p(1 / n) - 1;
    out[n] = next;
  }
  return out;
}
