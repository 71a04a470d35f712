/**
 * Work space for many short arrays: one buffer cut into views, taken afresh for each use. Small typed arrays of their
 * own cost about a microsecond each, more than the arithmetic done on them.
 */
export class Workspace {
  #buffer: Float64Array<ArrayBuffer>;
  #used = 0;

  /** @param capacity - Numbers at the start; grows on demand. */
  constructor(capacity: number) {
    this.#buffer = new Float64Array(capacity);
  }

  /** Forgets everything taken so far; views handed out before are invalid from here on. */
  reset(): void {
    this.#used = 0;
  }

  /** A view of `count` numbers with arbitrary content. */
  take(count: number): Float64Array<ArrayBuffer> {
    if (this.#used + count > this.#buffer.length) {
      // Earlier views keep the old buffer alive.
      this.#buffer = new Float64Array(2 * this.#buffer.length + count);
      this.#used = 0;
    }
    const view = this.#buffer.subarray(this.#used, this.#used + count);
    this.#used += count;
    return view;
  }
}
