/**
 * The numbers in the linear memory of the compiled part. Its size is fixed: growing would cut off every array that
 * looks into it, also those of a computation that waits for a kernel which calls the library itself.
 *
 * Loans are a stack: all users are synchronous and give back in reverse order, in a `finally`. What is kept for good
 * comes off the other end.
 *
 * Arrays in this memory carry their place as a property of their own: asking a typed array for its buffer and offset
 * costs 20 ns, a small determinant would spend a quarter of its time on that.
 */
const PLACE = Symbol("place");

/** An array, perhaps in linear memory. */
interface Placed {
  [PLACE]?: number;
}

/** Where an array lies in linear memory, in bytes; −1 for an array elsewhere. */
export function placeOf(array: Float64Array): number {
  return (array as Placed)[PLACE] ?? -1;
}

/** See above. */
export class LinearMemory {
  /** The whole memory as numbers. */
  readonly numbers: Float64Array<ArrayBuffer>;
  #used = 0; // numbers on loan
  #end: number; // numbers up to those kept for good

  /** @param buffer - The memory, a multiple of 16 bytes. */
  constructor(buffer: ArrayBuffer) {
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

  /** An array of `count` numbers that knows its place; `start` in numbers. */
  view(start: number, count: number): Float64Array<ArrayBuffer> {
    const array: Float64Array<ArrayBuffer> & Placed = this.numbers.subarray(start, start + count);
    array[PLACE] = 8 * start;
    return array;
  }
}

/** Two numbers fill a lane: every array begins at one. */
export function even(count: number): number {
  return count + (count % 2);
}
