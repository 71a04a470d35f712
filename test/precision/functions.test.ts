import { describe, expect, it } from "vitest";
import type { PreciseEstimate, PreciseInput } from "../../src/precision/index.ts";
import * as precision from "../../src/precision/index.ts";
import {
  add,
  atMost,
  distance,
  type PreciseRow,
  parse,
  preciseReference,
  referenceOf,
  shifted,
} from "./decimals.ts";

const options = (digits: number) => ({ digits });

/** Public function of each name in the reference. */
const FUNCTIONS: Readonly<
  Record<string, (args: readonly PreciseInput[], digits: number) => PreciseEstimate>
> = {
  pi: (_, d) => precision.precisePi(options(d)),
  logTwo: (_, d) => precision.preciseLogTwo(options(d)),
  logTen: (_, d) => precision.preciseLogTen(options(d)),
  eulerGamma: (_, d) => precision.preciseEulerGamma(options(d)),
  zetaPrime: (_, d) => precision.preciseZetaPrime(options(d)),
  exp: ([x], d) => precision.preciseExp(x, options(d)),
  log: ([x], d) => precision.preciseLog(x, options(d)),
  squareRoot: ([x], d) => precision.preciseSquareRoot(x, options(d)),
  sine: ([x], d) => precision.preciseSine(x, options(d)),
  cosine: ([x], d) => precision.preciseCosine(x, options(d)),
  power: ([x, y], d) => precision.precisePower(x, y, options(d)),
  gamma: ([x], d) => precision.preciseGamma(x, options(d)),
  logGamma: ([x], d) => precision.preciseLogGamma(x, options(d)),
  airyAi: ([x], d) => precision.preciseAiryAi(x, options(d)),
  airyAiPrime: ([x], d) => precision.preciseAiryAiPrime(x, options(d)),
  airyAiIntegral: ([x], d) => precision.preciseAiryAiIntegral(x, options(d)),
  besselJ: ([order, x], d) => precision.preciseBesselJ(order, x, options(d)),
  besselJPrime: ([order, x], d) => precision.preciseBesselJPrime(order, x, options(d)),
  besselI: ([order, x], d) => precision.preciseBesselI(order, x, options(d)),
};

/** What is wrong with a result, in words; undefined when nothing is. */
function complaint(row: PreciseRow, digits: number, found: PreciseEstimate): string | undefined {
  const where = `${row.f}(${row.args.join(", ")}) to ${digits} digits`;
  const { value, unit } = referenceOf(row);
  const error = parse(found.error);
  if (!found.converged) return `${where}: not converged`;
  if (found.errorKind !== "bound") return `${where}: not a bound`;
  if (distance(parse(found.value), { mantissa: found.mantissa, scale: found.scale }).mantissa !== 0n)
    return `${where}: value and mantissa differ`;
  if (!atMost(distance(parse(found.value), value), add(error, unit)))
    return `${where}: ${found.value} ± ${found.error} instead of ${row.value}`;
  if (!atMost(error, add(shifted(value, digits), unit))) return `${where}: error ${found.error} too large`;
  return undefined;
}

const rows = preciseReference();
const DIGITS = [1, 2, 7, 20, 50, 100, 300, 1000];

describe("precise functions against the reference", () => {
  it.each(Object.keys(FUNCTIONS))("%s: true value within the error, error within 10^−digits", (name) => {
    const complaints: string[] = [];
    const own = rows.filter((row) => row.f === name);
    for (const row of own) {
      for (const digits of DIGITS.filter((d) => d + 10 <= row.digits)) {
        const wrong = complaint(row, digits, FUNCTIONS[name](row.args, digits));
        if (wrong !== undefined) complaints.push(wrong);
      }
    }
    expect(complaints).toEqual([]);
    expect(own.length).toBeGreaterThan(0);
  });

  it("covers every public function", () => {
    // Kernels, domains, determinants, laws and rules have tests of their own.
    const other = /Kernel$|^precise(Interval|HalfLine|Determinant|TracyWidom|GaussLegendre)$/;
    const names = Object.keys(precision).filter((name) => name.startsWith("precise") && !other.test(name));
    expect(names.length).toBe(Object.keys(FUNCTIONS).length);
    expect(rows.length).toBeGreaterThan(700);
  });

  it("notices a wrong digit and an error stated too small", () => {
    const row = rows.find(({ f }) => f === "airyAi")!;
    const good = FUNCTIONS["airyAi"](row.args, 20);
    expect(complaint(row, 20, good)).toBeUndefined();
    expect(complaint(row, 20, { ...good, error: "1e-30" })).toContain("instead of");
    expect(complaint(row, 20, { ...good, error: "1e-3" })).toContain("too large");
    const mantissa = good.mantissa + 100n;
    const value = `${mantissa}e-${good.scale}`;
    expect(complaint(row, 20, { ...good, mantissa, value })).toContain("instead of");
  });
});

describe("exact values", () => {
  it.each([
    ["sin 0", precision.preciseSine(0, options(30)), "0"],
    ["sin −0", precision.preciseSine(-0, options(30)), "0"],
    ["cos 0", precision.preciseCosine("0", options(5)), "1.000000"],
    ["log 1", precision.preciseLog("1.000", options(30)), "0"],
    ["log 1, dyadic", precision.preciseLog(1, options(30)), "0"],
    ["exp 0", precision.preciseExp("0e5", options(4)), "1.00000"],
    ["√4", precision.preciseSquareRoot(4n, options(5)), "2.000000"],
    ["√(9/4)", precision.preciseSquareRoot(2.25, options(5)), "1.500000"],
    ["√0", precision.preciseSquareRoot(0, options(5)), "0"],
    ["log Γ(2)", precision.preciseLogGamma(2, options(5)), "0"],
    ["log Γ(1)", precision.preciseLogGamma("1", options(5)), "0"],
    ["J_1(0)", precision.preciseBesselJ(1, 0, options(5)), "0"],
    ["J_0(0)", precision.preciseBesselJ(0, 0, options(5)), "1.000000"],
    ["J_0′(0)", precision.preciseBesselJPrime(0, 0, options(5)), "0"],
    ["J_1′(0)", precision.preciseBesselJPrime(1, 0, options(5)), "0.5000000"],
    ["I_0(0)", precision.preciseBesselI(0, 0, options(5)), "1.000000"],
    ["1^(10^50)", precision.precisePower(1, 10n ** 50n, options(5)), "1.000000"],
    ["(−1)^3", precision.precisePower(-1, 3, options(5)), "-1.000000"],
    ["0^2", precision.precisePower(0, 2, options(5)), "0"],
  ])("%s", (_, found, value) => {
    expect(found.value).toBe(value);
    expect(found.error).toBe("0");
    expect(found.converged).toBe(true);
  });

  it("takes a number at its binary value and a string at its decimal one", () => {
    const binary = precision.preciseExp(0.1, options(40)).value;
    const decimal = precision.preciseExp("0.1", options(40)).value;
    expect(binary).not.toBe(decimal);
    expect(
      precision.preciseExp("0.1000000000000000055511151231257827021181583404541015625", options(40)).value,
    ).toBe(binary);
  });

  it("does not depend on what was asked for before", () => {
    const first = precision.preciseAiryAi("-3.25", options(60));
    precision.preciseAiryAi("-3.25", options(500));
    precision.precisePi(options(1000));
    expect(precision.preciseAiryAi("-3.25", options(60))).toEqual(first);
  });
});
