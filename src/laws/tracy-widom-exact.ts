/**
 * The exact route of the Tracy–Widom laws: distribution function, survival function and density at one point, each
 * with its error, from Fredholm determinants; left of where a double-precision determinant has digits, from the
 * Painlevé representation.
 *
 *   F2 = det(I − K_Ai),  F1 = det(I − V) =: D₋,  unscaled F4 = ½ (det(I − V) + det(I + V)) =: ½ (D₋ + D₊),
 *
 * V(x, y) = ½ Ai((x + y)/2) on (s, ∞): C. Tracy, H. Widom, Commun. Math. Phys. 159 (1994) 151 and 177 (1996) 727;
 * P. Ferrari, H. Spohn, J. Phys. A 38 (2005) L557. Derivatives: (log det)' = R(s, s), R the resolvent kernel.
 */
import type { Estimate } from "../core/estimate.ts";
import { type DeterminantOptions, determinantWithResolvent } from "../determinant/fredholm-determinant.ts";
import { airyKernel } from "../kernels/airy-kernel.ts";
import { airySumKernel } from "../kernels/airy-sum-kernel.ts";
import { halfLine } from "../quadrature/domain.ts";
import { airyExponent } from "../special/airy.ts";
import { tracyWidomLeftTail } from "./hastings-mcleod.ts";
import { scaledRightTail } from "./tracy-widom-far.ts";
import { fourthMinors } from "./tracy-widom-minors.ts";

/** The three laws; β = 4 in the unscaled variable. */
export type Beta = 1 | 2 | 4;

/** Distribution, survival and density at a point, and the logarithms that stay finite where those underflow. */
export interface ExactPoint {
  readonly cdf: Estimate;
  readonly survival: Estimate;
  readonly pdf: Estimate;
  /** log cdf with its absolute error. */
  readonly logCdf: Estimate;
  /** log survival with its absolute error. */
  readonly logSurvival: Estimate;
  /** log pdf with its absolute error. */
  readonly logPdf: Estimate;
}

/** Left of this point the Painlevé route has more digits than a determinant. */
export const LEFT_SWITCH: Readonly<Record<Beta, number>> = { 1: -4, 2: -4, 4: -6 };
/** Right of this point the first term of the tail is exact to rounding: the rest is of relative size 1 − F < 1e-18. */
export const RIGHT_SWITCH: Readonly<Record<Beta, number>> = { 1: 15, 2: 9.5, 4: 6 };
// Right of this point 1 − F for β = 4 comes from the minors of V: as ½(c₋ + c₊) it would cancel.
const MINOR_SWITCH = -2.01;

/** Whether the point lies in the right tail of β = 4 that is computed from minors. */
export function hasMinorRoute(beta: Beta, s: number): boolean {
  return beta === 4 && s > MINOR_SWITCH;
}

/** The law at s by the exact route. */
export function exactPoint(beta: Beta, s: number, options: DeterminantOptions = {}): ExactPoint {
  if (s < LEFT_SWITCH[beta]) return leftPoint(beta, s);
  if (s > RIGHT_SWITCH[beta]) return farPoint(beta, s);
  if (hasMinorRoute(beta, s)) return minorPoint(s);
  if (beta === 4) return meanPoint(s, options);
  const d = determinantWithResolvent(beta === 2 ? airyKernel() : airySumKernel(), halfLine(s), s, options);
  return pointFrom(d, d.complement, product(d, d.resolvent));
}

function estimate(value: number, error: number, converged: boolean, order: number): Estimate {
  return { value, error, errorKind: "estimate", converged, order };
}

/** Product of two estimates: relative errors add. */
function product(p: Estimate, q: Estimate): Estimate {
  const error = p.error * Math.abs(q.value) + q.error * Math.abs(p.value) + p.error * q.error;
  return estimate(
    p.value * q.value,
    error + 2 ** -52 * Math.abs(p.value * q.value),
    p.converged && q.converged,
    p.order,
  );
}

function logOf(p: Estimate, log: number): Estimate {
  // −log(1 − r) ≥ r: the error of a logarithm from the relative error r of its argument.
  const r = p.error / Math.abs(p.value);
  const error = (r < 1 ? -Math.log1p(-r) : Number.POSITIVE_INFINITY) + 2 ** -53 * Math.abs(log);
  return estimate(log, error, p.converged && r < 1, p.order);
}

/** log of 1 − y from an estimate of a small y, or of the number itself when y is not small. */
function logComplement(y: Estimate, direct: Estimate): Estimate {
  if (Math.abs(y.value) > 0.5) return logOf(direct, Math.log(direct.value));
  const log = Math.log1p(-y.value);
  return estimate(log, 1.01 * (y.error / (1 - y.value)) + 2 ** -52 * Math.abs(log), y.converged, y.order);
}

function pointFrom(cdf: Estimate, survival: Estimate, pdf: Estimate): ExactPoint {
  return {
    cdf,
    survival,
    pdf,
    logCdf: logComplement(survival, cdf),
    logSurvival: logComplement(cdf, survival),
    logPdf: logOf(pdf, Math.log(pdf.value)),
  };
}

/** β = 4 where nothing cancels: the mean of the two determinants. */
function meanPoint(s: number, options: DeterminantOptions): ExactPoint {
  const minus = determinantWithResolvent(airySumKernel(), halfLine(s), s, options);
  const plus = determinantWithResolvent(airySumKernel(), halfLine(s), s, { ...options, z: -1 });
  const mean = (p: Estimate, q: Estimate): Estimate =>
    estimate(
      0.5 * (p.value + q.value),
      0.5 * (p.error + q.error),
      p.converged && q.converged,
      Math.max(p.order, q.order),
    );
  const pdf = mean(product(minus, minus.resolvent), product(plus, plus.resolvent));
  return pointFrom(mean(minus, plus), mean(minus.complement, plus.complement), pdf);
}

/** β = 4 in the right tail: 1 − F = −e₂ − e₄ − e₆ − …, e_k the k-th minors of V. */
function minorPoint(s: number): ExactPoint {
  const first = scaledRightTail(4, s);
  const scale = s > 0 ? expMinusExponent(2, s) : 1;
  const rest = fourthMinors(s);
  const survival = first.survival * scale - rest.value;
  const density = first.density * scale + rest.derivative;
  const relative = 3e-15;
  return pointFrom(
    estimate(1 - survival, relative * survival + rest.error + 2 ** -53, true, rest.order),
    estimate(survival, relative * survival + rest.error, true, rest.order),
    estimate(density, relative * density + 10 * rest.error, true, rest.order),
  );
}

function leftPoint(beta: Beta, s: number): ExactPoint {
  const tail = tracyWidomLeftTail(beta === 1 ? "beta1" : beta === 2 ? "beta2" : "beta4-unscaled", s);
  const value = Math.exp(tail.logCdf);
  const order = 0;
  const relative = tail.relativeError + 2 ** -53 * Math.abs(tail.logCdf);
  const cdf = estimate(value, value * relative, true, order);
  const density = value * tail.derivative;
  const logPdf = tail.logCdf + Math.log(tail.derivative);
  return {
    cdf,
    survival: estimate(1 - value, value * relative + 2 ** -53, true, order),
    pdf: estimate(density, density * (relative + 1e-14), true, order),
    logCdf: estimate(tail.logCdf, relative, true, order),
    logSurvival: estimate(Math.log1p(-value), 1.01 * value * relative + 2 ** -52 * value, true, order),
    logPdf: estimate(logPdf, relative + 1e-14 + 2 ** -53 * Math.abs(logPdf), true, order),
  };
}

function farPoint(beta: Beta, s: number): ExactPoint {
  const kappa = beta === 1 ? 1 : 2;
  const { survival, density } = scaledRightTail(beta, s);
  const scale = expMinusExponent(kappa, s);
  const exponent = kappa * airyExponent(s)[0];
  const logSurvival = Math.log(survival) - exponent;
  const logPdf = Math.log(density) - exponent;
  const relative = 5e-15;
  const relativeLog = (log: number): number => relative + 2 ** -52 * Math.abs(log);
  const p = survival * scale;
  const underflow = Number.MIN_VALUE;
  return {
    cdf: estimate(1 - p, p * relative + 2 ** -53, true, 40),
    survival: estimate(p, p * relative + underflow, true, 40),
    pdf: estimate(density * scale, density * scale * relative + underflow, true, 40),
    logCdf: estimate(Math.log1p(-p), p * relative + underflow, true, 40),
    logSurvival: estimate(logSurvival, relativeLog(logSurvival), true, 40),
    logPdf: estimate(logPdf, relativeLog(logPdf), true, 40),
  };
}

/** e^{−κζ(s)}, s ≥ 0, from the two-part exponent. */
export function expMinusExponent(kappa: number, s: number): number {
  const [head, tail] = airyExponent(s);
  const value = Math.exp(-kappa * head);
  return value - value * kappa * tail;
}
