/**
 * Nodes and weights on a list of panels: a Gauss–Legendre rule on each, or, for a half-line that cannot be cut, the
 * rule mapped by x = lower + c (1 + t) / (1 − t), dx = 2c / (1 − t)² dt (J. P. Boyd, J. Comput. Phys. 70 (1987) 63).
 */
import { gaussLegendreShared } from "./gauss-legendre.ts";

/** A finite interval, or a whole half-line (`mapped`) whose length scale is upper − lower. */
export interface Panel {
  readonly lower: number;
  readonly upper: number;
  readonly mapped: boolean;
}

/**
 * Fills `nodes` and `weights` with a rule of `order` points on every panel, panel after panel.
 *
 * @returns Number of points written, `order · panels.length`.
 */
export function fillPanels(
  panels: readonly Panel[],
  order: number,
  nodes: Float64Array,
  weights: Float64Array,
): number {
  const rule = gaussLegendreShared(order);
  let at = 0;
  for (const { lower, upper, mapped } of panels) {
    const half = 0.5 * (upper - lower);
    for (let i = 0; i < order; i++, at++) {
      // Measured from the nearer end, by its exact distance: a far-away middle would cost digits.
      const d = rule.distances[i];
      const below = rule.nodes[i] < 0;
      if (mapped) {
        const away = below ? 2 - d : d; // 1 − t
        nodes[at] = lower + ((upper - lower) * (2 - away)) / away;
        weights[at] = (rule.weights[i] * 2 * (upper - lower)) / (away * away);
      } else {
        nodes[at] = below ? lower + half * d : upper - half * d;
        weights[at] = half * rule.weights[i];
      }
    }
  }
  return at;
}
