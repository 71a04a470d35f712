/**
 * Eigenvalues of a sample covariance matrix from a data matrix, through the smaller of the two Gram matrices: X*X
 * (variables) or XX* (observations) have the same non-zero eigenvalues, so that more variables than observations are
 * no trouble. The symmetric eigenvalues are ml-matrix's; a Hermitian matrix A + iB goes in as [[A, −B], [B, A]],
 * whose eigenvalues are those of the Hermitian one, each twice.
 */
import { EigenvalueDecomposition, Matrix } from "ml-matrix";
import { InvalidArgumentError, InvalidDataError } from "../core/errors.ts";
import { checkTable, prepareColumns } from "./column-preparation.ts";
import type { NumericTable } from "./numeric-table.ts";

/** How the data are prepared. */
export interface CovarianceOptions {
  /** Whether the column means are removed, which costs one degree of freedom. Default true. */
  readonly centre?: boolean;
  /** `"unit-variance"` divides every column by its standard deviation (a correlation matrix). Default `"none"`. */
  readonly scaling?: "none" | "unit-variance";
}

/** Eigenvalues of a sample covariance matrix. */
export interface CovarianceSpectrum {
  /** The min(n, p) eigenvalues that are not zero for lack of data, non-increasing. */
  readonly eigenvalues: readonly number[];
  /** Degrees of freedom n: observations, less one if the means were removed. */
  readonly n: number;
  /** Number of variables. */
  readonly p: number;
  /** Whether the data are complex. */
  readonly complex: boolean;
  /** Whether column means were removed. */
  readonly centred: boolean;
  /** Whether columns were scaled to unit variance. */
  readonly scaled: boolean;
}

const SMALLEST_NORMAL = 2 ** -1022;
const MOST_ROWS = 3000; // order of the smaller Gram matrix that a dense eigenvalue routine still serves

/**
 * Eigenvalues of the sample covariance matrix S = X*X / n of a table.
 *
 * @param table - Rows are observations, columns variables; real or complex.
 * @param options - Centring and scaling.
 * @returns The eigenvalues, each with an absolute error of about 2e-14 of the largest (tested against numpy), and n
 *   and p as the tests take them. With `"unit-variance"` they are those of a correlation matrix, for which the limit
 *   laws hold only nearly (they were derived for covariance matrices; common practice).
 * @throws {@link InvalidDataError} for fewer than two rows (three when means are removed) or columns, a number that is
 *   not finite, a constant column (named), or variances outside the range of double precision;
 *   {@link InvalidArgumentError} for bad options or a table whose smaller side exceeds 3000.
 *
 * Cost: p n min(n, p) for the Gram matrix and about 9 min(n, p)³ for the eigenvalues (72 for complex data).
 */
export function covarianceSpectrum(table: NumericTable, options: CovarianceOptions = {}): CovarianceSpectrum {
  checkTable(table);
  const { rows, columns } = table;
  if (typeof options !== "object" || options === null) {
    throw new InvalidArgumentError("options", "an object", options);
  }
  const centre = options.centre ?? true;
  const scaling = options.scaling ?? "none";
  if (typeof centre !== "boolean") throw new InvalidArgumentError("options.centre", "true or false", centre);
  if (scaling !== "none" && scaling !== "unit-variance") {
    throw new InvalidArgumentError("options.scaling", '"none" or "unit-variance"', scaling);
  }
  const least = centre ? 3 : 2;
  if (rows < least) throw new InvalidDataError("data", `at least ${least} rows (observations)`, rows);
  if (columns < 2) throw new InvalidDataError("data", "at least 2 columns (variables)", columns);
  const n = centre ? rows - 1 : rows;
  if (Math.min(rows, columns) > MOST_ROWS) {
    throw new InvalidArgumentError(
      "data",
      `a table with at most ${MOST_ROWS} rows or columns`,
      `${rows} × ${columns}`,
    );
  }
  const complex = table.imaginary !== undefined;
  refuseConstantColumns(table);
  const { real, imaginary, unit } = prepareColumns(table, centre, scaling === "unit-variance", n);
  const gram = gramMatrix(real, imaginary, rows, columns, n);
  const values = new EigenvalueDecomposition(gram, { assumeSymmetric: true }).realEigenvalues;
  values.sort((x, y) => y - x);
  const each = complex ? values.filter((_, i) => i % 2 === 0) : values;
  // Eigenvalues of a Gram matrix are not negative; rounding may make a zero one so.
  const eigenvalues = each.slice(0, Math.min(n, columns)).map((value) => Math.max(0, value * unit * unit));
  if (!(eigenvalues[0] >= SMALLEST_NORMAL && eigenvalues[0] <= Number.MAX_VALUE)) {
    const expected = "a covariance matrix within the range of double precision";
    throw new InvalidDataError("data", expected, eigenvalues[0]);
  }
  return { eigenvalues, n, p: columns, complex, centred: centre, scaled: scaling === "unit-variance" };
}

function refuseConstantColumns(table: NumericTable): void {
  const { rows, columns, real, imaginary } = table;
  for (let j = 0; j < columns; j++) {
    let constant = true;
    for (let i = 1; i < rows && constant; i++) {
      const same =
        real[i * columns + j] === real[j] && (imaginary?.[i * columns + j] ?? 0) === (imaginary?.[j] ?? 0);
      if (!same) constant = false;
    }
    if (constant) {
      const name = table.header?.[j];
      throw new InvalidDataError(
        "data",
        "columns that vary",
        name === undefined ? "a constant column" : `constant column ${name}`,
        {
          column: j + 1,
        },
      );
    }
  }
}

/** X*X / n or XX* / n, whichever is smaller; the real form of twice the order for complex data. */
function gramMatrix(
  real: Float64Array,
  imaginary: Float64Array | undefined,
  rows: number,
  columns: number,
  n: number,
): Matrix {
  const dual = columns > rows;
  const order = dual ? rows : columns;
  const length = dual ? columns : rows;
  // Entry k of vector i: a row of X (dual) or a column.
  const step = dual ? 1 : columns;
  const start = (i: number): number => (dual ? i * columns : i);
  const gram = Matrix.zeros(imaginary ? 2 * order : order, imaginary ? 2 * order : order);
  for (let i = 0; i < order; i++) {
    for (let j = 0; j <= i; j++) {
      let a = 0;
      let b = 0;
      for (let k = 0; k < length; k++) {
        const p = start(i) + k * step;
        const q = start(j) + k * step;
        a += real[p] * real[q];
        if (imaginary) {
          a += imaginary[p] * imaginary[q];
          b += imaginary[p] * real[q] - real[p] * imaginary[q];
        }
      }
      a /= n;
      b /= n;
      gram.set(i, j, a);
      gram.set(j, i, a);
      if (imaginary) {
        gram.set(order + i, order + j, a);
        gram.set(order + j, order + i, a);
        gram.set(order + i, j, b);
        gram.set(j, order + i, b);
        gram.set(order + j, i, -b);
        gram.set(i, order + j, -b);
      }
    }
  }
  return gram;
}
