/**
 * Many digits beside mpmath (where python3 has it) and decimal.js: F2(−2) by structured elimination, the same points.
 */
import { spawnSync } from "node:child_process";
import Decimal from "decimal.js";
import { airyPairFixed } from "../src/precision/airy-fixed.ts";
import { preciseAiryKernel } from "../src/precision/airy-kernels.ts";
import { fixedFromExact, readExact } from "../src/precision/decimal.ts";
import { eliminatePair } from "../src/precision/elimination-pair.ts";
import { numberFromFixed } from "../src/precision/fixed-point.ts";
import { preciseGaussLegendre } from "../src/precision/gauss-rules.ts";
import { preciseAiryAi, preciseAiryAiPrime } from "../src/precision/precise-airy.ts";
import { preciseDeterminant } from "../src/precision/precise-determinant.ts";
import { preciseHalfLine } from "../src/precision/precise-kernel.ts";
import { discretize } from "../src/precision/precise-scene.ts";
import { ratio, showTime, time } from "./timing.ts";

// Points that give F2(−2) to that many digits on (−2, −2 + length).
const CASES = [
  { digits: 50, order: 76, length: 22 },
  { digits: 100, order: 144, length: 34 },
] as const;

interface MpmathRow {
  readonly samples: number;
  readonly elimination: number;
  readonly value: string;
}

/** decimal.js: the elimination alone, samples given. */
function decimalElimination(
  digits: number,
  length: number,
  nodes: readonly string[],
  weights: readonly string[],
): () => string {
  Decimal.set({ precision: digits + 10 });
  const half = new Decimal(length).div(2);
  const points = nodes.map((t) => new Decimal(-2).plus(half.times(new Decimal(t).plus(1))));
  const w = weights.map((t) => half.times(t));
  const value = points.map((t) => new Decimal(preciseAiryAi(t.toString(), { digits: digits + 10 }).value));
  const slope = points.map(
    (t) => new Decimal(preciseAiryAiPrime(t.toString(), { digits: digits + 10 }).value),
  );
  return () => {
    const a = value.slice();
    const b = slope.slice();
    const e = points.map((t, i) => b[i].times(b[i]).minus(t.times(a[i]).times(a[i])));
    let det = new Decimal(1);
    for (let q = 0; q < points.length; q++) {
      const m = new Decimal(1).minus(w[q].times(e[q]));
      det = det.times(m);
      const f = w[q].div(m);
      const [sa, sb] = [a[q].times(f), b[q].times(f)];
      for (let i = q + 1; i < points.length; i++) {
        const v = a[i].times(b[q]).minus(b[i].times(a[q])).div(points[i].minus(points[q]));
        a[i] = a[i].plus(v.times(sa));
        b[i] = b[i].plus(v.times(sb));
        e[i] = e[i].plus(v.times(v).times(f));
      }
    }
    return det.toString();
  };
}

/** The same in fixed point. */
function fixedElimination(
  digits: number,
  length: number,
  nodes: readonly string[],
  weights: readonly string[],
): () => number {
  const bits = BigInt(Math.ceil((digits + 10) * Math.log2(10)));
  const from = (text: string): bigint => fixedFromExact(readExact("text", text), bits);
  const half = BigInt(length / 2);
  const x = nodes.map((t) => half * from(t) + (BigInt(length / 2 - 2) << bits));
  const weight = weights.map((t) => half * from(t));
  const pairs = x.map((t) => airyPairFixed(t, bits));
  return () => {
    const a = pairs.map((p) => p[0]);
    const b = pairs.map((p) => p[1]);
    const diagonal = x.map((t, i) => (b[i] * b[i] - ((t * a[i]) >> bits) * a[i]) >> bits);
    const found = eliminatePair({ x: x.slice(), weight: weight.slice(), a, b, diagonal }, true, bits);
    return found ? numberFromFixed(found.value, found.scale) : Number.NaN;
  };
}

/** Rows: digits, points, ours whole and at one order, mpmath, decimal.js, ratios. */
export function precisionRows(): string[][] {
  const rules = CASES.map(({ digits, order, length }) => ({
    digits,
    length,
    ...preciseGaussLegendre(order, { digits: digits + 12 }),
  }));
  const run = spawnSync("python3", ["bench/peer-mpmath.py"], {
    encoding: "utf8",
    input: JSON.stringify(rules),
  });
  const reply = run.status === 0 && run.stdout ? JSON.parse(run.stdout) : undefined;
  const peers: readonly MpmathRow[] | undefined = reply?.rows;
  const kernel = preciseAiryKernel();
  const domain = preciseHalfLine(-2);
  const scene = {
    kernel,
    domain,
    z: { numerator: 1n, twos: 0, tens: 0 },
    derivatives: 0,
    end: "lower",
  } as const;
  return CASES.map(({ digits, order, length }, k) => {
    const from = process.hrtime.bigint();
    const found = preciseDeterminant(kernel, domain, { digits });
    const first = Number(process.hrtime.bigint() - from) / 1e9;
    const whole = time(() => preciseDeterminant(kernel, domain, { digits }), 0.2, 5).median;
    const bits = BigInt(Math.ceil((digits + 10) * Math.log2(10)) + 56);
    const single = time(() => discretize(scene, order, bits), 0.2, 5).median;
    const { nodes, weights } = rules[k];
    const own = fixedElimination(digits, length, nodes, weights);
    if (Math.abs(own() - Number(found.value)) > 1e-15) throw new Error(`elimination gives ${own()}`);
    const ownTime = time(own, 0.1, 5).median;
    const elimination = decimalElimination(digits, length, nodes, weights);
    const theirs = time(elimination, 0.1, 3).median;
    const agreed = elimination().slice(0, digits) === found.value.slice(0, digits);
    const mpmath = peers ? peers[k].samples + peers[k].elimination : undefined;
    const mpmathAgrees =
      peers === undefined || peers[k].value.slice(0, digits - 1) === found.value.slice(0, digits - 1);
    if (!agreed || !mpmathAgrees) throw new Error(`the peers disagree: ${found.value}`);
    return [
      String(digits),
      showTime(first),
      showTime(whole),
      `${order}: ${showTime(single)}`,
      mpmath === undefined ? "—" : showTime(mpmath),
      ratio(mpmath, single),
      showTime(ownTime),
      showTime(theirs),
      ratio(theirs, ownTime),
    ];
  });
}
