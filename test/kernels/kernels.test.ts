/**
 * The built-in kernels: generators against formula, diagonal against its limit, decay against the integral.
 */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { airyKernel } from "../../src/kernels/airy-kernel.ts";
import { airySumKernel } from "../../src/kernels/airy-sum-kernel.ts";
import { gaussLegendre } from "../../src/quadrature/gauss-legendre.ts";
import { airyAi } from "../../src/special/airy.ts";

const settings = { seed: 20261201, numRuns: 200 };

/** Samples of the Airy kernel at given points. */
function sampleAiry(points: number[]): { left: Float64Array[]; diagonal: Float64Array } {
  const n = points.length;
  const left = [new Float64Array(n), new Float64Array(n)];
  const diagonal = new Float64Array(n);
  airyKernel().sample(Float64Array.from(points), n, left, [], diagonal);
  return { left, diagonal };
}

describe("airyKernel", () => {
  // K(x, y) = ∫_0^∞ Ai(x + t) Ai(y + t) dt (C. Tracy, H. Widom, Commun. Math. Phys. 159 (1994) 151, eq. (4.5)).
  const { nodes, weights } = gaussLegendre(200);
  const byIntegral = (x: number, y: number): number => {
    const half = 0.5 * (18 - Math.min(x, y));
    let sum = 0;
    for (let i = 0; i < nodes.length; i++) {
      const t = half * (1 + nodes[i]);
      sum += half * weights[i] * airyAi(x + t) * airyAi(y + t);
    }
    return sum;
  };

  it("has generators and a diagonal that are the integral of Ai Ai", () => {
    fc.assert(
      fc.property(
        fc.double({ min: -12, max: 5, noNaN: true }),
        fc.double({ min: 0.3, max: 4, noNaN: true }),
        (x, gap) => {
          const y = x + gap;
          const { left, diagonal } = sampleAiry([x, y]);
          const offDiagonal = (left[0][0] * left[1][1] - left[1][0] * left[0][1]) / (x - y);
          expect(Math.abs(offDiagonal - byIntegral(x, y))).toBeLessThan(4e-15);
          expect(Math.abs(diagonal[0] - byIntegral(x, x))).toBeLessThan(4e-15);
        },
      ),
      settings,
    );
  });

  it("states a decay that exceeds what is cut off, and not by much", () => {
    const { tail } = airyKernel().decay ?? { tail: () => 0 };
    for (const b of [-6, -2, 0, 0.9, 1.1, 3, 6]) {
      let integral = 0;
      for (let x = b + 0.005; x < b + 14; x += 0.01) integral += 0.01 * sampleAiry([x]).diagonal[0];
      expect(tail(b, b), `tail(${b})`).toBeGreaterThan(0.999 * integral);
      expect(tail(b, b), `tail(${b})`).toBeLessThan(12 * integral);
    }
  });
});

describe("airySumKernel", () => {
  it("squares to the Airy kernel: V² = K on (s, ∞)", () => {
    // ∫_s^∞ ½Ai((x + t)/2) ½Ai((t + y)/2) dt = ∫_0^∞ ½ Ai(½(x + s) + u) Ai(½(y + s) + u) du.
    const kernel = airySumKernel();
    const { nodes, weights } = gaussLegendre(120);
    for (const [s, x, y] of [
      [-3, -2.5, 0.4],
      [0, 0.1, 1.3],
      [2, 2.2, 2.9],
    ]) {
      const half = 0.5 * (30 - s);
      let left = 0;
      let right = 0;
      for (let i = 0; i < nodes.length; i++) {
        const t = half * (1 + nodes[i]);
        left += half * weights[i] * kernel.evaluate(x, s + t) * kernel.evaluate(s + t, y);
        right += 0.25 * half * weights[i] * airyAi(0.5 * (x + s + t)) * airyAi(0.5 * (y + s + t));
      }
      expect(Math.abs(left - right)).toBeLessThan(1e-15);
    }
  });

  it("is symmetric and states a decay that falls with the cut", () => {
    const kernel = airySumKernel();
    expect(kernel.evaluate(1, 2)).toBe(kernel.evaluate(2, 1));
    const { tail } = kernel.decay ?? { tail: () => 0 };
    for (const lower of [-5, 0, 4]) {
      let before = Number.POSITIVE_INFINITY;
      for (let cut = lower; cut < lower + 25; cut += 0.5) {
        expect(tail(lower, cut)).toBeLessThan(before);
        before = tail(lower, cut);
      }
    }
  });
});
