/** `edgelaw evaluate`: quantities of laws at given points. */
import type { Command } from "commander";
import { InvalidArgumentError } from "../core/errors.ts";
import type { LawQuantity } from "../laws/law.ts";
import { type EvaluationRequest, evaluationReport } from "../report/evaluation.ts";
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
import { choiceList, collectMentions, type Mentions, numberList, probabilityList } from "./values.ts";

interface EvaluateMentions extends OutputMentions, ToleranceMentions {
  readonly laws?: Mentions;
  readonly at?: Mentions;
  readonly quantities?: Mentions;
  readonly levels?: Mentions;
  readonly upperLevels?: Mentions;
  readonly beta4Scaling?: Mentions;
}

const QUANTITIES = {
  cdf: "cdf",
  survival: "survival",
  density: "pdf",
  "log-cdf": "logCdf",
  "log-survival": "logSurvival",
  "log-density": "logPdf",
} as const satisfies Record<string, LawQuantity>;

type QuantityName = keyof typeof QUANTITIES;
const QUANTITY_NAMES = Object.keys(QUANTITIES) as QuantityName[];

const EXAMPLES = `
Examples:
  edgelaw evaluate --laws F2 --at -3.5,-2,0
  edgelaw evaluate --laws F1,F2 --at -6:4:0.5 --quantities survival --format csv
  edgelaw evaluate --laws F1 --at 40 --quantities survival,log-survival
  edgelaw evaluate --laws F1 --levels 0.95 --upper-levels 1e-12
Quantities:
  cdf           P(X <= x)
  survival      P(X > x), to full relative accuracy however small
  density       probability density
  log-cdf, log-survival, log-density: natural logarithms of these`;

function requests(mentions: EvaluateMentions): EvaluationRequest[] {
  const at = numberList("--at", mentions.at);
  const lower = probabilityList("--levels", mentions.levels);
  const upper = probabilityList("--upper-levels", mentions.upperLevels);
  if (mentions.quantities !== undefined && at.length === 0) {
    throw new InvalidArgumentError(
      "--quantities",
      "points to evaluate at (--at)",
      mentions.quantities.join(","),
    );
  }
  if (at.length + lower.length + upper.length === 0) {
    throw new InvalidArgumentError(
      "--at",
      "points, or probabilities in --levels or --upper-levels",
      "nothing",
    );
  }
  const names = choiceList("--quantities", mentions.quantities ?? ["cdf,survival,density"], QUANTITY_NAMES);
  const list: EvaluationRequest[] =
    at.length > 0 ? names.map((name) => ({ quantity: QUANTITIES[name], at })) : [];
  if (lower.length > 0) list.push({ quantity: "quantile", at: lower });
  if (upper.length > 0) list.push({ quantity: "upperQuantile", at: upper });
  return list;
}

function runEvaluate(mentions: EvaluateMentions, io: CommandIo): 0 | 2 {
  if (mentions.laws === undefined) throw new InvalidArgumentError("--laws", "some of F1, F2, F4", "nothing");
  const { laws, scaling } = chooseLaws("--laws", mentions.laws, mentions.beta4Scaling);
  const wanted = requests(mentions);
  const tolerances = toleranceOptions(mentions);
  const settings = outputSettings(mentions, io);
  const progress = watchProgress(io);
  try {
    const report = evaluationReport(laws, wanted, {
      ...tolerances,
      ...builderOptions(settings),
      named: {
        command: "evaluate",
        ...(scaling === undefined ? {} : { "beta4-scaling": scaling }),
        ...namedTolerances(tolerances),
      },
      onProgress: progress.listener,
    });
    progress.end();
    return deliver(report, settings, io);
  } finally {
    progress.end();
  }
}

/** Adds the command to the program; `finish` takes the exit code. */
export function addEvaluateCommand(program: Command, io: CommandIo, finish: (code: 0 | 2) => void): void {
  const command = program
    .command("evaluate")
    .summary("probabilities, densities and quantiles of a law at given points")
    .description("Values of laws at given points. Every number is printed with its error.")
    .optionsGroup("What to compute:")
    .option("--laws <list>", "laws, comma-separated: F1, F2, F4", collectMentions)
    .option("--at <list>", "points: numbers or ranges from:to:step, comma-separated", collectMentions)
    .option(
      "--quantities <list>",
      "what to compute at the points (default: cdf,survival,density)",
      collectMentions,
    )
    .option("--levels <list>", "probabilities p: the x of P(X <= x) = p", collectMentions)
    .option(
      "--upper-levels <list>",
      "probabilities q: the x of P(X > x) = q, down to 1e-300",
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
    .action((mentions: EvaluateMentions) => finish(runEvaluate(mentions, io)));
}
