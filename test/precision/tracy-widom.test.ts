/**
 * The Tracy–Widom laws with many digits against independent 50-digit values and against Painlevé II.
 */
import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import {
  preciseAiryAi,
  preciseAiryAiIntegral,
  preciseAiryAiPrime,
} from "../../src/precision/precise-airy.ts";
import { preciseExp } from "../../src/precision/precise-elementary.ts";
import type { PreciseEstimate } from "../../src/precision/precise-estimate.ts";
import { preciseTracyWidom } from "../../src/precision/precise-tracy-widom.ts";
import { add, atMost, distance, parse, shifted } from "./decimals.ts";

interface Row {
  readonly s: string;
  readonly [law: string]: string | { cdf: string; survival: string; pdf: string };
}

// Header of the file: Nyström determinants in Arb, every point computed twice, 50 digits; checked against Painlevé II.
const grid: readonly Row[] = JSON.parse(
  readFileSync(new URL("../fixtures/tracy-widom.json", import.meta.url), "utf8"),
).grid;

function expectClose(found: PreciseEstimate, expected: string, digits: number, what: string): void {
  const value = parse(expected);
  const gap = distance(parse(found.value), value);
  expect(atMost(gap, shifted(value, digits)), `${what}: ${found.value} against ${expected}`).toBe(true);
  const allowed = add(parse(found.error), { mantissa: 1n, scale: value.scale });
  expect(atMost(gap, allowed), `${what}: ${found.value} ± ${found.error}`).toBe(true);
  expect(found.converged, what).toBe(true);
}

const points = ["-20", "-10", "-6", "-4", "-2", "0", "2", "5", "8", "16"];

describe("against 50-digit values", () => {
  it.each(points)(
    "s = %s: 45 digits of F, 1 − F and F′, relative",
    (s) => {
      const row = grid.find((r) => r.s === s)!;
      for (const [beta, key] of [
        [1, "beta1"],
        [2, "beta2"],
        [4, "beta4_G"],
      ] as const) {
        const { cdf, survival, pdf } = preciseTracyWidom(beta, s, { digits: 45 });
        const reference = row[key] as { cdf: string; survival: string; pdf: string };
        expectClose(cdf, reference.cdf, 44, `F${beta}`);
        expectClose(survival, reference.survival, 44, `1 − F${beta}`);
        expectClose(pdf, reference.pdf, 44, `F${beta}′`);
      }
    },
    60_000,
  );
});

/**
 * q″ = s q + 2 q³ by Taylor steps of ¼ from s = 24, where q = Ai to 68 digits, down to `target`, together with
 * μ′ = −q, u′ = −q² (u = ∫_s^∞ q²) and v′ = −u (v = −log F2). C. Tracy, H. Widom, Commun. Math. Phys. 159 (1994) 151.
 * Returns q, μ, v in units of 2^−bits.
 */
function painleve(target: number, bits: bigint): { q: bigint; mu: bigint; v: bigint; u: bigint } {
  const terms = 90;
  const from = 24;
  const fixed = (e: PreciseEstimate): bigint => {
    const power = 10n ** BigInt(Math.abs(e.scale));
    return e.scale >= 0 ? (e.mantissa << bits) / power : (e.mantissa * power) << bits;
  };
  const digits = 200;
  const ai = fixed(preciseAiryAi(from, { digits }));
  const prime = fixed(preciseAiryAiPrime(from, { digits }));
  const s0 = BigInt(from);
  let q = ai;
  let slope = prime;
  let mu = fixed(preciseAiryAiIntegral(from, { digits }));
  // With q = Ai: u = Ai′² − s Ai², v = (2 s² Ai² − 2 s Ai′² − Ai Ai′)/3.
  let u = (prime * prime - s0 * ai * ai) >> bits;
  let v = ((2n * s0 * s0 * ai * ai - 2n * s0 * prime * prime - ai * prime) / 3n) >> bits;
  const steps = 4 * (from - target);
  for (let i = 0; i < steps; i++) {
    const s = (BigInt(4 * from - i) << bits) >> 2n;
    const a = [q, slope];
    const squares: bigint[] = [];
    for (let k = 0; k < terms; k++) {
      let square = 0n;
      for (let j = 0; j <= k; j++) square += a[j] * a[k - j];
      squares.push(square >> bits);
      let cube = 0n;
      for (let j = 0; j <= k; j++) cube += squares[j] * a[k - j];
      const right = ((s * a[k] + 2n * cube) >> bits) + (k > 0 ? a[k - 1] : 0n);
      a.push(right / BigInt((k + 1) * (k + 2)));
    }
    const uc = [u, ...squares.map((c, k) => -c / BigInt(k + 1))];
    const sum = (c: readonly bigint[]): bigint => c.reduceRight((acc, x) => x - (acc >> 2n), 0n); // at ε = −¼
    const muStep = [mu, ...a.map((c, k) => -c / BigInt(k + 1))];
    const vStep = [v, ...uc.map((c, k) => -c / BigInt(k + 1))];
    const slopes = a.slice(1).map((c, k) => c * BigInt(k + 1));
    [q, slope, mu, u, v] = [sum(a), sum(slopes), sum(muStep), sum(uc), sum(vStep)];
  }
  return { q, mu, u, v };
}

describe("second route: Hastings–McLeod", () => {
  it.each([2, -1, -4, -6])("s = %s: F1, F2, F4 from Painlevé II to 40 digits", (s) => {
    const bits = 640n;
    const { mu, v, u } = painleve(s, bits);
    const decimal = (a: bigint): string => `${(a * 10n ** 190n) >> bits}e-190`;
    const e = (a: bigint): PreciseEstimate => preciseExp(decimal(a), { digits: 60 });
    const text = (x: PreciseEstimate): string => `${x.mantissa}e${-x.scale}`;
    const f2 = preciseTracyWidom(2, s, { digits: 45 });
    const f1 = preciseTracyWidom(1, s, { digits: 45 });
    const f4 = preciseTracyWidom(4, s, { digits: 45 });
    expectClose(f2.cdf, text(e(-v)), 40, "F2 = e^{−v}");
    expectClose(f1.cdf, text(e((-v - mu) >> 1n)), 40, "F1 = e^{−(v + μ)/2}");
    const plus = e((-v + mu) >> 1n);
    const minus = e((-v - mu) >> 1n);
    const doubled = add(
      { mantissa: plus.mantissa, scale: plus.scale },
      { mantissa: minus.mantissa, scale: minus.scale },
    );
    expectClose(f4.cdf, `${doubled.mantissa * 5n}e${-(doubled.scale + 1)}`, 40, "F4 = e^{−v/2} cosh(μ/2)");
    // F2′ = F2 u.
    const value = e(-v);
    const slope = (value.mantissa * u) >> bits;
    expectClose(f2.pdf, `${slope}e${-value.scale}`, 40, "F2′ = F2 ∫ q²");
  });
});
