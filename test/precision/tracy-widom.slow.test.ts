/** All points of the 50-digit table, both ends included: some minutes. */
import { readFileSync } from "node:fs";
import { expect, it } from "vitest";
import { preciseTracyWidom } from "../../src/precision/precise-tracy-widom.ts";
import { atMost, distance, parse, shifted } from "./decimals.ts";

const { grid } = JSON.parse(readFileSync(new URL("../fixtures/tracy-widom.json", import.meta.url), "utf8"));

it("F, 1 − F and F′ to 45 digits at every point, F2(−40) and 1 − F2(30) included", () => {
  for (const row of grid) {
    for (const [beta, key] of [
      [1, "beta1"],
      [2, "beta2"],
      [4, "beta4_G"],
    ] as const) {
      const found = preciseTracyWidom(beta, row.s, { digits: 46 });
      for (const what of ["cdf", "survival", "pdf"] as const) {
        const expected = parse(row[key][what]);
        const gap = distance(parse(found[what].value), expected);
        expect(
          atMost(gap, shifted(expected, 45)),
          `${what} of F${beta} at ${row.s}: ${found[what].value}`,
        ).toBe(true);
        expect(found[what].converged).toBe(true);
      }
    }
  }
});
