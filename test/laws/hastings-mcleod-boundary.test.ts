import { describe, expect, it } from "vitest";
import { chebyshevCoefficients, chebyshevPoints } from "../../src/approximation/chebyshev.ts";
import { hastingsMcLeod } from "../../src/laws/hastings-mcleod.ts";
import { fitMatrix, matrixTimes, solvePanels } from "../../src/laws/hastings-mcleod-boundary.ts";
import stepped from "../fixtures/tracy-widom-left-tail.json" with { type: "json" };

function reference(s: number): number {
  const row = stepped.rows.find((entry) => entry[0] === s);
  if (!row) throw new Error(`no reference at ${s}`);
  return Number(row[1]);
}

describe("boundary value problem of the Hastings–McLeod function", () => {
  it("has the same solution whatever the panels, the points and the first guess", () => {
    const a = -10;
    const b = 0;
    for (const count of [13, 20]) {
      for (const guessed of [0.2, 1.5]) {
        for (const n of [18, 24]) {
          const breaks = Float64Array.from({ length: count + 1 }, (_, k) => a + ((b - a) * k) / count);
          const guess = breaks.map(() => guessed);
          guess[0] = reference(a);
          guess[count] = reference(b);
          const panels = solvePanels(breaks, guess, n);
          expect(panels.length).toBe(count);
          panels.forEach((values, p) => {
            const points = chebyshevPoints(n, breaks[p], breaks[p + 1]);
            values.forEach((q, i) => {
              expect(Math.abs(q / hastingsMcLeod(points[i]) - 1), `s = ${points[i]}`).toBeLessThan(8e-15);
            });
          });
        }
      }
    }
  });

  it("leaves its arguments alone", () => {
    const breaks = Float64Array.of(-4, -3, -2);
    const guess = Float64Array.of(reference(-4), 1.2, reference(-2));
    const before = [breaks.slice(), guess.slice()];
    solvePanels(breaks, guess, 20);
    expect([breaks, guess]).toEqual(before);
  });

  it("fits by a matrix as the cosine sums do", () => {
    for (const n of [2, 3, 10, 18, 31]) {
      const values = chebyshevPoints(n, 0, 1).map((x) => Math.exp(x) * Math.cos(9 * x));
      const expected = chebyshevCoefficients(values, n - 1);
      matrixTimes(fitMatrix(n), values).forEach((c, k) => {
        // Plain summation of n terms, |terms| ≤ (2/n) e, against compensated.
        expect(Math.abs(c - expected[k]), `n = ${n}, k = ${k}`).toBeLessThan(n * Number.EPSILON * Math.E);
      });
    }
  });
});
