/**
 * Gauss–Legendre rules on [−1, 1], cached.
 */
import { requireInteger } from "../core/check.ts";
import { legendreZeros } from "./legendre-zeros.ts";

/** Nodes in increasing order, and their weights. */
export interface QuadratureRule {
  readonly nodes: Float64Array;
  readonly weights: Float64Array;
}

/** A rule with the distance 1 − |x| of each node from the nearer end, to full relative accuracy. */
export interface SharedRule extends QuadratureRule {
  readonly distances: Float64Array;
}

/** Largest order available. */
export const LARGEST_ORDER = 100_000;

// Nodes kept in all, about 24 MB; the oldest rules go first. The cache never changes a result.
const MOST_KEPT = 1_000_000;
const cache = new Map<number, SharedRule>();
let kept = 0;

/**
 * The Gauss–Legendre rule of `order` points on [−1, 1], exact for polynomials of degree 2·order − 1.
 *
 * @param order - Number of points, an integer from 1 to 100 000.
 * @returns Nodes (increasing, symmetric to the last bit) and weights; fresh arrays that belong to the caller.
 * @throws {@link InvalidArgumentError} for any other order.
 *
 * **Error.** Nodes and weights are computed in double-double and rounded: at most one unit in the last place, at every
 * order (measured: docs/accuracy.md). **Cost.** O(order), about 3 µs a node at the first call, a copy later.
 * **Source.** A. Glaser, X. Liu, V. Rokhlin, SIAM J. Sci. Comput. 29 (2007) 1420, marching inwards from x = 1.
 *
 * @example
 * gaussLegendre(2).nodes; // −0.5773502691896257, 0.5773502691896257
 */
export function gaussLegendre(order: number): QuadratureRule {
  const { nodes, weights } = gaussLegendreShared(requireInteger("order", order, 1, LARGEST_ORDER));
  return { nodes: nodes.slice(), weights: weights.slice() };
}

/**
 * The cached rule itself, for use inside the library: its arrays must not be written to. The order is not checked.
 */
export function gaussLegendreShared(order: number): SharedRule {
  const found = cache.get(order);
  if (found !== undefined) return found;
  const rule = computeRule(order);
  kept += order;
  for (const [oldest] of cache) {
    if (kept <= MOST_KEPT) break;
    cache.delete(oldest);
    kept -= oldest;
  }
  cache.set(order, rule);
  return rule;
}

function computeRule(order: number): SharedRule {
  const { node, weight, distance } = legendreZeros(order);
  const nodes = new Float64Array(order);
  const weights = new Float64Array(order);
  const distances = new Float64Array(order);
  for (let k = 0; k < node.length; k++) {
    nodes[order - 1 - k] = node[k];
    weights[order - 1 - k] = weight[k];
    // 0 − x, so that the middle node of an odd rule is +0.
    nodes[k] = 0 - node[k];
    weights[k] = weight[k];
    distances[order - 1 - k] = distance[k];
    distances[k] = distance[k];
  }
  return { nodes, weights, distances };
}
