/**
 * Largest and least of many numbers; `Math.max(...values)` overflows the stack beyond some ten thousand.
 */

/** The largest number, −∞ for none. */
export function largest(values: Iterable<number>): number {
  let most = Number.NEGATIVE_INFINITY;
  for (const value of values) if (value > most) most = value;
  return most;
}

/** The least number, ∞ for none. */
export function least(values: Iterable<number>): number {
  let found = Number.POSITIVE_INFINITY;
  for (const value of values) if (value < found) found = value;
  return found;
}
