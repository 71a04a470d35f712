/**
 * The compiled part: loops in WebAssembly with 128-bit lanes, and the linear memory they work in.
 *
 * Compiled and plain loops run the same operations in the same order, so that results do not depend on which of the
 * two is used. The module is built and its memory made on first use; where that fails (no WebAssembly, no lanes,
 * compilation forbidden by a content security policy) everything runs plain.
 */
import { InvalidArgumentError } from "./errors.ts";
import { LinearMemory } from "./linear-memory.ts";
import { WEB_ASSEMBLY_MODULE } from "./web-assembly-module.ts";

/**
 * How the hot loops are run: `"wasm"` compiled, `"plain"` in plain JavaScript, `"automatic"` compiled where that is
 * possible and pays. Results are the same, bit for bit.
 */
export type Arithmetic = "automatic" | "wasm" | "plain";

/** The functions of the module. Pointers are bytes in linear memory; nothing is checked. */
export interface CompiledRoutines {
  /** `eliminateStructuredSymmetric` of `linalg/structured-symmetric.ts`. */
  readonly eliminateStructuredSymmetric: (
    x: number,
    a: number,
    b: number,
    e: number,
    pivots: number,
    rows: number,
    least: number,
  ) => number;
  /** Ai, Ai' up to the first point outside the table; returns the number done. */
  readonly airyPair: (x: number, ai: number, aiPrime: number, count: number, table: number) => number;
  /** ∫Ai² up to the first point beyond the table; returns the number done. */
  readonly airySquareIntegral: (
    x: number,
    ai: number,
    aiPrime: number,
    out: number,
    count: number,
    table: number,
  ) => number;
}

/** The routines with their memory. */
export interface Compiled {
  readonly routines: CompiledRoutines;
  readonly memory: LinearMemory;
}

/** What of the global `WebAssembly` is used here. */
export interface WebAssemblyHost {
  readonly Module: new (bytes: Uint8Array) => object;
  readonly Instance: new (module: object) => { readonly exports: object };
}

let found: Compiled | undefined;
let tried = false;

/** The compiled part, made on first use; undefined where it cannot be had. */
export function compiled(): Compiled | undefined {
  if (!tried) {
    tried = true;
    found = compile((globalThis as { WebAssembly?: WebAssemblyHost }).WebAssembly);
  }
  return found;
}

/** Builds the compiled part with a given `WebAssembly`; undefined where that fails, for whatever reason. */
export function compile(host: WebAssemblyHost | undefined): Compiled | undefined {
  try {
    if (host === undefined) return undefined;
    const { exports } = new host.Instance(new host.Module(decodeBase64(WEB_ASSEMBLY_MODULE)));
    const { eliminateStructuredSymmetric, airyPair, airySquareIntegral, memory } =
      exports as CompiledRoutines & { readonly memory: { readonly buffer: ArrayBuffer } };
    // An object of our own: engines look the members of the exports object up at every call.
    const routines = { eliminateStructuredSymmetric, airyPair, airySquareIntegral };
    return { routines, memory: new LinearMemory(memory.buffer) };
  } catch {
    return undefined;
  }
}

/** A choice of arithmetic that can be had here, or throw; `undefined` is `"automatic"`. */
export function requireArithmetic(argument: string, value: unknown): Arithmetic {
  if (value === undefined) return "automatic";
  if (value !== "automatic" && value !== "wasm" && value !== "plain") {
    throw new InvalidArgumentError(argument, '"automatic", "wasm" or "plain"', value);
  }
  if (value === "wasm" && compiled() === undefined) {
    throw new InvalidArgumentError(
      argument,
      '"automatic" or "plain" where WebAssembly with 128-bit lanes cannot be had',
      value,
    );
  }
  return value;
}

const ALPHABET = "ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/";

/** Bytes of a base64 text, with nothing that only one kind of host has. */
export function decodeBase64(text: string): Uint8Array {
  const digits = text.replace(/=+$/, "");
  const bytes = new Uint8Array(Math.floor((digits.length * 6) / 8));
  let bits = 0;
  let held = 0;
  let at = 0;
  for (const digit of digits) {
    held = (held << 6) | ALPHABET.indexOf(digit);
    bits += 6;
    if (bits >= 8) {
      bits -= 8;
      bytes[at++] = (held >> bits) & 255;
    }
    held &= 63;
  }
  return bytes;
}
