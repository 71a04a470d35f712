/**
 * The shared part of every continuous law: batches, quantiles by inversion, moments by quadrature, sampling. A law
 * supplies its pointwise functions and its exact route; the rest is here once.
 */
import { safeNewton } from "../approximation/bracketing.ts";
import { requireInteger } from "../core/check.ts";
import { InvalidArgumentError } from "../core/errors.ts";
import type { Estimate } from "../core/estimate.ts";
import type { UniformGenerator } from "../core/random.ts";
import { gaussLegendreShared } from "../quadrature/gauss-legendre.ts";
import type { Law, LawAccuracy, LawMoments, LawProvenance, LawQuantity } from "./law.ts";

/** What a law brings along. */
export interface LawCore {
  readonly name: string;
  readonly symbol: string;
  readonly support: readonly [number, number];
  readonly accuracy: LawAccuracy;
  readonly provenance: LawProvenance;
  pdf(x: number): number;
  cdf(x: number): number;
  survival(x: number): number;
  logPdf(x: number): number;
  logCdf(x: number): number;
  logSurvival(x: number): number;
  /** A point near the median and a length near the standard deviation, where searches start. */
  readonly centre: number;
  readonly spread: number;
  /** Interval outside which less than 1e-25 of the sixth moment lies. */
  readonly bulk: readonly [number, number];
  /** The exact route, for anything but the quantiles. */
  exact(what: Exclude<LawQuantity, "quantile" | "upperQuantile">, x: number, options: ExactOptions): Estimate;
}

/** Tolerances of the exact route. */
export interface ExactOptions {
  readonly absTol?: number;
  readonly relTol?: number;
}

/** Completes a {@link LawCore} to a {@link Law}. */
export function completeLaw(core: LawCore): Law {
  let moments: LawMoments | undefined;
  const momentsOf = (): LawMoments => {
    moments ??= momentsByQuadrature(core);
    return moments;
  };
  const lower = (p: number): number =>
    p <= 0.5 ? solveLower(core, Math.log(p)) : solveUpper(core, Math.log1p(-p));
  const upper = (q: number): number =>
    q <= 0.5 ? solveUpper(core, Math.log(q)) : solveLower(core, Math.log1p(-q));
  const quantile = (p: number): number => (Number.isNaN(p) ? p : lower(requireProbability("p", p)));
  const upperQuantile = (q: number): number => (Number.isNaN(q) ? q : upper(requireProbability("q", q)));
  // Beyond ½ the other tail has the digits: log(1 − e^l) = log(−expm1(l)).
  const quantileFromLog = (l: number): number => {
    if (Number.isNaN(l)) return l;
    const log = requireLogProbability(l);
    return log <= -Math.LN2 ? solveLower(core, log) : solveUpper(core, Math.log(-Math.expm1(log)));
  };
  const upperQuantileFromLog = (l: number): number => {
    if (Number.isNaN(l)) return l;
    const log = requireLogProbability(l);
    return log <= -Math.LN2 ? solveUpper(core, log) : solveLower(core, Math.log(-Math.expm1(log)));
  };
  return Object.freeze({
    name: core.name,
    symbol: core.symbol,
    support: core.support,
    accuracy: core.accuracy,
    provenance: core.provenance,
    pdf: core.pdf,
    cdf: core.cdf,
    survival: core.survival,
    logPdf: core.logPdf,
    logCdf: core.logCdf,
    logSurvival: core.logSurvival,
    quantile,
    upperQuantile,
    quantileFromLog,
    upperQuantileFromLog,
    get mean(): number {
      return momentsOf().mean;
    },
    get variance(): number {
      return momentsOf().variance;
    },
    get skewness(): number {
      return momentsOf().skewness;
    },
    get excessKurtosis(): number {
      return momentsOf().excessKurtosis;
    },
    cumulant: (k: number): number => momentsOf().cumulants[requireInteger("k", k, 1, 6) - 1],
    pdfInto: into(core.pdf),
    cdfInto: into(core.cdf),
    survivalInto: into(core.survival),
    logPdfInto: into(core.logPdf),
    logCdfInto: into(core.logCdf),
    logSurvivalInto: into(core.logSurvival),
    quantileInto: into(quantile),
    upperQuantileInto: into(upperQuantile),
    sample(count: number, generator: UniformGenerator): Float64Array {
      requireInteger("count", count, 0, 2 ** 31);
      if (typeof generator !== "function")
        throw new InvalidArgumentError("generator", "a function", generator);
      const out = new Float64Array(count);
      for (let i = 0; i < count; i++) out[i] = lower(requireProbability("generator()", generator()));
      return out;
    },
    estimate(what: LawQuantity, x: number, options: ExactOptions = {}): Estimate {
      if (typeof x !== "number" || Number.isNaN(x)) throw new InvalidArgumentError("x", "a number", x);
      if (what === "quantile")
        return exactQuantile(core, "cdf", requireProbability("x", x), quantile(x), options);
      if (what === "upperQuantile") {
        return exactQuantile(core, "survival", requireProbability("x", x), upperQuantile(x), options);
      }
      if (!POINTWISE.includes(what)) {
        throw new InvalidArgumentError(
          "what",
          `one of ${POINTWISE.join(", ")}, quantile, upperQuantile`,
          what,
        );
      }
      return core.exact(what, x, options);
    },
  });
}

const POINTWISE: readonly LawQuantity[] = ["pdf", "cdf", "survival", "logPdf", "logCdf", "logSurvival"];

function requireProbability(argument: string, p: unknown): number {
  if (typeof p !== "number" || !(p > 0 && p < 1)) {
    throw new InvalidArgumentError(argument, "a probability strictly between 0 and 1", p);
  }
  return p;
}

function requireLogProbability(value: unknown): number {
  if (typeof value !== "number" || !(value >= -1e15 && value < 0)) {
    throw new InvalidArgumentError(
      "logProbability",
      "a logarithm of a probability, from -1e15 to below 0",
      value,
    );
  }
  return value;
}

function into(f: (x: number) => number): (x: Float64Array, out: Float64Array) => void {
  return (x, out) => {
    if (!(x instanceof Float64Array)) throw new InvalidArgumentError("x", "a Float64Array", x);
    if (!(out instanceof Float64Array) || out.length !== x.length) {
      throw new InvalidArgumentError("out", `a Float64Array of length ${x.length}`, out);
    }
    for (let i = 0; i < x.length; i++) out[i] = f(x[i]);
  };
}

/** x with log cdf(x) = target. */
function solveLower(core: LawCore, target: number): number {
  let high = core.centre + core.spread;
  let step = core.spread;
  while (core.logCdf(high) < target) high += step;
  let low = high - step;
  for (; core.logCdf(low) >= target; step *= 1.5) {
    high = low;
    low -= step;
  }
  const f = (x: number, out: Float64Array): void => {
    const log = core.logCdf(x);
    out[0] = log - target;
    out[1] = Math.exp(core.logPdf(x) - log);
  };
  return safeNewton(f, low, high, 0.5 * (low + high), true);
}

/** x with log survival(x) = target. */
function solveUpper(core: LawCore, target: number): number {
  let low = core.centre - core.spread;
  let step = core.spread;
  while (core.logSurvival(low) < target) low -= step;
  let high = low + step;
  for (; core.logSurvival(high) >= target; step *= 1.5) {
    low = high;
    high += step;
  }
  const f = (x: number, out: Float64Array): void => {
    const log = core.logSurvival(x);
    out[0] = log - target;
    out[1] = -Math.exp(core.logPdf(x) - log);
  };
  return safeNewton(f, low, high, 0.5 * (low + high), false);
}

/** One Newton step of the exact route from the tabulated quantile; its error is that of the probability over the density. */
function exactQuantile(
  core: LawCore,
  what: "cdf" | "survival",
  probability: number,
  start: number,
  options: ExactOptions,
): Estimate {
  const at = core.exact(what, start, {});
  const density = core.exact("pdf", start, {});
  const sign = what === "cdf" ? 1 : -1;
  const step = (sign * (at.value - probability)) / density.value;
  const value = start - step;
  const error = at.error / density.value + step * step * (1 + Math.abs(value)) + 2 ** -52 * Math.abs(value);
  const { absTol, relTol } = options;
  const tolerance =
    absTol === undefined && relTol === undefined
      ? 1e-12
      : Math.max(absTol ?? 0, (relTol ?? 0) * Math.abs(value));
  return { value, error, errorKind: "estimate", converged: error <= tolerance, order: at.order };
}

const PANEL_ORDER = 24;

function momentsByQuadrature(core: LawCore): LawMoments {
  const { nodes, weights } = gaussLegendreShared(PANEL_ORDER);
  const [from, to] = core.bulk;
  const panels = Math.ceil((to - from) / core.spread);
  const half = (to - from) / panels / 2;
  // Moments about a point near the mean, so that central moments come out without cancellation.
  const raw = new Float64Array(7);
  for (let p = 0; p < panels; p++) {
    const middle = from + (2 * p + 1) * half;
    for (let i = 0; i < PANEL_ORDER; i++) {
      const x = middle + half * nodes[i];
      let term = half * weights[i] * core.pdf(x);
      for (let k = 0; k <= 6; k++) {
        raw[k] += term;
        term *= x - core.centre;
      }
    }
  }
  const shift = raw[1] / raw[0];
  const central = centralMoments(raw, shift);
  const [m2, m3, m4, m5, m6] = [central[2], central[3], central[4], central[5], central[6]];
  const mean = core.centre + shift;
  // Cumulants from central moments (M. Kendall, A. Stuart, The Advanced Theory of Statistics 1, § 3.14).
  const cumulants = [
    mean,
    m2,
    m3,
    m4 - 3 * m2 * m2,
    m5 - 10 * m3 * m2,
    m6 - 15 * m4 * m2 - 10 * m3 * m3 + 30 * m2 ** 3,
  ];
  return {
    mean,
    variance: m2,
    skewness: m3 / m2 ** 1.5,
    excessKurtosis: m4 / (m2 * m2) - 3,
    cumulants,
  };
}

function centralMoments(raw: Float64Array, shift: number): number[] {
  const binomial = [
    [1],
    [1, 1],
    [1, 2, 1],
    [1, 3, 3, 1],
    [1, 4, 6, 4, 1],
    [1, 5, 10, 10, 5, 1],
    [1, 6, 15, 20, 15, 6, 1],
  ];
  return binomial.map((row, k) => {
    let sum = 0;
    for (let j = 0; j <= k; j++) sum += (row[j] * raw[j] * (-shift) ** (k - j)) / raw[0];
    return sum;
  });
}
