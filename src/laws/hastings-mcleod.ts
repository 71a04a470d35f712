/**
 * The left tail of the Tracy–Widom laws by Painlevé II, where a double-precision determinant has no relative digits.
 *
 *   q'' = s q + 2 q³, q ~ Ai at +∞;  (log F2)'' = −q²,  μ(s) = ∫_s^∞ q,
 *   log F1 = ½ log F2 − ½ μ,  log F4 = ½ log F2 + log cosh(μ/2) (unscaled).
 *
 * C. Tracy, H. Widom, Commun. Math. Phys. 159 (1994) 151 and 177 (1996) 727. As an initial value problem q is
 * unstable in either direction; as a boundary value problem on [−11, 8], between its series on the left and Ai on the
 * right (q − Ai is of relative size Ai² = 3e-15/40 there), it is well conditioned. It is solved once, at the first
 * call (hastings-mcleod-boundary.ts); then q and q² are integrated from the right, so that nothing cancels.
 */
import { clenshaw } from "../approximation/chebyshev.ts";
import { antiderivative, atLeft, atRight } from "../approximation/chebyshev-calculus.ts";
import { InvalidArgumentError } from "../core/errors.ts";
import { airyAi, airyAiIntegral, airyAiPrime } from "../special/airy.ts";
import { fitMatrix, matrixTimes, solvePanels } from "./hastings-mcleod-boundary.ts";
import { type PainleveValues, painleveSeries } from "./hastings-mcleod-series.ts";

/** Which law. */
export type PainleveLaw = "beta1" | "beta2" | "beta4-unscaled";

/** log F, its derivative, and the absolute error of the logarithm (= relative error of F). */
export interface LeftTail {
  readonly logCdf: number;
  /** d/ds log F, positive; largest relative error measured 3e-15, at −2 for β = 4, elsewhere 1e-15. */
  readonly derivative: number;
  readonly relativeError: number;
}

/** Largest s served. */
export const LEFT_TAIL_END = -2;
// x³ stays finite.
const LEFT_END = -1e100;
const SERIES_END = -11;
const RIGHT_END = 8;
// Panels about as long as q, μ, log F2 need for 1e-16 with 18 points.
const BREAKS = new Float64Array([
  -11, -8.5, -6.5, -5, -4, -3, -2, -1.125, -0.25, 0.625, 1.5, 2.5, 3.5, 4.5, 5.5, 6.75, 8,
]);
const PANEL_POINTS = 18;

/**
 * Left tail of a Tracy–Widom law.
 *
 * @param law - Which one; β = 4 in the unscaled variable.
 * @param s - Point from −1e100 to −2. NaN passes through.
 * @throws {@link InvalidArgumentError} for an unknown law, or s above −2, below −1e100 or infinite.
 *
 * **Error.** Estimate, with ε = 2^−52: 3 ε (1 + |log F2|) for β = 2, ε (1 + 2 |log F2| + 2 μ) for the others. Left of
 * −11 the roundings cannot add up to more; the largest error found at 5000 points was 0.6 of it, the median 0.1
 * (test/fixtures/tracy-widom-left-tail.json holds 300 of that kind).
 * **Cost.** 20 to 30 ms at the first call, then some 0.2 µs.
 */
export function tracyWidomLeftTail(law: PainleveLaw, s: number): LeftTail {
  if (law !== "beta1" && law !== "beta2" && law !== "beta4-unscaled")
    throw new InvalidArgumentError("law", '"beta1", "beta2" or "beta4-unscaled"', law);
  if (Number.isNaN(s)) return { logCdf: s, derivative: s, relativeError: s };
  const { logF2, slope, mu, q } = valuesAt(s, LEFT_TAIL_END);
  if (law === "beta2") {
    return { logCdf: logF2, derivative: slope, relativeError: 3 * Number.EPSILON * (1 + Math.abs(logF2)) };
  }
  const relativeError = Number.EPSILON * (1 + 2 * Math.abs(logF2) + 2 * mu);
  if (law === "beta1") return { logCdf: 0.5 * (logF2 - mu), derivative: 0.5 * (slope + q), relativeError };
  // log cosh(μ/2) = μ/2 + log((1 + e^{−μ})/2).
  const decayed = Math.exp(-mu);
  return {
    logCdf: 0.5 * (logF2 + mu) + (Math.log1p(decayed) - Math.LN2),
    derivative: 0.5 * (slope - (q * (1 - decayed)) / (1 + decayed)),
    relativeError,
  };
}

/**
 * The Hastings–McLeod function q(s), the solution of q'' = s q + 2 q³ with q ~ Ai at +∞.
 *
 * @param s - Point from −1e100 to 8. NaN passes through.
 * @throws {@link InvalidArgumentError} outside that range.
 *
 * **Error.** Estimate, relative: 2e-15 for s ≤ 0, 2e-14 beyond. **Cost.** As {@link tracyWidomLeftTail}.
 */
export function hastingsMcLeod(s: number): number {
  return Number.isNaN(s) ? s : valuesAt(s, RIGHT_END).q;
}

function valuesAt(s: number, end: number): PainleveValues {
  // Written so that whatever is not a number fails too.
  if (typeof s !== "number" || !(s >= LEFT_END && s <= end))
    throw new InvalidArgumentError("s", `a number from -1e100 to ${end}`, s);
  return s < SERIES_END ? painleveSeries(-s) : solved(s);
}

interface Panel {
  readonly lower: number;
  readonly upper: number;
  readonly q: Float64Array;
  readonly mu: Float64Array;
  readonly slope: Float64Array;
  readonly logF2: Float64Array;
}

let panels: readonly Panel[] | undefined;

function solved(s: number): PainleveValues {
  panels ??= buildPanels();
  let p = 0;
  while (p + 1 < panels.length && s >= panels[p].upper) p++;
  const { lower, upper, q, mu, slope, logF2 } = panels[p];
  const t = (s - lower - (upper - s)) / (upper - lower);
  const at = (c: Float64Array): number => clenshaw(c, 0, c.length - 1, t);
  return { q: at(q), mu: at(mu), slope: at(slope), logF2: at(logF2) };
}

/** Starting guess of q at the breaks: Ai on the right, on the left the root of 2q² = −s raised to meet it at 0. */
function startingValues(): Float64Array {
  const values = BREAKS.map((s) => (s < 0 ? Math.sqrt(airyAi(0) ** 2 - 0.5 * s) : airyAi(s)));
  values[0] = painleveSeries(-SERIES_END).q;
  return values;
}

/** From the right end inwards, panel by panel: μ = ∫ q, slope = ∫ q², −log F2 = ∫ slope. */
function buildPanels(): Panel[] {
  const values = solvePanels(BREAKS, startingValues(), PANEL_POINTS);
  const fit = fitMatrix(PANEL_POINTS);
  const out: Panel[] = [];
  // Their values for q = Ai. Beside those at s ≤ −2 they are nothing, so that the closed forms may cancel.
  const s = RIGHT_END;
  const ai = airyAi(s);
  const prime = airyAiPrime(s);
  let mu = airyAiIntegral(s);
  let slope = prime * prime - s * ai * ai;
  let minusLog = (2 * s * s * ai * ai - 2 * s * prime * prime - ai * prime) / 3;
  for (let p = values.length - 1; p >= 0; p--) {
    const lower = BREAKS[p];
    const upper = BREAKS[p + 1];
    const half = 0.5 * (upper - lower);
    const squares = values[p].map((x) => x * x);
    const q = matrixTimes(fit, values[p]);
    const muc = fromRight(q, half, mu);
    const slopec = fromRight(matrixTimes(fit, squares), half, slope);
    const logc = fromRight(slopec, half, minusLog);
    mu = atLeft(muc);
    slope = atLeft(slopec);
    minusLog = atLeft(logc);
    out.unshift({ lower, upper, q, mu: muc, slope: slopec, logF2: logc.map((c) => -c) });
  }
  return out;
}

/** Coefficients of value + ∫_x^upper f. */
function fromRight(c: Float64Array, half: number, value: number): Float64Array {
  const integral = antiderivative(c, half);
  const out = integral.map((x) => -x);
  out[0] += value + atRight(integral);
  return out;
}
