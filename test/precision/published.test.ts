/** Published digits; the source stands beside each. */
import { describe, expect, it } from "vitest";
import {
  preciseAiryAi,
  preciseAiryAiPrime,
  preciseBesselI,
  preciseBesselJ,
  preciseGamma,
  precisePower,
  preciseZetaPrime,
} from "../../src/precision/index.ts";
import { atMost, distance, parse } from "./decimals.ts";

const forty = { digits: 40 };

/** The digits printed are those of the value: at most one unit of the last one off. */
function expectDigits(found: string, printed: string): void {
  const reference = parse(printed);
  const one = { mantissa: 1n, scale: reference.scale };
  expect(atMost(distance(parse(found), reference), one), `${found} against ${printed}`).toBe(true);
}

describe("published values", () => {
  it("Ai(0): OEIS A284867", () => {
    const digits = "0.35502805388781723926006318600418317639797917419917724058";
    expectDigits(preciseAiryAi(0, { digits: 60 }).value, digits);
  });

  it("Ai′(0): OEIS A284868", () => {
    const digits = "-0.2588194037928067984051835601892039634790911383549345822";
    expectDigits(preciseAiryAiPrime(0, { digits: 60 }).value, digits);
  });

  it("ζ′(−1): OEIS A084448", () => {
    const digits = "-0.1654211437004509292139196602427806427640363803352017836665223";
    expectDigits(preciseZetaPrime({ digits: 70 }).value, digits);
  });

  it("Ai(0) = 3^(−2/3)/Γ(2/3) (DLMF 9.2.3), through 230 digits of two thirds", () => {
    const twoThirds = "0." + "6".repeat(229) + "7";
    const root = precisePower(3, `-${twoThirds}`, { digits: 210 });
    const gamma = preciseGamma(twoThirds, { digits: 210 });
    const quotient = (root.mantissa * 10n ** BigInt(gamma.scale + 200 - root.scale)) / gamma.mantissa;
    expectDigits(preciseAiryAi(0, { digits: 210 }).value, `${quotient}e-200`);
  });

  it.each([
    // OEIS A096714 (Ai), OEIS A115368 (J_0); the others: GNU Scientific Library, specfunc/airy_zero.c.
    ["Ai", preciseAiryAi, "-2.33810741045976703848919725244673544063854014567238"],
    ["Ai", preciseAiryAi, "-4.087949444130970617"],
    ["Ai", preciseAiryAi, "-12.82877675286575720"],
    ["Ai", preciseAiryAi, "-38.02100867725525443"],
    ["Ai", preciseAiryAi, "-60.45555727411669871"],
    ["Ai′", preciseAiryAiPrime, "-1.018792971647471089"],
    ["Ai′", preciseAiryAiPrime, "-12.384788371845747325"],
    ["Ai′", preciseAiryAiPrime, "-280.9378080358935071"],
    [
      "J_0",
      (x: string, options: { digits: number }) => preciseBesselJ(0, x, options),
      "2.40482555769577276862163187932645464312424490914596713570699909",
    ],
  ])("%s changes sign at its zero %3$s", (_, f, zero) => {
    const { mantissa, scale } = parse(zero);
    const at = (m: bigint) => f(`${m}e-${scale}`, forty);
    const [before, after] = [at(mantissa - 1n), at(mantissa + 1n)];
    expect(before.converged && after.converged).toBe(true);
    expect(before.mantissa < 0n).not.toBe(after.mantissa < 0n);
  });

  // The library's test files carry what another double computation printed, tested there to 2 … 16 units of 2^−52 (the
  // factors from memory); 16 of them are allowed here, the accuracy of the source.
  it.each([
    // GNU Scientific Library, specfunc/test_airy.c; the odd arguments are doubles.
    [preciseAiryAi(-500, forty).value, "0.0725901201040411396"],
    [preciseAiryAi(-5, forty).value, "0.3507610090241142"],
    [preciseAiryAiPrime(-5, forty).value, "0.3271928185544435"],
    [preciseAiryAi(1.649999999999991, forty).value, "0.05831058618720882"],
    [preciseAiryAi(5.39999999999998, forty).value, "4.272986169411866e-5"],
  ])("%s is %s to the source's accuracy", (found, printed) => {
    const reference = parse(printed);
    const allowed = { mantissa: reference.mantissa * 16n, scale: reference.scale };
    const difference = distance(parse(found), reference);
    expect(atMost({ ...difference, mantissa: difference.mantissa << 52n }, allowed)).toBe(true);
  });

  it.each([
    // GNU Scientific Library, specfunc/test_bessel.c, 19 or 20 digits of which the last may be off by a few: at 0.1
    // it prints …3230, while J_0(1/10) = …32281 and J_0 of the double 0.1 is …32000. One unit of the last but one here.
    [preciseBesselJ(0, "0.1", forty).value, "0.9975015620660400323"],
    [preciseBesselJ(0, 2, forty).value, "0.22389077914123566805"],
    [preciseBesselJ(0, 100, forty).value, "0.019985850304223122424"],
    [preciseBesselJ(1, 100, forty).value, "-0.07714535201411215803"],
    [preciseBesselJ(5, 2, forty).value, "0.007039629755871685484"],
    [preciseBesselJ(100, 100, forty).value, "0.09636667329586155967"],
    [preciseBesselJ(0.75, 1, forty).value, "0.5586524932048917478"],
    [preciseBesselJ("0.75", 10, forty).value, "-0.04968928974751508135"],
    [preciseBesselJ(1.75, 1, forty).value, "0.1685939225457631701"],
    [preciseBesselI(0, 2, forty).value, "2.2795853023360672674"],
    [preciseBesselI(0, 100, forty).value, "1.0737517071310738235e+42"],
  ])("%s is %s", (found, printed) => {
    expectDigits(found, printed);
  });
});
