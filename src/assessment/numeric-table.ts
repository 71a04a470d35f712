/**
 * Reads a table of numbers from CSV text (RFC 4180): rows are observations, columns variables. The first row is a
 * header when at least one of its cells is a name and none is a number or stands for one (`NaN`, `inf`, `1e999`): a bad
 * first row of data is refused, not passed over as names. Cells may be complex: `1.5-2i`.
 */
import { parse } from "csv-parse/browser/esm/sync";
import { InvalidArgumentError, InvalidDataError } from "../core/errors.ts";

/** A rectangular table of finite numbers. */
export interface NumericTable {
  /** Number of observations. */
  readonly rows: number;
  /** Number of variables. */
  readonly columns: number;
  /** Names of the variables, where the first row held names. */
  readonly header: readonly string[] | undefined;
  /** Real parts, row-major. */
  readonly real: Float64Array;
  /** Imaginary parts, row-major; undefined when every cell is real. */
  readonly imaginary: Float64Array | undefined;
}

/** Options of {@link readNumericTable}. */
export interface NumericTableOptions {
  /** Character between cells, not one that numbers, quotes or lines are written with. Default: `,`. */
  readonly delimiter?: string;
}

/**
 * Reads CSV text into numbers.
 *
 * @param text - The text; blank lines are passed over.
 * @param options - `delimiter`.
 * @throws {@link InvalidDataError} with row and column (1-based, as in the text's non-blank lines): no data, rows of
 *   different length, a cell that is not a finite number.
 */
export function readNumericTable(text: string, options: NumericTableOptions = {}): NumericTable {
  if (typeof text !== "string") throw new InvalidArgumentError("text", "a string of CSV text", text);
  if (typeof options !== "object" || options === null) {
    throw new InvalidArgumentError("options", "an object", options);
  }
  const delimiter = options.delimiter ?? ",";
  if (typeof delimiter !== "string" || delimiter.length !== 1 || NOT_A_DELIMITER.test(delimiter)) {
    throw new InvalidArgumentError(
      "options.delimiter",
      "one character that is no letter, digit, point, sign, quote or line break",
      delimiter,
    );
  }
  const records = split(text, delimiter);
  if (records.length === 0) throw new InvalidDataError("data", "at least one row of numbers", "empty text");
  const header = isHeader(records[0]) ? records[0] : undefined;
  const body = header === undefined ? records : records.slice(1);
  if (body.length === 0) throw new InvalidDataError("data", "at least one row of numbers", "only a header");
  const columns = records[0].length;
  const first = header === undefined ? 1 : 2;
  const real = new Float64Array(body.length * columns);
  const imaginary = new Float64Array(body.length * columns);
  let complex = false;
  body.forEach((record, i) => {
    if (record.length !== columns) {
      throw new InvalidDataError("data", `${columns} cells in every row`, `${record.length} cells`, {
        row: first + i,
      });
    }
    record.forEach((cell, j) => {
      const value = parseCell(cell);
      if (value === undefined) {
        throw new InvalidDataError("data", "a finite number in every cell", cell, {
          row: first + i,
          column: j + 1,
        });
      }
      real[i * columns + j] = value.real;
      if (value.imaginary !== undefined) {
        complex = true;
        imaginary[i * columns + j] = value.imaginary;
      }
    });
  });
  return { rows: body.length, columns, header, real, imaginary: complex ? imaginary : undefined };
}

const NOT_A_DELIMITER = /[A-Za-z0-9.+\-"\r\n]/;
/** Marks of a missing value: no name. */
const MISSING = /^(?:|[+-]?nan|na|n\/a|null|none|-+|\?)$/i;
const NOT_FINITE = /^[+-]?(?:nan|inf|infinity)$/i;

function isHeader(cells: readonly string[]): boolean {
  const numeric = (cell: string): boolean =>
    NOT_FINITE.test(cell) || REAL.test(cell) || IMAGINARY.test(cell) || COMPLEX.test(cell);
  return cells.some((cell) => !MISSING.test(cell)) && !cells.some(numeric);
}

function split(text: string, delimiter: string): string[][] {
  try {
    return parse(text, {
      bom: true,
      delimiter,
      trim: true,
      skip_empty_lines: true,
      relax_column_count: true,
    }) as string[][];
  } catch (error) {
    const reason = error instanceof Error ? error.message : String(error);
    throw new InvalidDataError("data", "CSV text (RFC 4180)", reason);
  }
}

const NUMBER = String.raw`[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?`;
const REAL = new RegExp(`^${NUMBER}$`);
const IMAGINARY = new RegExp(`^(${NUMBER})[ij]$`);
const COMPLEX = new RegExp(`^(${NUMBER})\\s*([+-])\\s*((?:\\d+\\.?\\d*|\\.\\d+)(?:[eE][+-]?\\d+)?)[ij]$`);

function parseCell(cell: string): { real: number; imaginary?: number } | undefined {
  const finite = (value: number): number | undefined => (Number.isFinite(value) ? value : undefined);
  if (REAL.test(cell)) {
    const real = finite(Number(cell));
    return real === undefined ? undefined : { real };
  }
  const pure = IMAGINARY.exec(cell);
  if (pure) {
    const imaginary = finite(Number(pure[1]));
    return imaginary === undefined ? undefined : { real: 0, imaginary };
  }
  const both = COMPLEX.exec(cell);
  if (!both) return undefined;
  const real = finite(Number(both[1]));
  const imaginary = finite(Number(`${both[2]}${both[3]}`));
  return real === undefined || imaginary === undefined ? undefined : { real, imaginary };
}
