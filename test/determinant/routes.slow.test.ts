/**
 * Long sweep: independent routes to the same determinant must agree within the sum of their stated errors. Generators
 * against formula, pair against general elimination, whole interval against split, 3000 random kernels each.
 */
import { describe, expect, it } from "vitest";
import { seededGenerator } from "../../src/core/random.ts";
import { fredholmDeterminant } from "../../src/determinant/fredholm-determinant.ts";
import { integrableKernel } from "../../src/kernels/integrable-kernel.ts";
import { smoothKernel } from "../../src/kernels/smooth-kernel.ts";
import { interval, union } from "../../src/quadrature/domain.ts";

describe("routes", () => {
  it("agree within their errors", () => {
    const uniform = seededGenerator(4711);
    const between = (low: number, high: number): number => low + (high - low) * uniform();
    const broken: unknown[] = [];
    for (let k = 0; k < 3000; k++) {
      const [p, q, r] = [between(0.2, 6), between(0.2, 6), between(-1.5, 1.5)];
      // f₁ = e^{rx} sin px, f₂ = cos qx: entire generators, a kernel without closed form.
      const f = (x: number): number => Math.exp(r * x) * Math.sin(p * x);
      const g = (x: number): number => Math.cos(q * x);
      const df = (x: number): number => Math.exp(r * x) * (r * Math.sin(p * x) + p * Math.cos(p * x));
      const dg = (x: number): number => -q * Math.sin(q * x);
      const diagonal = (x: number): number => df(x) * g(x) - f(x) * dg(x);
      const pair = integrableKernel({ left: [f, g], diagonal });
      const general = integrableKernel({ left: [f, g], right: [g, (x) => -f(x)], diagonal });
      const formula = smoothKernel(
        (x, y) => (x === y ? diagonal(x) : (f(x) * g(y) - g(x) * f(y)) / (x - y)),
        {
          // The formula cancels near the diagonal: its error is that of the generators over the gap.
          evaluationError: 1e-13,
        },
      );
      const a = between(-2, 2);
      const b = a + between(0.1, 3);
      const z = between(-1, 1);
      const whole = interval(a, b);
      const middle = between(a + 0.2 * (b - a), b - 0.2 * (b - a));
      const found = [
        fredholmDeterminant(pair, whole, { z }),
        fredholmDeterminant(general, whole, { z }),
        fredholmDeterminant(pair, union(interval(a, middle), interval(middle, b)), { z }),
        fredholmDeterminant(formula, whole, { z }),
      ];
      for (const other of found) {
        if (!(Math.abs(other.value - found[0].value) <= other.error + found[0].error)) {
          broken.push({ p, q, r, a, b, z, values: found.map((d) => [d.value, d.error]) });
        }
      }
    }
    expect(broken).toEqual([]);
  });
});
