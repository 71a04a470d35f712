/**
 * The left tail of the Tracy–Widom laws by Painlevé II, where a double-precision determinant has no relative digits.
 *
 *   q'' = s q + 2 q³, q ~ Ai at +∞;  (log F2)'' = −q²,  μ(s) = ∫_s^∞ q,
 *   log F1 = ½ log F2 − ½ μ,  log F4 = ½ log F2 + log cosh(μ/2) (unscaled).
 *
 * C. Tracy, H. Widom, Commun. Math. Phys. 159 (1994) 151 and 177 (1996) 727. As an initial value problem q is
 * unstable in either direction; as a boundary value problem on [−11, 8], between its series on the left and Ai on the
 * right (q − Ai is of relative size Ai² = 3e-15/40 there), it is well conditioned. It is solved for v = q'' by
 * Chebyshev collocation of the integrated equation (L. Greengard, SIAM J. Numer. Anal. 28 (1991) 1071), Newton's
 * method; then q and q² are integrated from the right, so that nothing cancels.
 */
import { chebyshevCoefficients, clenshaw } from "../approximation/chebyshev.ts";
import { antiderivative, atLeft, atRight } from "../approximation/chebyshev-calculus.ts";
import { InvalidArgumentError } from "../core/errors.ts";
import { airyAi, airyAiIntegral, airyAiPrime } from "../special/airy.ts";
import { solvePanels } from "./hastings-mcleod-boundary.ts";
import { type PainleveValues, painleveSeries } from "./hastings-mcleod-series.ts";

/** Which law. */
export type PainleveLaw = "beta1" | "beta2" | "beta4-unscaled";

/** log F, its derivative, and the absolute error of the logarithm (= relative error of F). */
export interface LeftTail {
  readonly logCdf: number;
  /** d/ds log F, positive; its relative error is below 1e-13. */
  readonly derivative: number;
  readonly relativeError: number;
}

/** Largest s served. */
export const LEFT_TAIL_END = -2;
const SERIES_END = -11;
const RIGHT_END = 8;
// Panels about as long as q, μ, log F2 need for 1e-16 with 18 points.
const PANELS = [
  -11, -9.5, -8, -7, -6, -5, -4.25, -3.5, -2.75, -2, -1.25, -0.5, 0.25, 1, 2, 3, 4, 5, 6, 7, 8,
];
const PANEL_POINTS = 18;

/**
 * Left tail of a Tracy–Widom law.
 *
 * @param law - Which one; β = 4 in the unscaled variable.
 * @param s - Point ≤ −2. NaN passes through.
 * @throws {@link InvalidArgumentError} above −2 or below −1e100.
 *
 * **Error.** Estimate: about 1e-15 (1 + |log F|), see docs/accuracy.md for the measured figures. **Cost.** Some tens of
 * milliseconds at the first call, then well below a microsecond.
 */
export function tracyWidomLeftTail(law: PainleveLaw, s: number): LeftTail {
  if (Number.isNaN(s)) return { logCdf: s, derivative: s, relativeError: s };
  if (s > LEFT_TAIL_END || s < -1e100) throw new InvalidArgumentError("s", "a number from -1e100 to -2", s);
  const { logF2, slope, mu, q } = s < SERIES_END ? painleveSeries(-s) : solved(s);
  const relativeError = 10 * 2 ** -52 * (1 + 0.5 * Math.abs(logF2) + 0.5 * mu);
  if (law === "beta2") return { logCdf: logF2, derivative: slope, relativeError };
  if (law === "beta1") return { logCdf: 0.5 * (logF2 - mu), derivative: 0.5 * (slope + q), relativeError };
  // log cosh(μ/2) = μ/2 + log((1 + e^{−μ})/2).
  const decayed = Math.exp(-mu);
  return {
    logCdf: 0.5 * (logF2 + mu) + (Math.log1p(decayed) - Math.LN2),
    derivative: 0.5 * (slope - (q * (1 - decayed)) / (1 + decayed)),
    relativeError,
  };
}

/** The Hastings–McLeod function q(s) for s ≤ 8. */
export function hastingsMcLeod(s: number): number {
  if (Number.isNaN(s)) return s;
  if (s > RIGHT_END || s < -1e100) throw new InvalidArgumentError("s", "a number from -1e100 to 8", s);
  return s < SERIES_END ? painleveSeries(-s).q : solved(s).q;
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
  const values = Float64Array.from(PANELS, (s) => (s < 0 ? Math.sqrt(airyAi(0) ** 2 - 0.5 * s) : airyAi(s)));
  values[0] = painleveSeries(-SERIES_END).q;
  return values;
}

/** From the right end inwards, panel by panel: μ = ∫ q, slope = ∫ q², −log F2 = ∫ slope. */
function buildPanels(): Panel[] {
  const values = solvePanels(PANELS, startingValues(), PANEL_POINTS);
  const out: Panel[] = [];
  // Their values for q = Ai. Beside those at s ≤ −2 they are nothing, so that the closed forms may cancel.
  const s = RIGHT_END;
  const ai = airyAi(s);
  const prime = airyAiPrime(s);
  let mu = airyAiIntegral(s);
  let slope = prime * prime - s * ai * ai;
  let minusLog = (2 * s * s * ai * ai - 2 * s * prime * prime - ai * prime) / 3;
  for (let p = values.length - 1; p >= 0; p--) {
    const lower = PANELS[p];
    const upper = PANELS[p + 1];
    const half = 0.5 * (upper - lower);
    const squares = values[p].map((x) => x * x);
    const q = chebyshevCoefficients(values[p], PANEL_POINTS - 1);
    const muc = fromRight(q, half, mu);
    const slopec = fromRight(chebyshevCoefficients(squares, PANEL_POINTS - 1), half, slope);
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
