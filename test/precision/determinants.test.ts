/**
 * Determinants with many digits against values and formulas from outside the library.
 */
import { describe, expect, it } from "vitest";
import { preciseAiryKernel, preciseAirySumKernel } from "../../src/precision/airy-kernels.ts";
import { preciseBesselKernel } from "../../src/precision/bessel-kernel.ts";
import { preciseBesselI } from "../../src/precision/precise-bessel.ts";
import { precisePi } from "../../src/precision/precise-constants.ts";
import { preciseDeterminant } from "../../src/precision/precise-determinant.ts";
import { preciseExp, preciseSine } from "../../src/precision/precise-elementary.ts";
import type { PreciseEstimate } from "../../src/precision/precise-estimate.ts";
import {
  preciseHalfLine,
  preciseIntegrableKernel,
  preciseInterval,
  preciseSmoothKernel,
} from "../../src/precision/precise-kernel.ts";
import { preciseTracyWidom } from "../../src/precision/precise-tracy-widom.ts";
import { preciseSineKernel } from "../../src/precision/sine-kernel.ts";
import { add, atMost, distance, parse, shifted } from "./decimals.ts";

/** |estimate − expected| ≤ error (and half a unit of the last expected digit), and the digits are there. */
function expectHonest(found: PreciseEstimate, expected: string, digits: number): void {
  const value = parse(expected);
  const gap = distance(parse(found.value), value);
  const allowed = add(parse(found.error), { mantissa: 1n, scale: value.scale });
  expect(atMost(gap, allowed), `${found.value} ± ${found.error} against ${expected}`).toBe(true);
  expect(found.converged).toBe(true);
  expect(atMost(gap, shifted(value, digits)), `${found.value} against ${expected}`).toBe(true);
}

const mantissaOf = ({ mantissa, scale }: PreciseEstimate): { mantissa: bigint; scale: number } => ({
  mantissa,
  scale,
});

/** a · b as decimal string. */
function times(a: PreciseEstimate, b: PreciseEstimate): string {
  return `${a.mantissa * b.mantissa}e${-(a.scale + b.scale)}`;
}

describe("published values and closed forms", () => {
  it("Bessel kernel, α = 0: e^{−s/4} to 300 digits", () => {
    // P. Forrester, T. Hughes, J. Math. Phys. 35 (1994) 6736.
    const found = preciseDeterminant(preciseBesselKernel(0), preciseInterval(0, 4), { digits: 300 });
    expectHonest(found, preciseExp(-1, { digits: 320 }).value, 300);
  });

  it("Bessel kernel, α = 1: e^{−s/4} I₀(√s)", () => {
    const found = preciseDeterminant(preciseBesselKernel(1), preciseInterval(0, 9), { digits: 60 });
    const closed = times(preciseExp("-2.25", { digits: 80 }), preciseBesselI(0, 3, { digits: 80 }));
    expectHonest(found, closed, 60);
  });

  it("Bessel kernel, α = 2: e^{−s/4} (I₀² − I₁²)(√s)", () => {
    const found = preciseDeterminant(preciseBesselKernel("2"), preciseInterval(0, 16), { digits: 50 });
    const [i0, i1] = [preciseBesselI(0, 4, { digits: 80 }), preciseBesselI(1, 4, { digits: 80 })];
    const difference = distance(parse(times(i0, i0)), parse(times(i1, i1)));
    const e = preciseExp(-4, { digits: 80 });
    expectHonest(found, `${e.mantissa * difference.mantissa}e${-(e.scale + difference.scale)}`, 50);
  });

  it("Bessel kernel, α = ∓½: even and odd parts of the sine kernel", () => {
    // C. Tracy, H. Widom, Commun. Math. Phys. 161 (1994) 289: the product is the sine kernel's determinant on (0, 2√s)…
    const [even, odd] = ["-0.5", "0.5"].map((alpha) =>
      preciseDeterminant(preciseBesselKernel(alpha), preciseInterval(0, 4), { digits: 60 }),
    );
    const sine = preciseDeterminant(preciseSineKernel(), preciseInterval(0, 4), { digits: 50 });
    expectHonest(sine, times(even, odd), 50);
    // … and the numbers of published.md § 1g ("C only").
    expect(odd.value.slice(0, 15)).toBe("0.6436167979308");
    expect(even.value.slice(0, 15)).toBe("0.1151538638007");
  });

  it("sine kernel: E₂(0; s)", () => {
    // s = 0.1: F. Bornemann, Math. Comp. 79 (2010) 871, 15 digits. 0.25 and 1.5: Gaudin's even and odd kernels (M. L.
    // Mehta, Random Matrices, 3rd ed. 2004), multiprecision LU in Arb, two settings, 45 digits. 1 and 2: recomputed, 19.
    const pi = precisePi({ digits: 80 });
    const at = (hundredths: bigint): PreciseEstimate =>
      preciseDeterminant(
        preciseSineKernel(),
        preciseInterval(0, `${pi.mantissa * hundredths}e${-(pi.scale + 2)}`),
        { digits: 45 },
      );
    expect(at(10n).value.slice(0, 17)).toBe("0.900027271798259");
    expectHonest(at(25n), "0.751036494215780301853119056445203903148059510", 44);
    expectHonest(at(150n), "0.0326600073640632786820119757043860446711172918", 44);
    expectHonest(at(100n), "0.17021742137918523073", 19);
    expectHonest(at(200n), "0.0034973251491690976984", 19);
  });

  it("Green's function of −u″ on (0, 1): sin √z / √z, by a kernel with a kink, as far as the error says", () => {
    const green = preciseSmoothKernel(
      "Green",
      ({ one, multiply }) =>
        (x, y) =>
          x < y ? multiply(x, one - y) : multiply(y, one - x),
      { symmetric: true },
    );
    const found = preciseDeterminant(green, preciseInterval(0, 1), { digits: 30, maxOrder: 60 });
    expect(found.converged).toBe(false);
    const gap = distance(mantissaOf(found), parse(preciseSine(1, { digits: 40 }).value));
    expect(atMost(gap, parse(found.error))).toBe(true);
  });

  it("separable kernels: det = 1 − z, 1 − z/3", () => {
    const line = preciseSmoothKernel("x y", ({ multiply }) => multiply);
    expectHonest(preciseDeterminant(line, preciseInterval(0, 1), { z: "1.5", digits: 60 }), "0.5", 60);
    const general = preciseIntegrableKernel({
      name: "1, as rank 2",
      rank: 2,
      generators:
        ({ one }, m) =>
        (x) => {
          const zeros = Array.from({ length: m }, () => 0n);
          return [
            [x, one, ...zeros],
            [one, 0n, ...zeros],
            [one, 0n, ...zeros],
            [-x, -one, ...zeros],
          ];
        },
    });
    const found = preciseDeterminant(general, preciseInterval("-0.5", 1), {
      z: -2,
      digits: 60,
      derivatives: 2,
    });
    expectHonest(found, "4", 60);
    expectHonest(found.complement, "-3", 60);
    expectHonest(found.derivatives[0], "2", 60);
  });
});

describe("Airy kernel", () => {
  it("200 digits agree with 230", () => {
    const [a, b] = [200, 230].map((digits) =>
      preciseDeterminant(preciseAiryKernel(), preciseHalfLine("-0.5"), { digits }),
    );
    expectHonest(a, b.value, 200);
  }, 60_000);

  it("the kernel ½ Ai((x + y)/2) gives F1, and F2/F1 with z = −1", () => {
    for (const s of ["-3.25", "1"]) {
      const at = (z: number): PreciseEstimate =>
        preciseDeterminant(preciseAirySumKernel(), preciseHalfLine(s), { digits: 40, z });
      const [minus, plus] = [at(1), at(-1)];
      expectHonest(minus, preciseTracyWidom(1, s, { digits: 50 }).cdf.value, 40);
      expectHonest(preciseTracyWidom(2, s, { digits: 38 }).cdf, times(minus, plus), 38);
    }
  });

  it("derivatives are those of the determinant: F′, and those of e^{−s/4}", () => {
    const found = preciseDeterminant(preciseAiryKernel(), preciseHalfLine(-1), {
      digits: 40,
      derivatives: 3,
    });
    expectHonest(found.derivatives[0], preciseTracyWidom(2, -1, { digits: 50 }).pdf.value, 40);
    const bessel = preciseDeterminant(preciseBesselKernel(0), preciseInterval(0, 4), {
      digits: 40,
      derivatives: 5,
    });
    const e = preciseExp(-1, { digits: 60 });
    bessel.derivatives.forEach((d, k) => {
      // (−¼)^{k+1} e^{−1}, exactly: 4^{−n} = 25^n 10^{−2n}.
      const n = k + 1;
      const scaled = e.mantissa * 25n ** BigInt(n) * (n % 2 === 1 ? -1n : 1n);
      expectHonest(d, `${scaled}e${-(e.scale + 2 * n)}`, 40);
    });
  });

  it("derivatives in the lower end of an interval: translation makes them opposite", () => {
    const at = (end: "lower" | "upper"): readonly PreciseEstimate[] =>
      preciseDeterminant(preciseSineKernel(), preciseInterval(0, 2), { digits: 30, derivatives: 2, end })
        .derivatives;
    const [lower, upper] = [at("lower"), at("upper")];
    expectHonest(lower[0], upper[0].value.replace("-", ""), 30);
    expectHonest(lower[1], upper[1].value, 30);
  });
});

describe("digits", () => {
  it("errors hold: few digits against many", () => {
    const cases = [
      (digits: number) => preciseDeterminant(preciseAiryKernel(), preciseHalfLine(-5), { digits }),
      (digits: number) => preciseDeterminant(preciseAiryKernel(), preciseHalfLine(9), { digits }).complement,
      (digits: number) =>
        preciseDeterminant(preciseAiryKernel(), preciseInterval(-3, 3), { digits, z: "0.7" }),
      (digits: number) =>
        preciseDeterminant(preciseAiryKernel(), preciseInterval(-3, 3), { digits, z: "-2.5" }),
      (digits: number) =>
        preciseDeterminant(preciseAiryKernel(), preciseInterval(-6, 0), { digits, z: "1.8" }),
      (digits: number) => preciseDeterminant(preciseSineKernel(), preciseInterval(0, 30), { digits }),
      (digits: number) => preciseDeterminant(preciseBesselKernel("-0.9"), preciseInterval(0, 2), { digits }),
      (digits: number) => preciseDeterminant(preciseBesselKernel("3.3"), preciseInterval(0, 50), { digits }),
    ];
    for (const at of cases) {
      const exact = at(70).value;
      for (const digits of [1, 5, 12, 20, 33, 50]) expectHonest(at(digits), exact, digits);
    }
  });

  it("a determinant that vanishes says so", () => {
    const line = preciseIntegrableKernel({
      name: "1",
      generators:
        ({ one }, m) =>
        (x) => {
          const zeros = Array.from({ length: m }, () => 0n);
          return [
            [x, one, ...zeros],
            [one, 0n, ...zeros],
          ];
        },
    });
    const found = preciseDeterminant(line, preciseInterval(0, 1), { digits: 40 });
    expect(found.converged).toBe(false);
    expect(atMost(mantissaOf(found), parse(found.error))).toBe(true);
    expect(atMost(parse(found.error), parse("1e-40"))).toBe(true);
    expectHonest(found.complement, "1", 40);
    expectHonest(preciseDeterminant(line, preciseInterval(0, 1), { digits: 40, z: 0 }), "1", 40);
  });
});

describe("bad input", () => {
  const airy = preciseAiryKernel();
  const line = preciseHalfLine(0);
  it.each([0, -5, 1.5, 1e7, Number.NaN, "50"])("digits %s", (digits) => {
    const limit = /options\.digits: expected an integer from 1 to 1000/;
    expect(() => preciseDeterminant(airy, line, { digits: digits as number })).toThrow(limit);
    expect(() => preciseTracyWidom(2, 0, { digits: digits as number })).toThrow(limit);
  });
  it("the rest of the arguments", () => {
    expect(() => preciseDeterminant(preciseSineKernel(), line)).toThrow(/states no decay/);
    expect(() => preciseDeterminant(preciseBesselKernel(0), preciseInterval(1, 2))).toThrow(
      /interval \(0, b\)/,
    );
    expect(() => preciseBesselKernel(-1)).toThrow(/alpha/);
    expect(() => preciseInterval(1, 1)).toThrow(/upper/);
    expect(() => preciseInterval("a", 1)).toThrow(/lower/);
    expect(() => preciseDeterminant(airy, line, { z: Number.NaN })).toThrow(/options\.z/);
    expect(() => preciseDeterminant(airy, line, { derivatives: -1 })).toThrow(/options\.derivatives/);
    expect(() => preciseDeterminant(airy, line, { end: "upper" })).toThrow(/options\.end/);
    expect(() => preciseDeterminant(airy, line, { maxOrder: 3 })).toThrow(/options\.maxOrder/);
    expect(() => preciseTracyWidom(3 as 2, 0)).toThrow(/beta/);
    expect(() => preciseTracyWidom(2, 1e6)).toThrow(/s: expected a number from -60 to 1000/);
    const smooth = preciseSmoothKernel(
      "1",
      ({ one }) =>
        () =>
          one,
    );
    expect(() => preciseDeterminant(smooth, preciseInterval(0, 1), { derivatives: 1 })).toThrow(
      /derivatives/,
    );
  });
  it("kernels that misbehave", () => {
    const domain = preciseInterval(0, 1);
    const failing = preciseIntegrableKernel({
      name: "failing",
      generators: () => () => {
        throw new TypeError("no value here");
      },
    });
    expect(() => preciseDeterminant(failing, domain)).toThrow("no value here");
    const wrong = preciseIntegrableKernel({ name: "wrong", generators: () => () => [[1n], [2n]] });
    expect(() => preciseDeterminant(wrong, domain)).toThrow(/kernel \(wrong\).*Taylor coefficients/);
    const pole = preciseIntegrableKernel({
      name: "pole",
      rank: 1,
      generators:
        ({ one }, m) =>
        () => [
          [one, ...Array.from({ length: m + 1 }, () => 0n)],
          [one, ...Array.from({ length: m + 1 }, () => 0n)],
        ],
    });
    expect(() => preciseDeterminant(pole, domain)).toThrow(/Σ f_k\(x\) g_k\(x\) = 0/);
    const growing = preciseIntegrableKernel({
      name: "growing",
      generators:
        ({ one }) =>
        (x) => [
          [x, one, 0n, 0n],
          [one, 0n, 0n, 0n],
        ],
      decay: (x) => x,
    });
    expect(() => preciseDeterminant(growing, preciseHalfLine(0))).toThrow(/decreases without limit/);
    expect(() => preciseIntegrableKernel({ name: "x", generators: 3 as never })).toThrow(/parts\.generators/);
    const text = preciseSmoothKernel("text", () => () => "1" as never);
    expect(() => preciseDeterminant(text, domain)).toThrow(/values that are bigints/);
  });
});
