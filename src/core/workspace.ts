/**
 * Work space for many short arrays: one buffer cut into views, taken afresh for each use. Small typed arrays of their
 * own cost about a microsecond each, more than the arithmetic done on them.
 */
import { even, type LinearMemory } from "./linear-memory.ts";
import { type Arithmetic, compiled } from "./web-assembly.ts";

const NOTHING = new Float64Array(0);

/** See above. */
export class Workspace {
  /** How the loops on its arrays are to be run. */
  readonly arithmetic: Arithmetic;
  #capacity: number;
  #used = 0;
  #buffer = NOTHING; // ordinary memory, while #start is negative
  #start = -1; // where the buffer begins in linear memory
  #lender: LinearMemory | undefined;
  #mark = 0;

  /**
   * Ordinary memory.
   *
   * @param capacity - Numbers at the start; grows on demand.
   * @param arithmetic - For those who work on the arrays.
   */
  constructor(capacity: number, arithmetic: Arithmetic = "automatic") {
    this.#capacity = capacity;
    this.arithmetic = arithmetic;
  }

  /**
   * Memory of the compiled part, as far as it reaches, so that its loops need no copies; ordinary memory otherwise. To
   * be given back by {@link release}, in reverse order of borrowing.
   */
  static borrow(capacity: number, arithmetic: Arithmetic): Workspace {
    const workspace = new Workspace(capacity, arithmetic);
    const memory = arithmetic === "plain" ? undefined : compiled()?.memory;
    if (memory !== undefined) {
      workspace.#lender = memory;
      workspace.#mark = memory.mark;
      workspace.#claim(capacity);
    }
    return workspace;
  }

  /** Forgets everything taken so far; views handed out before are invalid from here on. */
  reset(): void {
    this.#used = 0;
  }

  /** Gives borrowed memory back; neither the work space nor its views may be used from here on. */
  release(): void {
    this.#lender?.giveBack(this.#mark);
    this.#lender = undefined;
    this.#capacity = 0;
  }

  /** A view of `count` numbers with arbitrary content. */
  take(count: number): Float64Array<ArrayBuffer> {
    // Earlier views keep the old buffer alive, or it stays on loan.
    if (this.#used + count > this.#capacity) this.#claim(2 * this.#capacity + count);
    const from = this.#used;
    this.#used += even(count);
    if (this.#lender !== undefined && this.#start >= 0) return this.#lender.view(this.#start + from, count);
    if (this.#buffer.length < this.#capacity) this.#buffer = new Float64Array(this.#capacity);
    return this.#buffer.subarray(from, from + count);
  }

  #claim(capacity: number): void {
    const start = this.#lender?.mark ?? -1;
    this.#start = this.#lender?.lend(capacity) ? start : -1;
    this.#capacity = capacity;
    this.#used = 0;
  }
}
