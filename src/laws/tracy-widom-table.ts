/**
 * The fast route of the Tracy–Widom laws: Chebyshev pieces of the smaller of F and 1 − F and of the density, sampled
 * from the exact route on first use.
 *
 * From left to right: the Painlevé route (its own expansions); pieces of F up to the median and of 1 − F beyond; from
 * s = 1 on pieces of e^{κζ(s)} (1 − F(s)), ζ = (2/3) s^{3/2}, κ = 1 (β = 1) or 2, which vary slowly, so that the tail
 * keeps its relative accuracy down to the smallest double; beyond the pieces the first term of the tail.
 */
import { fromSamples, type PiecewiseChebyshev, tabulationPoints } from "../approximation/piecewise.ts";
import { airyExponent } from "../special/airy.ts";
import { tracyWidomLeftTail } from "./hastings-mcleod.ts";
import { type Beta, expMinusExponent, LEFT_SWITCH, RIGHT_SWITCH } from "./tracy-widom-exact.ts";
import { scaledRightTail } from "./tracy-widom-far.ts";
import { samplePoint } from "./tracy-widom-samples.ts";

/** The six pointwise functions of one law, in the unscaled variable. */
export interface PointwiseLaw {
  pdf(s: number): number;
  cdf(s: number): number;
  survival(s: number): number;
  logPdf(s: number): number;
  logCdf(s: number): number;
  logSurvival(s: number): number;
}

const SAMPLES = 36;
const DEGREE = 17;
/** Pieces left of this point hold F, right of it 1 − F; near the medians −1.27, −1.80, −3.29. */
const MIDDLE: Readonly<Record<Beta, number>> = { 1: -1.5, 2: -2, 4: -3.5 };
/** From here on the exponential factor is taken out. */
const SCALED_FROM = 1;
/** Ends of the pieces of the scaled tail: widths grow with s, as the distance to the branch point at 0 does. */
const SCALED_BREAKS = [1, 1.5, 2.25, 3.25, 4.75, 7, 10.5, 16, 24, 36, 54, 80, 120];

// Left of this point the left tail is not evaluated: its logarithm, −|s|³/24 or −|s|³/12, is read as −∞.
const OUT_OF_REACH = -1e100;

interface Table {
  readonly probability: PiecewiseChebyshev;
  readonly density: PiecewiseChebyshev;
  /** First piece that holds 1 − F, first piece that is scaled. */
  readonly firstUpper: number;
  readonly firstScaled: number;
  readonly end: number;
}

/** The pointwise functions of the law, from its table (built at the first call). */
export function tabulatedTracyWidom(beta: Beta): PointwiseLaw {
  const kappa = beta === 1 ? 1 : 2;
  const leftName = beta === 1 ? "beta1" : beta === 2 ? "beta2" : "beta4-unscaled";
  const start = LEFT_SWITCH[beta];
  let table: Table | undefined;
  const tableOf = (): Table => {
    table ??= buildTable(beta);
    return table;
  };

  const far = (s: number): { survival: number; density: number } => scaledRightTail(beta, s);

  const logScaled = (value: number, s: number): number => {
    const [head, tail] = airyExponent(s);
    return Math.log(value) - kappa * tail - kappa * head;
  };

  const law: PointwiseLaw = {
    cdf(s) {
      if (s < start) return s < OUT_OF_REACH ? 0 : Math.exp(tracyWidomLeftTail(leftName, s).logCdf);
      const t = tableOf();
      if (s >= t.end) return 1;
      const piece = t.probability.locate(s);
      const value = t.probability.evaluateOn(piece, s);
      if (piece < t.firstUpper) return value;
      return piece < t.firstScaled ? 1 - value : 1 - value * expMinusExponent(kappa, s);
    },
    survival(s) {
      if (s < start) return s < OUT_OF_REACH ? 1 : 1 - Math.exp(tracyWidomLeftTail(leftName, s).logCdf);
      const t = tableOf();
      if (s >= t.end)
        return s === Number.POSITIVE_INFINITY ? 0 : far(s).survival * expMinusExponent(kappa, s);
      const piece = t.probability.locate(s);
      const value = t.probability.evaluateOn(piece, s);
      if (piece < t.firstUpper) return 1 - value;
      return piece < t.firstScaled ? value : value * expMinusExponent(kappa, s);
    },
    pdf(s) {
      if (s < start) {
        if (s < OUT_OF_REACH) return 0;
        const tail = tracyWidomLeftTail(leftName, s);
        return Math.exp(tail.logCdf) * tail.derivative;
      }
      const t = tableOf();
      if (s >= t.end) return s === Number.POSITIVE_INFINITY ? 0 : far(s).density * expMinusExponent(kappa, s);
      const piece = t.density.locate(s);
      const value = t.density.evaluateOn(piece, s);
      return piece < t.firstScaled ? value : value * expMinusExponent(kappa, s);
    },
    logCdf(s) {
      if (s < start)
        return s < OUT_OF_REACH ? Number.NEGATIVE_INFINITY : tracyWidomLeftTail(leftName, s).logCdf;
      const t = tableOf();
      if (s >= t.end) return -law.survival(s);
      const piece = t.probability.locate(s);
      return piece < t.firstUpper
        ? Math.log(t.probability.evaluateOn(piece, s))
        : Math.log1p(-law.survival(s));
    },
    logSurvival(s) {
      if (s < start) return Math.log1p(-law.cdf(s));
      if (s === Number.POSITIVE_INFINITY) return -s;
      const t = tableOf();
      if (s >= t.end) return logScaled(far(s).survival, s);
      const piece = t.probability.locate(s);
      const value = t.probability.evaluateOn(piece, s);
      if (piece < t.firstUpper) return Math.log1p(-value);
      return piece < t.firstScaled ? Math.log(value) : logScaled(value, s);
    },
    logPdf(s) {
      if (s < start) {
        if (s < OUT_OF_REACH) return Number.NEGATIVE_INFINITY;
        const tail = tracyWidomLeftTail(leftName, s);
        return tail.logCdf + Math.log(tail.derivative);
      }
      if (s === Number.POSITIVE_INFINITY) return -s;
      const t = tableOf();
      if (s >= t.end) return logScaled(far(s).density, s);
      const piece = t.density.locate(s);
      const value = t.density.evaluateOn(piece, s);
      return piece < t.firstScaled ? Math.log(value) : logScaled(value, s);
    },
  };
  return law;
}

function buildTable(beta: Beta): Table {
  const breaks: number[] = [];
  for (let s = LEFT_SWITCH[beta]; s < SCALED_FROM - 0.25; s += 0.5) breaks.push(s);
  const firstUpper = breaks.indexOf(MIDDLE[beta]);
  const firstScaled = breaks.length;
  breaks.push(...SCALED_BREAKS);
  const points = tabulationPoints(breaks, SAMPLES);
  const probability = new Float64Array(points.length);
  const density = new Float64Array(points.length);
  const kappa = beta === 1 ? 1 : 2;
  points.forEach((s, i) => {
    const piece = Math.floor(i / SAMPLES);
    if (s > RIGHT_SWITCH[beta]) {
      const tail = scaledRightTail(beta, s);
      probability[i] = tail.survival;
      density[i] = tail.density;
      return;
    }
    const point = samplePoint(beta, s);
    const scale = piece < firstScaled ? 1 : expMinusExponent(kappa, s);
    probability[i] = piece < firstUpper ? point.cdf : point.survival / scale;
    density[i] = point.pdf / scale;
  });
  return {
    probability: fromSamples(breaks, SAMPLES, DEGREE, probability),
    density: fromSamples(breaks, SAMPLES, DEGREE, density),
    firstUpper,
    firstScaled,
    end: SCALED_BREAKS[SCALED_BREAKS.length - 1],
  };
}
