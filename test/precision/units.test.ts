/** The fixed-point functions that determinants use: the stated units, against the reference. */
import { describe, expect, it } from "vitest";
import { airyIntegralFixed, airyPairFixed, airyTaylorFixed } from "../../src/precision/airy-fixed.ts";
import { bernoulliNumbers } from "../../src/precision/bernoulli.ts";
import {
  besselEntirePairFixed,
  besselPairFixed,
  modifiedBesselFixed,
  nextOrder,
} from "../../src/precision/bessel-fixed.ts";
import { logTenFixed, logThreeFixed, logTwoFixed, piFixed } from "../../src/precision/constants.ts";
import { fixedFromExact, type Rational, rationalFromExact, readExact } from "../../src/precision/decimal.ts";
import { eulerGammaFixed } from "../../src/precision/euler-gamma.ts";
import { exponentialFixed } from "../../src/precision/exponential.ts";
import { logGammaFixed } from "../../src/precision/gamma.ts";
import { logarithmFixed } from "../../src/precision/logarithm.ts";
import { sineCosineFixed } from "../../src/precision/trigonometric.ts";
import { zetaPrimeFixed } from "../../src/precision/zeta-derivative.ts";
import { type PreciseRow, preciseReference } from "./decimals.ts";

type Fixed = (x: bigint, bits: bigint) => bigint;
type FixedOfOrder = (order: Rational, x: bigint, bits: bigint) => bigint;

/** Units stated, and the function. */
const ONE: Readonly<Record<string, readonly [bigint, Fixed]>> = {
  exp: [2n, exponentialFixed],
  log: [1n, (x, bits) => logarithmFixed(x, bits, bits)],
  sine: [2n, (x, bits) => sineCosineFixed(x, bits, bits)[0]],
  cosine: [2n, (x, bits) => sineCosineFixed(x, bits, bits)[1]],
  logGamma: [1n, (x, bits) => logGammaFixed(x, bits, bits)],
  airyAi: [1n, (x, bits) => airyPairFixed(x, bits)[0]],
  airyAiPrime: [1n, (x, bits) => airyPairFixed(x, bits)[1]],
  airyAiIntegral: [1n, airyIntegralFixed],
};
const WITH_ORDER: Readonly<Record<string, FixedOfOrder>> = {
  besselJ: (order, x, bits) => besselPairFixed(order, x, bits)[0],
  besselJPrime: (order, x, bits) => besselPairFixed(order, x, bits)[1],
  besselI: modifiedBesselFixed,
};
const CONSTANTS: Readonly<Record<string, (bits: bigint) => bigint>> = {
  pi: piFixed,
  logTwo: logTwoFixed,
  logTen: logTenFixed,
  eulerGamma: eulerGammaFixed,
  zetaPrime: zetaPrimeFixed,
};

const rows = preciseReference();

/** The argument at `bits` if it is exactly a fixed-point number there. */
function dyadic(argument: string | number, bits: bigint): bigint | undefined {
  const exact = readExact("x", argument);
  const { numerator, denominator } = rationalFromExact(exact);
  const fixed = fixedFromExact(exact, bits);
  return fixed * denominator === numerator << bits ? fixed : undefined;
}

/** Whether |value − reference| ≤ units at `bits`; the reference has `digits` digits. */
function within(value: bigint, row: PreciseRow, bits: bigint, units: bigint): boolean {
  if (Number(row.value) === 0) return value <= units && -value <= units; // far below any unit tried here
  const { numerator, denominator } = rationalFromExact(readExact("value", row.value));
  const difference = value * denominator - (numerator << bits);
  const slack = ((numerator < 0n ? -numerator : numerator) << bits) / 10n ** BigInt(row.digits - 2);
  return (difference < 0n ? -difference : difference) <= units * denominator + slack;
}

const PRECISIONS = [64n, 200n, 350n, 1000n, 3300n];
/** Precisions at which the digits of the row tell a unit. */
function precisionsFor(row: PreciseRow): bigint[] {
  const lead = Math.log2(Math.abs(Number(row.value)) + Number.MIN_VALUE);
  return PRECISIONS.filter((bits) => Number(bits) + Math.max(0, lead) + 12 < row.digits * Math.log2(10));
}

describe("units of the fixed-point functions", () => {
  it.each(Object.keys(ONE))("%s", (name) => {
    const [units, f] = ONE[name];
    let count = 0;
    for (const row of rows.filter((r) => r.f === name)) {
      for (const bits of precisionsFor(row)) {
        const x = dyadic(row.args[0], bits);
        if (x === undefined || (name === "logGamma" && x < 0n) || Math.abs(Number(row.args[0])) > 1e5)
          continue;
        count++;
        expect(within(f(x, bits), row, bits, units), `${name}(${row.args[0]}) at ${bits}`).toBe(true);
      }
    }
    expect(count).toBeGreaterThan(20);
  });

  it.each(Object.keys(WITH_ORDER))("%s", (name) => {
    let count = 0;
    for (const row of rows.filter((r) => r.f === name)) {
      const order = rationalFromExact(readExact("order", row.args[0]));
      for (const bits of precisionsFor(row)) {
        const x = dyadic(row.args[1], bits);
        if (x === undefined) continue;
        count++;
        expect(
          within(WITH_ORDER[name](order, x, bits), row, bits, 1n),
          `${name} ${row.args} at ${bits}`,
        ).toBe(true);
      }
    }
    expect(count).toBeGreaterThan(20);
  });

  it.each(Object.keys(CONSTANTS))("%s", (name) => {
    const row = rows.find(({ f }) => f === name)!;
    for (const bits of [1n, 7n, 53n, 200n, 223n, 224n, 225n, 1000n, 3400n]) {
      expect(within(CONSTANTS[name](bits), row, bits, 1n), `${name} at ${bits}`).toBe(true);
    }
  });

  it("log 3 against the logarithm", () => {
    for (const bits of [60n, 500n, 3000n]) {
      const difference = logThreeFixed(bits) - logarithmFixed(3n, 0n, bits);
      expect(difference >= -2n && difference <= 2n).toBe(true);
    }
  });

  it("notices a wrong unit", () => {
    const row = rows.find(({ f }) => f === "pi")!;
    expect(within(piFixed(200n) + 3n, row, 200n, 1n)).toBe(false);
  });
});

describe("Taylor coefficients of Ai", () => {
  it.each(["0", "0.5", "-1.75", "2.5", "-20.25", "13.125", "-90.5"])(
    "about %s satisfy the equation and are within one unit",
    (at) => {
      for (const bits of [100n, 400n, 1000n]) {
        const order = 24;
        const x = dyadic(at, bits)!;
        const a = airyTaylorFixed(x, bits, order);
        expect(a.length).toBe(order + 1);
        const [value, slope] = airyPairFixed(x, bits);
        expect(a[0] - value <= 2n && value - a[0] <= 2n).toBe(true);
        expect(a[1] - slope <= 2n && slope - a[1] <= 2n).toBe(true);
        // The same with 200 digits more, through exact rationals: the true coefficients within far less than a unit.
        const more = 400n;
        const [v, s] = airyPairFixed(x << more, bits + more);
        const exact = [v, s];
        for (let k = 0; k + 2 <= order; k++) {
          exact.push((((x * exact[k]) >> bits) + (k === 0 ? 0n : exact[k - 1])) / BigInt((k + 1) * (k + 2)));
        }
        a.forEach((c, k) => {
          const difference = (c << more) - exact[k];
          expect(
            (difference < 0n ? -difference : difference) <= (1n << more) + (1n << (more / 2n)),
            `${k}`,
          ).toBe(true);
        });
      }
    },
  );
});

describe("the entire Bessel form", () => {
  it.each(["0", "0.5", "-0.75", "3.3", "12"])(
    "of order %s is J_ν(√x)/x^{ν/2} at squares, and I_ν on the left",
    (text) => {
      const order = rationalFromExact(readExact("order", text));
      const nu = Number(text);
      for (const root of [0.25, 2, 7.5, 40, 100]) {
        const bits = 300n;
        const x = dyadic(root * root, bits)!;
        const [first, second] = besselEntirePairFixed(order, x, bits);
        const z = dyadic(root, bits)!;
        const near = (value: bigint, reference: bigint, power: number): void => {
          // The power in doubles: 45 bits of the comparison.
          const [a, b] = [Number(value) / 2 ** 300, Number(reference) / 2 ** 300 / root ** power];
          expect(Math.abs(a - b)).toBeLessThanOrEqual(Math.abs(b) * 2 ** -45);
        };
        near(first, besselPairFixed(order, z, bits)[0], nu);
        near(second, besselPairFixed(nextOrder(order), z, bits)[0], nu + 1);
        if (root > 10) continue;
        near(besselEntirePairFixed(order, -x, bits)[0], modifiedBesselFixed(order, z, bits), nu);
      }
    },
  );

  it("of whole order to all digits: φ_0(x) = J_0(√x), φ_1(x) √x = J_1(√x), and at 0 it is 1/(2^ν ν!)", () => {
    const zero: Rational = { numerator: 0n, denominator: 1n };
    for (const bits of [200n, 1000n]) {
      for (const root of [1n, 9n, 30n, 250n]) {
        const [first, second] = besselEntirePairFixed(zero, (root * root) << bits, bits);
        const [value, slope] = besselPairFixed(zero, root << bits, bits);
        expect(first - value <= 2n && value - first <= 2n).toBe(true);
        const difference = second * root + slope;
        expect(difference <= root + 1n && -difference <= root + 1n).toBe(true);
      }
    }
    const three: Rational = { numerator: 3n, denominator: 1n };
    const [first, second] = besselEntirePairFixed(three, 0n, 100n);
    expect(first - (1n << 100n) / 48n <= 1n && (1n << 100n) / 48n - first <= 1n).toBe(true);
    expect(second - (1n << 100n) / 384n <= 1n && (1n << 100n) / 384n - second <= 1n).toBe(true);
  });
});

describe("Bernoulli numbers", () => {
  it("B_2, …, B_20 (DLMF 24.2, table)", () => {
    const table = [
      [1, 6],
      [-1, 30],
      [1, 42],
      [-1, 30],
      [5, 66],
      [-691, 2730],
      [7, 6],
      [-3617, 510],
      [43867, 798],
      [-174611, 330],
    ];
    const found = bernoulliNumbers(10);
    table.forEach(([p, q], k) => {
      expect(found[k].numerator * BigInt(q)).toBe(found[k].denominator * BigInt(p));
    });
  });
});
