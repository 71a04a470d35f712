/**
 * Airy functions for |x| > 20 by their asymptotic series in 1/ζ, ζ = (2/3)|x|^{3/2}
 * (DLMF 9.7.5, 9.7.6, 9.7.9, 9.7.10):
 *
 *   x > 0:  e^{ζ} Ai(x)   =  x^{−1/4} / (2√π) · Σ (−1)^k u_k ζ^{−k}
 *           e^{ζ} Ai'(x)  = −x^{1/4}  / (2√π) · Σ (−1)^k v_k ζ^{−k}
 *           e^{ζ} ∫_x^∞ Ai = x^{−3/4} / (2√π) · Σ (−1)^k w_k ζ^{−k}
 *   x = −z < 0, with P = Σ (−1)^k u_{2k} ζ^{−2k}, Q = Σ (−1)^k u_{2k+1} ζ^{−2k−1}:
 *           Ai(−z)  = z^{−1/4} / √(2π) · ((P − Q) cos ζ + (P + Q) sin ζ)
 *           Ai'(−z) = z^{1/4}  / √(2π) · ((P − Q) sin ζ − (P + Q) cos ζ)      (P, Q from v_k)
 *           ∫_{−∞}^{−z} Ai = z^{−3/4} / √(2π) · ((P + Q) cos ζ + (Q − P) sin ζ)   (P, Q from w_k)
 *
 * the usual cos(ζ ∓ π/4) written out, so that no phase is shifted. The integral's own equation
 * gives w_k = u_k + (k − ½) w_{k−1}.
 * At ζ(20) = 59.6 the first terms left out are 8e-21 (u_14), 9e-21 (v_14), 1.4e-19 (w_22).
 */
import { InvalidArgumentError } from "../core/errors.ts";
import { exponentHead, exponentTail, scaleDown } from "./airy-exponent.ts";
import { SERIES_U, SERIES_V, SERIES_W } from "./airy-tables.ts";

/** Below this the rounding of x alone moves the phase by 0.1 and more: no digit of Ai(x) is meant. */
export const LOWEST = -1e10;

const HALF_INVERSE_ROOT_PI = 0.28209479177387814; // 1/(2√π)
const INVERSE_ROOT_TWO_PI = 0.3989422804014327; // 1/√(2π)

/** Throws where the phase has lost all digits. */
export function requirePhase(x: number): void {
  if (x < LOWEST)
    throw new InvalidArgumentError("x", `a number ≥ ${LOWEST}, below which the phase of Ai is lost`, x);
}

/** Σ c_{2k} w^k. */
function evenPart(c: readonly number[], w: number): number {
  let sum = 0;
  for (let k = (c.length - 2) & -2; k >= 0; k -= 2) sum = sum * w + c[k];
  return sum;
}

/** Σ c_{2k+1} w^k. */
function oddPart(c: readonly number[], w: number): number {
  let sum = 0;
  for (let k = c.length - 1; k >= 1; k -= 2) sum = sum * w + c[k];
  return sum;
}

/** Σ (−1)^k c_k v^k for an even number of coefficients. */
function alternating(c: readonly number[], v: number): number {
  return evenPart(c, v * v) - v * oddPart(c, v * v);
}

/** e^{ζ} Ai(x), x > 20. */
export function decayingAiScaled(x: number): number {
  return (HALF_INVERSE_ROOT_PI / Math.sqrt(Math.sqrt(x))) * alternating(SERIES_U, 1 / exponentHead(x));
}

/** e^{ζ} Ai'(x), x > 20. */
export function decayingAiPrimeScaled(x: number): number {
  return -HALF_INVERSE_ROOT_PI * Math.sqrt(Math.sqrt(x)) * alternating(SERIES_V, 1 / exponentHead(x));
}

/** e^{ζ} ∫_x^∞ Ai, x > 20. */
export function decayingIntegralScaled(x: number): number {
  const root = Math.sqrt(x);
  return (HALF_INVERSE_ROOT_PI / (root * Math.sqrt(root))) * alternating(SERIES_W, 1 / exponentHead(x));
}

/** Ai(x), x > 20. */
export function decayingAi(x: number): number {
  return scaleDown(x, decayingAiScaled(x));
}

/** Ai'(x), x > 20. */
export function decayingAiPrime(x: number): number {
  return scaleDown(x, decayingAiPrimeScaled(x));
}

/** ∫_x^∞ Ai, x > 20. */
export function decayingIntegral(x: number): number {
  return scaleDown(x, decayingIntegralScaled(x));
}

/** Ai(−z) given cos ζ and sin ζ. */
function oscillatingAiFrom(z: number, cosine: number, sine: number): number {
  const v = 1 / exponentHead(z);
  const p = evenPart(SERIES_U, -v * v);
  const q = v * oddPart(SERIES_U, -v * v);
  return (INVERSE_ROOT_TWO_PI / Math.sqrt(Math.sqrt(z))) * ((p - q) * cosine + (p + q) * sine);
}

/** Ai'(−z) given cos ζ and sin ζ. */
function oscillatingAiPrimeFrom(z: number, cosine: number, sine: number): number {
  const v = 1 / exponentHead(z);
  const p = evenPart(SERIES_V, -v * v);
  const q = v * oddPart(SERIES_V, -v * v);
  return INVERSE_ROOT_TWO_PI * Math.sqrt(Math.sqrt(z)) * ((p - q) * sine - (p + q) * cosine);
}

/** Ai(x), x < −20. */
export function oscillatingAi(x: number): number {
  const head = exponentHead(-x);
  const tail = exponentTail(-x);
  const c = Math.cos(head);
  const s = Math.sin(head);
  return oscillatingAiFrom(-x, turnedCosine(c, s, tail), turnedSine(c, s, tail));
}

/** Ai'(x), x < −20. */
export function oscillatingAiPrime(x: number): number {
  const head = exponentHead(-x);
  const tail = exponentTail(-x);
  const c = Math.cos(head);
  const s = Math.sin(head);
  return oscillatingAiPrimeFrom(-x, turnedCosine(c, s, tail), turnedSine(c, s, tail));
}

/** Both at once, x < −20: Ai into ai[i], Ai' into aiPrime[j]. */
export function oscillatingPairInto(
  x: number,
  ai: Float64Array,
  i: number,
  aiPrime: Float64Array,
  j: number,
): void {
  const head = exponentHead(-x);
  const tail = exponentTail(-x);
  const c = Math.cos(head);
  const s = Math.sin(head);
  const cosine = turnedCosine(c, s, tail);
  const sine = turnedSine(c, s, tail);
  ai[i] = oscillatingAiFrom(-x, cosine, sine);
  aiPrime[j] = oscillatingAiPrimeFrom(-x, cosine, sine);
}

/** ∫_{−∞}^x Ai, x < −20. */
export function oscillatingIntegral(x: number): number {
  const z = -x;
  const head = exponentHead(z);
  const tail = exponentTail(z);
  const c = Math.cos(head);
  const s = Math.sin(head);
  const p = evenPart(SERIES_W, -1 / (head * head));
  const q = oddPart(SERIES_W, -1 / (head * head)) / head;
  const root = Math.sqrt(z);
  const amplitude = INVERSE_ROOT_TWO_PI / (root * Math.sqrt(root));
  return amplitude * ((p + q) * turnedCosine(c, s, tail) + (q - p) * turnedSine(c, s, tail));
}

/** cos(head + tail) from cos head and sin head; the tail reaches 0.06 at x = −1e10, hence its full sine and cosine. */
function turnedCosine(c: number, s: number, tail: number): number {
  return c * Math.cos(tail) - s * Math.sin(tail);
}

/** sin(head + tail) from cos head and sin head. */
function turnedSine(c: number, s: number, tail: number): number {
  return s * Math.cos(tail) + c * Math.sin(tail);
}
