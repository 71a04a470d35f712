/**
 * Honesty: over 2000 random kernels, domains and tolerances with known determinants no error is larger than stated.
 */
import { describe, expect, it } from "vitest";
import { type DeterminantOptions, fredholmDeterminant } from "../../src/determinant/fredholm-determinant.ts";
import fixture from "../fixtures/known-determinants.json" with { type: "json" };
import { buildCase, type KnownCase } from "./known-cases.ts";

// Kernels with a kink on the diagonal are extrapolated; a small largest order keeps their dense matrices cheap.
const KINKED = ["green", "brownian", "ornstein"];

describe("stated errors of fredholmDeterminant", () => {
  const cases = fixture.cases as unknown as KnownCase[];

  it("hold in every known case, for the value, the complement and the logarithm", () => {
    expect(cases.length).toBeGreaterThanOrEqual(2000);
    const broken: unknown[] = [];
    const pessimism: number[] = [];
    let converged = 0;
    cases.forEach((c, index) => {
      const [kernel, domain] = buildCase(c, index);
      const options: DeterminantOptions = {
        z: c.z,
        ...(c.absTol === undefined ? {} : { absTol: c.absTol }),
        ...(c.relTol === undefined ? {} : { relTol: c.relTol }),
        ...(KINKED.includes(c.family) ? { maxOrder: 160 } : {}),
      };
      const found = fredholmDeterminant(kernel, domain, options);
      const error = Math.abs(found.value - c.hi - c.lo);
      const complementError = Math.abs(found.complement.value - (1 - c.hi) + c.lo);
      // 1 − hi is exact only for hi in [½, 2].
      const blur = c.hi >= 0.5 && c.hi <= 2 ? 0 : 2 ** -53 * Math.max(1, Math.abs(c.hi));
      const logError = Math.abs(found.logAbs - Math.log(Math.abs(c.hi)));
      const logAllowed = found.error / Math.abs(c.hi) + 1e-15 * (1 + Math.abs(found.logAbs));
      const honest =
        error <= found.error &&
        complementError <= found.complement.error + blur &&
        (found.error > 0.1 * Math.abs(c.hi) ||
          (logError <= 1.2 * logAllowed && found.sign === Math.sign(c.hi)));
      if (!honest) broken.push({ c, found, error, complementError, logError });
      if (found.converged) {
        converged++;
        const { absTol, relTol } = c;
        const tolerance =
          absTol === undefined && relTol === undefined
            ? Math.max(1e-13, 1e-13 * Math.abs(found.value))
            : Math.max(absTol ?? 0, (relTol ?? 0) * Math.abs(found.value));
        if (error > tolerance) broken.push({ c, found, error, tolerance });
      }
      if (error > 0) pessimism.push(found.error / error);
    });
    expect(broken).toEqual([]);
    expect(converged).toBeGreaterThan(0.7 * cases.length);
    pessimism.sort((p, q) => p - q);
    // The median of error stated over error made; measured figures in docs/accuracy.md.
    expect(pessimism[pessimism.length >> 1]).toBeLessThan(100);
  });
});
