/**
 * The invented data of the demo: an array of 24 sensors listens for a few weak sources in noise.
 *
 * The truth is known because it is put in here: {@link DEMO_TRUTH}. The same seed gives the same bytes; the test
 * of the demo makes the files again and compares. `node docs/demo/generate.mjs` writes them.
 *
 * A source at angle θ reaches sensor j with phase π j sin θ (half a wavelength between neighbours). A snapshot
 * is the sum over sources of strength × random signal × unit steering vector, plus unit white noise. In complex
 * snapshots the phase is kept; in real ones only its cosine. A source of strength a raises one eigenvalue of
 * the covariance matrix from 1 to 1 + a².
 */
import { seededGenerator, type UniformGenerator } from "../../src/core/random.ts";

/** What was put into the data. */
export const DEMO_TRUTH = {
  sensors: 24,
  snapshots: 180,
  /** Sources in the two array files. */
  sources: 3,
  /** Sources in the file with noise only. */
  sourcesInNoise: 0,
  /** Limit law of the peak readings, which are largest eigenvalues of finite matrices. */
  peakLaw: "F2",
  peaks: 300,
} as const;

const SEED = 20261201;
/** Angle from broadside in degrees, and the square of the strength. */
const SOURCES = [
  { angle: -34, power: 2.8 },
  { angle: 8, power: 1.7 },
  { angle: 41, power: 1.1 },
] as const;
/** Size of the Hermitian matrices whose largest eigenvalues are the peak readings. */
const PEAK_SIZE = 200;

/** Standard normal numbers by Box and Muller, both of each pair used. */
function normalGenerator(uniform: UniformGenerator): () => number {
  let spare: number | undefined;
  return () => {
    if (spare !== undefined) {
      const kept = spare;
      spare = undefined;
      return kept;
    }
    const radius = Math.sqrt(-2 * Math.log(uniform()));
    const angle = 2 * Math.PI * uniform();
    spare = radius * Math.sin(angle);
    return radius * Math.cos(angle);
  };
}

/** Real and imaginary part of the unit steering vector of a source. */
function steering(angle: number, real: boolean): { re: number[]; im: number[] } {
  const phase = Math.PI * Math.sin((angle * Math.PI) / 180);
  const re = Array.from({ length: DEMO_TRUTH.sensors }, (_, j) => Math.cos(phase * j));
  const im = Array.from({ length: DEMO_TRUTH.sensors }, (_, j) => (real ? 0 : Math.sin(phase * j)));
  const norm = Math.hypot(...re, ...im);
  return { re: re.map((x) => x / norm), im: im.map((x) => x / norm) };
}

/** Snapshots as rows of [re, im] a sensor; signals and noise have unit variance in total. */
function snapshots(
  seed: number,
  sources: readonly { angle: number; power: number }[],
  real: boolean,
): [number, number][][] {
  const normal = normalGenerator(seededGenerator(seed));
  const part = real ? 1 : Math.SQRT1_2;
  const directions = sources.map(({ angle }) => steering(angle, real));
  return Array.from({ length: DEMO_TRUTH.snapshots }, () => {
    const signals = sources.map(({ power }) => {
      const strength = Math.sqrt(power) * part;
      return { re: strength * normal(), im: real ? 0 : strength * normal() };
    });
    return Array.from({ length: DEMO_TRUTH.sensors }, (_, j): [number, number] => {
      let re = part * normal();
      let im = real ? 0 : part * normal();
      directions.forEach((direction, k) => {
        const signal = signals[k] as { re: number; im: number };
        const vre = direction.re[j] as number;
        const vim = direction.im[j] as number;
        re += signal.re * vre - signal.im * vim;
        im += signal.re * vim + signal.im * vre;
      });
      return [re, im];
    });
  });
}

/**
 * Largest eigenvalue of a Gaussian Hermitian matrix, on the scale of F2, from the tridiagonal model of
 * I. Dumitriu and A. Edelman (J. Math. Phys. 43 (2002) 5830) by bisection on the Sturm sequence.
 */
function peak(size: number, normal: () => number): number {
  // Weight exp(−x²): diagonal N(0, 1/2), squared off-diagonal Gamma(k) as a sum of k exponentials.
  const diagonal = Array.from({ length: size }, () => normal() * Math.SQRT1_2);
  const squares = Array.from({ length: size - 1 }, (_, i) => {
    let sum = 0;
    for (let k = 0; k < 2 * (size - 1 - i); k++) sum += normal() ** 2;
    return sum / 4;
  });
  const allBelow = (x: number): boolean => {
    let pivot = x - (diagonal[0] as number);
    for (let i = 1; i < size; i++) {
      if (pivot <= 0) return false;
      pivot = x - (diagonal[i] as number) - (squares[i - 1] as number) / pivot;
    }
    return pivot > 0;
  };
  const edge = Math.sqrt(2 * size);
  let low = 0;
  let high = 2 * edge;
  for (let step = 0; step < 60; step++) {
    const middle = (low + high) / 2;
    if (allBelow(middle)) high = middle;
    else low = middle;
  }
  return (high - edge) * Math.SQRT2 * size ** (1 / 6);
}

function csv(header: readonly string[], rows: readonly (readonly string[])[]): string {
  return `${[header, ...rows].map((row) => row.join(",")).join("\n")}\n`;
}

function sensorNames(): string[] {
  return Array.from({ length: DEMO_TRUTH.sensors }, (_, j) => `sensor_${String(j + 1).padStart(2, "0")}`);
}

/** A complex number as the CSV reader takes it: `0.123-1.456i`. */
function complexCell([re, im]: readonly [number, number]): string {
  const imaginary = im.toFixed(3);
  return `${re.toFixed(3)}${imaginary.startsWith("-") ? "" : "+"}${imaginary}i`;
}

/**
 * The demo's files.
 *
 * @returns File names with their text.
 */
export function demoFiles(): Record<string, string> {
  const real = (seed: number, sources: typeof SOURCES | readonly []): string =>
    csv(
      sensorNames(),
      snapshots(seed, sources, true).map((row) => row.map(([re]) => re.toFixed(3))),
    );
  const normal = normalGenerator(seededGenerator(SEED + 3));
  const peaks = Array.from({ length: DEMO_TRUTH.peaks }, () => [peak(PEAK_SIZE, normal).toFixed(4)]);
  return {
    "array-real.csv": real(SEED, SOURCES),
    "array-complex.csv": csv(
      sensorNames(),
      snapshots(SEED + 2, SOURCES, false).map((row) => row.map(complexCell)),
    ),
    "noise-only.csv": real(SEED + 1, []),
    "peaks.csv": csv(["peak"], peaks),
  };
}
