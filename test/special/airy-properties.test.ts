import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  airyAi,
  airyAiPrime,
  airyAiPrimeScaled,
  airyAiScaled,
  airyExponent,
} from "../../src/special/airy.ts";
import { integrate } from "./gauss-rule.ts";
import { uniform } from "./uniform.ts";

const SEED = { seed: 20261201, numRuns: 3000 };

/** Envelopes of Ai and Ai': their size for x ≥ 1, the leading term of the modulus to the left. */
function envelope(x: number): { ai: number; prime: number } {
  if (x >= 1) return { ai: airyAi(x), prime: -airyAiPrime(x) };
  const quarter = Math.sqrt(Math.sqrt(Math.max(1, -x)));
  return { ai: 0.6 / quarter, prime: 0.6 * quarter };
}

/** w(x + h), w'(x + h) by the Taylor series of w″ = x w from w(x), w'(x). */
function step(x: number, w: number, slope: number, h: number): [number, number] {
  const a = [w, slope, 0.5 * x * w];
  for (let k = 3; k < 40; k++) a.push((x * a[k - 2] + a[k - 3]) / (k * (k - 1)));
  let value = 0;
  let derivative = 0;
  for (let k = a.length - 1; k >= 1; k--) {
    value = value * h + a[k];
    derivative = derivative * h + k * a[k];
  }
  return [value * h + w, derivative];
}

describe("the differential equation", () => {
  it("carries Ai, Ai' backwards by up to 1/2 anywhere on [−60, 103], across switches", () => {
    // Backwards, because errors then grow no faster than Ai itself.
    fc.assert(
      fc.property(uniform(-60, 103), uniform(0, 0.5), (x, h) => {
        const start = x - h;
        const taken = start - x; // the step that was really made
        const [value, slope] = step(x, airyAi(x), airyAiPrime(x), taken);
        const scale = envelope(start);
        // fl(x − h) − x is exact or off by half a unit of x, which moves Ai by √|x| times that.
        const moved = 2 ** -53 * Math.abs(x) * Math.sqrt(Math.abs(x));
        const tolerance = 4e-15 + moved;
        expect(Math.abs(value - airyAi(start)) / scale.ai).toBeLessThanOrEqual(tolerance);
        expect(Math.abs(slope - airyAiPrime(start)) / scale.prime).toBeLessThanOrEqual(tolerance);
      }),
      SEED,
    );
  });

  it("the Wronskian of Ai(t + h) and Ai(t), the numerator of the Airy kernel, changes by −h ∫ Ai(t) Ai(t + h) dt", () => {
    const wronskian = (t: number, h: number): number =>
      airyAi(t + h) * airyAiPrime(t) - airyAiPrime(t + h) * airyAi(t);
    fc.assert(
      fc.property(fc.integer({ min: -3200, max: 2000 }), fc.integer({ min: 1, max: 64 }), (place, gap) => {
        const x = place / 64; // dyadic: every argument but the nodes is exact
        const h = gap / 64;
        const integral = integrate((t) => airyAi(t) * airyAi(t + h), x, x + 0.25);
        const scale = envelope(x);
        const change = wronskian(x + 0.25, h) - wronskian(x, h);
        // Four products, each with the errors of Ai and Ai' (6e-16 at most) and a rounding.
        expect(Math.abs(change + h * integral)).toBeLessThanOrEqual(4 * 1.4e-15 * scale.ai * scale.prime);
      }),
      SEED,
    );
  });
});

describe("the switches", () => {
  it("no jump at ±20, nor between Taylor centres, beyond the error itself", () => {
    const edges = [-20, 20];
    for (let c = -19.875; c < 20; c += 0.25) edges.push(c);
    for (const edge of edges) {
      const below = edge - 2 ** -48;
      const above = edge + 2 ** -48;
      const scale = envelope(edge);
      // Between the two points the functions move by their derivatives, taken at the edge.
      const rise = airyAi(above) - airyAi(below) - airyAiPrime(edge) * (above - below);
      const slopeRise = airyAiPrime(above) - airyAiPrime(below) - edge * airyAi(edge) * (above - below);
      expect(Math.abs(rise) / scale.ai, `Ai at ${edge}`).toBeLessThanOrEqual(1e-15);
      expect(Math.abs(slopeRise) / scale.prime, `Ai' at ${edge}`).toBeLessThanOrEqual(1e-15);
    }
  });

  it("Ai is positive and decreasing right of −1.0187, Ai' negative; Ai' increases right of 0", () => {
    fc.assert(
      fc.property(uniform(-1.0187, 103), uniform(1e-12, 0.5), (x, h) => {
        expect(airyAi(x)).toBeGreaterThan(0);
        expect(airyAiPrime(x)).toBeLessThan(0);
        expect(airyAi(x + h)).toBeLessThanOrEqual(airyAi(x) * (1 + 1e-15));
        if (x >= 0) expect(airyAiPrime(x + h)).toBeGreaterThanOrEqual(airyAiPrime(x) * (1 + 1e-15));
      }),
      SEED,
    );
  });
});

describe("the scaled forms", () => {
  it("are the plain ones times e^ζ", () => {
    fc.assert(
      fc.property(uniform(0, 103), (x) => {
        const [head, tail] = airyExponent(x);
        const factor = Math.exp(-head) * (1 - tail);
        expect(Math.abs((airyAiScaled(x) * factor) / airyAi(x) - 1)).toBeLessThanOrEqual(1.5e-15);
        expect(Math.abs((airyAiPrimeScaled(x) * factor) / airyAiPrime(x) - 1)).toBeLessThanOrEqual(1.5e-15);
      }),
      SEED,
    );
  });

  it("decrease (Ai), increase in size (Ai'), and satisfy √x < −Ai'/Ai < √x + 1/(4x), at any size of x > 1", () => {
    fc.assert(
      fc.property(uniform(0, 300), (power) => {
        const x = 10 ** power;
        const root = Math.sqrt(x);
        const ratio = -airyAiPrimeScaled(x) / airyAiScaled(x);
        expect(ratio).toBeGreaterThan(root * (1 - 1e-15));
        expect(ratio).toBeLessThan((root + 1 / (4 * x)) * (1 + 1e-15));
        expect(airyAiScaled(1.01 * x)).toBeLessThan(airyAiScaled(x));
        expect(-airyAiPrimeScaled(1.01 * x)).toBeGreaterThan(-airyAiPrimeScaled(x));
      }),
      SEED,
    );
  });
});
