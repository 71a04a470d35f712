import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  airyAi,
  airyAiPrime,
  airyAiPrimeScaled,
  airyAiScaled,
  airyExponent,
} from "../../src/special/airy.ts";

const SEED = { seed: 20261201, numRuns: 3000 };

/** Envelopes of Ai and Ai': their size for x ≥ 1, the leading term of the modulus (DLMF 9.8.20) or 1 to the left. */
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
      fc.property(fc.double({ min: -60, max: 103, noNaN: true }), fc.double({ min: 0, max: 0.5 }), (x, h) => {
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

  it("holds in between: Ai(x+h) Ai'(x) − Ai'(x+h) Ai(x) = −∫ t-weighted product, the kernel identity", () => {
    // d/dt (Ai(t+h) Ai'(t) − Ai'(t+h) Ai(t)) = −h Ai(t) Ai(t+h); checked by the derivative's Simpson-free form:
    // the Wronskian of w(t) = Ai(t+h) and Ai(t) between x and x + s, s small enough for a midpoint series.
    const wronskian = (t: number, h: number): number =>
      airyAi(t + h) * airyAiPrime(t) - airyAiPrime(t + h) * airyAi(t);
    const nodes = [-0.7745966692414834, 0, 0.7745966692414834];
    const weights = [5 / 9, 8 / 9, 5 / 9];
    fc.assert(
      fc.property(fc.integer({ min: -2400, max: 1500 }), fc.integer({ min: 1, max: 64 }), (place, gap) => {
        const x = place / 64; // all arguments exact
        const h = gap / 64;
        const half = 1 / 128;
        let integral = 0;
        for (let i = 0; i < 3; i++) {
          const t = x + half * (1 + nodes[i]);
          integral += half * weights[i] * airyAi(t) * airyAi(t + h);
        }
        const scale = envelope(x);
        const change = wronskian(x + 2 * half, h) - wronskian(x, h);
        expect(Math.abs(change + h * integral)).toBeLessThanOrEqual(6e-15 * scale.ai * scale.prime);
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
      fc.property(
        fc.double({ min: -1.0187, max: 103, noNaN: true }),
        fc.double({ min: 1e-12, max: 0.5 }),
        (x, h) => {
          expect(airyAi(x)).toBeGreaterThan(0);
          expect(airyAiPrime(x)).toBeLessThan(0);
          expect(airyAi(x + h)).toBeLessThanOrEqual(airyAi(x) * (1 + 1e-15));
          if (x >= 0) expect(airyAiPrime(x + h)).toBeGreaterThanOrEqual(airyAiPrime(x) * (1 + 1e-15));
        },
      ),
      SEED,
    );
  });
});

describe("the scaled forms", () => {
  it("are the plain ones times e^ζ", () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 103, noNaN: true }), (x) => {
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
      fc.property(fc.double({ min: 0, max: 300, noNaN: true }), (power) => {
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
