/**
 * Long sweep: every order from 1 to 4000. Σ w x^(2k) = 2/(2k + 1) for k < order, by compensated sums.
 */
import { expect, it } from "vitest";
import { gaussLegendreShared } from "../../src/quadrature/gauss-legendre.ts";

it("every order to 4000 integrates even powers to rounding", () => {
  let worst = 0;
  for (let order = 1; order <= 4000; order++) {
    const { nodes, weights } = gaussLegendreShared(order);
    for (const k of [0, 1, 2, 5, 11, 40]) {
      if (k >= order) continue;
      let sum = 0;
      let carry = 0;
      for (let i = 0; i < order; i++) {
        const term = weights[i] * nodes[i] ** (2 * k) - carry;
        const next = sum + term;
        carry = next - sum - term;
        sum = next;
      }
      worst = Math.max(worst, Math.abs((sum * (2 * k + 1)) / 2 - 1));
      if (worst > 1e-14) throw new Error(`order ${order}, power ${2 * k}: relative error ${worst}`);
    }
  }
  expect(worst).toBeGreaterThan(0);
});
