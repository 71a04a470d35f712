/**
 * The numbers in the linear memory of the compiled part. Its size is fixed: growing would cut off every array that
 * looks into it, also those of a computation that waits for a kernel which calls the library itself.
 *
 * Loans are a stack: all users are synchronous and give back in reverse order, in a `finally`. What is kept for good
 * comes off the other end.
 */

/** What an array is to a loop; the last array in each role is remembered with its place. */
export const ROLE = { nodes: 0, first: 1, second: 2, diagonal: 3 } as const;
const ROLES = 4;

/** See above. */
export class LinearMemory {
  /** The whole memory as numbers. */
  readonly numbers: Float64Array<ArrayBuffer>;
  readonly #buffer: ArrayBuffer;
  // The array last seen in each role: asking a typed array for its buffer and offset costs 20 ns, this 1 ns.
  readonly #arrays: (Float64Array | undefined)[] = new Array(ROLES).fill(undefined);
  readonly #places: number[] = new Array(ROLES).fill(-1);
  #used = 0; // numbers on loan
  #end: number; // numbers up to those kept for good

  /** @param buffer - The memory, a multiple of 16 bytes. */
  constructor(buffer: ArrayBuffer) {
    this.#buffer = buffer;
    this.numbers = new Float64Array(buffer);
    this.#end = this.numbers.length;
  }

  /** Where the next loan begins, in numbers; also the mark that {@link giveBack} takes. */
  get mark(): number {
    return this.#used;
  }

  /** How many numbers could be lent now. */
  get free(): number {
    return this.#end - this.#used;
  }

  /** Lends `count` numbers with arbitrary content, from the present mark on. Whether there was room. */
  lend(count: number): boolean {
    if (!(even(count) <= this.free)) return false;
    this.#used += even(count);
    return true;
  }

  /** Takes back everything lent since `mark`. */
  giveBack(mark: number): void {
    this.#used = mark;
  }

  /** `count` numbers for good, undefined if there is no room. */
  keep(count: number): Float64Array<ArrayBuffer> | undefined {
    if (!(even(count) <= this.free)) return undefined;
    this.#end -= even(count);
    return this.view(this.#end, count);
  }

  /** An array of `count` numbers; `start` in numbers. */
  view(start: number, count: number): Float64Array<ArrayBuffer> {
    return this.numbers.subarray(start, start + count);
  }

  /** Where an array lies in this memory, in bytes; −1 for an array elsewhere. */
  placeOf(array: Float64Array, role: number): number {
    if (this.#arrays[role] === array) return this.#places[role];
    const place = array.buffer === this.#buffer ? array.byteOffset : -1;
    this.#arrays[role] = array;
    this.#places[role] = place;
    return place;
  }
}

/** Two numbers fill a lane: every array begins at one. */
export function even(count: number): number {
  return count + (count % 2);
}
