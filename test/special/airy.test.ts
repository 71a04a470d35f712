import { describe, expect, it } from "vitest";
import { InvalidArgumentError } from "../../src/core/errors.ts";
import {
  airyAi,
  airyAiPrime,
  airyAiPrimeScaled,
  airyAiScaled,
  airyPair,
  airyPairInto,
  airyPairScaled,
  airyPairScaledInto,
} from "../../src/special/airy.ts";
import { SERIES_R, SERIES_U, SERIES_V, SERIES_W } from "../../src/special/airy-tables.ts";
import { type AiryReferenceRow, airyReference, worstError } from "./airy-reference.ts";

const rows = airyReference();
const between = (low: number, high: number): AiryReferenceRow[] =>
  rows.filter((r) => r.x >= low && r.x < high);
const left = rows.filter((r) => r.x < 0);

describe("against mpmath, 34 digits", () => {
  // Region, rows, least number of rows, bounds on the largest and on the root-mean-square error of Ai and of Ai'. On
  // [−20, 20] only sums and products are taken, the same on every engine, so the bounds are close to what is measured.
  const regions: [string, AiryReferenceRow[], number, number, number][] = [
    ["[-1e10, -50)", between(-1e10, -50), 5, 6e-16, 3e-16],
    ["[-50, -20)", between(-50, -20), 100, 6e-16, 2e-16],
    ["[-20, 0)", between(-20, 0), 200, 2e-16, 4.3e-17],
    ["[0, 20]", between(0, 20.0000000001), 200, 4.5e-16, 6.2e-17],
    ["(20, 103.5]", between(20.0000000001, 104), 50, 6e-16, 2e-16],
  ];
  for (const [name, chosen, least, bound, rms] of regions) {
    it(`Ai and Ai' on ${name}: error ≤ ${bound}, relative (x ≥ 0) or to the modulus (x < 0)`, () => {
      const ai = worstError(chosen, "ai", airyAi, (row, size) => row.modulus ?? size);
      const prime = worstError(chosen, "aiPrime", airyAiPrime, (row, size) => row.modulusPrime ?? size);
      expect(ai.count).toBeGreaterThanOrEqual(least);
      expect(prime.count).toBe(ai.count);
      expect(ai.worst, `Ai at ${ai.at}`).toBeLessThanOrEqual(bound);
      expect(prime.worst, `Ai' at ${prime.at}`).toBeLessThanOrEqual(bound);
      expect(ai.rms, "root mean square, Ai").toBeLessThanOrEqual(rms);
      expect(prime.rms, "root mean square, Ai'").toBeLessThanOrEqual(rms);
    });
  }

  it("scaled forms, 0 ≤ x ≤ 1e12: relative error ≤ 6e-16", () => {
    const ai = worstError(rows, "aiScaled", airyAiScaled);
    const prime = worstError(rows, "aiPrimeScaled", airyAiPrimeScaled);
    expect(ai.count).toBeGreaterThanOrEqual(150);
    expect(rows[rows.length - 1].x).toBe(1e12);
    expect(ai.worst, `at ${ai.at}`).toBeLessThanOrEqual(6e-16);
    expect(prime.worst, `at ${prime.at}`).toBeLessThanOrEqual(6e-16);
  });

  it("scaled forms are the plain ones for x < 0", () => {
    expect(left.length).toBeGreaterThan(100);
    for (const { x } of left) {
      expect(airyAiScaled(x)).toBe(airyAi(x));
      expect(airyAiPrimeScaled(x)).toBe(airyAiPrime(x));
    }
  });
});

describe("against published values", () => {
  it("Ai(0), Ai'(0): OEIS A284867, A284868", () => {
    expect(Math.abs(airyAi(0) - Number("0.35502805388781723926"))).toBeLessThanOrEqual(5.6e-17);
    expect(Math.abs(airyAiPrime(0) - Number("-0.25881940379280679841"))).toBeLessThanOrEqual(5.6e-17);
  });

  // GNU Scientific Library, specfunc/test_airy.c; the odd arguments are as in the file. Last column: unit of the last
  // digit quoted there.
  const quoted: [string, (x: number) => number, number, number, number][] = [
    ["Ai", airyAi, -500, Number("0.0725901201040411396"), 1e-17],
    ["Ai", airyAi, -5, 0.3507610090241142, 1e-16],
    ["Ai", airyAi, -0.3000000000000094, 0.4309030952855831, 1e-16],
    ["Ai", airyAi, 0.6999999999999907, 0.1891624003981519, 1e-16],
    ["Ai", airyAi, 1.649999999999991, 0.05831058618720882, 1e-17],
    ["Ai", airyAi, 3.499999999999987, 0.002584098786989702, 1e-18],
    ["Ai", airyAi, 5.39999999999998, 4.272986169411866e-5, 1e-20],
    ["Ai'", airyAiPrime, -5, 0.3271928185544435, 1e-16],
    ["Ai'", airyAiPrime, 0.4999999999999906, -0.224910532664685, 1e-16],
    ["Ai'", airyAiPrime, 5.199999999999981, -0.0001589434526459543, 1e-19],
    ["e^ζ Ai", airyAiScaled, 0.6999999999999907, 0.2795125667681217, 1e-16],
    ["e^ζ Ai", airyAiScaled, 3.499999999999987, 0.2032920808163519, 1e-16],
    ["e^ζ Ai", airyAiScaled, 5.39999999999998, 0.1836050093282229, 1e-16],
  ];
  it("Ai, Ai' and scaled Ai: GNU Scientific Library test file, every digit quoted", () => {
    for (const [name, compute, x, value, unit] of quoted) {
      // One unit of the last quoted digit, the rounding of the quotation to a double, and 6e-16 of the envelope.
      const envelope = x < 0 ? (name === "Ai" ? 1 : Math.sqrt(-x)) / Math.sqrt(Math.PI * Math.sqrt(-x)) : 0;
      const tolerance = unit + 7e-16 * Math.max(Math.abs(value), envelope);
      expect(Math.abs(compute(x) - value), `${name}(${x})`).toBeLessThanOrEqual(tolerance);
    }
  });

  it("zeros of Ai and Ai': GNU Scientific Library, specfunc/airy_zero.c (Abramowitz–Stegun 10.4.105); OEIS A096714", () => {
    const zerosOfAi = [
      "-2.3381074104597670385",
      "-4.087949444130970617",
      "-5.520559828095551059",
      "-6.786708090071758999",
      "-7.944133587120853123",
      "-9.02265085334098038",
      "-10.04017434155808593",
      "-11.00852430373326289",
      "-11.93601556323626252",
      "-12.8287767528657572",
      "-38.02100867725525443",
      "-60.45555727411669871",
    ].map(Number);
    const zerosOfAiPrime = [
      "-1.018792971647471089",
      "-3.248197582179836738",
      "-4.820099211178735639",
      "-6.163307355639486822",
      "-7.372177255047770177",
      "-8.488486734019722133",
      "-9.535449052433547471",
      "-10.52766039695740728",
      "-11.47505663348024529",
      "-12.384788371845747325",
      "-280.9378080358935071",
    ].map(Number);
    // At a zero a rounded argument moves the value by slope · half a unit in the last place.
    const halfUnit = (x: number): number => 2 ** (Math.floor(Math.log2(-x)) - 53);
    for (const x of zerosOfAi) {
      const allowed = Math.abs(airyAiPrime(x)) * halfUnit(x) + 6e-16 / Math.sqrt(Math.PI * Math.sqrt(-x));
      expect(Math.abs(airyAi(x)), `Ai(${x})`).toBeLessThanOrEqual(allowed);
    }
    for (const x of zerosOfAiPrime) {
      const allowed = Math.abs(x * airyAi(x)) * halfUnit(x) + 6e-16 * Math.sqrt(Math.sqrt(-x) / Math.PI);
      expect(Math.abs(airyAiPrime(x)), `Ai'(${x})`).toBeLessThanOrEqual(allowed);
    }
  });
});

describe("series coefficients", () => {
  it("u_k, v_k: DLMF 9.7.2 (from memory)", () => {
    expect(SERIES_U[1]).toBe(5 / 72);
    expect(SERIES_V[1]).toBe(-7 / 72);
    for (let k = 1; k < SERIES_U.length; k++) {
      const u = (SERIES_U[k - 1] * (6 * k - 5) * (6 * k - 3) * (6 * k - 1)) / ((2 * k - 1) * 216 * k);
      expect(Math.abs(SERIES_U[k] / u - 1)).toBeLessThan(1e-15);
      expect(Math.abs((SERIES_V[k] * (1 - 6 * k)) / ((6 * k + 1) * SERIES_U[k]) - 1)).toBeLessThan(1e-15);
    }
  });

  it("first values by hand from the recurrences: w_1 = 41/72, r_1 = 1/3, r_2 = −1/9", () => {
    expect(SERIES_W[1]).toBe(41 / 72);
    expect(SERIES_R[0]).toBe(1 / 3);
    expect(SERIES_R[1]).toBe(-1 / 9);
  });
});

describe("ends of the line", () => {
  it("passes NaN through", () => {
    const out = new Float64Array(2);
    for (const f of [airyAi, airyAiPrime, airyAiScaled, airyAiPrimeScaled]) expect(f(Number.NaN)).toBeNaN();
    airyPair(Number.NaN, out);
    expect([...out]).toEqual([Number.NaN, Number.NaN]);
    airyPairScaled(Number.NaN, out);
    expect([...out]).toEqual([Number.NaN, Number.NaN]);
  });

  it("takes the limits at ±∞ where they exist", () => {
    expect(airyAi(Number.POSITIVE_INFINITY)).toBe(0);
    expect(airyAi(Number.NEGATIVE_INFINITY)).toBe(0);
    expect(airyAiPrime(Number.POSITIVE_INFINITY)).toBe(0);
    expect(airyAiScaled(Number.POSITIVE_INFINITY)).toBe(0);
    expect(airyAiScaled(Number.NEGATIVE_INFINITY)).toBe(0);
    expect(airyAiPrimeScaled(Number.POSITIVE_INFINITY)).toBe(Number.NEGATIVE_INFINITY);
    expect(() => airyAiPrime(Number.NEGATIVE_INFINITY)).toThrow(InvalidArgumentError);
  });

  it("underflows to 0 without a sign, through subnormal numbers", () => {
    expect(airyAi(104)).toBeGreaterThan(0);
    expect(airyAi(104)).toBeLessThan(2.3e-308);
    expect(airyAiPrime(104)).toBeLessThan(0);
    for (const x of [108, 1e3, 1e100, 1e300, Number.MAX_VALUE]) {
      expect(airyAi(x)).toBe(0);
      expect(airyAiPrime(x)).toBe(0);
    }
  });

  it("scaled forms follow x^{∓1/4}/(2√π) at huge x", () => {
    for (const x of [1e20, 1e100, 1e206, 1e300, Number.MAX_VALUE]) {
      const quarter = Math.sqrt(Math.sqrt(x));
      expect(Math.abs(airyAiScaled(x) * quarter * 2 * Math.sqrt(Math.PI) - 1)).toBeLessThan(1e-15);
      expect(Math.abs((airyAiPrimeScaled(x) / quarter) * 2 * Math.sqrt(Math.PI) + 1)).toBeLessThan(1e-15);
    }
  });

  it("throws where the phase is lost, naming the argument", () => {
    for (const x of [-1.0001e10, -1e300, -Number.MAX_VALUE]) {
      for (const f of [airyAi, airyAiPrime, airyAiScaled, airyAiPrimeScaled]) {
        expect(() => f(x)).toThrow(InvalidArgumentError);
        expect(() => f(x)).toThrow(/^x: expected a number ≥ -10000000000/);
      }
      expect(() => airyPair(x, new Float64Array(2))).toThrow(InvalidArgumentError);
    }
    expect(Number.isFinite(airyAi(-1e10))).toBe(true);
  });
});

describe("pairs and arrays", () => {
  const points = Float64Array.from([...rows.map((r) => r.x), Number.NaN, Number.POSITIVE_INFINITY, 107, 1e5]);
  const ai = new Float64Array(points.length + 1).fill(7);
  const aiPrime = new Float64Array(points.length + 1).fill(7);
  const out = new Float64Array(3).fill(7);

  it("give the bits of the single functions and touch nothing else", () => {
    airyPairInto(points, ai, aiPrime, points.length);
    for (let i = 0; i < points.length; i++) {
      airyPair(points[i], out);
      expect(ai[i]).toBe(airyAi(points[i]));
      expect(aiPrime[i]).toBe(airyAiPrime(points[i]));
      expect(out[0]).toBe(ai[i]);
      expect(out[1]).toBe(aiPrime[i]);
    }
    expect([ai[points.length], aiPrime[points.length], out[2]]).toEqual([7, 7, 7]);
  });

  it("scaled: the same", () => {
    airyPairScaledInto(points, ai, aiPrime, points.length);
    for (let i = 0; i < points.length; i++) {
      airyPairScaled(points[i], out);
      expect(ai[i]).toBe(airyAiScaled(points[i]));
      expect(aiPrime[i]).toBe(airyAiPrimeScaled(points[i]));
      expect(out[0]).toBe(ai[i]);
      expect(out[1]).toBe(aiPrime[i]);
    }
    expect([ai[points.length], aiPrime[points.length], out[2]]).toEqual([7, 7, 7]);
  });

  it("may overwrite their points", () => {
    const plain = new Float64Array(points.length);
    const prime = new Float64Array(points.length);
    for (const fill of [airyPairInto, airyPairScaledInto]) {
      fill(points, plain, prime, points.length);
      const first = points.slice();
      const second = points.slice();
      fill(first, first, ai, points.length);
      fill(second, ai, second, points.length);
      expect(first).toEqual(plain);
      expect(second).toEqual(prime);
    }
  });

  it("write count entries", () => {
    const few = new Float64Array(3).fill(7);
    airyPairInto(points, few, aiPrime, 2);
    expect(few[2]).toBe(7);
    airyPairInto(points, few, aiPrime, 0);
  });

  it("refuse bad arguments", () => {
    const two = new Float64Array(2);
    const other = new Float64Array(2);
    const three = new Float64Array(3);
    expect(() => airyPair(0, new Float64Array(1))).toThrow(/^out: expected a Float64Array of length ≥ 2/);
    expect(() => airyPairScaled(0, [0, 0] as unknown as Float64Array)).toThrow(InvalidArgumentError);
    for (const fill of [airyPairInto, airyPairScaledInto]) {
      for (const count of [-1, 1.5, Number.NaN, Number.POSITIVE_INFINITY]) {
        expect(() => fill(two, other, three, count)).toThrow(/^count: /);
      }
      expect(() => fill(two, new Float64Array(3), three, 3)).toThrow(/^x: /);
      expect(() => fill(new Float64Array(3), two, three, 3)).toThrow(/^ai: /);
      expect(() => fill(new Float64Array(3), three, two, 3)).toThrow(/^aiPrime: /);
      expect(() => fill(two, other, other, 2)).toThrow(/^aiPrime: expected an array other than ai/);
      expect(() => fill(Float64Array.of(-1e11), two, other, 1)).toThrow(/^x: /);
    }
  });
});
