/**
 * A number together with what is known about its error.
 *
 * `error` is absolute and covers everything: truncation of the domain, quadrature, kernel evaluation and
 * round-off of the elimination. `errorKind` says whether it is a proved bound or a heuristic estimate;
 * `converged` is false when the tolerance asked for was missed (the value and its honest error are still the
 * best available); `order` is the number of quadrature points (or terms) spent.
 */
export interface Estimate {
  /** The value. */
  readonly value: number;
  /** Absolute error: `|value − true| ≤ error`. */
  readonly error: number;
  /** `"bound"` when proved, `"estimate"` when heuristic. */
  readonly errorKind: "bound" | "estimate";
  /** Whether the tolerance asked for was met. */
  readonly converged: boolean;
  /** Number of quadrature points (or series terms) used. */
  readonly order: number;
}
