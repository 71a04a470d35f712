/** The report of a sample against a law: distances with p-values, moments side by side, figures. */

import type { DistanceTest, SampleTestResult } from "../assessment/sample-test.ts";
import { InvalidArgumentError } from "../core/errors.ts";
import type { Law } from "../laws/law.ts";
import type { Cell, InputReference, ReportBlock, ReportDocument, TableBlock } from "./document.ts";
import { quantileFigure, sampleDensityFigure } from "./law-figures.ts";
import { formatProbability, type Measured } from "./numbers.ts";
import type { ReportOptions } from "./percentiles.ts";
import { lawReferences } from "./provenance.ts";
import { libraryVersion } from "./version.ts";

/** What the report knows beside the result. */
export interface SampleReportOptions extends ReportOptions {
  /** Data files. */
  readonly inputs?: readonly InputReference[];
  /** Level of the verdict. Default 0.05. */
  readonly level?: number;
}

const DIGITS = 6;

function pValueOf(test: DistanceTest): Measured {
  return {
    value: test.pValue,
    error: test.pValueError,
    errorKind: "estimate",
    ...(Number.isFinite(test.logPValue) ? { logValue: test.logPValue, logError: test.logPValueError } : {}),
  };
}

function verdict(result: SampleTestResult, level: number): string {
  const shown = result.distances
    .map((test) => `${test.name} p-value ${formatProbability(pValueOf(test), 3)}`)
    .join(", ");
  const below = result.distances.filter((test) => test.pValue <= level);
  if (below.length === 0) {
    return `The sample of ${result.count} agrees with ${result.lawSymbol} at level ${level}: ${shown}.`;
  }
  const which =
    below.length === result.distances.length ? "both distances" : `the ${below[0]?.name} distance`;
  return `The sample of ${result.count} departs from ${result.lawSymbol} at level ${level} by ${which}: ${shown}.`;
}

/**
 * The report of a sample against a law.
 *
 * @param result - Outcome of `sampleTest`.
 * @param law - The law that the sample was tested against.
 * @param options - Digits (default 6), figures, level, inputs.
 * @returns A report with the tables `distances` (main) and `moments`.
 * @throws InvalidArgumentError if the law is not the one of the result.
 */
export function sampleReport(
  result: SampleTestResult,
  law: Law,
  options: SampleReportOptions = {},
): ReportDocument {
  if (law.symbol !== result.lawSymbol) throw new InvalidArgumentError("law", result.lawSymbol, law.symbol);
  const digits = options.digits ?? DIGITS;
  const distances: TableBlock = {
    kind: "table",
    id: "distances",
    caption: `Distance of the sample from ${law.symbol}`,
    columns: [
      { key: "distance", title: "distance", kind: "text" },
      { key: "statistic", title: "statistic", kind: "plain", law: law.symbol },
      { key: "p_value", title: "p-value", kind: "probability", law: law.symbol },
    ],
    rows: result.distances.map((test): Cell[] => [test.name, test.statistic, pValueOf(test)]),
    digits,
  };
  const moments: TableBlock = {
    kind: "table",
    id: "moments",
    caption: `Moments of the sample beside those of ${law.symbol}`,
    columns: [
      { key: "moment", title: "moment", kind: "text" },
      { key: "sample", title: "sample", kind: "plain" },
      { key: "law", title: "law", kind: "plain", law: law.symbol },
      { key: "standard_error", title: "standard error", kind: "plain", law: law.symbol },
      { key: "z", title: "difference / standard error", kind: "plain", law: law.symbol },
    ],
    rows: result.moments.map((row): Cell[] => [row.name, row.sample, row.law, row.standardError, row.z]),
    digits,
  };
  const blocks: ReportBlock[] = [
    { kind: "paragraph", answer: true, text: verdict(result, options.level ?? 0.05) },
    distances,
    moments,
    { kind: "heading", text: "What this rests on" },
    ...result.assumptions.map((text): ReportBlock => ({ kind: "note", text })),
  ];
  if (options.figures !== false) {
    blocks.push({ kind: "heading", text: "Figures" });
    blocks.push(sampleDensityFigure(law, result.sorted), quantileFigure(law, result.sorted));
  }
  return {
    title: `A sample against ${law.name}`,
    blocks,
    mainTable: "distances",
    provenance: {
      version: libraryVersion,
      laws: lawReferences([law]),
      methods: [
        "Kolmogorov–Smirnov and Anderson–Darling distances to a fully specified law; moments with the standard errors of a sample of this size from the law",
      ],
      options: options.named ?? {},
      inputs: options.inputs ?? [],
      ...(options.date === undefined ? {} : { date: options.date }),
    },
  };
}
