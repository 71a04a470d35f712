/**
 * Columns of a data matrix made ready for a Gram matrix: checked, in a unit whose squares are in range, centred, scaled.
 */
import { requireInteger } from "../core/check.ts";
import { InvalidArgumentError, InvalidDataError } from "../core/errors.ts";
import type { NumericTable } from "./numeric-table.ts";

/** Columns with the power of two that was taken out of them (1 for scaled columns, which have no unit). */
export interface PreparedColumns {
  readonly real: Float64Array;
  readonly imaginary: Float64Array | undefined;
  readonly unit: number;
}

const SMALLEST_NORMAL = 2 ** -1022;

/** Shape and finiteness of a table that need not come from `readNumericTable`. */
export function checkTable(table: NumericTable): void {
  if (typeof table !== "object" || table === null) {
    throw new InvalidArgumentError("table", "a table of numbers, as from readNumericTable", table);
  }
  requireInteger("table.rows", table.rows, 1, 1e9);
  requireInteger("table.columns", table.columns, 1, 1e9);
  checkPart("table.real", table.real, table);
  if (table.imaginary !== undefined) checkPart("table.imaginary", table.imaginary, table);
}

function checkPart(name: string, part: unknown, { rows, columns }: NumericTable): void {
  if (!(part instanceof Float64Array) || part.length !== rows * columns) {
    throw new InvalidArgumentError(name, `a Float64Array of ${rows} × ${columns} numbers`, part);
  }
  const bad = part.findIndex((value) => !Number.isFinite(value));
  if (bad < 0) return;
  throw new InvalidDataError("data", "finite numbers", part[bad], {
    row: Math.floor(bad / columns) + 1,
    column: (bad % columns) + 1,
  });
}

/** The columns, less their means if asked, of unit variance (Σ|x|²/n = 1) if asked. */
export function prepareColumns(
  table: NumericTable,
  centre: boolean,
  scale: boolean,
  n: number,
): PreparedColumns {
  const unit = binaryUnit(table);
  const real = inUnit(table.real, unit);
  const imaginary = table.imaginary === undefined ? undefined : inUnit(table.imaginary, unit);
  if (centre) {
    removeMeans(real, table);
    if (imaginary !== undefined) removeMeans(imaginary, table);
  }
  if (scale) scaleColumns(real, imaginary, table, n);
  return { real, imaginary, unit: scale ? 1 : unit };
}

/** A power of two within a factor of two of the largest entry: no square overflows or underflows as a whole. */
function binaryUnit({ real, imaginary }: NumericTable): number {
  let most = 0;
  for (const value of real) most = Math.max(most, Math.abs(value));
  for (const value of imaginary ?? []) most = Math.max(most, Math.abs(value));
  return most === 0 ? 1 : 2 ** Math.max(-1022, Math.min(1022, Math.floor(Math.log2(most))));
}

function inUnit(part: Float64Array, unit: number): Float64Array {
  return part.map((value) => value / unit);
}

function removeMeans(part: Float64Array, { rows, columns }: NumericTable): void {
  for (let j = 0; j < columns; j++) {
    // Twice: the second time removes what rounding left of the mean of a column far from 0.
    for (let pass = 0; pass < 2; pass++) {
      let mean = 0;
      for (let i = 0; i < rows; i++) mean += (part[i * columns + j] - mean) / (i + 1);
      for (let i = 0; i < rows; i++) part[i * columns + j] -= mean;
    }
  }
}

function scaleColumns(
  real: Float64Array,
  imaginary: Float64Array | undefined,
  { rows, columns }: NumericTable,
  n: number,
): void {
  for (let j = 0; j < columns; j++) {
    let most = 0;
    for (let i = 0; i < rows; i++) {
      const at = i * columns + j;
      most = Math.max(most, Math.abs(real[at]), Math.abs(imaginary?.[at] ?? 0));
    }
    if (!(most >= SMALLEST_NORMAL)) {
      const expected = "columns that vary within double precision of the widest one";
      throw new InvalidDataError("data", expected, most, { column: j + 1 });
    }
    let sum = 0;
    for (let i = 0; i < rows; i++) {
      const at = i * columns + j;
      sum += (real[at] / most) ** 2 + ((imaginary?.[at] ?? 0) / most) ** 2;
    }
    const deviation = Math.sqrt(sum / n);
    for (let i = 0; i < rows; i++) {
      const at = i * columns + j;
      real[at] = real[at] / most / deviation;
      if (imaginary !== undefined) imaginary[at] = imaginary[at] / most / deviation;
    }
  }
}
