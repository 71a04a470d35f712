/**
 * Timing inside one process: the median over rounds of the time of one call, each round long enough to be measured.
 */

/** Median, fastest and slowest time of one call in seconds. */
export interface Timing {
  readonly median: number;
  readonly least: number;
  readonly most: number;
}

/**
 * Times a function: as many calls a round as fill `roundSeconds`, an odd number of rounds after one warm-up.
 */
export function time(call: () => unknown, roundSeconds = 0.02, rounds = 9): Timing {
  const now = (): number => Number(process.hrtime.bigint()) / 1e9;
  let calls = 1;
  for (;;) {
    const start = now();
    for (let i = 0; i < calls; i++) sink(call());
    const spent = now() - start;
    if (spent > roundSeconds) break;
    calls = Math.ceil(calls * Math.min(10, Math.max(1.5, (1.2 * roundSeconds) / Math.max(spent, 1e-9))));
  }
  const times = Array.from({ length: rounds }, () => {
    const start = now();
    for (let i = 0; i < calls; i++) sink(call());
    return (now() - start) / calls;
  }).sort((p, q) => p - q);
  return { median: times[rounds >> 1], least: times[0], most: times[rounds - 1] };
}

let kept: unknown;
/** Keeps results alive, so that no call is optimized away. */
function sink(value: unknown): void {
  kept = value;
}

/** The last result, for nobody in particular. */
export function lastResult(): unknown {
  return kept;
}

/** A time for people. */
export function showTime(seconds: number): string {
  if (seconds < 1e-6) return `${(seconds * 1e9).toPrecision(3)} ns`;
  if (seconds < 1e-3) return `${(seconds * 1e6).toPrecision(3)} µs`;
  if (seconds < 1) return `${(seconds * 1e3).toPrecision(3)} ms`;
  return `${seconds.toPrecision(3)} s`;
}

/** Their time over ours, or a dash. */
export function ratio(theirs: number | undefined, ours: number): string {
  return theirs === undefined ? "—" : `${(theirs / ours).toPrecision(3)}×`;
}
