/** Options for the tolerances of the exact route, shared by the commands that print values of laws. */
import type { Command } from "commander";
import type { EstimateOptions } from "../report/provenance.ts";
import { collectMentions, type Mentions, positiveOption } from "./values.ts";

/** The tolerance options as commander hands them over. */
export interface ToleranceMentions {
  readonly absoluteTolerance?: Mentions;
  readonly relativeTolerance?: Mentions;
}

/** Adds the tolerance options to a command. */
export function addToleranceOptions(command: Command): Command {
  return command
    .optionsGroup("Tolerances (exit code 2 when one is missed):")
    .option("--absolute-tolerance <number>", "largest absolute error accepted", collectMentions)
    .option("--relative-tolerance <number>", "largest relative error accepted", collectMentions);
}

/** The tolerances, checked. */
export function toleranceOptions(mentions: ToleranceMentions): EstimateOptions {
  const absTol = positiveOption("--absolute-tolerance", mentions.absoluteTolerance);
  const relTol = positiveOption("--relative-tolerance", mentions.relativeTolerance);
  return { ...(absTol === undefined ? {} : { absTol }), ...(relTol === undefined ? {} : { relTol }) };
}

/** The tolerances as the provenance names them. */
export function namedTolerances(options: EstimateOptions): Record<string, number> {
  return {
    ...(options.absTol === undefined ? {} : { "absolute-tolerance": options.absTol }),
    ...(options.relTol === undefined ? {} : { "relative-tolerance": options.relTol }),
  };
}
