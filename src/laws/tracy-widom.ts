/**
 * The Tracy–Widom laws: limits of the largest eigenvalue of real (β = 1), complex (β = 2) and quaternion (β = 4)
 * Gaussian and Wishart matrices.
 *
 * Sources: C. Tracy, H. Widom, Commun. Math. Phys. 159 (1994) 151 (β = 2) and 177 (1996) 727 (β = 1, 4); determinants
 * for β = 1, 4: P. Ferrari, H. Spohn, J. Phys. A 38 (2005) L557.
 */
import { InvalidArgumentError } from "../core/errors.ts";
import type { Estimate } from "../core/estimate.ts";
import type { Law, LawAccuracy, LawProvenance, LawQuantity } from "./law.ts";
import { completeLaw, type ExactOptions, type LawCore } from "./law-base.ts";
import { type Beta, exactPoint } from "./tracy-widom-exact.ts";
import { type PointwiseLaw, tabulatedTracyWidom } from "./tracy-widom-table.ts";

/**
 * Which of the three published scalings of the β = 4 law is meant. With G(s) = ½ (F1(s) + F2(s)/F1(s)):
 *
 * - `"standard"`: F4(x) = G(√2 x), the usual moment tables, mean −2.30688…
 * - `"unscaled"`: G itself, also the law of the second largest eigenvalue for β = 1, mean −3.26243…
 * - `"stochastic-airy"`: G(2^{2/3} x), the general-β stochastic Airy operator, mean −2.05520…
 */
export type QuaternionScaling = "standard" | "unscaled" | "stochastic-airy";

/** Options of {@link tracyWidom}. */
export interface TracyWidomOptions {
  /** Scaling for β = 4; the other laws have only one. Default `"standard"`. */
  readonly scaling?: QuaternionScaling;
}

/**
 * A Tracy–Widom law.
 *
 * Fast route: tables made from the exact route at the first call (β = 2 in some milliseconds, β = 1 and 4 in some
 * tens), then well below a microsecond a call. Exact route: `estimate`, Fredholm determinants with their error.
 *
 * @param beta - Dyson index: 1 (real), 2 (complex) or 4 (quaternion).
 * @param options - `scaling` for β = 4.
 * @returns The law; the same object for the same arguments.
 * @throws {@link InvalidArgumentError} for any other β or scaling, or a scaling with β ≠ 4.
 *
 * **Error.** As stated in `accuracy` and tested.
 *
 * @example
 * tracyWidom(1).upperQuantile(0.05); // 0.9793160535…
 * tracyWidom(2).survival(8); // 6.5335632069…e-17
 */
export function tracyWidom(beta: Beta, options: TracyWidomOptions = {}): Law {
  if (beta !== 1 && beta !== 2 && beta !== 4) throw new InvalidArgumentError("beta", "1, 2 or 4", beta);
  const { scaling } = options;
  if (beta !== 4 && scaling !== undefined && scaling !== "standard") {
    throw new InvalidArgumentError("options.scaling", "no scaling unless beta is 4", scaling);
  }
  const key = scaling ?? "standard";
  if (beta === 1) return realLaw();
  if (beta === 2) return complexLaw();
  if (key === "unscaled") return unscaledLaw();
  if (key === "standard") return standardLaw();
  if (key === "stochastic-airy") return stochasticAiryLaw();
  throw new InvalidArgumentError("options.scaling", '"standard", "unscaled" or "stochastic-airy"', scaling);
}

// Measured: docs/accuracy.md.
const ACCURACY: LawAccuracy = {
  cdfAbsolute: 5e-16,
  cdfRelative: 2e-13,
  survivalRelative: 2e-14,
  pdfAbsolute: 5e-15,
  quantileAbsolute: 1e-13,
  momentAbsolute: 1e-12,
};

interface Description {
  readonly name: string;
  readonly symbol: string;
  readonly provenance: LawProvenance;
  readonly centre: number;
  readonly spread: number;
  readonly bulk: readonly [number, number];
}

const REAL: Description = {
  name: "Tracy–Widom, β = 1",
  symbol: "F1",
  provenance: {
    formula: "F1(s) = det(I − V) on (s, ∞), V(x, y) = ½ Ai((x + y)/2)",
    source:
      "P. Ferrari, H. Spohn, J. Phys. A 38 (2005) L557; C. Tracy, H. Widom, Commun. Math. Phys. 177 (1996) 727",
    convention: "soft edge of the real (β = 1) ensembles, one scaling in use; mean −1.20653…",
  },
  centre: -1.2,
  spread: 1.27,
  bulk: [-14, 26],
};

const COMPLEX: Description = {
  name: "Tracy–Widom, β = 2",
  symbol: "F2",
  provenance: {
    formula: "F2(s) = det(I − K) on (s, ∞), K the Airy kernel",
    source: "C. Tracy, H. Widom, Commun. Math. Phys. 159 (1994) 151",
    convention: "soft edge of the complex (β = 2) ensembles, one scaling in use; mean −1.77108…",
  },
  centre: -1.77,
  spread: 0.9,
  bulk: [-12, 17],
};

function quaternion(scaling: string, symbol: string, sentence: string): Description {
  return {
    name: `Tracy–Widom, β = 4 (${scaling})`,
    symbol,
    provenance: {
      formula: "G(s) = ½ (det(I − V) + det(I + V)) on (s, ∞), V(x, y) = ½ Ai((x + y)/2)",
      source:
        "P. Ferrari, H. Spohn, J. Phys. A 38 (2005) L557; C. Tracy, H. Widom, Commun. Math. Phys. 177 (1996) 727",
      convention: sentence,
    },
    centre: -3.26,
    spread: 1.02,
    bulk: [-16, 17],
  };
}

const realLaw = once(() => completeLaw(coreOf(1, REAL)));
const complexLaw = once(() => completeLaw(coreOf(2, COMPLEX)));
const unscaledCore = once(() =>
  coreOf(
    4,
    quaternion("unscaled", "F4 (unscaled)", "β = 4 unscaled: F(s) = ½ (F1(s) + F2(s)/F1(s)); mean −3.26242…"),
  ),
);
const unscaledLaw = once(() => completeLaw(unscaledCore()));
const standardLaw = once(() =>
  completeLaw(
    rescaled(
      unscaledCore(),
      // √2 as a double and what is missing from it.
      [Math.SQRT2, -9.667293313452913e-17],
      quaternion(
        "standard",
        "F4",
        "β = 4 standard: F(x) = ½ (F1 + F2/F1)(√2 x), the usual moment tables; mean −2.30688…",
      ),
    ),
  ),
);
const stochasticAiryLaw = once(() =>
  completeLaw(
    rescaled(
      unscaledCore(),
      // 2^(2/3) as a double and what is missing from it.
      [1.5874010519681996, -1.0869008194197823e-16],
      quaternion(
        "stochastic-airy",
        "F4 (stochastic Airy)",
        "β = 4 stochastic Airy operator: F(x) = ½ (F1 + F2/F1)(2^(2/3) x); mean −2.05520…",
      ),
    ),
  ),
);

function once<T>(make: () => T): () => T {
  let made: T | undefined;
  return () => {
    made ??= make();
    return made;
  };
}

function coreOf(beta: Beta, about: Description): LawCore {
  const fast = tabulatedTracyWidom(beta);
  return {
    ...about,
    support: [Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY],
    accuracy: ACCURACY,
    ...fast,
    exact: (what, x, options) => exactQuantity(beta, what, x, options),
  };
}

function exactQuantity(
  beta: Beta,
  what: Exclude<LawQuantity, "quantile" | "upperQuantile">,
  x: number,
  options: ExactOptions,
): Estimate {
  if (!Number.isFinite(x)) throw new InvalidArgumentError("x", "a finite number", x);
  const point = exactPoint(beta, x);
  const found = point[what];
  const { absTol, relTol } = options;
  const asked = absTol !== undefined || relTol !== undefined;
  const tolerance = asked
    ? Math.max(absTol ?? 0, (relTol ?? 0) * Math.abs(found.value))
    : Math.max(1e-12, 1e-12 * Math.abs(found.value));
  return { ...found, converged: found.error <= tolerance };
}

/**
 * The law of X / factor when `core` is that of X: F(x) = G(factor · x). The factor comes in two parts, head and tail;
 * the product is carried in two parts as well, since a rounding of the argument would show in the far tail:
 * G(h + l) = G(h) + l g(h).
 */
function rescaled(core: LawCore, factor: readonly [number, number], about: Description): LawCore {
  const [head, tail] = factor;
  const argument = (x: number): readonly [number, number] => {
    const h = head * x;
    return Number.isFinite(h) ? [h, productError(head, x, h) + tail * x] : [h, 0];
  };
  const shifted =
    (f: (s: number) => number, slope: (s: number) => number) =>
    (x: number): number => {
      const [h, l] = argument(x);
      const value = f(h);
      return l === 0 || !Number.isFinite(value) ? value : value + l * slope(h);
    };
  const law: PointwiseLaw = {
    cdf: shifted(core.cdf, core.pdf),
    survival: shifted(core.survival, (s) => -core.pdf(s)),
    logCdf: shifted(core.logCdf, (s) => Math.exp(core.logPdf(s) - core.logCdf(s))),
    logSurvival: shifted(core.logSurvival, (s) => -Math.exp(core.logPdf(s) - core.logSurvival(s))),
    pdf: (x) => head * core.pdf(argument(x)[0]),
    logPdf: (x) => core.logPdf(argument(x)[0]) + Math.log(head),
  };
  return {
    ...about,
    ...law,
    centre: core.centre / head,
    spread: core.spread / head,
    bulk: [core.bulk[0] / head, core.bulk[1] / head],
    support: core.support,
    accuracy: { ...core.accuracy, pdfAbsolute: core.accuracy.pdfAbsolute * head },
    exact(what, x, options) {
      const [h, l] = argument(x);
      const found = core.exact(what, h, options);
      // The tail l of the argument moves the value by l times its slope.
      if (what === "cdf") return moved(found, l * core.pdf(h));
      if (what === "survival") return moved(found, -l * core.pdf(h));
      if (what === "logCdf") return moved(found, l * Math.exp(core.logPdf(h) - core.logCdf(h)));
      if (what === "logSurvival") return moved(found, -l * Math.exp(core.logPdf(h) - core.logSurvival(h)));
      // (log pdf)' is between −2√s and s²/4, to leading order; here it only enters the error.
      const slope = Math.abs(l) * (2 * Math.sqrt(Math.abs(h)) + (h * h) / 4 + 1);
      if (what === "logPdf") {
        const value = found.value + Math.log(head);
        return { ...found, value, error: found.error + slope + 2 ** -52 * Math.abs(value) };
      }
      const error = head * (found.error + Math.abs(found.value) * slope) * (1 + 2 ** -51);
      return { ...found, value: head * found.value, error };
    },
  };
}

/** An estimate shifted by a small correction, whose own error is a rounding. */
function moved(found: Estimate, by: number): Estimate {
  if (by === 0 || !Number.isFinite(found.value)) return found;
  return { ...found, value: found.value + by, error: found.error + 2 ** -40 * Math.abs(by) };
}

/** x·y − fl(x·y), by Dekker's splitting (T. J. Dekker, Numer. Math. 18 (1971) 224). */
function productError(x: number, y: number, product: number): number {
  const split = 134217729;
  const cx = split * x;
  const xh = cx - (cx - x);
  const xl = x - xh;
  const cy = split * y;
  const yh = cy - (cy - y);
  const yl = y - yh;
  const error = xl * yl - (product - xh * yh - xl * yh - xh * yl);
  return Number.isFinite(error) ? error : 0;
}
