/**
 * Probabilities that may be too small for a double: value and logarithm, each with its error.
 */

/** Probability with its absolute error. */
export interface Probability {
  readonly value: number;
  readonly error: number;
}

/** Probability with its natural logarithm, which stays finite where the value underflows to 0. */
export interface TailProbability extends Probability {
  /** Natural logarithm of the probability. */
  readonly log: number;
  /** Absolute error of `log`: the relative error of the probability. Infinite where the error swamps the value. */
  readonly logError: number;
}

/** From a value and its absolute error. */
export function fromValue(value: number, error: number): TailProbability {
  const logError = error < value ? error / (value - error) : Number.POSITIVE_INFINITY;
  return { value, error, log: Math.log(value), logError };
}

/** From a logarithm and its absolute error. A value that underflows keeps the least positive number as its error. */
export function fromLog(log: number, logError: number): TailProbability {
  const value = Math.min(1, Math.exp(log));
  // The upper side is the wider one; where the value underflows, its product with a large factor would be no number.
  const above = value > 0 ? value * Math.expm1(logError) : Math.exp(log + logError);
  return { value, error: Math.min(1, Math.max(above, Number.MIN_VALUE)), log, logError };
}
