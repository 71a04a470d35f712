/**
 * The Airy kernel K(x, y) = (Ai(x) Ai'(y) − Ai'(x) Ai(y)) / (x − y), K(x, x) = Ai'(x)² − x Ai(x)².
 *
 * Source: C. Tracy, H. Widom, "Level-spacing distributions and the Airy kernel", Commun. Math. Phys. 159 (1994) 151,
 * eq. (1.4). det(I − K) on (s, ∞) is F2(s).
 */
import type { Arithmetic } from "../core/web-assembly.ts";
import type { IntegrableKernel } from "../determinant/kernel.ts";
import { fillPairs } from "../special/airy-pair.ts";
import { airySquareIntegralInto } from "../special/airy-square-integral.ts";

/**
 * The Airy kernel, the soft edge of the β = 2 ensembles.
 *
 * @returns An integrable kernel of rank 2, a contraction (0 ≤ K ≤ 1).
 *
 * **Error.** Airy functions to 6e-16 of their envelope, the diagonal to 2e-15 relative (x ≥ 0).
 */
export function airyKernel(): IntegrableKernel {
  return AIRY_KERNEL;
}

const AIRY_KERNEL: IntegrableKernel = Object.freeze({
  kind: "integrable" as const,
  name: "Airy kernel",
  rank: 2,
  antisymmetricPair: true,
  symmetric: true,
  contraction: true,
  evaluationError: 6e-16,
  decay: { tail: (_lower: number, cut: number) => traceTail(cut) },
  sample(
    nodes: Float64Array,
    count: number,
    left: readonly Float64Array[],
    _right: readonly Float64Array[],
    diagonal: Float64Array,
    arithmetic: Arithmetic = "automatic",
  ): void {
    const ai = left[0];
    const aiPrime = left[1];
    fillPairs(nodes, ai, aiPrime, count, arithmetic);
    airySquareIntegralInto(nodes, ai, aiPrime, diagonal, count, arithmetic);
  },
});

/**
 * ∫_b^∞ K(x, x) dx, from above: e^{−(4/3) b^{3/2}} / (16π b^{3/2}) for b ≥ 1 (the first omitted term, −35/(24 b^{3/2}),
 * is negative), and below that its value at 1 plus the growth of K(x, x) ≤ 0.07 + √|x| / π.
 */
function traceTail(b: number): number {
  if (b >= 1) {
    const power = b * Math.sqrt(b);
    return Math.exp((-4 / 3) * power) / (16 * Math.PI * power);
  }
  const below = 1 - b;
  return 0.0053 + 0.07 * below + (2 / (3 * Math.PI)) * below * Math.sqrt(below);
}
