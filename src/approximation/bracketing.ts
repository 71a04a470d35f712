/**
 * A root of a monotone function inside a bracket: Newton's step while it stays inside, bisection otherwise.
 */

/**
 * Solves f(x) = 0 on [low, high], f increasing or decreasing, f(low) and f(high) of different sign.
 *
 * @param evaluate - Writes f(x) to out[0] and f'(x) to out[1].
 * @param low - Left end of the bracket.
 * @param high - Right end of the bracket.
 * @param start - First guess inside.
 * @param rising - Whether f increases.
 * @returns x to the last bit or two that f resolves.
 */
export function safeNewton(
  evaluate: (x: number, out: Float64Array) => void,
  low: number,
  high: number,
  start: number,
  rising: boolean,
): number {
  const out = new Float64Array(2);
  let x = start;
  let previous = Number.POSITIVE_INFINITY;
  for (let k = 0; k < 200; k++) {
    evaluate(x, out);
    const f = out[0];
    if (f === 0) return x;
    if (f > 0 === rising) high = x;
    else low = x;
    const step = f / out[1];
    if (Math.abs(step) <= 2.3e-16 * Math.abs(x)) return x - step;
    let next = x - step;
    if (next > low && next < high) {
      const moved = Math.abs(step);
      // At the rounding floor Newton's steps stop shrinking: stay.
      if (moved < 1e-12 * (1 + Math.abs(x)) && moved >= 0.5 * previous) return next;
      previous = moved;
    } else {
      next = 0.5 * (low + high);
      if (next === low || next === high) return next;
      previous = Number.POSITIVE_INFINITY;
    }
    x = next;
  }
  return x;
}
