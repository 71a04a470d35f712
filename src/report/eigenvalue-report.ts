/**
 * The report of a largest-root test: which leading components stand out from noise, with table and figures.
 *
 * The error beside a p-value is numerical and complete: that of the tail probability, plus what the rounding of
 * the eigenvalue and of the statistic does to it, d log p = (density / tail) d statistic. The distance of the limit
 * law from the finite one is not a rounding and stands among the assumptions.
 */
import type { RootTestResult, RootTestStep } from "../assessment/largest-root.ts";
import type { Law } from "../laws/law.ts";
import { tracyWidom } from "../laws/tracy-widom.ts";
import type { Cell, InputReference, ReportBlock, ReportDocument, TableBlock } from "./document.ts";
import { densityFigure, tailFigure } from "./law-figures.ts";
import { formatProbability, type Measured } from "./numbers.ts";
import type { ReportOptions } from "./percentiles.ts";
import { lawReferences } from "./provenance.ts";
import { libraryVersion } from "./version.ts";

/** What the report knows beside the result. */
export interface EigenvalueReportOptions extends ReportOptions {
  /** Data files. */
  readonly inputs?: readonly InputReference[];
  /** True when the eigenvalues were given, false when they were computed from data and so are rounded. */
  readonly eigenvaluesGiven?: boolean;
  /** Further sentences on how the data were prepared. */
  readonly preparation?: readonly string[];
}

const ULP = 2 ** -52;
const DIGITS = 6;

/**
 * Relative rounding error of eigenvalues of a Gram matrix against the largest of them: inner products of length
 * max(n, p), then a backward stable eigenvalue routine of order min(n, p). An estimate with room, not a bound.
 */
function eigenvalueError(result: RootTestResult, given: boolean): number {
  if (given) return 0;
  const largest = result.steps[0]?.eigenvalue ?? 0;
  return (Math.max(result.n, result.p) + 10 * Math.min(result.n, result.p)) * ULP * largest;
}

function statisticError(step: RootTestStep, n: number, eigenvalue: number): number {
  const scaled = (n * step.eigenvalue) / step.noiseVariance;
  const relative = step.eigenvalue > 0 ? eigenvalue / step.eigenvalue : 0;
  // The noise variance is a mean of the same eigenvalues; its relative error is no larger than theirs.
  return (scaled * (2 * relative + 8 * ULP) + 8 * ULP * step.centre) / step.scale;
}

function pValueCell(law: Law, step: RootTestStep, shift: number): Measured & { readonly law: string } {
  const slope = Math.exp(law.logPdf(step.statistic) - law.logSurvival(step.statistic));
  const relative = slope * shift;
  const logError =
    law.accuracy.survivalRelative +
    4 * ULP * Math.abs(step.logPValue) +
    (Number.isFinite(relative) ? relative : 0);
  return {
    value: step.pValue,
    error: step.pValueError + step.pValue * (Number.isFinite(relative) ? relative : 1),
    errorKind: "estimate",
    logValue: step.logPValue,
    logError,
    law: law.symbol,
  };
}

function verdict(result: RootTestResult, first: string): string {
  const { significantCount: count, steps, level } = result;
  const tested = steps.length === 1 ? "the largest root" : `${steps.length} leading roots tested in sequence`;
  if (count === 0) {
    return `No component stands out from white noise at level ${level} (${tested}; p-value of the largest root ${first}).`;
  }
  const more = result.exhausted ? " All of them did: there may be more; test more components." : "";
  const what = count === 1 ? "1 component stands" : `${count} components stand`;
  return `${what} out from white noise at level ${level} (${tested}; p-value of the largest root ${first}).${more}`;
}

/**
 * The report of a largest-root test.
 *
 * @param result - Outcome of `largestRootTest`.
 * @param options - Digits (default 6), figures, inputs, preparation.
 * @returns A report whose main table is `roots`.
 */
export function eigenvalueReport(
  result: RootTestResult,
  options: EigenvalueReportOptions = {},
): ReportDocument {
  const law = tracyWidom(result.complex ? 2 : 1);
  const error = eigenvalueError(result, options.eigenvaluesGiven === true);
  const shifts = result.steps.map((step) => statisticError(step, result.n, error));
  const pValues = result.steps.map((step, i) => pValueCell(law, step, shifts[i] as number));
  const digits = options.digits ?? DIGITS;
  const table: TableBlock = {
    kind: "table",
    id: "roots",
    caption: "Leading roots against the law of the largest root of noise",
    columns: [
      { key: "component", title: "root", kind: "integer" },
      { key: "eigenvalue", title: "eigenvalue", kind: "measured" },
      { key: "noise_variance", title: "noise variance", kind: "plain" },
      { key: "statistic", title: "statistic", kind: "measured", law: law.symbol },
      { key: "p_value", title: "p-value", kind: "probability", law: law.symbol },
      { key: "significant", title: "stands out", kind: "text" },
    ],
    rows: result.steps.map((step, i): Cell[] => [
      step.component,
      { value: step.eigenvalue, error },
      step.noiseVariance,
      { value: step.statistic, error: shifts[i], law: law.symbol },
      pValues[i] as Measured,
      step.significant ? "yes" : "no",
    ]),
    digits,
  };
  const first = pValues[0];
  // Those that stand out and the first that does not have their names drawn; the rest crowd in the bulk.
  const observed = result.steps.map((step) => ({
    x: step.statistic,
    label: `root ${step.component}`,
    quiet: step.component > result.significantCount + 1,
  }));
  const blocks: ReportBlock[] = [
    {
      kind: "paragraph",
      answer: true,
      text: verdict(result, first === undefined ? "unknown" : formatProbability(first, 3)),
    },
    {
      kind: "paragraph",
      text: `${result.n} degrees of freedom, ${result.p} ${result.complex ? "complex" : "real"} variables. The statistic is (n·eigenvalue/noise variance − μ)/σ and has nearly the law ${law.symbol} when there is nothing but noise.`,
    },
    table,
    { kind: "heading", text: "What this rests on" },
    ...[...result.assumptions, ...(options.preparation ?? [])].map(
      (text): ReportBlock => ({ kind: "note", text }),
    ),
  ];
  if (options.figures !== false) {
    blocks.push({ kind: "heading", text: "Figures" });
    blocks.push(densityFigure(law, observed), tailFigure(law, observed, result.level));
  }
  return {
    title: "Largest-root test",
    blocks,
    mainTable: "roots",
    provenance: {
      version: libraryVersion,
      laws: lawReferences([law]),
      methods: [`centring and scaling, ${result.constants} constants: ${result.formula}`],
      options: options.named ?? {},
      inputs: options.inputs ?? [],
      ...(options.date === undefined ? {} : { date: options.date }),
    },
  };
}
