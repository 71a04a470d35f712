import { describe, expect, it } from "vitest";
import { InvalidArgumentError } from "../../src/core/errors.ts";
import { complexDeterminant } from "../../src/determinant/complex-determinant.ts";
import { fredholmDeterminant } from "../../src/determinant/fredholm-determinant.ts";
import { airyKernel } from "../../src/kernels/airy-kernel.ts";
import { smoothKernel } from "../../src/kernels/smooth-kernel.ts";
import { halfLine, interval } from "../../src/quadrature/domain.ts";

describe("complexDeterminant", () => {
  it("gives 1 − z/2 for the rank-one kernel e^{−x−y} on (0, ∞)", () => {
    const kernel = smoothKernel((x, y) => Math.exp(-x - y), { symmetric: true });
    for (let k = 0; k < 24; k++) {
      const z = { re: 3 * Math.cos(k), im: 3 * Math.sin(k) };
      const found = complexDeterminant(kernel, halfLine(0), z);
      const error = Math.hypot(found.value.re - (1 - z.re / 2), found.value.im + z.im / 2);
      expect(error).toBeLessThanOrEqual(found.error);
      expect(found.converged).toBe(true);
    }
  });

  it("agrees with the real engine on the real axis and is conjugate-symmetric", () => {
    for (const z of [-2, 0.5, 1]) {
      const real = fredholmDeterminant(airyKernel(), halfLine(-3), { z });
      const found = complexDeterminant(airyKernel(), halfLine(-3), { re: z, im: 0 });
      expect(Math.abs(found.value.re - real.value)).toBeLessThanOrEqual(found.error + real.error);
      expect(Math.abs(found.value.im)).toBeLessThanOrEqual(found.error);
    }
    const up = complexDeterminant(airyKernel(), halfLine(-2), { re: 0.3, im: 1.2 });
    const down = complexDeterminant(airyKernel(), halfLine(-2), { re: 0.3, im: -1.2 });
    expect(up.value.im + down.value.im).toBe(0);
  });

  it("is the characteristic function of a count: by Fourier inversion P(no point above −2) = F2(−2)", () => {
    // P(N = 0) = (1/m) Σ_k det(I − (1 − e^{2πik/m}) K), exact up to P(N ≥ m).
    const m = 12;
    let sum = 0;
    for (let k = 0; k < m; k++) {
      const t = (2 * Math.PI * k) / m;
      sum +=
        complexDeterminant(airyKernel(), halfLine(-2), { re: 1 - Math.cos(t), im: -Math.sin(t) }).value.re /
        m;
    }
    expect(Math.abs(sum - 0.413224142505122)).toBeLessThan(1e-14);
  });

  it("says when it did not converge, and refuses bad input", () => {
    const kinked = smoothKernel((x, y) => Math.min(x, y));
    const found = complexDeterminant(kinked, interval(0, 1), { re: 0, im: 1 }, { maxOrder: 40 });
    expect(found.converged).toBe(false);
    // det(I − zK) = cos √z, √i = (1 + i)/√2.
    const h = Math.SQRT1_2;
    const exact = { re: Math.cos(h) * Math.cosh(h), im: -Math.sin(h) * Math.sinh(h) };
    expect(Math.hypot(found.value.re - exact.re, found.value.im - exact.im)).toBeLessThanOrEqual(found.error);
    expect(() => complexDeterminant(kinked, interval(0, 1), { re: Number.NaN, im: 0 })).toThrow(
      InvalidArgumentError,
    );
    expect(() => complexDeterminant(kinked, interval(0, 1), { re: 0, im: 1 }, { maxOrder: 2 })).toThrow(
      /maxOrder/,
    );
  });
});
