/**
 * The command line as a function: arguments and a machine in, exit code out.
 *
 * 0: done. 1: bad input; one line on the standard error names the argument, what is allowed and what came.
 * 2: a tolerance was missed; the result is printed all the same, with its error.
 */
import { Command, CommanderError } from "commander";
import { InvalidArgumentError, InvalidDataError } from "../core/errors.ts";
import { libraryVersion } from "../report/version.ts";
import { addAssessCommand } from "./assess-command.ts";
import { addEvaluateCommand } from "./evaluate-command.ts";
import type { CommandIo } from "./io.ts";
import { addPercentilesCommand } from "./percentiles-command.ts";

/** Exit code of a command. */
export type ExitCode = 0 | 1 | 2;

const AFTER = `
Start here:
  edgelaw percentiles                          the classical table
  edgelaw evaluate --laws F1 --at 0.98         one p-value: the row P(X > x)
  edgelaw assess --data measurements.csv       is there structure in these data, or only noise?
  edgelaw help assess                          everything about one command

Exit codes: 0 done; 1 bad input (nothing is written); 2 a tolerance was missed (the result is written
with the error it reached).`;

/** One line that says what was wrong. */
export function complaint(error: InvalidArgumentError): string {
  const place: string[] = [];
  if (error instanceof InvalidDataError) {
    if (error.row !== undefined) place.push(`row ${error.row}`);
    if (error.column !== undefined) place.push(`column ${error.column}`);
  }
  // biome-ignore lint/suspicious/noControlCharactersInRegex: text from a file must not drive the terminal
  const message = error.message.replace(/[\u0000-\u001f\u007f-\u009f]/g, "\ufffd");
  return `edgelaw: ${message}${place.length > 0 ? ` (${place.join(", ")})` : ""}\n`;
}

/**
 * Runs the command line.
 *
 * @param argv - Arguments without the interpreter and the script.
 * @param io - The machine.
 * @returns The exit code.
 * @throws Only what is a defect of the program: every bad input ends in code 1.
 */
export async function run(argv: readonly string[], io: CommandIo): Promise<ExitCode> {
  let code: ExitCode = 0;
  const finish = (result: 0 | 2): void => {
    code = result;
  };
  const program = new Command("edgelaw");
  program
    .description(
      "Percentiles, p-values and values of the laws of largest eigenvalues (Tracy-Widom laws), computed from " +
        "Fredholm determinants, each number with its error; and tests of data against these laws.",
    )
    .version(libraryVersion)
    .exitOverride()
    .configureOutput({ writeOut: (text) => io.print(text), writeErr: (text) => io.complain(text) })
    .configureHelp({ helpWidth: 100 })
    .showHelpAfterError("(add --help for the options)")
    .addHelpText("after", AFTER);
  // Set before the commands are made: they inherit these settings.
  addPercentilesCommand(program, io, finish);
  addEvaluateCommand(program, io, finish);
  addAssessCommand(program, io, finish);
  try {
    await program.parseAsync([...argv], { from: "user" });
    return code;
  } catch (error) {
    if (error instanceof CommanderError) return error.exitCode === 0 ? 0 : 1;
    if (error instanceof InvalidArgumentError) {
      io.complain(complaint(error));
      return 1;
    }
    throw error;
  }
}
