import { describe, expect, it } from "vitest";
import { InvalidArgumentError } from "../../src/core/errors.ts";
import type { PreciseInput } from "../../src/precision/index.ts";
import * as precision from "../../src/precision/index.ts";

const twenty = { digits: 20 };
const ONE_ARGUMENT = [
  precision.preciseExp,
  precision.preciseLog,
  precision.preciseSquareRoot,
  precision.preciseSine,
  precision.preciseCosine,
  precision.preciseGamma,
  precision.preciseLogGamma,
  precision.preciseAiryAi,
  precision.preciseAiryAiPrime,
  precision.preciseAiryAiIntegral,
];
const TWO_ARGUMENTS = [
  precision.precisePower,
  precision.preciseBesselJ,
  precision.preciseBesselJPrime,
  precision.preciseBesselI,
];
const CONSTANTS = [
  precision.precisePi,
  precision.preciseLogTwo,
  precision.preciseLogTen,
  precision.preciseEulerGamma,
  precision.preciseZetaPrime,
];

function refusal(run: () => unknown): InvalidArgumentError {
  try {
    run();
  } catch (error) {
    expect(error).toBeInstanceOf(InvalidArgumentError);
    return error as InvalidArgumentError;
  }
  throw new Error("accepted");
}

const hostile = [0, -5, 1.5, 1e7, 1001, Number.NaN, Number.POSITIVE_INFINITY, "20", null, undefined, 20n];

describe("digits", () => {
  it.each(hostile)("%s is refused by every function, with the limit named", (digits) => {
    const options = { digits } as { digits: number };
    const calls = [
      ...ONE_ARGUMENT.map((f) => () => f(1.5, options)),
      ...TWO_ARGUMENTS.map((f) => () => f(1.5, 1.5, options)),
      ...CONSTANTS.map((f) => () => f(options)),
    ];
    for (const call of calls) {
      const error = refusal(call);
      expect(error.argument).toBe("options.digits");
      expect(error.message).toContain("from 1 to 1000");
    }
  });

  it("missing options are refused", () => {
    expect(refusal(() => precision.precisePi(undefined as never)).argument).toBe("options.digits");
    expect(refusal(() => precision.preciseExp(1, null as never)).argument).toBe("options.digits");
  });
});

describe("numbers", () => {
  const bad = [
    "abc",
    "",
    " ",
    ".",
    "1e",
    "0x10",
    "1_000",
    "--1",
    "1,5",
    "Infinity",
    "NaN",
    Number.NaN,
    Number.POSITIVE_INFINITY,
    Number.NEGATIVE_INFINITY,
    null,
    undefined,
    true,
    {},
    [1],
    () => 1,
    "1e999999",
    "-1e999999",
    "1e-999999",
    "1e99999999999",
    "9".repeat(1e6),
    `0.${"0".repeat(30000)}1`,
    10n ** 20000n,
  ];
  it.each(bad.map((value) => [String(value).slice(0, 20), value] as const))(
    "%s is refused by every function",
    (_, value) => {
      const input = value as PreciseInput;
      for (const f of ONE_ARGUMENT) expect(refusal(() => f(input, twenty)).argument).toBe("x");
      for (const f of TWO_ARGUMENTS) {
        const names = f === precision.precisePower ? ["x", "y"] : ["order", "x"];
        expect(refusal(() => f(input, 1, twenty)).argument).toBe(names[0]);
        expect(refusal(() => f(1, input, twenty)).argument).toBe(names[1]);
      }
    },
  );

  it.each<[string, string, () => unknown, string]>([
    ["log 0", "x", () => precision.preciseLog(0, twenty), "> 0"],
    ["log −1", "x", () => precision.preciseLog("-1", twenty), "> 0"],
    ["√−1", "x", () => precision.preciseSquareRoot(-1, twenty), "≥ 0"],
    ["exp 1e12", "x", () => precision.preciseExp(1e12, twenty), "1000000"],
    ["exp −1e12", "x", () => precision.preciseExp(-1e12, twenty), "1000000"],
    ["exp 1e9000", "x", () => precision.preciseExp("1e9000", twenty), "1000000"],
    ["Γ(0)", "x", () => precision.preciseGamma(0, twenty), "poles"],
    ["Γ(−1)", "x", () => precision.preciseGamma(-1, twenty), "poles"],
    ["Γ(−7.0)", "x", () => precision.preciseGamma("-7.0", twenty), "poles"],
    ["Γ(1e6)", "x", () => precision.preciseGamma(1e6, twenty), "100000"],
    ["log Γ(−2)", "x", () => precision.preciseLogGamma("-2", twenty), "poles"],
    ["log Γ(1e16)", "x", () => precision.preciseLogGamma(1e16, twenty), "1000000000000000"],
    ["Ai(10001)", "x", () => precision.preciseAiryAi(10001, twenty), "10000"],
    ["Ai(−1e300)", "x", () => precision.preciseAiryAiPrime(-1e300, twenty), "10000"],
    ["∫Ai", "x", () => precision.preciseAiryAiIntegral("1e5", twenty), "10000"],
    ["J_−1", "order", () => precision.preciseBesselJ(-1, 1, twenty), "> −1"],
    ["J_−3.5", "order", () => precision.preciseBesselJ("-3.5", 1, twenty), "> −1"],
    ["J_1e5", "order", () => precision.preciseBesselJ(1e5, 1, twenty), "10000"],
    ["J_0(−1)", "x", () => precision.preciseBesselJ(0, -1, twenty), "from 0"],
    ["J_0(1e10)", "x", () => precision.preciseBesselJ(0, 1e10, twenty), "1000000000"],
    ["J_−½(0)", "x", () => precision.preciseBesselJ(-0.5, 0, twenty), "> 0"],
    ["J′_½(0)", "x", () => precision.preciseBesselJPrime(0.5, 0, twenty), "> 0"],
    ["J_9999(1e-9999)", "x", () => precision.preciseBesselJ(9999, "1e-9999", twenty), "1e-400000"],
    ["I_0(20000)", "x", () => precision.preciseBesselI(0, 20000, twenty), "10000"],
    ["0^−1", "x", () => precision.precisePower(0, -1, twenty), "other than 0"],
    ["(−2)^½", "x", () => precision.precisePower(-2, 0.5, twenty), "whole"],
    ["2^1e9", "y", () => precision.precisePower(2, 1e9, twenty), "1000000"],
    ["2^1e5000", "y", () => precision.precisePower("1.5", "1e5000", twenty), "1000000"],
  ])("%s names %s and the limit", (_, argument, run, words) => {
    const error = refusal(run);
    expect(error.argument).toBe(argument);
    expect(error.message).toContain(words);
  });
});
