import { describe, expect, it } from "vitest";
import {
  airyTaylorCoefficients,
  CENTRES,
  centre,
  DEGREE,
  nearestCentre,
  taylorAi,
  taylorAiPrime,
  taylorTable,
} from "../../src/special/airy-taylor.ts";

describe("Taylor table", () => {
  it("is built once", () => {
    expect(taylorTable()).toBe(taylorTable());
  });

  it("puts every x of [−20, 20] within 1/8 of its centre", () => {
    for (let x = -20; x <= 20; x += 1 / 128) {
      const j = nearestCentre(x);
      expect(j).toBeGreaterThanOrEqual(0);
      expect(j).toBeLessThan(CENTRES);
      expect(Math.abs(x - centre(j))).toBeLessThanOrEqual(1 / 8);
    }
    expect(nearestCentre(20)).toBe(CENTRES - 1);
    expect(centre(0)).toBe(-20);
  });

  it("sums every coefficient: at |t| = 8, far outside its use, where the last ones dominate", () => {
    const table = taylorTable();
    const a = new Float64Array(DEGREE + 2);
    for (let j = 0; j < CENTRES; j++) {
      airyTaylorCoefficients(j, a);
      for (const t of [-8, 8]) {
        let value = 0;
        let slope = 0;
        let size = 0;
        for (let k = DEGREE; k >= 0; k--) {
          value = value * t + a[k];
          slope = slope * t + (k + 1) * a[k + 1];
          size = size * 8 + (k + 1) * Math.abs(a[k + 1]) + Math.abs(a[k]);
        }
        expect(Math.abs(taylorAi(table, j, t) - value)).toBeLessThanOrEqual(1e-14 * size);
        expect(Math.abs(taylorAiPrime(table, j, t) - slope)).toBeLessThanOrEqual(1e-14 * size);
        expect(Math.abs(a[DEGREE]) * 8 ** DEGREE).toBeGreaterThan(1e-6 * size);
      }
    }
  });

  it("is long enough: the terms left out are below 2e-17 of the envelope", () => {
    const a = new Float64Array(24);
    for (let j = 0; j < CENTRES; j++) {
      airyTaylorCoefficients(j, a);
      const c = centre(j);
      // Modulus to the left (about 0.6 |c|^∓1/4), the smallest value reached on the piece to the right.
      const decay = Math.exp(-Math.sqrt(Math.max(0, c)) / 8);
      const quarter = Math.max(1, -c) ** 0.25;
      const size = c > 0 ? a[0] * decay : 0.55 / quarter;
      const slopeSize = c > 0 ? -a[1] * decay : 0.55 * quarter;
      let left = 0;
      let slopeLeft = 0;
      for (let k = DEGREE + 1; k < a.length; k++) left += Math.abs(a[k]) * 8 ** -k;
      for (let k = DEGREE + 2; k < a.length; k++) slopeLeft += k * Math.abs(a[k]) * 8 ** -(k - 1);
      expect(left / size).toBeLessThan(2e-17);
      expect(slopeLeft / slopeSize).toBeLessThan(2e-17);
    }
  });
});
