import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  decimalFromFixed,
  fixedFromExact,
  formatDecimal,
  formatErrorBound,
  numberFromExact,
  rationalFromExact,
  readExact,
} from "../../src/precision/decimal.ts";
import {
  add,
  type Enclosure,
  over,
  powerOf,
  rootOf,
  settle,
  times,
  trim,
  withBits,
} from "../../src/precision/enclosure.ts";
import {
  bitLength,
  divide,
  fixedFromNumber,
  integerSquareRoot,
  log2OfFixed,
  multiply,
  numberFromFixed,
  rescale,
  splitNumber,
  squareRoot,
} from "../../src/precision/fixed-point.ts";
import { preciseEstimate } from "../../src/precision/precise-estimate.ts";
import { parse } from "./decimals.ts";

const SEED = { seed: 20261201, numRuns: 500 };
const anyDouble = fc.double({ noNaN: true, noDefaultInfinity: true });
const integer = (bits: number) => fc.bigInt({ min: -(2n ** BigInt(bits)), max: 2n ** BigInt(bits) });
const positive = (bits: number) => fc.bigInt({ min: 1n, max: 2n ** BigInt(bits) });

describe("fixed point", () => {
  it("splits any double exactly and puts it together again", () => {
    fc.assert(
      fc.property(anyDouble, (x) => {
        const bits = 1100n;
        const [mantissa, exponent] = splitNumber(x);
        expect(mantissa << (BigInt(exponent) + bits)).toBe(fixedFromNumber(x, bits));
        expect(numberFromFixed(fixedFromNumber(x, bits), bits)).toBe(x || 0);
      }),
      SEED,
    );
    for (const x of [
      5e-324,
      -5e-324,
      2 ** -1022,
      1.7976931348623157e308,
      2 ** -1000,
      1e-301,
      1,
      3,
      2 ** 53 - 1,
    ]) {
      expect(numberFromFixed(fixedFromNumber(x, 1100n), 1100n)).toBe(x);
    }
    expect(() => splitNumber(Number.NaN)).toThrow(RangeError);
  });

  it("rounds to the nearest double", () => {
    expect(numberFromFixed((1n << 200n) + (1n << 147n) + 1n, 200n)).toBe(1 + 2 ** -52);
    expect(numberFromFixed((1n << 200n) + (1n << 147n), 200n)).toBe(1);
    expect(numberFromFixed(1n, 5000n)).toBe(0);
    expect(numberFromFixed(-(1n << 3000n), 10n)).toBe(Number.NEGATIVE_INFINITY);
  });

  it("multiplies, divides, takes roots and rescales within the units stated", () => {
    fc.assert(
      fc.property(integer(300), positive(300), (a, b) => {
        const bits = 120n;
        const error = a * b - (multiply(a, b, bits) << bits);
        expect(error >= 0n && error < 1n << bits).toBe(true);
        const rest = (a << bits) - divide(a, b, bits) * b;
        expect(rest < b && rest > -b).toBe(true);
        const root = squareRoot(b, bits);
        expect(root * root <= b << bits && (root + 1n) * (root + 1n) > b << bits).toBe(true);
        expect(rescale(rescale(a, 50n, 90n), 90n, 50n)).toBe(a);
        expect(rescale(a, 50n, 10n) << 40n <= a).toBe(true);
        expect(bitLength(a)).toBe(a === 0n ? 0 : (a < 0n ? -a : a).toString(2).length);
        if (a !== 0n) expect(log2OfFixed(a, 0n)).toBeCloseTo(Math.log2(Math.abs(Number(a))), 9);
      }),
      SEED,
    );
    for (const n of [0n, 1n, 2n, 3n, 4n, 2n ** 52n - 1n, 2n ** 52n, 2n ** 53n + 1n, 10n ** 400n]) {
      const root = integerSquareRoot(n);
      expect(root * root <= n && (root + 1n) * (root + 1n) > n).toBe(true);
    }
    expect(() => integerSquareRoot(-1n)).toThrow(RangeError);
  });
});

describe("decimal strings", () => {
  it("are read exactly", () => {
    const rational = (text: string) => rationalFromExact(readExact("x", text));
    expect(rational("-2.50")).toEqual({ numerator: -5n, denominator: 2n });
    expect(rational(" +.125e2 ")).toEqual({ numerator: 25n, denominator: 2n });
    expect(rational("7.")).toEqual({ numerator: 7n, denominator: 1n });
    expect(rational("1E-3")).toEqual({ numerator: 1n, denominator: 1000n });
    expect(rational("-0.000e-900000")).toEqual({ numerator: 0n, denominator: 1n });
    expect(rationalFromExact(readExact("x", 0.1)).denominator).toBe(2n ** 55n);
    expect(rationalFromExact(readExact("x", -12n))).toEqual({ numerator: -12n, denominator: 1n });
  });

  it("give the number at any precision, rounded down, and the double nearby", () => {
    fc.assert(
      fc.property(integer(200), fc.integer({ min: -60, max: 60 }), (n, power) => {
        const exact = readExact("x", `${n}e${power}`);
        const { numerator, denominator } = rationalFromExact(exact);
        const fixed = fixedFromExact(exact, 90n);
        expect(fixed * denominator <= numerator << 90n && (fixed + 1n) * denominator > numerator << 90n).toBe(
          true,
        );
        const direct = Number(`${n}e${power}`);
        expect(Math.abs(numberFromExact(exact) - direct)).toBeLessThanOrEqual(Math.abs(direct) * 2 ** -52);
      }),
      SEED,
    );
    expect(numberFromExact(readExact("x", `0.1${"0".repeat(400)}1`))).toBe(0.1);
    expect(numberFromExact(readExact("x", 5e-324))).toBe(5e-324);
    expect(numberFromExact(readExact("x", "1e5000"))).toBe(Number.POSITIVE_INFINITY);
    expect(numberFromExact(readExact("x", "-1e-5000"))).toBe(-0);
  });

  it("come from fixed point rounded to nearest, exact ones marked", () => {
    fc.assert(
      fc.property(
        integer(300),
        fc.integer({ min: -200, max: 400 }),
        fc.integer({ min: 1, max: 60 }),
        (a, bits, digits) => {
          const { mantissa, scale, exact } = decimalFromFixed(a, BigInt(bits), digits);
          // |a 2^−bits − mantissa 10^−scale| ≤ ½ 10^−scale, in integers.
          const [up, down] = [10n ** BigInt(Math.max(0, scale)), 10n ** BigInt(Math.max(0, -scale))];
          const [two, over2] = [2n ** BigInt(Math.max(0, bits)), 2n ** BigInt(Math.max(0, -bits))];
          const difference = a * over2 * up - mantissa * two * down;
          expect((difference < 0n ? -difference : difference) * 2n <= two * down).toBe(true);
          expect(exact).toBe(difference === 0n);
          // Rounding may carry to a power of ten, which has a digit more.
          if (a !== 0n) expect(`${mantissa}`.replace("-", "").length).toBe(digits);
          const back = parse(formatDecimal({ mantissa, scale }));
          const common = Math.max(back.scale, scale);
          expect(back.mantissa * 10n ** BigInt(common - back.scale)).toBe(
            mantissa * 10n ** BigInt(common - scale),
          );
        },
      ),
      SEED,
    );
  });

  it.each([
    [1234n, 2, "12.34"],
    [1234n, 4, "0.1234"],
    [-1234n, 8, "-0.00001234"],
    [1234n, 9, "1.234e-6"],
    [1234n, 0, "1234"],
    [1234n, -1, "1.234e+4"],
    [5n, 400, "5e-400"],
    [0n, 3, "0"],
  ])("%s · 10^−%s is written %s", (mantissa, scale, text) => {
    expect(formatDecimal({ mantissa, scale })).toBe(text);
  });

  it("write error bounds rounded up to two digits", () => {
    expect(formatErrorBound(Number.NEGATIVE_INFINITY)).toBe("0");
    expect(formatErrorBound(Math.log2(0.99999))).toBe("1.0e+0");
    for (const log2 of [-3, 0, 17.3, -1000.7, -3321.9, 1e6, -1.4e6]) {
      const [lead, power] = formatErrorBound(log2).split("e").map(Number);
      const excess = Math.log10(lead) + power - log2 * Math.log10(2);
      expect(excess).toBeGreaterThan(-1e-15 * Math.abs(log2));
      expect(excess).toBeLessThan(Math.log10(1.11));
    }
  });
});

describe("PreciseEstimate", () => {
  it("adds the rounding to the error and says honestly whether the digits are there", () => {
    const third = (1n << 200n) / 3n;
    const good = preciseEstimate(third, 200n, -200, 20, 7);
    expect(good).toMatchObject({ converged: true, errorKind: "bound", order: 7, error: "5.1e-23" });
    expect(good.value).toBe("0.3333333333333333333333");
    const poor = preciseEstimate(third, 200n, -50, 20, 7, "estimate");
    expect(poor.converged).toBe(false);
    expect(Number(poor.error)).toBeGreaterThanOrEqual(2 ** -50);
    expect(preciseEstimate(0n, 5n, -90, 20, 1).converged).toBe(false);
    expect(preciseEstimate(0n, 5n, Number.NEGATIVE_INFINITY, 20, 1)).toMatchObject({
      value: "0",
      error: "0",
      converged: true,
    });
  });
});

describe("numbers with bounds", () => {
  /** An enclosure and a rational point inside it: value · 2^−bits + part · units · 2^−bits/64. */
  const enclosure = fc.record({
    value: fc.bigInt({ min: 2n ** 60n, max: 2n ** 140n }),
    bits: fc.bigInt({ min: -40n, max: 200n }),
    units: fc.bigInt({ min: 0n, max: 2n ** 50n }),
    part: fc.bigInt({ min: -64n, max: 64n }),
    negative: fc.boolean(),
  });
  type Drawn = typeof enclosure extends fc.Arbitrary<infer T> ? T : never;
  const made = (d: Drawn): Enclosure => ({
    value: d.negative ? -d.value : d.value,
    bits: d.bits,
    units: d.units,
  });
  /** The point inside, times 64 · 2^bits. */
  const inside = (d: Drawn): bigint => 64n * made(d).value + d.part * d.units;
  /** Whether top/bottom · 2^−bits lies in a. */
  const holds = (a: Enclosure, top: bigint, bottom: bigint, bits: bigint): boolean => {
    const lift = a.bits - bits;
    const [t, b] = lift >= 0n ? [top << lift, bottom] : [top, bottom << -lift];
    const difference = t - a.value * b;
    return (difference < 0n ? -difference : difference) <= a.units * (b < 0n ? -b : b);
  };

  it("sums, products, quotients, powers and roots of points lie in those of their enclosures", () => {
    fc.assert(
      fc.property(enclosure, enclosure, fc.bigInt({ min: 20n, max: 200n }), (d, e, precision) => {
        const [a, b] = [made(d), made(e)];
        const [p, q] = [inside(d), inside(e)];
        const top = add(a, b).bits;
        expect(holds(add(a, b), (p << (top - d.bits)) + (q << (top - e.bits)), 64n, top)).toBe(true);
        expect(holds(times(a, b, precision), p * q, 4096n, d.bits + e.bits)).toBe(true);
        expect(holds(over(a, b, precision), p, q, d.bits - e.bits)).toBe(true);
        expect(holds(trim(a, precision), p, 64n, d.bits)).toBe(true);
        expect(holds(withBits(a, d.bits - 7n), p, 64n, d.bits)).toBe(true);
        expect(holds(powerOf(a, 5n, precision), p ** 5n, 64n ** 5n, 5n * d.bits)).toBe(true);
        // The root r of the positive point p/64 · 2^−bits: (value ± units)² around it.
        const size = { ...a, value: d.value };
        const point = 64n * d.value + d.part * d.units;
        const root = rootOf(size, precision);
        const low = root.value > root.units ? root.value - root.units : 0n;
        const high = root.value + root.units;
        const lift = 2n * root.bits - d.bits;
        const scaled = lift >= 0n ? point << lift : point;
        const factor = lift >= 0n ? 64n : 64n << -lift;
        expect(low * low * factor <= scaled && scaled <= high * high * factor).toBe(true);
      }),
      SEED,
    );
  });

  it("settle only when the bound allows it, and then within one unit", () => {
    expect(settle({ value: 5n, bits: 3n, units: 0n }, 3n)).toBe(5n);
    expect(settle({ value: 5n, bits: 3n, units: 1n }, 3n)).toBeUndefined();
    expect(settle({ value: 81n, bits: 7n, units: 8n }, 3n)).toBe(5n);
    expect(settle({ value: 81n, bits: 7n, units: 9n }, 3n)).toBeUndefined();
  });

  it("refuse to divide by what may be 0 and to take roots of what may be negative", () => {
    const unsure = { value: 4n, bits: 0n, units: 2n };
    expect(() => over(unsure, unsure, 10n)).toThrow(RangeError);
    expect(() => rootOf(unsure, 10n)).toThrow(RangeError);
  });
});
