/** Option values: what is taken, and what is refused with which words. */
import { describe, expect, it } from "vitest";
import {
  choiceList,
  choiceOption,
  integerOption,
  numberList,
  positiveOption,
  probabilityList,
  probabilityOption,
  single,
} from "../../src/cli/values.ts";
import { InvalidArgumentError } from "../../src/core/errors.ts";

describe("numbers", () => {
  it("takes negative numbers, exponents, blanks after commas and several mentions", () => {
    expect(numberList("--at", ["-3.5,-2", " 1e-3, .5"])).toEqual([-3.5, -2, 0.001, 0.5]);
  });

  it("takes ranges with both ends", () => {
    expect(numberList("--at", ["-1:1:0.5"])).toEqual([-1, -0.5, 0, 0.5, 1]);
    const fine = numberList("--at", ["-6:2:0.1"]);
    expect(fine).toHaveLength(81);
    expect(fine[1]).toBe(-5.9);
    expect(fine[80]).toBe(2);
    expect(numberList("--at", ["3:3:1"])).toEqual([3]);
    expect(numberList("--at", ["0:1:0.4"])).toEqual([0, 0.4, 0.8]);
  });

  it.each([
    ["1,,2", /--at: expected a comma-separated list without empty places, received "1,,2"/],
    ["", /without empty places/],
    ["one", /--at: expected a decimal number, received "one"/],
    ["0x10", /a decimal number/],
    ["NaN", /a decimal number/],
    ["Infinity", /a decimal number/],
    ["1e999", /a finite number/],
    ["1:2", /a range from:to:step/],
    ["2:1:0.5", /a range from:to:step/],
    ["1:2:0", /a range from:to:step/],
    ["1:2:-1", /a range from:to:step/],
    ["1:x:1", /a decimal number, received "x"/],
    ["0:1e9:1", /at most 100000 numbers/],
    ["0:1:1e-300", /at most 100000 numbers/],
  ])("refuses %j", (text, message) => {
    expect(() => numberList("--at", [text])).toThrow(message);
    expect(() => numberList("--at", [text])).toThrow(InvalidArgumentError);
  });
});

describe("probabilities", () => {
  it("takes what lies inside (0, 1)", () => {
    expect(probabilityList("--levels", ["0.5,1e-300"])).toEqual([0.5, 1e-300]);
    expect(probabilityOption("--level", undefined)).toBeUndefined();
  });

  it.each(["0", "1", "-0.1", "1.5", "95%", "1e-400"])("refuses %s", (text) => {
    expect(() => probabilityList("--levels", [text])).toThrow(/--levels: expected .*received/);
  });
});

describe("single values", () => {
  it("refuses a second mention, an empty value and a swallowed option", () => {
    expect(() => single("--format", ["text", "csv"])).toThrow(/--format: expected to be given once/);
    expect(() => single("--output", [""])).toThrow(/--output: expected a value/);
    expect(() => single("--output", ["--format"])).toThrow(/--output: expected a value, received "--format"/);
  });

  it("keeps positive numbers positive", () => {
    expect(positiveOption("--t", ["1e-9"])).toBe(1e-9);
    expect(() => positiveOption("--t", ["0"])).toThrow(/greater than 0/);
  });

  it("keeps integers to integers and to their range", () => {
    expect(integerOption("--n", ["12"], 1, 17)).toBe(12);
    for (const text of ["0", "18", "2.5", "1e1", "x"]) {
      expect(() => integerOption("--n", [text], 1, 17)).toThrow(
        /--n: expected an integer from 1 to 17, received/,
      );
    }
  });

  it("knows its choices in any case, each once", () => {
    expect(choiceOption("--f", ["HTML"], ["text", "html"])).toBe("html");
    expect(choiceList("--laws", ["f1,F4"], ["F1", "F2", "F4"])).toEqual(["F1", "F4"]);
    expect(() => choiceList("--laws", ["F1,F1"], ["F1", "F2"])).toThrow(/each choice once, received "F1"/);
    expect(() => choiceOption("--f", ["pdf"], ["text", "html"])).toThrow(/one of text, html, received "pdf"/);
  });
});
