/**
 * The far right tail of the Tracy–Widom laws, where 1 − F is its first term to full precision.
 *
 * With Ai(x) = e^{−ζ(x)} A(x), ζ = (2/3) x^{3/2}, all integrands positive, nothing cancels:
 *
 *   β = 1:  1 − F ≃ ½ ∫_s^∞ Ai,                       density ½ Ai(s)
 *   β = 2:  1 − F ≃ ∫_s^∞ (x − s) Ai(x)² dx,          density ∫_s^∞ Ai²
 *   β = 4 (unscaled): 1 − F ≃ ⅛ ∫_s^∞ (x − s)² Ai(x) J(x) dx,   density ¼ ∫_s^∞ (x − s) Ai(x) J(x) dx,
 *     J(x) = ∫_x^∞ (t − x) Ai(t) dt.
 *
 * The third is ½ (tr V² − (tr V)²), V = ½ Ai((x + y)/2) on (s, ∞): with I(s) = ∫_s^∞ Ai, its third derivative is
 * ¼ Ai(s) (Ai'(s) + s I(s)) = −¼ Ai(s) J(s), integrated back three times. Written as traces it would lose
 * 8 s^{3/2} units. What is left out is of relative size 1 − F (β = 1, 2), far smaller for β = 4.
 */
import { gaussLegendreShared } from "../quadrature/gauss-legendre.ts";
import { airyAi, airyAiIntegralScaled, airyAiScaled, airySquareIntegralScaled } from "../special/airy.ts";

/** e^{κζ(s)} (1 − F(s)) and e^{κζ(s)} F'(s), κ = 1 for β = 1, else 2; κ = 0 where s < 0. */
export interface ScaledTail {
  readonly survival: number;
  readonly density: number;
}

const ORDER = 40;
// Where products of two Airy functions, and single ones, may be cut: e^{−46} = 1e-20.
const SQUARED = 23;
const LINEAR = 46;

/** Scaled first term of the right tail, for s > −2.3 (β = 4) or s ≥ 0 (β = 1, 2). */
export function scaledRightTail(beta: 1 | 2 | 4, s: number): ScaledTail {
  if (beta === 1) return { survival: 0.5 * airyAiIntegralScaled(s), density: 0.5 * airyAiScaled(s) };
  if (beta === 2) return { survival: squareTail(s), density: airySquareIntegralScaled(s) };
  return quarticTail(s);
}

/** ζ(s + u) − ζ(s) without cancellation, s ≥ 0: (2/3) u (x + √(xs) + s) / (√x + √s). */
function exponentRise(s: number, u: number): number {
  const x = s + u;
  const p = Math.sqrt(x);
  const q = Math.sqrt(s);
  return p + q === 0 ? 0 : ((2 / 3) * u * (x + p * q + s)) / (p + q);
}

/** Ai(s + u) e^{ζ(s)} for s ≥ 0, Ai(s + u) for s < 0. */
function relativeAiry(s: number, u: number): number {
  if (s < 0) return airyAi(s + u);
  return airyAiScaled(s + u) * Math.exp(-exponentRise(s, u));
}

/** Length after which Ai(s + u)/Ai(s) is below e^{−decay}. */
function reach(s: number, decay: number): number {
  if (s < 0) return reach(0, decay) - s;
  const power = s * Math.sqrt(s);
  // (s + u)^{3/2} = s^{3/2} + 1.5 decay; far out the difference is its first term.
  return s < 1e4 ? (power + 1.5 * decay) ** (2 / 3) - s : decay / Math.sqrt(s);
}

function squareTail(s: number): number {
  const { nodes, weights } = gaussLegendreShared(ORDER);
  const half = 0.5 * reach(s, SQUARED);
  let sum = 0;
  for (let i = 0; i < ORDER; i++) {
    const u = half * (1 + nodes[i]);
    const a = relativeAiry(s, u);
    sum += weights[i] * u * a * a;
  }
  return half * sum;
}

function quarticTail(s: number): ScaledTail {
  const { nodes, weights } = gaussLegendreShared(ORDER);
  const half = 0.5 * reach(s, SQUARED);
  let survival = 0;
  let density = 0;
  for (let i = 0; i < ORDER; i++) {
    const u = half * (1 + nodes[i]);
    const outer = relativeAiry(s, u);
    const innerHalf = 0.5 * reach(s + u, LINEAR);
    let inner = 0;
    for (let k = 0; k < ORDER; k++) {
      const t = innerHalf * (1 + nodes[k]);
      inner += weights[k] * t * relativeAiry(s, u + t);
    }
    const common = weights[i] * outer * inner * innerHalf;
    survival += common * u * u;
    density += common * u;
  }
  return { survival: (half * survival) / 8, density: (half * density) / 4 };
}
