import { describe, expect, it } from "vitest";
import { InvalidArgumentError } from "../../src/core/errors.ts";
import { fredholmDeterminant } from "../../src/determinant/fredholm-determinant.ts";
import { airyKernel } from "../../src/kernels/airy-kernel.ts";
import {
  hastingsMcLeod,
  LEFT_TAIL_END,
  type PainleveLaw,
  tracyWidomLeftTail,
} from "../../src/laws/hastings-mcleod.ts";
import { halfLine } from "../../src/quadrature/domain.ts";
import { airyAi } from "../../src/special/airy.ts";
import fixture from "../fixtures/tracy-widom.json" with { type: "json" };
import stepped from "../fixtures/tracy-widom-left-tail.json" with { type: "json" };
import { differenceFrom, relativeDifference } from "../precise.ts";

const LAWS: readonly (readonly [PainleveLaw, "beta1" | "beta2" | "beta4_G"])[] = [
  ["beta1", "beta1"],
  ["beta2", "beta2"],
  ["beta4-unscaled", "beta4_G"],
];

describe("left tail by Painlevé II", () => {
  it("agrees with the reference, log F to 1e-14 relative, its error honest and sharp", () => {
    let checked = 0;
    for (const row of fixture.grid) {
      const s = Number(row.s);
      if (s > LEFT_TAIL_END) continue;
      for (const [law, key] of LAWS) {
        checked++;
        const tail = tracyWidomLeftTail(law, s);
        const error = Math.abs(differenceFrom(tail.logCdf, row[key].log_cdf));
        expect(error, `${law} at ${s}`).toBeLessThanOrEqual(tail.relativeError);
        expect(error, `${law} at ${s}`).toBeLessThanOrEqual(
          1e-14 * Math.max(1, Math.abs(Number(row[key].log_cdf))),
        );
        const hazard = Number(row[key].pdf) / Number(row[key].cdf);
        if (Number.isFinite(hazard)) expect(Math.abs(tail.derivative / hazard - 1)).toBeLessThan(2e-14);
      }
    }
    expect(checked).toBeGreaterThan(50);
  });

  it("agrees with Painlevé II stepped at 330 digits, in every point within its error, which is sharp", () => {
    const laws: readonly PainleveLaw[] = ["beta2", "beta1", "beta4-unscaled"];
    for (const [k, law] of laws.entries()) {
      const pessimism: number[] = [];
      for (const row of stepped.rows) {
        const s = Number(row[0]);
        if (s > LEFT_TAIL_END) continue;
        const logarithm = String(row[2 + 2 * k]);
        const tail = tracyWidomLeftTail(law, s);
        const error = Math.abs(differenceFrom(tail.logCdf, logarithm));
        const what = `${law} at ${s}`;
        expect(error, what).toBeLessThanOrEqual(tail.relativeError);
        expect(error, what).toBeLessThanOrEqual(1e-14 + 2.5 * Number.EPSILON * Math.abs(Number(logarithm)));
        expect(Math.abs(relativeDifference(tail.derivative, String(row[3 + 2 * k]))), what).toBeLessThan(
          5e-15,
        );
        pessimism.push(tail.relativeError / Math.max(error, Number.MIN_VALUE));
      }
      expect(pessimism.length).toBeGreaterThan(300);
      pessimism.sort((a, b) => a - b);
      expect(pessimism[pessimism.length >> 1], law).toBeLessThan(30);
    }
  });

  it("gives q with relative accuracy on both sides of 0", () => {
    let right = 0;
    for (const [s, q] of stepped.rows.map((row) => [Number(row[0]), String(row[1])] as const)) {
      if (s > 0) right++;
      expect(Math.abs(relativeDifference(hastingsMcLeod(s), q)), `s = ${s}`).toBeLessThan(
        s > 0 ? 3e-14 : 4e-15,
      );
    }
    expect(right).toBeGreaterThan(20);
  });

  it("is the second route to F2: the determinant agrees where it has digits", () => {
    for (let s = -6; s <= LEFT_TAIL_END; s += 0.125) {
      const { value, error } = fredholmDeterminant(airyKernel(), halfLine(s));
      const tail = tracyWidomLeftTail("beta2", s);
      const other = Math.exp(tail.logCdf);
      expect(Math.abs(value - other), `s = ${s}`).toBeLessThanOrEqual(error + tail.relativeError * other);
    }
  });

  it("joins its series and its boundary value problem without a seam", () => {
    for (const [law] of LAWS) {
      const before = tracyWidomLeftTail(law, -11.0000001);
      const after = tracyWidomLeftTail(law, -10.9999999);
      const step = 2e-7 * 0.5 * (before.derivative + after.derivative);
      expect(Math.abs(after.logCdf - before.logCdf - step)).toBeLessThan(1e-12);
    }
  });

  it("solves q″ = s q + 2 q³ with q ~ Ai", () => {
    const h = 0.02;
    for (const s of [-14, -9, -4.5, -2, -0.3, 1, 3]) {
      const q = (k: number): number => hastingsMcLeod(s + k * h);
      const second =
        (2 * (q(-3) + q(3)) - 27 * (q(-2) + q(2)) + 270 * (q(-1) + q(1)) - 490 * q(0)) / (180 * h * h);
      expect(Math.abs(second - s * q(0) - 2 * q(0) ** 3)).toBeLessThan(2e-10);
    }
    expect(Math.abs(hastingsMcLeod(6) / airyAi(6) - 1)).toBeLessThan(1e-9);
  });

  it("passes NaN through and refuses what it does not serve", () => {
    expect(tracyWidomLeftTail("beta2", Number.NaN).logCdf).toBeNaN();
    for (const s of [-1.9, 0, Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY]) {
      expect(() => tracyWidomLeftTail("beta1", s)).toThrow(InvalidArgumentError);
    }
    expect(() => hastingsMcLeod(9)).toThrow(/s: expected a number from -1e100 to 8/);
    expect(hastingsMcLeod(Number.NaN)).toBeNaN();
    const any = tracyWidomLeftTail as (law: unknown, s: unknown) => unknown;
    expect(() => any("beta3", -4)).toThrow(/law: expected .* received "beta3"/);
    for (const s of ["-4", undefined, null]) expect(() => any("beta2", s)).toThrow(InvalidArgumentError);
  });
});
