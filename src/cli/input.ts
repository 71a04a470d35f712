/** Data files: bytes in, numbers with their digest out. Each failure names the option and the file. */
import { createHash } from "node:crypto";
import {
  type NumericTable,
  type NumericTableOptions,
  readNumericTable,
} from "../assessment/numeric-table.ts";
import { InvalidArgumentError, InvalidDataError } from "../core/errors.ts";
import type { InputReference } from "../report/document.ts";
import type { CommandIo } from "./io.ts";

/** A table with the reference that goes into the report. */
export interface InputTable {
  readonly table: NumericTable;
  readonly reference: InputReference;
}

/** Gives errors of the data their option and file. */
export function namingFile<T>(option: string, path: string, work: () => T): T {
  try {
    return work();
  } catch (error) {
    if (error instanceof InvalidDataError) {
      throw new InvalidDataError(`${option} ${path}`, error.expected, error.received, error);
    }
    throw error;
  }
}

/**
 * Reads a table of numbers from a file, or from the standard input for `-`.
 *
 * @throws InvalidArgumentError for a file that can't be read or is not UTF-8 text; InvalidDataError, with row and
 *   column, for what is no table of numbers.
 */
export async function readTable(
  option: string,
  path: string,
  options: NumericTableOptions,
  io: CommandIo,
): Promise<InputTable> {
  const bytes = path === "-" ? await io.readStandardInput() : io.readFile(option, path);
  let text: string;
  try {
    text = new TextDecoder("utf-8", { fatal: true }).decode(bytes);
  } catch {
    throw new InvalidArgumentError(option, "a file of text in UTF-8", path);
  }
  const table = namingFile(option, path, () => readNumericTable(text, options));
  const digest = `sha256:${createHash("sha256").update(bytes).digest("hex")}`;
  const name = path === "-" ? "standard input" : path;
  return { table, reference: { name, digest, rows: table.rows, columns: table.columns } };
}

/**
 * The numbers of a table that is a list: one column or one row, real.
 *
 * @throws InvalidDataError otherwise.
 */
export function listOf(option: string, path: string, table: NumericTable): Float64Array {
  const place = `${option} ${path}`;
  if (table.rows > 1 && table.columns > 1) {
    throw new InvalidDataError(
      place,
      "a list: one column or one row",
      `${table.rows} rows of ${table.columns}`,
    );
  }
  if (table.imaginary !== undefined) throw new InvalidDataError(place, "real numbers", "complex numbers");
  return table.real;
}
