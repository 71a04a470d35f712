/**
 * Tail series: coefficients against published ones, and the next omitted term against values with many digits.
 */
import { describe, expect, it } from "vitest";
import { numberFromFixed } from "../../src/precision/fixed-point.ts";
import { precisePi, preciseZetaPrime } from "../../src/precision/precise-constants.ts";
import { preciseExp, preciseLog, preciseSquareRoot } from "../../src/precision/precise-elementary.ts";
import type { PreciseEstimate } from "../../src/precision/precise-estimate.ts";
import { preciseTracyWidom } from "../../src/precision/precise-tracy-widom.ts";
import type { Fraction } from "../../src/precision/rational.ts";
import { leftTailSeries, rightTailSeries } from "../../src/precision/tail-series.ts";

const BITS = 500n;
const DIGITS = 100;

/** An estimate as a fixed-point number. */
function fixed(e: PreciseEstimate): bigint {
  return e.scale >= 0
    ? (e.mantissa << BITS) / 10n ** BigInt(e.scale)
    : (e.mantissa * 10n ** BigInt(-e.scale)) << BITS;
}
const times = (a: bigint, b: bigint): bigint => (a * b) >> BITS;
const over = (a: bigint, b: bigint): bigint => (a << BITS) / b;
const of = ({ numerator, denominator }: Fraction): bigint => (numerator << BITS) / denominator;
const text = (list: readonly Fraction[]): string[] => list.map((c) => `${c.numerator}/${c.denominator}`);
const root = (n: number): bigint => fixed(preciseSquareRoot(n, { digits: DIGITS }));

describe("coefficients", () => {
  it("right tails", () => {
    // Derived in published.md from the trace of the Airy kernel and from ½ ∫ Ai; leading terms: G. Borot, C. Nadal,
    // Random Matrices: Theory Appl. 1 (2012) 1250006.
    expect(text(rightTailSeries(2, "survival", 5).coefficients)).toEqual([
      "1/1",
      "-35/24",
      "3745/1152",
      "-805805/82944",
      "289554265/7962624",
    ]);
    expect(text(rightTailSeries(1, "survival", 4).coefficients)).toEqual([
      "1/1",
      "-41/48",
      "9241/4608",
      "-5075225/663552",
    ]);
    expect(
      text([rightTailSeries(2, "survival", 1).factor, rightTailSeries(1, "survival", 1).factor]),
    ).toEqual(["1/16", "1/4"]);
  });

  it("left tails", () => {
    // C. Tracy, H. Widom, Commun. Math. Phys. 159 (1994) 151; further terms from published.md §4a.
    const { painleve, logarithm } = leftTailSeries(7);
    expect(text(painleve.slice(0, 5))).toEqual(["1/1", "-1/8", "-73/128", "-10657/1024", "-13912277/32768"]);
    expect(text(logarithm.slice(1, 6))).toEqual([
      "3/64",
      "63/256",
      "2407/512",
      "1608657/8192",
      "1180103913/81920",
    ]);
    // The bracket: exp of the logarithm's corrections, 1 + 3/2⁶ + 2025/2¹³ + 2470825/2¹⁹ + 26389914075/2²⁷.
    const [, b1, b2, b3, b4] = logarithm.map(
      ({ numerator, denominator }) => Number(numerator) / Number(denominator),
    );
    expect(b2 + b1 ** 2 / 2).toBe(2025 / 2 ** 13);
    expect(b3 + b1 * b2 + b1 ** 3 / 6).toBeCloseTo(2470825 / 2 ** 19, 12);
    expect(b4 + b1 * b3 + b2 ** 2 / 2 + (b1 ** 2 * b2) / 2 + b1 ** 4 / 24).toBeCloseTo(
      26389914075 / 2 ** 27,
      10,
    );
  });
});

describe("the next omitted term is the remainder", () => {
  it.each([1, 2, 4] as const)("right tail, β = %i, 1 − F and F′", (beta) => {
    for (const s of [16, 25]) {
      const exact = preciseTracyWidom(beta, s, { digits: 45 });
      const rootOfS = BigInt(Math.sqrt(s));
      const zeta = `${2n * rootOfS ** 3n}`; // 3 ζ
      for (const what of ["survival", "density"] as const) {
        const { kappa, power, factor, piPower, coefficients } = rightTailSeries(beta, what, 12);
        // Powers of s in quarters: s^{−p} = (√s)^{−2p}, and √s is a square or has a precise root.
        const quarters = Number((4n * power.numerator) / power.denominator);
        const fourth = root(Number(rootOfS));
        let prefactor = of(factor);
        for (let k = 0; k < quarters; k++) prefactor = over(prefactor, fourth);
        const pi = fixed(precisePi({ digits: DIGITS }));
        prefactor = over(
          prefactor,
          piPower === 2 ? pi : fixed(preciseSquareRoot(precisePi({ digits: 120 }).value, { digits: DIGITS })),
        );
        const third = (BigInt(zeta) * BigInt(kappa) * 10n ** 110n) / 3n;
        const exponential = fixed(preciseExp(`-${third}e-110`, { digits: DIGITS }));
        const scaled = over(
          over(fixed(what === "survival" ? exact.survival : exact.pdf), exponential),
          prefactor,
        );
        const z = (1n << BITS) / rootOfS ** 3n;
        let partial = 0n;
        let term = 1n << BITS;
        coefficients.forEach((c, k) => {
          // The remainder before term k over term k is 1 + O(z k), up to the part 1 − F that the series leaves out.
          const next = times(of(c), term);
          if (k >= 1 && k <= 4) {
            const ratio = numberFromFixed(over(scaled - partial, next), BITS);
            expect(Math.abs(ratio - 1), `term ${k} at ${s}: ${ratio}`).toBeLessThan(6 * (k + 1) * s ** -1.5);
          }
          partial += next;
          term = times(term, z);
        });
      }
    }
  });

  it.each([1, 2, 4] as const)("left tail, β = %i", (beta) => {
    const { painleve, logarithm } = leftTailSeries(9);
    for (const x of [9, 16]) {
      const value = preciseTracyWidom(beta, -x, { digits: 45 }).cdf;
      const log = fixed(preciseLog(value.value, { digits: 60 }));
      const cube = BigInt(x) ** 3n;
      const logTwo = fixed(preciseLog(2, { digits: DIGITS }));
      const constant =
        -((cube << BITS) / 12n) -
        fixed(preciseLog(x, { digits: DIGITS })) / 8n +
        logTwo / 24n +
        fixed(preciseZetaPrime({ digits: DIGITS }));
      // log F2 and μ with m correction terms each; the remainder is compared with what term m + 1 adds.
      const sums = (m: number): bigint => {
        let logF2 = constant;
        for (let k = 1; k <= m; k++) logF2 += of(logarithm[k]) / cube ** BigInt(k);
        if (beta === 2) return logF2;
        const threeHalves = over((BigInt(Math.sqrt(x)) ** 3n) << BITS, root(2));
        let mu = logTwo / 2n;
        for (let k = 0; k <= m; k++) {
          const term = times(of(painleve[k]), threeHalves) / cube ** BigInt(k);
          mu += (2n * term) / BigInt(3 - 6 * k);
        }
        if (beta === 1) return (logF2 - mu) / 2n;
        // log cosh(μ/2) = μ/2 + log((1 + e^{−μ})/2).
        const decay = fixed(preciseExp(`${(-mu * 10n ** 110n) >> BITS}e-110`, { digits: DIGITS }));
        const half = `${(((1n << BITS) + decay) * 10n ** 110n) >> (BITS + 1n)}e-110`;
        return (logF2 + mu) / 2n + fixed(preciseLog(half, { digits: DIGITS }));
      };
      for (const m of [1, 2, 3]) {
        const step = sums(m + 1) - sums(m);
        const ratio = numberFromFixed(over(log - sums(m), step), BITS);
        expect(Math.abs(ratio - 1), `term ${m + 1} at ${x}: ${ratio}`).toBeLessThan(
          30 * (m + 1) ** 2 * x ** -3,
        );
      }
    }
  });
});
