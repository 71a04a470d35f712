import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { safeNewton } from "../../src/approximation/bracketing.ts";
import { chebyshevCoefficients, chebyshevPoints, clenshaw } from "../../src/approximation/chebyshev.ts";
import { antiderivative, atLeft, atRight } from "../../src/approximation/chebyshev-calculus.ts";
import { fromSamples, tabulationPoints } from "../../src/approximation/piecewise.ts";

const settings = { seed: 20261201, numRuns: 200 };

describe("Chebyshev expansions", () => {
  it("reproduce polynomials", () => {
    fc.assert(
      fc.property(
        fc.array(fc.double({ min: -1, max: 1, noNaN: true }), { minLength: 1, maxLength: 9 }),
        fc.double({ min: -3, max: 3, noNaN: true }),
        fc.double({ min: 0, max: 1, noNaN: true }),
        (coefficients, lower, share) => {
          const f = (x: number): number => coefficients.reduceRight((sum, c) => sum * x + c, 0);
          const upper = lower + 1.5;
          const samples = chebyshevPoints(12, lower, upper).map(f);
          const c = chebyshevCoefficients(samples, 9);
          const x = lower + 1.5 * share;
          const size = Math.max(...samples.map(Math.abs), 1);
          expect(Math.abs(clenshaw(c, 0, 9, 2 * share - 1) - f(x))).toBeLessThan(1e-14 * size);
        },
      ),
      settings,
    );
  });

  it("integrate: ∫ e^x over every part of an interval", () => {
    const c = chebyshevCoefficients(chebyshevPoints(24, -1, 2).map(Math.exp), 23);
    const integral = antiderivative(c, 1.5);
    const at = (x: number): number => clenshaw(integral, 0, integral.length - 1, (2 * x - 1) / 3);
    for (const [p, q] of [
      [-1, 2],
      [0, 1],
      [-0.3, 1.7],
    ]) {
      expect(Math.abs(at(q) - at(p) - (Math.exp(q) - Math.exp(p)))).toBeLessThan(3e-15);
    }
    expect(Math.abs(atRight(integral) - at(2))).toBeLessThan(1e-15);
    expect(Math.abs(atLeft(integral) - at(-1))).toBeLessThan(1e-15);
  });
});

describe("piecewise tables", () => {
  it("follow a function across their breaks and find their interval at the edges", () => {
    const breaks = [0, 0.5, 1.25, 3];
    const table = fromSamples(
      breaks,
      30,
      17,
      tabulationPoints(breaks, 30).map((x) => Math.exp(-x) * Math.cos(x)),
    );
    for (let x = 0; x <= 3; x += 1 / 64) {
      expect(Math.abs(table.evaluateOn(table.locate(x), x) - Math.exp(-x) * Math.cos(x))).toBeLessThan(4e-16);
    }
    expect([-1, 0, 0.5, 1.24, 1.25, 2, 3, 9].map((x) => table.locate(x))).toEqual([0, 0, 1, 1, 2, 2, 2, 2]);
  });
});

describe("safeNewton", () => {
  it("finds roots to the last bit from any start in the bracket, rising or falling", () => {
    fc.assert(
      fc.property(
        fc.double({ min: -20, max: 20, noNaN: true }),
        fc.double({ min: 0.01, max: 0.99, noNaN: true }),
        (root, share) => {
          for (const sign of [1, -1]) {
            const f = (x: number, out: Float64Array): void => {
              out[0] = sign * Math.sinh(x - root);
              out[1] = sign * Math.cosh(x - root);
            };
            const found = safeNewton(
              f,
              root - 30 * share,
              root + 30 * (1 - share),
              root - 30 * share + 15,
              sign === 1,
            );
            expect(Math.abs(found - root)).toBeLessThanOrEqual(4e-16 * Math.max(1, Math.abs(root)));
          }
        },
      ),
      settings,
    );
  });

  it("falls back on bisection where Newton's step is useless", () => {
    const f = (x: number, out: Float64Array): void => {
      out[0] = Math.cbrt(x - 0.3);
      out[1] = 1e-30; // a derivative that is wrong on purpose
    };
    expect(Math.abs(safeNewton(f, -1, 2, 1.9, true) - 0.3)).toBeLessThan(1e-15);
  });
});
