import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { addInto, divideInto, multiplyInto } from "../../src/core/double-double.ts";
import { InvalidArgumentError, InvalidDataError } from "../../src/core/errors.ts";
import { seededGenerator } from "../../src/core/random.ts";
import { Workspace } from "../../src/core/workspace.ts";

/** A double as an exact fraction m / 2^k of big integers. */
function fraction(value: number): [bigint, bigint] {
  let m = value;
  let k = 0n;
  while (!Number.isInteger(m)) {
    m *= 2;
    k++;
  }
  return [BigInt(m), 2n ** k];
}

/** hi + lo − expected relative to expected, expected = n/d exactly. */
function relativeError(out: Float64Array, n: bigint, d: bigint): number {
  const [hn, hd] = fraction(out[0]);
  const [ln, ld] = fraction(out[1]);
  const difference = (hn * ld + ln * hd) * d - n * hd * ld;
  if (n === 0n) return Number(difference);
  return Number((difference * 2n ** 200n) / (n * hd * ld)) / 2 ** 200;
}

describe("double-double arithmetic, against exact fractions", () => {
  const value = fc.double({ min: -1e6, max: 1e6, noNaN: true }).filter((x) => Math.abs(x) > 1e-6);
  const settings = { seed: 20261201, numRuns: 500 };

  it("adds, multiplies and divides to 1e-30 relative", () => {
    fc.assert(
      fc.property(value, value, value, value, (a, tailA, b, tailB) => {
        const al = tailA * 2 ** -75;
        const bl = tailB * 2 ** -75;
        const aHigh = a + al;
        const bHigh = b + bl;
        const [x, xl] = [aHigh, al - (aHigh - a)];
        const [y, yl] = [bHigh, bl - (bHigh - b)];
        const [xn, xd] = exact(x, xl);
        const [yn, yd] = exact(y, yl);
        const out = new Float64Array(2);
        multiplyInto(out, x, xl, y, yl);
        expect(Math.abs(relativeError(out, xn * yn, xd * yd))).toBeLessThan(1e-30);
        divideInto(out, x, xl, y, yl);
        expect(Math.abs(relativeError(out, xn * yd, xd * yn))).toBeLessThan(1e-30);
        if (Math.sign(x) === Math.sign(y)) {
          addInto(out, x, xl, y, yl);
          expect(Math.abs(relativeError(out, xn * yd + yn * xd, xd * yd))).toBeLessThan(1e-30);
        }
      }),
      settings,
    );
  });

  function exact(hi: number, lo: number): [bigint, bigint] {
    const [hn, hd] = fraction(hi);
    const [ln, ld] = fraction(lo);
    return [hn * ld + ln * hd, hd * ld];
  }
});

describe("seededGenerator", () => {
  it("repeats itself for the same seed and differs for another", () => {
    const draw = (seed: number): number[] => {
      const next = seededGenerator(seed);
      return Array.from({ length: 20 }, () => next());
    };
    expect(draw(7)).toEqual(draw(7));
    expect(draw(7)).not.toEqual(draw(8));
    expect(draw(0).every((u) => u > 0 && u < 1)).toBe(true);
  });

  it("is uniform: binned counts, and no correlation between neighbours", () => {
    const next = seededGenerator(2026);
    const bins = new Array<number>(64).fill(0);
    const n = 200_000;
    let product = 0;
    let before = next();
    for (let i = 0; i < n; i++) {
      const u = next();
      bins[Math.floor(64 * u)]++;
      product += (u - 0.5) * (before - 0.5);
      before = u;
    }
    const chiSquare = bins.reduce((sum, found) => sum + (found - n / 64) ** 2 / (n / 64), 0);
    // 63 degrees of freedom: 103.4 is the 0.999 point (common tables).
    expect(chiSquare).toBeLessThan(103.4);
    expect(Math.abs(product / n)).toBeLessThan((4 * (1 / 12)) / Math.sqrt(n));
  });

  it.each([-1, 1.5, 2 ** 32, Number.NaN])("refuses seed %s", (seed) => {
    expect(() => seededGenerator(seed)).toThrow(/seed: expected an integer from 0 to 4294967295/);
  });
});

describe("Workspace", () => {
  it("hands out views that do not overlap, and grows", () => {
    const workspace = new Workspace(4);
    const views = [3, 3, 10, 1].map((count, k) => workspace.take(count).fill(k));
    views.forEach((view, k) => {
      expect(Array.from(view)).toEqual(new Array(view.length).fill(k));
    });
    workspace.reset();
    expect(workspace.take(2).length).toBe(2);
  });
});

describe("errors", () => {
  it("describe what came, whatever it is", () => {
    const message = (received: unknown): string =>
      new InvalidArgumentError("x", "a number", received).message;
    expect(message("a\n")).toBe('x: expected a number, received "a\\n"');
    expect(message("y".repeat(100)).length).toBeLessThan(110);
    expect(message([1, 2])).toContain("an array of length 2");
    expect(message(new Float64Array(2))).toContain("a Float64Array");
    expect(message(() => 1)).toContain("a function");
    expect(message({})).toContain("an object");
    expect(message(null)).toContain("null");
    expect(message(-0)).toContain("-0");
    const data = new InvalidDataError("data", "numbers", "x", { row: 3 });
    expect(data).toBeInstanceOf(InvalidArgumentError);
    expect([data.row, data.column, data.name]).toEqual([3, undefined, "InvalidDataError"]);
  });
});
