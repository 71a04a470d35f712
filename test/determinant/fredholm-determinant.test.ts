import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { InvalidArgumentError } from "../../src/core/errors.ts";
import { determinantWithResolvent, fredholmDeterminant } from "../../src/determinant/fredholm-determinant.ts";
import type { Kernel } from "../../src/determinant/kernel.ts";
import { airyKernel } from "../../src/kernels/airy-kernel.ts";
import { airySumKernel } from "../../src/kernels/airy-sum-kernel.ts";
import { integrableKernel } from "../../src/kernels/integrable-kernel.ts";
import { smoothKernel } from "../../src/kernels/smooth-kernel.ts";
import { type Domain, halfLine, interval, union } from "../../src/quadrature/domain.ts";
import { airyAi, airyAiPrime } from "../../src/special/airy.ts";
import { differenceFrom } from "../precise.ts";

const sine = integrableKernel({
  left: [(x) => Math.sin(Math.PI * x) / Math.PI, (x) => Math.cos(Math.PI * x)],
  diagonal: () => 1,
  contraction: true,
});
const airyByFormula = smoothKernel(
  (x, y) =>
    x === y
      ? airyAiPrime(x) ** 2 - x * airyAi(x) ** 2
      : (airyAi(x) * airyAiPrime(y) - airyAiPrime(x) * airyAi(y)) / (x - y),
  { symmetric: true, contraction: true },
);

describe("fredholmDeterminant", () => {
  // Two figures published, the rest of the digits recomputed independently (test/fixtures/tracy-widom.json).
  it("gives F2(−2) from the Airy kernel by generators and by formula", () => {
    for (const kernel of [airyKernel(), airyByFormula]) {
      const found = fredholmDeterminant(kernel, halfLine(-2));
      expect(Math.abs(differenceFrom(found.value, "0.41322414250512255468808"))).toBeLessThanOrEqual(2.3e-16);
      expect(found.converged).toBe(true);
      expect(found.error).toBeLessThan(1e-14);
    }
  });

  // F. Bornemann, Math. Comp. 79 (2010) 871: E₂(0; 0.1), published to 15 digits; all by recomputation.
  it.each([
    [0.1, "0.9000272717982591487"],
    [0.5, "0.51507339507285187715"],
    [1, "0.17021742137918523073"],
    [2, "0.0034973251491690976984"],
  ])("gives the sine-kernel gap E₂(0; %s)", (s, value) => {
    const found = fredholmDeterminant(sine, interval(0, s));
    expect(Math.abs(differenceFrom(found.value, value))).toBeLessThanOrEqual(1.2e-16);
  });

  // F. Bornemann, Math. Comp. 79 (2010) 871: the Green kernel, det(I − zK) = sin √z / √z.
  it("gives sin √z / √z for min(x, y)(1 − max(x, y)), whose kink leaves n⁻², by extrapolation", () => {
    const green = smoothKernel((x, y) => Math.min(x, y) * (1 - Math.max(x, y)), { symmetric: true });
    for (const z of [1, 2.5, 9, 30, -4]) {
      const w = Math.sqrt(Math.abs(z));
      const exact = z > 0 ? Math.sin(w) / w : Math.sinh(w) / w;
      const found = fredholmDeterminant(green, interval(0, 1), { z });
      const error = Math.abs(found.value - exact);
      expect(error, `z = ${z}`).toBeLessThanOrEqual(found.error);
      expect(error, `z = ${z}`).toBeLessThan(2e-13);
      expect(found.order).toBeLessThan(200);
      expect(Math.abs(found.logAbs - Math.log(Math.abs(exact)))).toBeLessThan(2e-12);
      expect(Math.abs(found.complement.value - (1 - exact))).toBeLessThanOrEqual(
        found.complement.error + 2e-16,
      );
      const loose = fredholmDeterminant(green, interval(0, 1), { z, absTol: 1e-6 });
      expect(loose.converged).toBe(true);
      expect(loose.order).toBeLessThan(found.order);
      expect(Math.abs(loose.value - exact)).toBeLessThanOrEqual(loose.error);
    }
    expect(Math.abs(fredholmDeterminant(green, interval(0, 1)).value - Math.sin(1))).toBeLessThan(1e-14);
  });

  it("reports slow convergence: a singular kernel of rank one, det = 1 − 2z", () => {
    const singular = smoothKernel((x, y) => (x * y) ** -0.25, { symmetric: true });
    for (const z of [0.25, -1]) {
      const found = fredholmDeterminant(singular, interval(0, 1), { z, maxOrder: 200 });
      expect(found.converged).toBe(false);
      const error = Math.abs(found.value - (1 - 2 * z));
      expect(error).toBeGreaterThan(1e-5);
      expect(error).toBeLessThanOrEqual(found.error);
      expect(found.error).toBeLessThan(100 * error);
    }
  });

  it("keeps the relative accuracy of a small complement: 1 − F2(8) and 1 − F2(30)", () => {
    const at = (s: number): { value: number; error: number } =>
      fredholmDeterminant(airyKernel(), halfLine(s)).complement;
    expect(Math.abs(at(8).value / 6.5335632069316115e-17 - 1)).toBeLessThan(2e-15);
    expect(at(8).error).toBeLessThan(3e-14 * at(8).value);
    expect(at(30).value).toBeGreaterThan(0);
  });

  it("gives the determinant of a union by inclusion and exclusion of none: a split interval is the interval", () => {
    fc.assert(
      fc.property(
        fc.double({ min: -4, max: 2, noNaN: true }),
        fc.double({ min: 0.1, max: 3, noNaN: true }),
        (a, length) => {
          const whole = fredholmDeterminant(airyKernel(), halfLine(a));
          const split = fredholmDeterminant(
            airyKernel(),
            union(interval(a, a + length), halfLine(a + length)),
          );
          expect(Math.abs(whole.value - split.value)).toBeLessThanOrEqual(whole.error + split.error);
          const c = Math.abs(whole.complement.value - split.complement.value);
          expect(c).toBeLessThanOrEqual(whole.complement.error + split.complement.error);
        },
      ),
      { seed: 20261201, numRuns: 60 },
    );
  });

  it("is invariant under translation and under scaling of a kernel", () => {
    fc.assert(
      fc.property(
        fc.double({ min: -50, max: 50, noNaN: true }),
        fc.double({ min: 0.2, max: 5, noNaN: true }),
        (shift, factor) => {
          const plain = fredholmDeterminant(sine, interval(0, 1.5));
          const moved = fredholmDeterminant(sine, interval(shift, shift + 1.5));
          // (shift + 1.5) − shift is 1.5 only up to rounding: the density of the gap probability is below 1.
          const slack = 2 ** -50 * (1 + Math.abs(shift));
          expect(Math.abs(plain.value - moved.value)).toBeLessThanOrEqual(plain.error + moved.error + slack);
          const scaled = smoothKernel((x, y) => factor * Math.exp(-factor * (x + y)), { symmetric: true });
          const e = fredholmDeterminant(scaled, halfLine(0));
          expect(Math.abs(e.value - 0.5)).toBeLessThanOrEqual(e.error);
        },
      ),
      { seed: 20261201, numRuns: 40 },
    );
  });

  it("gives det(I − V) det(I + V) = F2, by a dense and a structured route", () => {
    for (const s of [-5, -3.3, -1, 0, 2, 6]) {
      const minus = fredholmDeterminant(airySumKernel(), halfLine(s));
      const plus = fredholmDeterminant(airySumKernel(), halfLine(s), { z: -1 });
      const f2 = fredholmDeterminant(airyKernel(), halfLine(s));
      expect(Math.abs(minus.value * plus.value - f2.value)).toBeLessThanOrEqual(
        minus.error + plus.error + f2.error,
      );
    }
  });

  it("gives the resolvent at a point that is a node, too", () => {
    // Every odd rule on (0, 1) has the node ½.
    const exact = determinantWithResolvent(sine, interval(0, 1), 0.5).resolvent;
    for (let order = 1; order <= 25; order++) {
      for (const point of [0.5, 0.5 + 1e-12]) {
        const { resolvent } = determinantWithResolvent(sine, interval(0, 1), point, { order });
        expect(Math.abs(resolvent.value - exact.value)).toBeLessThanOrEqual(resolvent.error + exact.error);
      }
    }
  });

  it("gives the logarithmic derivative as the resolvent at the end point", () => {
    const h = 1e-3;
    const at = (s: number): number => fredholmDeterminant(airyKernel(), halfLine(s)).logAbs;
    for (const s of [-3, -1, 0.5]) {
      const difference = (8 * (at(s + h) - at(s - h)) - (at(s + 2 * h) - at(s - 2 * h))) / (12 * h);
      const { resolvent } = determinantWithResolvent(airyKernel(), halfLine(s), s);
      expect(Math.abs(resolvent.value - difference)).toBeLessThan(1e-11);
    }
  });

  it("handles indefinite I − zK, where pivots are negative", () => {
    // z = 3 on (0, 3): three eigenvalues of the sine kernel are above 1/3; dense and structured routes must agree.
    const bySine = fredholmDeterminant(sine, interval(0, 3), { z: 3 });
    const formula = smoothKernel((x, y) => (x === y ? 1 : Math.sin(Math.PI * (x - y)) / (Math.PI * (x - y))));
    const byFormula = fredholmDeterminant(formula, interval(0, 3), { z: 3 });
    expect(bySine.sign).toBe(-1);
    expect(Math.abs(bySine.value - byFormula.value)).toBeLessThanOrEqual(bySine.error + byFormula.error);
  });

  it("does not invent digits where a double has none: F2(−10) is 4e-37", () => {
    const found = fredholmDeterminant(airyKernel(), halfLine(-10), { relTol: 1e-3 });
    expect(found.converged).toBe(false);
    expect(found.error).toBeGreaterThanOrEqual(Math.abs(found.value - 4.2122590096599025e-37));
    expect(found.error).toBeLessThan(1e-13);
  });

  it("gives exactly 1 for z = 0", () => {
    expect(fredholmDeterminant(sine, interval(0, 1), { z: 0 })).toMatchObject({
      value: 1,
      error: 0,
      logAbs: 0,
      converged: true,
    });
  });

  it("maps half-lines for kernels that decay like a power", () => {
    const found = fredholmDeterminant(
      smoothKernel((x, y) => 1 / (x * y) ** 2),
      halfLine(1),
    );
    expect(Math.abs(found.value - 2 / 3)).toBeLessThanOrEqual(found.error);
    expect(found.error).toBeLessThan(1e-14);
  });

  it("measures the error of a fixed order against the refined determinant", () => {
    for (const order of [1, 2, 3, 4, 6, 9, 14, 40]) {
      const found = fredholmDeterminant(sine, interval(0, 2), { order });
      expect(found.order).toBe(order);
      const error = Math.abs(found.value - 0.0034973251491690977);
      expect(error).toBeLessThanOrEqual(found.error);
      expect(found.error).toBeLessThanOrEqual(error + 1e-13);
      expect(found.converged).toBe(found.error <= 1e-13);
    }
  });

  const smooth = smoothKernel((x, y) => Math.exp(-x - y));
  it.each<[string, () => unknown, RegExp]>([
    [
      "order 0",
      () => fredholmDeterminant(sine, interval(0, 1), { order: 0 }),
      /options\.order: expected an integer from 1/,
    ],
    ["order 1.5", () => fredholmDeterminant(sine, interval(0, 1), { order: 1.5 }), /options\.order/],
    [
      "order 1e9",
      () => fredholmDeterminant(sine, interval(0, 1), { order: 1e9 }),
      /options\.order.*received 1000000000/,
    ],
    ["maxOrder 0", () => fredholmDeterminant(sine, interval(0, 1), { maxOrder: 0 }), /options\.maxOrder/],
    ["z = NaN", () => fredholmDeterminant(sine, interval(0, 1), { z: Number.NaN }), /options\.z/],
    [
      "negative tolerance",
      () => fredholmDeterminant(sine, interval(0, 1), { absTol: -1 }),
      /options\.absTol/,
    ],
    [
      "tolerance NaN",
      () => fredholmDeterminant(sine, interval(0, 1), { relTol: Number.NaN }),
      /options\.relTol/,
    ],
    ["no kernel", () => fredholmDeterminant(undefined as unknown as Kernel, interval(0, 1)), /kernel/],
    ["no domain", () => fredholmDeterminant(sine, undefined as unknown as Domain), /domain/],
    [
      "a domain made by hand",
      () => fredholmDeterminant(sine, { kind: "interval", lower: 2, upper: 1 }),
      /upper/,
    ],
    ["resolvent at NaN", () => determinantWithResolvent(sine, interval(0, 1), Number.NaN), /point/],
    [
      "a NaN from the user's formula, named with its arguments",
      () =>
        fredholmDeterminant(
          smoothKernel((x, y) => Math.sqrt(0.5 - x) * y),
          interval(0, 1),
        ),
      /finite number at \(x, y\) = \(0\.\d+, 0\.\d+\), received NaN/,
    ],
    [
      "a NaN from a generator, named with its argument",
      () =>
        fredholmDeterminant(
          integrableKernel({ left: [Math.sqrt, Math.exp], diagonal: () => 1 }),
          interval(-1, 0),
        ),
      /left\[0\] of integrable kernel: expected a finite number at x = -\d/,
    ],
    [
      "generators that do not balance",
      () =>
        fredholmDeterminant(
          integrableKernel({ left: [Math.sin, Math.cos], right: [Math.sin, Math.cos], diagonal: () => 1 }),
          interval(0, 1),
        ),
      /Σ f_k\(x\) g_k\(x\) = 0/,
    ],
    [
      "a kernel declared symmetric that is not",
      () =>
        fredholmDeterminant(
          smoothKernel((x, y) => x - 2 * y, { symmetric: true }),
          interval(0, 1),
        ),
      /K\(x, y\) = K\(y, x\), as declared/,
    ],
    [
      "a half-line without decay",
      () =>
        fredholmDeterminant(
          smoothKernel(() => 1),
          halfLine(0),
        ),
      /decays faster than 1\/x/,
    ],
    [
      "left of one function",
      () => integrableKernel({ left: [Math.sin], diagonal: () => 1 }),
      /left: expected an array of at least two/,
    ],
    [
      "unequal lists",
      () => integrableKernel({ left: [Math.sin, Math.cos], right: [Math.sin], diagonal: () => 1 }),
      /right/,
    ],
    [
      "three generators without right",
      () => integrableKernel({ left: [Math.sin, Math.cos, Math.exp], diagonal: () => 1 }),
      /right/,
    ],
    [
      "a formula that is no function",
      () => smoothKernel(3 as unknown as () => number),
      /evaluate: expected a function/,
    ],
  ])("refuses %s", (_, call, message) => {
    expect(call).toThrow(InvalidArgumentError);
    expect(call).toThrow(message);
    expect(smooth.kind).toBe("smooth");
  });

  it("an error names argument, allowed and received", () => {
    try {
      interval(1, 0);
      expect.unreachable();
    } catch (error) {
      expect(error).toMatchObject({ name: "InvalidArgumentError", argument: "upper", received: 0 });
      expect((error as InvalidArgumentError).expected).toContain("above lower = 1");
      expect(error).toBeInstanceOf(RangeError);
    }
  });
});
