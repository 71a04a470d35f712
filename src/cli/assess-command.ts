/** `edgelaw assess`: data, eigenvalues or a sample in, verdict out. */
import type { Command } from "commander";
import { type ConstantsChoice, largestRootTest, type RootTestOptions } from "../assessment/largest-root.ts";
import type { NumericTable } from "../assessment/numeric-table.ts";
import { covarianceSpectrum } from "../assessment/sample-covariance.ts";
import { sampleTest } from "../assessment/sample-test.ts";
import { InvalidArgumentError } from "../core/errors.ts";
import type { ReportDocument } from "../report/document.ts";
import { eigenvalueReport } from "../report/eigenvalue-report.ts";
import { sampleReport } from "../report/sample-report.ts";
import { listOf, namingFile, readTable } from "./input.ts";
import type { CommandIo } from "./io.ts";
import { chooseLaws, LAWS_HELP } from "./laws.ts";
import {
  addOutputOptions,
  builderOptions,
  deliver,
  type OutputMentions,
  type OutputSettings,
  outputSettings,
} from "./output.ts";
import { type Progress, watchProgress } from "./progress.ts";
import {
  choiceOption,
  collectMentions,
  integerOption,
  type Mentions,
  positiveOption,
  probabilityOption,
  single,
} from "./values.ts";

interface AssessMentions extends OutputMentions {
  readonly data?: Mentions;
  readonly eigenvalues?: Mentions;
  readonly sample?: Mentions;
  readonly delimiter?: Mentions;
  readonly field?: Mentions;
  readonly keepMeans?: boolean;
  readonly unitVariance?: boolean;
  readonly degreesOfFreedom?: Mentions;
  readonly variables?: Mentions;
  readonly noiseVariance?: Mentions;
  readonly constants?: Mentions;
  readonly components?: Mentions;
  readonly level?: Mentions;
  readonly law?: Mentions;
  readonly beta4Scaling?: Mentions;
}

type Source = "data" | "eigenvalues" | "sample";

const EXAMPLES = `
Examples:
  edgelaw assess --data measurements.csv
  edgelaw assess --data snapshots.csv --components 5 --level 0.01 --output report.html
  edgelaw assess --eigenvalues roots.csv --degrees-of-freedom 10 --variables 10
  edgelaw assess --sample peaks.csv --law F2 --format markdown
  some-program | edgelaw assess --sample - --law F1
Input files are CSV in UTF-8; a first row without a number holds names. Complex cells look like 1.5-2i.
With --data rows are observations and columns are variables; more variables than observations are fine.
With --eigenvalues and --sample the file is one column or one row.`;

const CONSTANTS = ["second-order", "classical"] as const satisfies readonly ConstantsChoice[];

/** Options that make sense with one kind of input only. */
const BELONGS_TO: readonly (readonly [keyof AssessMentions, string, readonly Source[]])[] = [
  ["field", "--field", ["data", "eigenvalues"]],
  ["keepMeans", "--keep-means", ["data"]],
  ["unitVariance", "--unit-variance", ["data"]],
  ["degreesOfFreedom", "--degrees-of-freedom", ["eigenvalues"]],
  ["variables", "--variables", ["eigenvalues"]],
  ["noiseVariance", "--noise-variance", ["data", "eigenvalues"]],
  ["constants", "--constants", ["data", "eigenvalues"]],
  ["components", "--components", ["data", "eigenvalues"]],
  ["law", "--law", ["sample"]],
  ["beta4Scaling", "--beta4-scaling", ["sample"]],
];

/** Which input was given, and its file. */
function sourceOf(mentions: AssessMentions): { source: Source; option: string; path: string } {
  const given = (["data", "eigenvalues", "sample"] as const).flatMap((source) => {
    const path = single(`--${source}`, mentions[source]);
    return path === undefined ? [] : [{ source, option: `--${source}`, path }];
  });
  const [first] = given;
  if (first === undefined || given.length > 1) {
    const received = first === undefined ? "nothing" : given.map(({ option }) => option).join(" and ");
    throw new InvalidArgumentError("input", "exactly one of --data, --eigenvalues, --sample", received);
  }
  for (const [key, option, sources] of BELONGS_TO) {
    if (mentions[key] !== undefined && !sources.includes(first.source)) {
      const allowed = sources.map((source) => `--${source}`).join(" or ");
      throw new InvalidArgumentError(option, `to be used with ${allowed}`, first.option);
    }
  }
  return first;
}

function delimiterOf(mentions: AssessMentions): { delimiter?: string } {
  const [given, ...more] = mentions.delimiter ?? [];
  if (given === undefined) return {};
  const delimiter = given === "tab" ? "\t" : given;
  if (more.length > 0 || delimiter.length !== 1) {
    throw new InvalidArgumentError("--delimiter", 'one character, or "tab"', [given, ...more].join(" and "));
  }
  return { delimiter };
}

function rootOptions(mentions: AssessMentions): RootTestOptions {
  const constants = choiceOption("--constants", mentions.constants, CONSTANTS);
  const level = probabilityOption("--level", mentions.level);
  const components = integerOption("--components", mentions.components, 1, 1_000_000);
  const noiseVariance = positiveOption("--noise-variance", mentions.noiseVariance);
  return {
    ...(constants === undefined ? {} : { constants }),
    ...(level === undefined ? {} : { level }),
    ...(components === undefined ? {} : { components }),
    ...(noiseVariance === undefined ? {} : { noiseVariance }),
  };
}

/** Named options for the provenance: every one that was given. */
function named(mentions: AssessMentions): Record<string, string | boolean> {
  const skip = ["format", "output", "digits", "table", "stamp", "data", "eigenvalues", "sample"];
  const given = Object.entries(mentions).filter(([key]) => !skip.includes(key));
  const plain = (key: string): string => key.replace(/[A-Z]/g, (letter) => `-${letter.toLowerCase()}`);
  return {
    command: "assess",
    ...Object.fromEntries(
      given.map(([key, value]) => [plain(key), Array.isArray(value) ? value.join(",") : Boolean(value)]),
    ),
  };
}

/** The library speaks of its own arguments; here they are options and files. */
function translated<T>(option: string, path: string, work: () => T): T {
  try {
    return namingFile(option, path, work);
  } catch (error) {
    if (!(error instanceof InvalidArgumentError) || error.argument.startsWith("--")) throw error;
    const expected = error.expected.replace("options.noiseVariance", "--noise-variance");
    const argument =
      error.argument.startsWith("eigenvalues") || error.argument === "data"
        ? `${option} ${path}: ${error.argument}`
        : error.argument;
    throw new InvalidArgumentError(argument, expected, error.received);
  }
}

/**
 * About how long the eigenvalues of a table take, from the cost that `covarianceSpectrum` states at 10⁹ steps a
 * second (measured for orders 400 and 800); it only decides whether a bar is worth showing.
 */
function spectrumSeconds({ rows, columns, imaginary }: NumericTable): number {
  const least = Math.min(rows, columns);
  const order = imaginary === undefined ? least : 2 * least;
  return (9 * order ** 3 + (rows * columns * least) / 2) / 1e9;
}

async function assessData(
  mentions: AssessMentions,
  { option, path }: { option: string; path: string },
  settings: OutputSettings,
  io: CommandIo,
  progress: Progress,
): Promise<ReportDocument> {
  const field = choiceOption("--field", mentions.field, ["real", "complex"]);
  const options = rootOptions(mentions);
  const { table, reference } = await readTable(option, path, delimiterOf(mentions), io);
  const complex = table.imaginary !== undefined;
  if (field !== undefined && (field === "complex") !== complex) {
    const cells = complex ? "complex cells in the file" : "no complex cell (like 1.5-2i) in the file";
    throw new InvalidArgumentError(
      "--field",
      complex ? "complex" : "real",
      `${field}, but there is ${cells}`,
    );
  }
  return translated(option, path, () => {
    progress.announce(spectrumSeconds(table), 0, 2);
    const spectrum = covarianceSpectrum(table, {
      centre: mentions.keepMeans !== true,
      scaling: mentions.unitVariance === true ? "unit-variance" : "none",
    });
    progress.listener(1, 2);
    const result = largestRootTest(spectrum, { ...options, complex });
    return eigenvalueReport(result, {
      ...builderOptions(settings),
      named: named(mentions),
      inputs: [reference],
      preparation: [
        spectrum.centred
          ? "The mean of every column was removed, which costs one degree of freedom."
          : "No mean was removed: the columns are taken to have mean 0.",
        ...(spectrum.scaled
          ? ["Every column was scaled to unit variance; the law then holds only nearly (common practice)."]
          : []),
      ],
    });
  });
}

async function assessEigenvalues(
  mentions: AssessMentions,
  { option, path }: { option: string; path: string },
  settings: OutputSettings,
  io: CommandIo,
): Promise<ReportDocument> {
  const n = integerOption("--degrees-of-freedom", mentions.degreesOfFreedom, 2, 1e9);
  const p = integerOption("--variables", mentions.variables, 2, 1e9);
  if (n === undefined)
    throw new InvalidArgumentError("--degrees-of-freedom", "a number, with --eigenvalues", "nothing");
  if (p === undefined)
    throw new InvalidArgumentError("--variables", "a number, with --eigenvalues", "nothing");
  const complex = choiceOption("--field", mentions.field, ["real", "complex"]) === "complex";
  const options = rootOptions(mentions);
  const { table, reference } = await readTable(option, path, delimiterOf(mentions), io);
  const eigenvalues = Array.from(listOf(option, path, table));
  return translated(option, path, () =>
    eigenvalueReport(largestRootTest({ eigenvalues, n, p }, { ...options, complex }), {
      ...builderOptions(settings),
      named: named(mentions),
      inputs: [reference],
      eigenvaluesGiven: true,
    }),
  );
}

async function assessSample(
  mentions: AssessMentions,
  { option, path }: { option: string; path: string },
  settings: OutputSettings,
  io: CommandIo,
): Promise<ReportDocument> {
  const name = single("--law", mentions.law);
  if (name === undefined)
    throw new InvalidArgumentError("--law", "one of F1, F2, F4, with --sample", "nothing");
  const { laws } = chooseLaws("--law", [name], mentions.beta4Scaling);
  const [law, ...more] = laws;
  if (law === undefined || more.length > 0) throw new InvalidArgumentError("--law", "one law", name);
  const level = probabilityOption("--level", mentions.level);
  const { table, reference } = await readTable(option, path, delimiterOf(mentions), io);
  const sample = listOf(option, path, table);
  return translated(option, path, () =>
    sampleReport(sampleTest(sample, law), law, {
      ...builderOptions(settings),
      named: named(mentions),
      inputs: [reference],
      ...(level === undefined ? {} : { level }),
    }),
  );
}

async function runAssess(mentions: AssessMentions, io: CommandIo): Promise<0 | 2> {
  const source = sourceOf(mentions);
  const settings = outputSettings(mentions, io);
  const assess = { data: assessData, eigenvalues: assessEigenvalues, sample: assessSample }[source.source];
  const progress = watchProgress(io);
  let report: ReportDocument;
  try {
    report = await assess(mentions, source, settings, io, progress);
  } finally {
    progress.end();
  }
  return deliver(report, settings, io);
}

/** Adds the command to the program; `finish` takes the exit code. */
export function addAssessCommand(program: Command, io: CommandIo, finish: (code: 0 | 2) => void): void {
  const command = program
    .command("assess")
    .summary("data in, verdict out: leading eigenvalues, or a sample against a law")
    .description(
      "Tests data. With --data or --eigenvalues: how many leading eigenvalues of the covariance matrix stand out " +
        "from white noise, with p-values from F1 (real) or F2 (complex). With --sample: do these numbers follow a law?",
    )
    .optionsGroup("Input, exactly one (- is the standard input):")
    .option("--data <file>", "data matrix", collectMentions)
    .option("--eigenvalues <file>", "eigenvalues of a covariance matrix, largest first", collectMentions)
    .option("--sample <file>", "numbers to compare with a law", collectMentions)
    .option("--delimiter <character>", 'between cells; "tab" for tabs (default: comma)', collectMentions)
    .optionsGroup("With --data and --eigenvalues:")
    .option("--field <name>", "real or complex (default: as the cells of --data; else real)", collectMentions)
    .option("--components <count>", "most leading eigenvalues to test (default: 10)", collectMentions)
    .option(
      "--noise-variance <number>",
      "variance of the noise where it is known (default: estimated)",
      collectMentions,
    )
    .option(
      "--constants <name>",
      "centring and scaling: second-order (default) or classical, as in Johnstone 2001",
      collectMentions,
    )
    .optionsGroup("With --data:")
    .option("--keep-means", "do not remove column means: they are known to be 0")
    .option("--unit-variance", "scale every column to unit variance (correlations)")
    .optionsGroup("With --eigenvalues:")
    .option(
      "--degrees-of-freedom <n>",
      "divisor of the covariance matrix: observations, less one if means were removed",
      collectMentions,
    )
    .option("--variables <p>", "number of variables", collectMentions)
    .optionsGroup("With --sample:")
    .option("--law <name>", "F1, F2 or F4", collectMentions)
    .option(
      "--beta4-scaling <name>",
      "standard, unscaled or stochastic-airy (default: standard)",
      collectMentions,
    )
    .optionsGroup("Verdict:")
    .option("--level <probability>", "level of significance (default: 0.05)", collectMentions);
  addOutputOptions(command)
    .addHelpText("after", LAWS_HELP)
    .addHelpText("after", EXAMPLES)
    .action(async (mentions: AssessMentions) => finish(await runAssess(mentions, io)));
}
