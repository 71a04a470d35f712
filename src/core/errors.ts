/**
 * The one error type for bad input. It names the argument, says what is allowed and carries what came.
 *
 * @category Errors
 */
export class InvalidArgumentError extends RangeError {
  override readonly name: string = "InvalidArgumentError";
  /** Name of the offending argument, as in the signature (`"order"`, `"options.relTol"`). */
  readonly argument: string;
  /** What is allowed, in words. */
  readonly expected: string;
  /** The value received. */
  readonly received: unknown;

  constructor(argument: string, expected: string, received: unknown) {
    super(`${argument}: expected ${expected}, received ${describe(received)}`);
    this.argument = argument;
    this.expected = expected;
    this.received = received;
  }
}

/**
 * Bad data: an {@link InvalidArgumentError} that also knows where in the data the trouble is.
 *
 * @category Errors
 */
export class InvalidDataError extends InvalidArgumentError {
  override readonly name: string = "InvalidDataError";
  /** One-based row of the trouble, where there is one. */
  readonly row: number | undefined;
  /** One-based column of the trouble, where there is one. */
  readonly column: number | undefined;

  constructor(
    argument: string,
    expected: string,
    received: unknown,
    place: { row?: number | undefined; column?: number | undefined } = {},
  ) {
    super(argument, expected, received);
    this.row = place.row;
    this.column = place.column;
  }
}

function describe(value: unknown): string {
  if (typeof value === "string")
    return JSON.stringify(value.length > 60 ? `${value.slice(0, 57)}...` : value);
  if (typeof value === "function") return "a function";
  if (Array.isArray(value)) return `an array of length ${value.length}`;
  if (ArrayBuffer.isView(value)) return `a ${value.constructor.name}`;
  if (typeof value === "object" && value !== null) return "an object";
  return Object.is(value, -0) ? "-0" : String(value);
}
