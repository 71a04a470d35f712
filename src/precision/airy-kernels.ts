/**
 * The Airy kernel and the kernel ½ Ai((x + y)/2) for any number of digits.
 *
 *   K(x, y) = (Ai(x) Ai′(y) − Ai′(x) Ai(y)) / (x − y)          F2 = det(I − K) on (s, ∞)
 *   V(x, y) = ½ Ai((x + y)/2)                                  F1 = det(I − V), unscaled F4 = ½ (det(I − V) + det(I + V))
 *
 * C. Tracy, H. Widom, Commun. Math. Phys. 159 (1994) 151; P. Ferrari, H. Spohn, J. Phys. A 38 (2005) L557.
 */
import { airyTable } from "./airy-table.ts";
import { composeLinear } from "./jet.ts";
import type { PreciseArithmetic } from "./precise-arithmetic.ts";
import type { PreciseIntegrableKernel, PreciseSmoothKernel } from "./precise-kernel.ts";

const AIRY: PreciseIntegrableKernel = Object.freeze({
  kind: "integrable",
  name: "Airy",
  rank: 2,
  antisymmetricPair: true,
  contraction: true,
  weightExponent: undefined,
  generators: (arithmetic: PreciseArithmetic, order: number, lower: number, upper: number) => {
    const { ai } = airyTable(arithmetic.bits, lower, upper, order + 1);
    return (x: bigint) => {
      const a = ai(x);
      return [a, a.slice(1).map((c, k) => c * BigInt(k + 1))];
    };
  },
  // ∫_x^∞ K(t, t) dt < e^{−(4/3) x^{3/2}} / (16 π x^{3/2}).
  decay: (x: number) =>
    x < 1 ? 8 - x : -((4 / 3) * x ** 1.5 + Math.log(16 * Math.PI * x ** 1.5)) * Math.LOG2E,
});

const AIRY_SUM: PreciseSmoothKernel = Object.freeze({
  kind: "smooth",
  name: "Airy sum",
  symmetric: true,
  mostDerivatives: Number.POSITIVE_INFINITY,
  evaluator: (arithmetic: PreciseArithmetic, order: number, lower: number, upper: number) => {
    const { bits } = arithmetic;
    const { ai } = airyTable(bits, lower, upper, order);
    return (x: bigint, u: bigint, y: bigint, v: bigint) =>
      composeLinear(ai((x + y) >> 1n), (u + v) >> 1n, order + 1, bits).map((c) => c >> 1n);
  },
  // V(t, u) = ½ Ai((t + u)/2) is largest at u = lower: Ai(m)² < e^{−(4/3) m^{3/2}} / (4π √m) at m = (x + lower)/2.
  decay: (x: number, lower: number) => {
    const m = 0.5 * (x + lower);
    return m < 1 ? 8 - m : -((4 / 3) * m ** 1.5 - Math.log(2 + m)) * Math.LOG2E;
  },
});

/**
 * The Airy kernel.
 *
 * @category Precise determinants
 * @since 0.2.0
 */
export function preciseAiryKernel(): PreciseIntegrableKernel {
  return AIRY;
}

/**
 * The kernel ½ Ai((x + y)/2).
 *
 * @category Precise determinants
 * @since 0.2.0
 */
export function preciseAirySumKernel(): PreciseSmoothKernel {
  return AIRY_SUM;
}
