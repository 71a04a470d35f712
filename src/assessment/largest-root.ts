/**
 * The largest-root test: is the largest eigenvalue of a sample covariance matrix larger than white noise makes it?
 *
 * Under white Gaussian noise of variance τ², n λ₁ / τ² has, for a covariance matrix of n degrees of freedom and p
 * variables, nearly the law μ + σ X, X Tracy–Widom of β = 1 (real) or 2 (complex).
 *
 * Real, second-order constants: μ = (√(n − ½) + √(p − ½))², σ = (√(n − ½) + √(p − ½)) (1/√(n − ½) + 1/√(p − ½))^{1/3}
 * (I. M. Johnstone, Proc. ICM Madrid 2006, 307; Z. Ma, Bernoulli 18 (2012) 322); classical: n − 1 and p in their
 * places (I. M. Johnstone, Ann. Statist. 29 (2001) 295). Complex: n and p themselves, whose error already falls like
 * n^{−2/3} (N. El Karoui, Ann. Probab. 34 (2006) 2077 for the rate; these constants from memory, checked against
 * exact values: from n = 16 to 32 the error falls by 2^0.74, 2^0.72, 2^0.67 for p = n, 2n, 4n).
 */
import { requireBetween, requireInteger } from "../core/check.ts";
import { InvalidArgumentError } from "../core/errors.ts";
import type { LawProvenance } from "../laws/law.ts";
import { tracyWidom } from "../laws/tracy-widom.ts";

/** Centring and scaling of the largest root. */
export interface RootConstants {
  readonly centre: number;
  readonly scale: number;
  /** The formula used. */
  readonly formula: string;
}

const MOST_STATISTIC = 1e100; // beyond it the logarithm of the p-value nears the end of the range of a double

/** Which constants. */
export type ConstantsChoice = "second-order" | "classical";

/**
 * Centring and scaling of n λ₁/τ² for n degrees of freedom and p variables.
 *
 * @param n - Degrees of freedom, ≥ 2: observations, less one if the means were removed. The n − 1 and n − ½ of the
 *   formulas come on top of that.
 * @param p - Variables, ≥ 1.
 * @param complex - Whether the data are complex; then both choices are the same.
 * @param choice - `"second-order"` or `"classical"`.
 * @throws {@link InvalidArgumentError} unless n ≥ 2 and p ≥ 1 are integers and the others are as stated.
 */
export function rootConstants(
  n: number,
  p: number,
  complex: boolean,
  choice: ConstantsChoice,
): RootConstants {
  requireInteger("n", n, 2, 1e9);
  requireInteger("p", p, 1, 1e9);
  if (typeof complex !== "boolean") throw new InvalidArgumentError("complex", "true or false", complex);
  requireChoice("choice", choice);
  const [a, b, formula] = complex
    ? [n, p, "μ = (√n + √p)², σ = (√n + √p)(1/√n + 1/√p)^(1/3)"]
    : choice === "classical"
      ? [n - 1, p, "μ = (√(n−1) + √p)², σ = (√(n−1) + √p)(1/√(n−1) + 1/√p)^(1/3)"]
      : [n - 0.5, p - 0.5, "μ = (√(n−½) + √(p−½))², σ = (√(n−½) + √(p−½))(1/√(n−½) + 1/√(p−½))^(1/3)"];
  const sum = Math.sqrt(a) + Math.sqrt(b);
  return { centre: sum * sum, scale: sum * Math.cbrt(1 / Math.sqrt(a) + 1 / Math.sqrt(b)), formula };
}

/** What is tested. */
export interface RootTestInput {
  /** Eigenvalues of the sample covariance matrix X*X / n, non-increasing. */
  readonly eigenvalues: readonly number[];
  /** Degrees of freedom: observations, less one if the means were removed. */
  readonly n: number;
  /** Number of variables. */
  readonly p: number;
  /** Whether they come from complex data; a `CovarianceSpectrum` says so itself. */
  readonly complex?: boolean;
  /** Whether every column was scaled to unit variance; a `CovarianceSpectrum` says so itself. */
  readonly scaled?: boolean;
}

/** Options of {@link largestRootTest}. */
export interface RootTestOptions {
  /** Whether the data are complex (β = 2). Default: as `input.complex` says, else false. */
  readonly complex?: boolean;
  /** Centring and scaling. Default `"second-order"`. */
  readonly constants?: ConstantsChoice;
  /** Level at which the sequence of tests stops. Default 0.05. */
  readonly level?: number;
  /** Most components to test. Default 10. */
  readonly components?: number;
  /** Noise variance τ² where it is known; otherwise it is estimated from the eigenvalues not yet removed. */
  readonly noiseVariance?: number;
}

/** One step of the sequence. */
export interface RootTestStep {
  /** 1 for the largest. */
  readonly component: number;
  readonly eigenvalue: number;
  /** Noise variance used. */
  readonly noiseVariance: number;
  readonly centre: number;
  readonly scale: number;
  /** (n λ / τ² − μ) / σ, to be compared with the law. */
  readonly statistic: number;
  /** P(X > statistic). May underflow to 0 for statistics beyond about 60: print `logPValue` then. */
  readonly pValue: number;
  /** Numerical error of `pValue` (not the distance of the limit law from the finite one). */
  readonly pValueError: number;
  /** Natural logarithm of the p-value. */
  readonly logPValue: number;
  /** Whether the p-value is at most the level and so were all before it. */
  readonly significant: boolean;
}

/** Outcome of {@link largestRootTest}. */
export interface RootTestResult {
  readonly steps: readonly RootTestStep[];
  /** Number of leading components found significant, in sequence. */
  readonly significantCount: number;
  /** Whether every component tested was significant, so that more might be. */
  readonly exhausted: boolean;
  readonly n: number;
  readonly p: number;
  readonly complex: boolean;
  readonly level: number;
  readonly lawSymbol: "F1" | "F2";
  readonly constants: ConstantsChoice;
  readonly formula: string;
  /** Formula, source and convention of the law. */
  readonly lawProvenance: LawProvenance;
  /** min(n, p)^(−2/3): the order of the difference between the limit law and the finite one. */
  readonly finiteSizeOrder: number;
  /** What the p-values rest on, in sentences. */
  readonly assumptions: readonly string[];
}

/**
 * Tests the largest eigenvalue, then the next ones in sequence.
 *
 * Component j is compared with the largest root of n degrees of freedom and p − j + 1 variables, which is conservative
 * (Johnstone 2001, Prop. 1.2); testing stops counting at the first p-value above the level (common practice).
 *
 * @param input - Eigenvalues with n and p.
 * @param options - Field, constants, level, number of components, noise variance.
 * @throws {@link InvalidArgumentError} naming what is wrong: negative, unsorted, too many or (when the noise variance has
 *   to be estimated) too few eigenvalues, n or p out of range, a statistic beyond 1e100.
 */
export function largestRootTest(input: RootTestInput, options: RootTestOptions = {}): RootTestResult {
  if (typeof input !== "object" || input === null) {
    throw new InvalidArgumentError("input", "eigenvalues with n and p", input);
  }
  if (typeof options !== "object" || options === null) {
    throw new InvalidArgumentError("options", "an object", options);
  }
  const { eigenvalues, n, p } = input;
  const complex = fieldOf(input, options);
  const choice = requireChoice("options.constants", options.constants ?? "second-order");
  const level = requireBetween("options.level", options.level ?? 0.05, 0, 1);
  const known = options.noiseVariance;
  if (known !== undefined && !(known > 0 && Number.isFinite(known))) {
    throw new InvalidArgumentError("options.noiseVariance", "a finite number > 0", known);
  }
  requireInteger("n", n, 2, 1e9);
  requireInteger("p", p, 2, 1e9);
  checkEigenvalues(eigenvalues, Math.min(n, p), known === undefined);
  const most = Math.min(eigenvalues.length, Math.min(n, p) - 1);
  const components = Math.min(requireInteger("options.components", options.components ?? 10, 1, 1e6), most);
  const law = tracyWidom(complex ? 2 : 1);
  const steps: RootTestStep[] = [];
  let significantSoFar = true;
  for (let j = 0; j < components; j++) {
    const eigenvalue = eigenvalues[j];
    const noiseVariance = known ?? remainingMean(eigenvalues, j, p);
    if (!(noiseVariance > 0)) break; // nothing but zeros is left
    const { centre, scale } = rootConstants(n, p - j, complex, choice);
    const statistic = ((n * eigenvalue) / noiseVariance - centre) / scale;
    if (!(Math.abs(statistic) <= MOST_STATISTIC)) {
      const expected = `a statistic (n λ / τ² − μ) / σ within ±${MOST_STATISTIC}`;
      throw new InvalidArgumentError(`eigenvalues[${j}]`, expected, eigenvalue);
    }
    const tail = law.estimate("survival", statistic);
    significantSoFar = significantSoFar && tail.value <= level;
    steps.push({
      component: j + 1,
      eigenvalue,
      noiseVariance,
      centre,
      scale,
      statistic,
      pValue: tail.value,
      pValueError: tail.error,
      logPValue: law.logSurvival(statistic),
      significant: significantSoFar,
    });
  }
  const significantCount = steps.filter((step) => step.significant).length;
  return {
    steps,
    significantCount,
    exhausted: significantCount === steps.length,
    n,
    p,
    complex,
    level,
    lawSymbol: complex ? "F2" : "F1",
    constants: choice,
    formula: rootConstants(n, p, complex, choice).formula,
    finiteSizeOrder: Math.min(n, p) ** (-2 / 3),
    lawProvenance: law.provenance,
    assumptions: assumptions(input, complex, known === undefined),
  };
}

/** Whether the data are complex, by the option or by the input; they must not contradict each other. */
function fieldOf(input: RootTestInput, options: RootTestOptions): boolean {
  const complex = options.complex ?? input.complex ?? false;
  if (typeof complex !== "boolean") {
    throw new InvalidArgumentError("options.complex", "true or false", complex);
  }
  if (input.complex !== undefined && input.complex !== complex) {
    throw new InvalidArgumentError("options.complex", `${input.complex}, as the data are`, complex);
  }
  return complex;
}

function requireChoice(argument: string, choice: ConstantsChoice): ConstantsChoice {
  if (choice !== "second-order" && choice !== "classical") {
    throw new InvalidArgumentError(argument, '"second-order" or "classical"', choice);
  }
  return choice;
}

function checkEigenvalues(eigenvalues: readonly number[], most: number, complete: boolean): void {
  if (!Array.isArray(eigenvalues) || eigenvalues.length === 0) {
    throw new InvalidArgumentError("eigenvalues", "a non-empty array of numbers", eigenvalues);
  }
  for (let i = 0; i < eigenvalues.length; i++) {
    const value = eigenvalues[i];
    if (typeof value !== "number" || !Number.isFinite(value) || value < 0) {
      throw new InvalidArgumentError(`eigenvalues[${i}]`, "a finite number ≥ 0", value);
    }
    if (i > 0 && value > eigenvalues[i - 1]) {
      throw new InvalidArgumentError(
        `eigenvalues[${i}]`,
        `a number ≤ the one before it, ${eigenvalues[i - 1]} (largest first)`,
        value,
      );
    }
  }
  if (eigenvalues.length > most) {
    throw new InvalidArgumentError("eigenvalues", `at most min(n, p) = ${most} numbers`, eigenvalues);
  }
  if (complete && eigenvalues.length < most) {
    throw new InvalidArgumentError(
      "eigenvalues",
      `all min(n, p) = ${most} of them, or else options.noiseVariance (the noise variance is estimated from their sum)`,
      eigenvalues,
    );
  }
  if (!(eigenvalues[0] > 0)) throw new InvalidArgumentError("eigenvalues[0]", "a number > 0", eigenvalues[0]);
}

/** Trace of what is left over the number of variables left: the mean noise variance if it is all noise. */
function remainingMean(eigenvalues: readonly number[], removed: number, p: number): number {
  let sum = 0;
  for (let i = eigenvalues.length - 1; i >= removed; i--) sum += eigenvalues[i];
  return sum / (p - removed);
}

function assumptions({ n, p, scaled }: RootTestInput, complex: boolean, estimated: boolean): string[] {
  const order = (Math.min(n, p) ** (-2 / 3)).toPrecision(2);
  const out = [
    `Rows are independent Gaussian vectors${complex ? " (circular complex)" : ""}; the null hypothesis is white noise of one variance in all ${p} variables.`,
    `The Tracy–Widom law is the limit for large n and p; at this size it differs from the exact law by something of order min(n, p)^(−2/3) = ${order} relative to its spread.`,
    "Component j is compared with the largest root of p − j + 1 variables (conservative, common practice); the p-values are not corrected for several tests beyond stopping at the first one above the level.",
  ];
  if (estimated) {
    // Simulated, 4000 samples a size: 5 % tests of pure noise reject 0.4 % at 10 × 5, 2.1 % at 40 × 12, 3.4 % at 100 × 20.
    out.push(
      "The noise variance is the mean of the eigenvalues not yet removed, the tested one among them; that makes the tests conservative, markedly so for few variables.",
    );
  }
  if (scaled === true) {
    out.push(
      "The columns were scaled to unit variance: for correlation matrices the law, derived for covariance matrices, holds only nearly (common practice).",
    );
  } else if (scaled === undefined) {
    out.push(
      "The eigenvalues are taken to be those of a covariance matrix; for a correlation matrix the law holds only nearly (common practice).",
    );
  }
  if (Math.min(n, p) < 5) out.push("min(n, p) is below 5: the limit law is hardly usable.");
  out.push(
    "Where a decision can hurt someone, this table is not enough: the practice of a licensed professional decides.",
  );
  return out;
}
