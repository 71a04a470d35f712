/** Gauss rules with many digits. */
import { describe, expect, it } from "vitest";
import { readExact } from "../../src/precision/decimal.ts";
import { gaussRule, preciseGaussLegendre } from "../../src/precision/gauss-rules.ts";
import { atMost, distance, parse } from "./decimals.ts";

/** Within one unit of the 25th decimal. */
function expect25(found: string, published: string): void {
  const gap = distance(parse(found), parse(published));
  expect(atMost(gap, parse("0.6e-25")), `${found} against ${published}`).toBe(true);
}

describe("Gauss–Legendre", () => {
  // GNU Scientific Library, integration/glfixed.c, 25 decimals: order, index from the middle, node, weight.
  it.each([
    [2, 0, "0.5773502691896257645091488", "1"],
    [4, 0, "0.3399810435848562648026658", "0.6521451548625461426269361"],
    [4, 1, "0.8611363115940525752239465", "0.3478548451374538573730639"],
    [10, 4, "0.9739065285171717200779640", "0.0666713443086881375935688"],
    [32, 15, "0.9972638618494815635449811", "0.0070186100094700966004071"],
    [64, 0, "0.0243502926634244325089558", "0.0486909570091397203833654"],
    [100, 49, "0.9997137267734412336782285", "0.0007346344905056717304063"],
    [128, 63, "0.9998248879471319144736081", ""],
  ])("order %i, node %i", (order, index, node, weight) => {
    const rule = preciseGaussLegendre(order, { digits: 40 });
    expect25(rule.nodes[order / 2 + index], node);
    if (weight !== "") expect25(rule.weights[order / 2 + index], weight);
    expect25(rule.nodes[order / 2 - 1 - index].replace("-", ""), node);
  });

  it("√(3/5), 5/9, 8/9 to 300 digits", () => {
    const { nodes, weights } = preciseGaussLegendre(3, { digits: 300 });
    const square = parse(nodes[2]);
    const gap = distance({ mantissa: square.mantissa ** 2n, scale: 2 * square.scale }, parse("0.6"));
    expect(atMost(gap, parse("1e-300"))).toBe(true);
    expect(nodes[1]).toBe("0");
    const nine = (w: string): { mantissa: bigint; scale: number } => ({
      ...parse(w),
      mantissa: 9n * parse(w).mantissa,
    });
    expect(atMost(distance(nine(weights[1]), parse("8")), parse("1e-299"))).toBe(true);
    expect(atMost(distance(nine(weights[0]), parse("5")), parse("1e-299"))).toBe(true);
  });

  it.each([1, 2, 7, 20, 61, 150])("order %i integrates every power up to 2n − 1 on (0, 1)", (order) => {
    const bits = 700n;
    const { nodes, weights } = gaussRule(order, bits);
    let powers = weights.slice();
    for (let k = 0; k < 2 * order; k++) {
      const sum = powers.reduce((a, b) => a + b, 0n);
      const gap = sum * BigInt(k + 1) - (1n << bits);
      expect(gap < 1n << 20n && gap > -(1n << 20n), `power ${k}`).toBe(true);
      powers = powers.map((p, i) => (p * nodes[i]) >> bits);
    }
  });

  it.each(["0.5", "-0.9", "3.25", "40"])("weight x^%s: ∫ x^{k + α} = 1/(k + α + 1)", (text) => {
    const bits = 500n;
    const alpha = readExact("alpha", text);
    const order = 24;
    const { nodes, weights } = gaussRule(order, bits, alpha);
    const hundredths = BigInt(Math.round(Number(text) * 100));
    let powers = weights.slice();
    for (let k = 0; k < 2 * order; k++) {
      const sum = powers.reduce((a, b) => a + b, 0n);
      const gap = (sum * (hundredths + 100n * BigInt(k + 1))) / 100n - (1n << bits);
      expect(gap < 1n << 20n && gap > -(1n << 20n), `power ${k}`).toBe(true);
      powers = powers.map((p, i) => (p * nodes[i]) >> bits);
    }
  });

  it("refuses bad orders and digits", () => {
    for (const order of [0, -1, 1.5, 2001, Number.NaN]) {
      expect(() => preciseGaussLegendre(order)).toThrow(/order: expected an integer from 1 to 2000/);
    }
    expect(() => preciseGaussLegendre(4, { digits: 0 })).toThrow(/from 1 to 1000/);
  });
});
