/** `edgelaw percentiles`: a table of laws × levels. */
import type { Command } from "commander";
import { percentilesReport } from "../report/percentiles.ts";
import type { CommandIo } from "./io.ts";
import { chooseLaws, LAWS_HELP } from "./laws.ts";
import { addOutputOptions, builderOptions, deliver, type OutputMentions, outputSettings } from "./output.ts";
import { watchProgress } from "./progress.ts";
import {
  addToleranceOptions,
  namedTolerances,
  type ToleranceMentions,
  toleranceOptions,
} from "./tolerances.ts";
import { collectMentions, type Mentions, probabilityList } from "./values.ts";

interface PercentilesMentions extends OutputMentions, ToleranceMentions {
  readonly laws?: Mentions;
  readonly levels?: Mentions;
  readonly upperLevels?: Mentions;
  readonly beta4Scaling?: Mentions;
}

const DEFAULT_LEVELS = ["0.01,0.05,0.1,0.3,0.5,0.7,0.9,0.95,0.99"];

const EXAMPLES = `
Examples:
  edgelaw percentiles
  edgelaw percentiles --laws F1 --levels 0.9,0.95,0.99
  edgelaw percentiles --laws F1,F2 --upper-levels 0.05,1e-6,1e-100 --digits 14
  edgelaw percentiles --laws F4 --beta4-scaling stochastic-airy --format csv --output table.csv`;

function runPercentiles(mentions: PercentilesMentions, io: CommandIo): 0 | 2 {
  const { laws, scaling } = chooseLaws("--laws", mentions.laws ?? ["F1,F2,F4"], mentions.beta4Scaling);
  const upper = probabilityList("--upper-levels", mentions.upperLevels);
  const asked = mentions.levels ?? (upper.length > 0 ? undefined : DEFAULT_LEVELS);
  const lower = probabilityList("--levels", asked);
  const tolerances = toleranceOptions(mentions);
  const settings = outputSettings(mentions, io);
  const progress = watchProgress(io);
  try {
    const report = percentilesReport(
      laws,
      { lower, upper },
      {
        ...tolerances,
        ...builderOptions(settings),
        named: {
          command: "percentiles",
          ...(scaling === undefined ? {} : { "beta4-scaling": scaling }),
          ...namedTolerances(tolerances),
        },
        onProgress: progress.listener,
      },
    );
    progress.end();
    return deliver(report, settings, io);
  } finally {
    progress.end();
  }
}

/** Adds the command to the program; `finish` takes the exit code. */
export function addPercentilesCommand(program: Command, io: CommandIo, finish: (code: 0 | 2) => void): void {
  const command = program
    .command("percentiles")
    .summary("table of percentiles: laws x levels")
    .description(
      "Table of percentiles of the laws at the given levels. Every number is printed with its error.",
    )
    .optionsGroup("What to compute:")
    .option("--laws <list>", "laws, comma-separated: F1, F2, F4 (default: all three)", collectMentions)
    .option("--levels <list>", "probabilities p of P(X <= x) = p, each inside (0, 1)", collectMentions)
    .option(
      "--upper-levels <list>",
      "upper tail probabilities q of P(X > x) = q, down to 1e-300",
      collectMentions,
    )
    .option(
      "--beta4-scaling <name>",
      "standard, unscaled or stochastic-airy (default: standard)",
      collectMentions,
    );
  addOutputOptions(addToleranceOptions(command))
    .addHelpText("after", LAWS_HELP)
    .addHelpText("after", EXAMPLES)
    .action((mentions: PercentilesMentions) => finish(runPercentiles(mentions, io)));
}
