/** Identities between the functions, at arguments drawn at random; every tolerance is the sum of the stated errors. */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  type PreciseEstimate,
  type PreciseInput,
  preciseAiryAi,
  preciseAiryAiIntegral,
  preciseAiryAiPrime,
  preciseBesselI,
  preciseBesselJ,
  preciseBesselJPrime,
  preciseCosine,
  preciseExp,
  preciseGamma,
  preciseLog,
  preciseLogGamma,
  precisePi,
  precisePower,
  preciseSine,
  preciseSquareRoot,
} from "../../src/precision/index.ts";
import { atMost, distance, type ExactDecimal, parse } from "./decimals.ts";

const SEED = { seed: 20261201, numRuns: 60 };
const DIGITS = 60;
const options = { digits: DIGITS };

/** Exact decimal numbers with their bounds: sums and products without rounding. */
interface Bounded {
  readonly value: ExactDecimal;
  readonly error: ExactDecimal;
}
const at = (a: ExactDecimal, scale: number): bigint => a.mantissa * 10n ** BigInt(scale - a.scale);
const sum = (a: ExactDecimal, b: ExactDecimal): ExactDecimal => {
  const scale = Math.max(a.scale, b.scale);
  return { mantissa: at(a, scale) + at(b, scale), scale };
};
const times = (a: ExactDecimal, b: ExactDecimal): ExactDecimal => ({
  mantissa: a.mantissa * b.mantissa,
  scale: a.scale + b.scale,
});
const size = (a: ExactDecimal): ExactDecimal => ({
  mantissa: a.mantissa < 0n ? -a.mantissa : a.mantissa,
  scale: a.scale,
});
const bounded = (e: PreciseEstimate): Bounded => ({ value: parse(e.value), error: parse(e.error) });
const exact = (text: string): Bounded => ({ value: parse(text), error: { mantissa: 0n, scale: 0 } });
const plus = (a: Bounded, b: Bounded): Bounded => ({
  value: sum(a.value, b.value),
  error: sum(a.error, b.error),
});
const minus = (a: Bounded, b: Bounded): Bounded => plus(a, product(exact("-1"), b));
function product(a: Bounded, b: Bounded): Bounded {
  const error = sum(
    sum(times(size(a.value), b.error), times(size(b.value), a.error)),
    times(a.error, b.error),
  );
  return { value: times(a.value, b.value), error };
}
function expectEqual(a: Bounded, b: Bounded): void {
  const difference = distance(a.value, b.value);
  expect(atMost(difference, sum(a.error, b.error)), `${difference.mantissa}e-${difference.scale}`).toBe(true);
}

/** Decimal strings with 12 places, from low to high. */
function decimal(low: number, high: number): fc.Arbitrary<string> {
  const places = 10 ** 12;
  return fc.bigInt({ min: BigInt(low * places), max: BigInt(high * places) }).map((n) => {
    const digits = (n < 0n ? -n : n).toString().padStart(13, "0");
    return `${n < 0n ? "-" : ""}${digits.slice(0, -12)}.${digits.slice(-12)}`;
  });
}

function check(property: (x: string, y: string) => void, x: fc.Arbitrary<string>, y = decimal(0, 1)): void {
  fc.assert(fc.property(x, y, property), SEED);
}

describe("elementary functions", () => {
  it("e^{log x} = x", () => {
    check(
      (x) => {
        const log = preciseLog(x, options);
        const back = bounded(preciseExp(log.value, options));
        // e^{log x + δ} = x (1 + δ …): |δ| ≤ the error of the logarithm.
        const moved = times(times(parse(log.error), parse(x)), parse("1.0001"));
        expectEqual({ ...back, error: sum(back.error, moved) }, exact(x));
      },
      decimal(0.001, 900),
    );
  });

  it("sin² + cos² = 1, and the addition theorem", () => {
    check(
      (x, y) => {
        const [s, c] = [bounded(preciseSine(x, options)), bounded(preciseCosine(x, options))];
        const [t, d] = [bounded(preciseSine(y, options)), bounded(preciseCosine(y, options))];
        expectEqual(plus(product(s, s), product(c, c)), exact("1"));
        const total = sum(parse(x), parse(y));
        const sine = bounded(preciseSine(`${total.mantissa}e${-total.scale}`, options));
        expectEqual(sine, plus(product(s, d), product(c, t)));
      },
      decimal(-200, 200),
      decimal(-3, 3),
    );
  });

  it("√x √x = x = x^½ x^½, and x^{y} x^{−y} = 1", () => {
    check(
      (x, y) => {
        const root = bounded(preciseSquareRoot(x, options));
        expectEqual(product(root, root), exact(x));
        expectEqual(bounded(precisePower(x, "0.5", options)), root);
        const inverse = y.startsWith("-") ? y.slice(1) : `-${y}`;
        expectEqual(
          product(bounded(precisePower(x, y, options)), bounded(precisePower(x, inverse, options))),
          exact("1"),
        );
      },
      decimal(0.01, 500),
      decimal(-30, 30),
    );
  });
});

describe("gamma function", () => {
  it("Γ(x + 1) = x Γ(x), and log Γ is its logarithm", () => {
    check(
      (x) => {
        if (/\.0*$/.test(x)) return; // a pole, or a whole number
        const more = sum(parse(x), parse("1"));
        const [gamma, next] = [
          preciseGamma(x, options),
          preciseGamma(`${more.mantissa}e${-more.scale}`, options),
        ];
        expectEqual(bounded(next), product(exact(x), bounded(gamma)));
        const positive = gamma.value.replace(/^-/, "");
        const log = preciseLogGamma(x, options);
        const direct = bounded(preciseLog(positive, options));
        // The relative error of Γ is at most 10^−60.
        expectEqual(bounded(log), { ...direct, error: sum(direct.error, parse("1.1e-60")) });
      },
      decimal(-40.0001, 60),
    );
  });

  it("Γ(x) Γ(1 − x) sin πx = π", () => {
    check(
      (x) => {
        const other = sum(parse("1"), times(parse("-1"), parse(x)));
        const angle = times(parse(x), parse(precisePi({ digits: 90 }).value));
        const left = product(
          product(
            bounded(preciseGamma(x, options)),
            bounded(preciseGamma(`${other.mantissa}e${-other.scale}`, options)),
          ),
          bounded(preciseSine(`${angle.mantissa}e${-angle.scale}`, options)),
        );
        const right = bounded(precisePi(options));
        expectEqual(left, { ...right, error: sum(right.error, parse("1e-75")) });
      },
      decimal(-20.0001, -0.0001),
    );
  });
});

describe("Airy functions", () => {
  it("Ai(x + h), Ai′(x + h) follow from Ai(x), Ai′(x) by the Taylor series of w″ = x w; so does the integral", () => {
    check(
      (x, h) => {
        // Coefficients to 130 places from 90 significant digits; |a_k| is about |x|^{k/2}/k!, so that for |h| ≤ 1/16 and
        // |x| ≤ 45 those left out are below 10^−85.
        const scale = 130;
        const unit = 10n ** BigInt(scale);
        const fixed = (text: string): bigint => {
          const exactly = parse(text);
          return exactly.scale <= scale
            ? at(exactly, scale)
            : exactly.mantissa / 10n ** BigInt(exactly.scale - scale);
        };
        const [position, step] = [fixed(x), fixed(h) / 16n];
        const a = [
          fixed(preciseAiryAi(x, { digits: 90 }).value),
          fixed(preciseAiryAiPrime(x, { digits: 90 }).value),
        ];
        for (let k = 0; k < 50; k++) {
          a.push(((position * a[k]) / unit + (k === 0 ? 0n : a[k - 1])) / BigInt((k + 1) * (k + 2)));
        }
        let [value, slope, integral, power] = [0n, 0n, 0n, unit];
        a.forEach((c, k) => {
          value += (c * power) / unit;
          if (k + 1 < a.length) slope += (a[k + 1] * BigInt(k + 1) * power) / unit;
          power = (power * step) / unit;
          integral += (c * power) / unit / BigInt(k + 1);
        });
        const there = `${position + step}e-${scale}`;
        const close = (v: bigint): Bounded => ({ value: { mantissa: v, scale }, error: parse("1e-85") });
        expectEqual(bounded(preciseAiryAi(there, options)), close(value));
        expectEqual(bounded(preciseAiryAiPrime(there, options)), close(slope));
        const difference = minus(
          bounded(preciseAiryAiIntegral(x, options)),
          bounded(preciseAiryAiIntegral(there, options)),
        );
        expectEqual(difference, close(integral));
      },
      decimal(-45, 20),
      decimal(-1, 1),
    );
  });

  it("series and asymptotic expansion agree where both serve: the values to 20 and to 120 digits", () => {
    check(
      (x) => {
        for (const f of [preciseAiryAi, preciseAiryAiPrime, preciseAiryAiIntegral]) {
          expectEqual(bounded(f(x, { digits: 20 })), bounded(f(x, { digits: 120 })));
        }
      },
      decimal(-60, 60),
    );
  });
});

describe("Bessel functions", () => {
  const next = (order: string, more: string): PreciseInput => {
    const total = sum(parse(order), parse(more));
    return `${total.mantissa}e${-total.scale}`;
  };

  it("x (J_{ν−1} + J_{ν+1}) = 2ν J_ν and 2 J_ν′ = J_{ν−1} − J_{ν+1}", () => {
    check(
      (order, x) => {
        const before = bounded(preciseBesselJ(next(order, "-1"), x, options));
        const after = bounded(preciseBesselJ(next(order, "1"), x, options));
        const value = bounded(preciseBesselJ(order, x, options));
        expectEqual(
          product(exact(x), plus(before, after)),
          product(product(exact("2"), exact(order)), value),
        );
        expectEqual(
          product(exact("2"), bounded(preciseBesselJPrime(order, x, options))),
          minus(before, after),
        );
      },
      decimal(0.0001, 60),
      decimal(0.001, 150),
    );
  });

  it("x (I_{ν−1} − I_{ν+1}) = 2ν I_ν", () => {
    check(
      (order, x) => {
        const before = bounded(preciseBesselI(next(order, "-1"), x, options));
        const after = bounded(preciseBesselI(next(order, "1"), x, options));
        const value = bounded(preciseBesselI(order, x, options));
        expectEqual(
          product(exact(x), minus(before, after)),
          product(product(exact("2"), exact(order)), value),
        );
      },
      decimal(0.0001, 60),
      decimal(0.001, 150),
    );
  });

  it("J_{ν+1} J_{−ν} + J_ν J_{−ν−1} = −2 sin(νπ)/(πx), orders kept above −1 by the recurrence", () => {
    // With J_{−ν−1} = −(2ν/x) J_{−ν} − J_{1−ν} (DLMF 10.5.5, 10.6.1), multiplied by πx.
    check(
      (order, x) => {
        const minusOrder = `-${order}`;
        const [nu, z] = [exact(order), exact(x)];
        const a = bounded(preciseBesselJ(order, x, options));
        const b = bounded(preciseBesselJ(next(order, "1"), x, options));
        const c = bounded(preciseBesselJ(minusOrder, x, options));
        const d = bounded(preciseBesselJ(next(minusOrder, "1"), x, options));
        const pi = bounded(precisePi(options));
        const low = minus(product(product(exact("-2"), nu), c), product(z, d));
        const left = product(pi, plus(product(z, product(b, c)), product(a, low)));
        const angle = times(parse(order), parse(precisePi({ digits: 90 }).value));
        const sine = bounded(preciseSine(`${angle.mantissa}e${-angle.scale}`, options));
        const right = product(exact("-2"), sine);
        expectEqual(left, { ...right, error: sum(right.error, parse("1e-75")) });
      },
      decimal(0.001, 0.999),
      decimal(0.01, 120),
    );
  });

  it("I_ν and J_ν of half orders: √(2/(πx)) sinh x, sin x (DLMF 10.39.1, 10.16.1)", () => {
    check(
      (x) => {
        const [j, i] = [bounded(preciseBesselJ(0.5, x, options)), bounded(preciseBesselI("0.5", x, options))];
        const pi = bounded(precisePi(options));
        const square = (a: Bounded): Bounded => product(a, a);
        const sine = bounded(preciseSine(x, options));
        const grow = bounded(preciseExp(x, options));
        const fall = bounded(preciseExp(`-${x}`, options));
        expectEqual(product(product(pi, exact(x)), square(j)), product(exact("2"), square(sine)));
        expectEqual(
          product(product(product(exact("2"), pi), exact(x)), square(i)),
          square(minus(grow, fall)),
        );
      },
      decimal(0.01, 150),
    );
  });
});
