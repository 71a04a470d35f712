/** The demo's data: the same bytes from the same seed, and small enough for the repository. */
import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { DEMO_TRUTH, demoFiles } from "../../docs/demo/sensor-array.ts";

describe("demo data", () => {
  const files = Object.entries(demoFiles());

  it("has four files", () => {
    expect(files.map(([name]) => name).sort()).toEqual([
      "array-complex.csv",
      "array-real.csv",
      "noise-only.csv",
      "peaks.csv",
    ]);
  });

  it.each(files)("%s is what the script makes, byte for byte", (name, text) => {
    const committed = readFileSync(new URL(`../../docs/demo/${name}`, import.meta.url));
    expect(committed.equals(Buffer.from(text))).toBe(true);
    expect(committed.length).toBeLessThan(100_000);
  });

  it("has the shape it says", () => {
    for (const name of ["array-real.csv", "array-complex.csv", "noise-only.csv"]) {
      const lines = demoFiles()[name]?.trimEnd().split("\n") ?? [];
      expect(lines).toHaveLength(DEMO_TRUTH.snapshots + 1);
      for (const line of lines) expect(line.split(",")).toHaveLength(DEMO_TRUTH.sensors);
    }
  });
});
