/**
 * The kernel V(x, y) = ½ Ai((x + y)/2) on (s, ∞), whose determinants give the β = 1 and β = 4 laws:
 * F1(s) = det(I − V), F2(s) = det(I − V) det(I + V).
 *
 * Source: P. Ferrari, H. Spohn, "A determinantal formula for the GOE Tracy–Widom distribution", J. Phys. A 38 (2005)
 * L557. V is a sum (Hankel) kernel, not an integrable one: its determinant goes through a dense matrix.
 */
import type { SmoothKernel } from "../determinant/kernel.ts";
import { airyAi } from "../special/airy.ts";

/**
 * The Airy sum kernel ½ Ai((x + y)/2).
 *
 * @returns A symmetric smooth kernel. Its eigenvalues on (s, ∞) lie in (−1, 1), of both signs.
 */
export function airySumKernel(): SmoothKernel {
  return AIRY_SUM_KERNEL;
}

const AIRY_SUM_KERNEL: SmoothKernel = Object.freeze({
  kind: "smooth" as const,
  name: "Airy sum kernel",
  symmetric: true,
  symmetryDeclared: true,
  contraction: true,
  evaluationError: 6e-16,
  decay: { tail },
  evaluate: (x: number, y: number): number => 0.5 * airyAi(0.5 * (x + y)),
});

/**
 * First order: ∫_cut^∞ V(x, x) dx = ½ ∫_cut^∞ Ai. Second order: the entries that couple the part cut off to the rest,
 * ∫_lower^∞ dx ∫_cut^∞ dy V(x, y)² = ∫_m^∞ (w − m) Ai(w)² dw with m = (lower + cut)/2. Both by the leading term of
 * their expansions, which exceed them (DLMF 9.10.4, 9.7.5).
 */
function tail(lower: number, cut: number): number {
  const m = 0.5 * (lower + cut);
  return firstOrder(cut) + secondOrder(m);
}

function firstOrder(b: number): number {
  if (b < 1) return 0.06 + 0.5 * Math.min(1, 1 - b);
  const power = b * Math.sqrt(b);
  return Math.exp((-2 / 3) * power) / (4 * Math.sqrt(Math.PI * power));
}

function secondOrder(m: number): number {
  if (m < 1) return 0.0053 + 0.07 * (1 - m) + 0.3 * (1 - m) * Math.sqrt(1 - m);
  const power = m * Math.sqrt(m);
  return Math.exp((-4 / 3) * power) / (16 * Math.PI * power);
}
