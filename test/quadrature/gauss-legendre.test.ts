import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { InvalidArgumentError } from "../../src/core/errors.ts";
import { gaussLegendre, gaussLegendreShared } from "../../src/quadrature/gauss-legendre.ts";
import fixture from "../fixtures/gauss-legendre.json" with { type: "json" };
import { differenceFrom, relativeDifference } from "../precise.ts";

/** Compensated sum. */
function sum(values: Iterable<number>): number {
  let s = 0;
  let c = 0;
  for (const v of values) {
    const y = v - c;
    const t = s + y;
    c = t - s - y;
    s = t;
  }
  return s;
}

describe("gaussLegendre", () => {
  const rows = fixture.rows as [number, number, string, string][];

  it("agrees with 36-digit nodes and weights from mpmath at every order, to the last place", () => {
    expect(rows.length).toBeGreaterThan(400);
    let worstNode = 0;
    let worstWeight = 0;
    for (const [order, index, node, weight] of rows) {
      const { nodes, weights } = gaussLegendre(order);
      worstNode = Math.max(worstNode, Math.abs(differenceFrom(nodes[order - index], node)));
      worstWeight = Math.max(worstWeight, Math.abs(relativeDifference(weights[order - index], weight)));
    }
    // Rounded to nearest: half a unit in the last place, 2⁻⁵⁴ for nodes near 1, 2⁻⁵³ relative for weights.
    expect(worstNode).toBeLessThanOrEqual(5.6e-17);
    expect(worstWeight).toBeLessThanOrEqual(1.12e-16);
  });

  // GNU Scientific Library, integration/glfixed.c, 25 decimals.
  it.each([
    [2, 0, "0.5773502691896257645091488", "1"],
    [4, 0, "0.3399810435848562648026658", "0.6521451548625461426269361"],
    [4, 1, "0.8611363115940525752239465", "0.3478548451374538573730639"],
    [10, 0, "0.148874338981631210884826", "0.295524224714752870173893"],
    [10, 4, "0.973906528517171720077964", "0.0666713443086881375935688"],
    [20, 9, "0.9931285991850949247861224", "0.017614007139152118311862"],
    [32, 15, "0.9972638618494815635449811", "0.0070186100094700966004071"],
    [64, 31, "0.9993050417357721394569056", "0.0017832807216964329472961"],
    [96, 47, "0.9996895038832307668276901", "0.0007967920655520124294381"],
    [100, 0, "0.0156289844215430828722167", "0.0312554234538633569476425"],
    [100, 49, "0.9997137267734412336782285", "0.0007346344905056717304063"],
  ])("order %i, node %i from the middle: the published digits", (order, fromMiddle, node, weight) => {
    const rule = gaussLegendre(order);
    const at = order / 2 + fromMiddle;
    expect(rule.nodes[at]).toBe(Number(node));
    expect(rule.weights[at]).toBe(Number(weight));
  });

  it("is symmetric to the last bit, increasing, with weights that sum to 2, up to order 100 000", () => {
    const orders = [1, 2, 11, 12, 13, 14, 1000, 10_000, 99_999, 100_000];
    fc.assert(
      fc.property(fc.oneof(fc.constantFrom(...orders), fc.integer({ min: 1, max: 3000 })), (order) => {
        const { nodes, weights } = gaussLegendre(order);
        expect(nodes.length).toBe(order);
        for (let i = 0; i < order; i++) {
          expect(nodes[i] + nodes[order - 1 - i]).toBe(0);
          expect(weights[i]).toBe(weights[order - 1 - i]);
          if (i > 0 && !(nodes[i] > nodes[i - 1]))
            throw new Error(`order ${order}: node ${i} not increasing`);
        }
        if (order % 2 === 1) expect(Object.is(nodes[(order - 1) / 2], 0)).toBe(true);
        expect(Math.abs(sum(weights) - 2)).toBeLessThan(5e-16);
      }),
      { seed: 20261201, numRuns: 40 },
    );
  });

  it("integrates Legendre polynomials up to degree 2n − 1 to zero", () => {
    for (const order of [1, 2, 3, 6, 7, 13, 30, 101]) {
      const { nodes, weights } = gaussLegendre(order);
      for (let degree = 1; degree < 2 * order; degree++) {
        const terms = Array.from(nodes, (x, i) => {
          let [p, q] = [1, x];
          for (let k = 2; k <= degree; k++) [p, q] = [q, ((2 * k - 1) * x * q - (k - 1) * p) / k];
          return weights[i] * q;
        });
        expect(Math.abs(sum(terms)), `order ${order}, degree ${degree}`).toBeLessThan(3e-15);
      }
    }
  });

  it("gives distances 1 − |x| to full relative accuracy inside the library", () => {
    for (const [order, index, node] of rows) {
      if (Number(node) < 0.5) continue; // there 1 − x is not exact in the check itself
      const { distances } = gaussLegendreShared(order);
      const exact = 1 - Number(node) + differenceFrom(Number(node), node);
      expect(Math.abs(distances[order - index] - exact)).toBeLessThanOrEqual(2 ** -53 * exact + 1e-31);
    }
  });

  it("hands out fresh arrays: writing to them does not reach the cache", () => {
    const first = gaussLegendre(17);
    const kept = first.nodes[3];
    first.nodes[3] = 99;
    first.weights[3] = 99;
    expect(gaussLegendre(17).nodes[3]).toBe(kept);
    expect(gaussLegendre(17).weights[3]).not.toBe(99);
  });

  it.each([0, -1, 1.5, 1e9, 100_001, Number.NaN, Number.POSITIVE_INFINITY])("refuses order %s", (order) => {
    expect(() => gaussLegendre(order)).toThrow(InvalidArgumentError);
    expect(() => gaussLegendre(order)).toThrow(/order: expected an integer from 1 to 100000, received/);
  });

  it("refuses an order that is not a number", () => {
    expect(() => gaussLegendre("8" as unknown as number)).toThrow(InvalidArgumentError);
  });
});
