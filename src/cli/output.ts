/** Options that every command shares: format, where to write, digits, date; and the writing itself. */
import type { Command } from "commander";
import { InvalidArgumentError } from "../core/errors.ts";
import { allConverged, type ReportDocument } from "../report/document.ts";
import { REPORT_FORMATS, type ReportFormat, renderReport } from "../report/render.ts";
import type { CommandIo } from "./io.ts";
import { choiceOption, collectMentions, integerOption, type Mentions, single } from "./values.ts";

/** The shared options as commander hands them over. */
export interface OutputMentions {
  readonly format?: Mentions;
  readonly output?: Mentions;
  readonly digits?: Mentions;
  readonly table?: Mentions;
  readonly stamp?: boolean;
}

/** The shared options, checked. */
export interface OutputSettings {
  readonly format: ReportFormat;
  /** Undefined: the standard output. */
  readonly path: string | undefined;
  readonly digits: number | undefined;
  readonly table: string | undefined;
  readonly date: string | undefined;
  /** Whether the format shows figures. */
  readonly figures: boolean;
}

const BY_ENDING: Readonly<Record<string, ReportFormat>> = {
  txt: "text",
  md: "markdown",
  csv: "csv",
  json: "json",
  html: "html",
  htm: "html",
};

/** Adds the shared options to a command. */
export function addOutputOptions(command: Command): Command {
  return command
    .optionsGroup("Output:")
    .option(
      "--format <name>",
      "text, markdown, csv, json or html (default: by the ending of --output, else text)",
      collectMentions,
    )
    .option(
      "--output <file>",
      "write to this file, whole or not at all (default: the standard output)",
      collectMentions,
    )
    .option(
      "--digits <count>",
      "show at most so many significant digits, 1 to 17 (fewer where the error is larger)",
      collectMentions,
    )
    .option("--table <id>", "with csv: which table of the report (default: the main one)", collectMentions)
    .option(
      "--stamp",
      "add date and time to the report (left out otherwise, so that equal input gives equal output)",
    );
}

/** Checks the shared options, and that the output can be written, before any work is done. */
export function outputSettings(mentions: OutputMentions, io: CommandIo): OutputSettings {
  const output = single("--output", mentions.output);
  const path = output === "-" ? undefined : output;
  const ending = path === undefined ? "" : path.slice(path.lastIndexOf(".") + 1).toLowerCase();
  const format = choiceOption("--format", mentions.format, REPORT_FORMATS) ?? BY_ENDING[ending] ?? "text";
  const table = single("--table", mentions.table);
  if (table !== undefined && format !== "csv") {
    throw new InvalidArgumentError("--table", "format csv (the other formats hold every table)", format);
  }
  const digits = integerOption("--digits", mentions.digits, 1, 17);
  if (path !== undefined) io.checkWritable("--output", path);
  return {
    format,
    path,
    digits,
    table,
    date: mentions.stamp === true ? io.date() : undefined,
    figures: format === "html" || format === "json",
  };
}

/** Options of the report builders that come from the shared options. */
export function builderOptions(settings: OutputSettings): {
  digits?: number;
  date?: string;
  figures: boolean;
} {
  return {
    figures: settings.figures,
    ...(settings.digits === undefined ? {} : { digits: settings.digits }),
    ...(settings.date === undefined ? {} : { date: settings.date }),
  };
}

/**
 * Writes the report.
 *
 * @returns The exit code: 0, or 2 when some number missed its tolerance (it is printed with its error all the
 *   same).
 */
export function deliver(report: ReportDocument, settings: OutputSettings, io: CommandIo): 0 | 2 {
  const text = renderReport(
    report,
    settings.format,
    settings.table === undefined ? {} : { table: settings.table },
  );
  if (settings.path === undefined) io.print(text);
  else io.writeFile("--output", settings.path, text);
  if (allConverged(report)) return 0;
  io.complain("edgelaw: a tolerance was missed; the result is the best value reached, with its error\n");
  return 2;
}
