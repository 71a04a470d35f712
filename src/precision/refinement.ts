/**
 * Orders and working precision are raised until a set of numbers stands still: the rule by which every determinant of
 * this room is computed and its error stated.
 */
import { difference, type Floating, log2OfFloating } from "./floating.ts";
import { bitsFor } from "./precise-estimate.ts";

/** The numbers at one order and one precision. */
export interface Attempt {
  readonly entries: readonly Floating[];
  /** log2 of the size each entry is to be accurate relative to. */
  readonly sizes: readonly number[];
  /** log2 of the relative error by the cut of a half-line; −∞ without one. */
  readonly truncation: number;
  /** Bits that must be added for what is small: pivots, complements. */
  readonly needed: number;
  /** Whether a pivot is nothing but rounding. */
  readonly vanishing: boolean;
}

/** The numbers, log2 of the absolute error of each, and the order. */
export interface Refined {
  readonly entries: readonly Floating[];
  readonly errors: readonly number[];
  readonly order: number;
}

/** Bits beyond what the digits need; they absorb the rounding of nodes, entries and elimination. */
export const GUARD = 72;
const MOST_BITS = 40_000;
const MOST_TESTS = 6;

/**
 * Raises the order until the change, less what the observed rate says the last step gained, is below the target, then
 * repeats the last order with more bits: what that changes is the rounding error.
 */
export function refineOrders(
  run: (order: number, bits: bigint) => Attempt,
  digits: number,
  firstOrder: number,
  maxOrder: number,
): Refined {
  const target = -(bitsFor(digits) + 4);
  let extra = 0;
  let vanished = false;
  let vanishedAt = 0;
  let tests = 0;
  let order = Math.min(maxOrder, firstOrder);
  let before: { readonly order: number; readonly entries: readonly Floating[] } | undefined;
  let history: Convergence[] = [];
  for (;;) {
    const bits = BigInt(bitsFor(digits) + GUARD + extra);
    const attempt = run(order, bits);
    const { entries } = attempt;
    const restart = (more: number): void => {
      extra = more;
      before = undefined;
      history = [];
    };
    if (attempt.needed > extra && Number(bits) < MOST_BITS && !vanished) {
      // A pivot that stays at the level of rounding when bits are added is 0: then only absolute accuracy is to be had.
      vanished = attempt.vanishing && vanishedAt === order;
      if (attempt.vanishing) vanishedAt = order;
      // Small pivots or a small complement: the digits start that much further down. The margin saves a restart.
      restart(vanished ? extra : Math.ceil(1.05 * Math.min(attempt.needed, 3 * Number(bits))) + 16);
      continue;
    }
    const sizes = vanished ? attempt.sizes.map((l) => Math.max(0, l)) : attempt.sizes;
    let next = Math.ceil(1.3 * order) + 1;
    if (before) {
      const known = before;
      const change = entries.map((e, k) => log2OfFloating(difference(e, known.entries[k])));
      history.push({ order: known.order, error: worst(change, sizes) });
      const { error } = history[history.length - 1];
      const gain = predictedGain(history, order);
      const slow = history.length >= 3 && rate(history) === 0;
      if (slow && error - gain > target && tests < MOST_TESTS && Number(bits) < MOST_BITS) {
        tests++;
        // Either the kernel is not smooth, or the elimination loses more than its pivots tell.
        const more = Math.max(128, extra);
        const again = run(order, bits + BigInt(more));
        const moved = worst(
          entries.map((e, k) => log2OfFloating(difference(e, again.entries[k]))),
          sizes,
        );
        if (moved > error - 10) {
          restart(extra + more);
          continue;
        }
      }
      const hopeless = outOfReach(history, target, maxOrder);
      if (error - gain <= target || order >= maxOrder || hopeless) {
        const own = change.map((d) => d - gain);
        return confirmed(run, attempt, order, bits, own, target, vanished);
      }
      next = nextOrder(history, order, target);
    } else if (order >= maxOrder) {
      return confirmed(run, attempt, order, bits, sizes, target, vanished);
    }
    before = { order, entries };
    order = Math.min(maxOrder, next);
  }
}

/** log2 of the relative error that an order was found to have, by the order after it. */
interface Convergence {
  readonly order: number;
  readonly error: number;
}

/** Bits a point between the last two known errors; 0 while unknown or when convergence slows down. */
function rate(history: readonly Convergence[]): number {
  if (history.length < 2) return 0;
  const [b, c] = history.slice(-2);
  const last = (b.error - c.error) / (c.order - b.order);
  if (history.length === 2) return Math.max(0, last);
  const a = history[history.length - 3];
  const former = (a.error - b.error) / (b.order - a.order);
  return last >= 0.9 * former ? Math.max(0, last) : 0;
}

/**
 * By how many bits `order` is better than the last order whose error is known. For analytic kernels convergence speeds
 * up with the order, so that the last rate is a safe one; half of it is kept back.
 */
function predictedGain(history: readonly Convergence[], order: number): number {
  return history.length < 3 ? 0 : 0.5 * rate(history) * (order - history[history.length - 1].order);
}

/** Whether an algebraic rate is seen, of which the target asks more than the most points allowed. */
function outOfReach(history: readonly Convergence[], target: number, maxOrder: number): boolean {
  if (history.length < 4 || rate(history) > 0) return false;
  const [a, , , d] = history.slice(-4);
  if (d.error === Number.POSITIVE_INFINITY) return false;
  const perDoubling = (a.error - d.error) / Math.log2(d.order / a.order);
  return perDoubling <= 0 || d.order * 2 ** ((d.error - target) / perDoubling) > maxOrder;
}

/** The order that should reach the target at the last rate, within 1.2 to 1.7 times the present one. */
function nextOrder(history: readonly Convergence[], order: number, target: number): number {
  const { order: known, error } = history[history.length - 1];
  const slope = rate(history);
  const wanted = slope > 0 ? known + (1.15 * (error - target)) / slope : 1.3 * order;
  return Math.ceil(Math.min(1.7 * order, Math.max(1.2 * order, wanted))) + 1;
}

/** Repeats the last order with more bits, until that changes nothing that matters. */
function confirmed(
  run: (order: number, bits: bigint) => Attempt,
  first: Attempt,
  order: number,
  bits: bigint,
  quadrature: readonly number[],
  target: number,
  vanished: boolean,
): Refined {
  let former = first;
  let precision = bits;
  for (let round = 0; ; round++) {
    precision += 40n + 64n * BigInt(round) ** 2n;
    const next = run(order, precision);
    // The new rounding error is 2^−40 of the old one, or more; half of those bits are kept back.
    const rounding = next.entries.map((e, k) => log2OfFloating(difference(e, former.entries[k])) - 20);
    former = next;
    if (vanished || worst(rounding, next.sizes) <= target || round === 3 || Number(precision) > MOST_BITS) {
      const errors = next.entries.map((_, k) => {
        const cut = next.truncation + next.sizes[k];
        return sumOfLogs(sumOfLogs(cut, quadrature[k]), rounding[k]);
      });
      return { entries: next.entries, errors, order };
    }
  }
}

/**
 * Bits that the elimination of a positive definite I − K with det = 2^`logDeterminant` may lose: as many as its smallest
 * eigenvalue is small. Some tr K eigenvalues of K are close to 1, and the logarithms of 1 − λ grow about linearly over
 * them: the largest is a small multiple of their mean. An estimate to start with, no more; `refineOrders` sees if it fails.
 */
export function expectedLoss(logDeterminant: number, trace: number): number {
  // A failed elimination tells nothing.
  return Number.isFinite(logDeterminant) ? (5 * Math.max(0, -logDeterminant)) / Math.max(1, trace) : 0;
}

function worst(logs: readonly number[], sizes: readonly number[]): number {
  // A number of size 0 has not been resolved yet.
  return Math.max(
    ...logs.map((l, k) => (sizes[k] === Number.NEGATIVE_INFINITY ? Number.POSITIVE_INFINITY : l - sizes[k])),
  );
}

/** log2 (2^a + 2^b). */
export function sumOfLogs(a: number, b: number): number {
  const most = Math.max(a, b);
  return most === Number.NEGATIVE_INFINITY ? most : most + Math.log2(2 ** (a - most) + 2 ** (b - most));
}
