/**
 * The Airy functions' side of the compiled part: their tables in its memory, and its loops on arrays in that memory or
 * elsewhere. The loops are in assembly/airy-pair.ts.
 */
import { type LinearMemory, ROLE } from "../core/linear-memory.ts";
import { type Arithmetic, type Compiled, type CompiledRoutines, compiled } from "../core/web-assembly.ts";

/** The compiled part with a table in its memory. */
export interface TabulatedRoutines {
  readonly routines: CompiledRoutines;
  readonly memory: LinearMemory;
  /** Where the table begins, in bytes. */
  readonly table: number;
}

/** Points copied at a time. */
const CHUNK = 256;

/**
 * A function that gives the compiled part with a table in its memory, put there once.
 *
 * @param length - Numbers in the table.
 * @param fill - Writes them.
 * @returns Undefined for `"plain"`, where there is no compiled part, or while its memory is too full.
 */
export function compiledTable(
  length: number,
  fill: (out: Float64Array) => void,
): (arithmetic: Arithmetic) => TabulatedRoutines | undefined {
  let kept: TabulatedRoutines | undefined;
  const place = ({ routines, memory }: Compiled): TabulatedRoutines | undefined => {
    const table = memory.keep(length);
    if (table === undefined) return undefined;
    fill(table);
    return { routines, memory, table: table.byteOffset };
  };
  return (arithmetic) => {
    if (arithmetic === "plain") return undefined;
    if (kept === undefined) {
      const found = compiled();
      if (found !== undefined) kept = place(found);
    }
    return kept !== undefined && kept.memory.free >= 3 * CHUNK ? kept : undefined;
  };
}

/**
 * Ai and Ai' from x[from] on, up to the first point outside the table.
 *
 * @returns The index of that point, or `count`.
 */
export function runPairs(
  { routines, memory, table }: TabulatedRoutines,
  x: Float64Array,
  ai: Float64Array,
  aiPrime: Float64Array,
  from: number,
  count: number,
): number {
  const px = memory.placeOf(x, ROLE.nodes);
  const pa = px < 0 ? -1 : memory.placeOf(ai, ROLE.first);
  const pb = pa < 0 ? -1 : memory.placeOf(aiPrime, ROLE.second);
  if (pb >= 0) {
    const shift = 8 * from;
    return from + routines.airyPair(px + shift, pa + shift, pb + shift, count - from, table);
  }
  const { numbers, mark } = memory;
  // Nobody else runs in between, so the free part of the memory need not be lent.
  const start = 8 * mark;
  let i = from;
  while (i < count) {
    const size = Math.min(CHUNK, count - i);
    for (let k = 0; k < size; k++) numbers[mark + k] = x[i + k];
    const done = routines.airyPair(start, start + 8 * CHUNK, start + 16 * CHUNK, size, table);
    for (let k = 0; k < done; k++) {
      ai[i + k] = numbers[mark + CHUNK + k];
      aiPrime[i + k] = numbers[mark + 2 * CHUNK + k];
    }
    i += done;
    if (done < size) return i;
  }
  return count;
}
