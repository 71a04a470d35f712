/** A machine in memory for tests of the command line. */
import { PassThrough } from "node:stream";
import type { CommandIo, ProgressStream } from "../../src/cli/io.ts";
import { run } from "../../src/cli/run.ts";
import { InvalidArgumentError } from "../../src/core/errors.ts";

/** What a run left behind. */
export interface Outcome {
  readonly code: number;
  readonly out: string;
  readonly err: string;
  readonly written: ReadonlyMap<string, string>;
  /** What the progress bar drew. */
  readonly bar: string;
}

/** What the machine offers. */
export interface MemoryMachine {
  readonly files?: Readonly<Record<string, string | Uint8Array>>;
  readonly input?: string;
  /** Paths that can't be written. */
  readonly readOnly?: readonly string[];
  readonly terminal?: boolean;
  /** Milliseconds that pass between two looks at the clock. */
  readonly tick?: number;
}

/** Runs a command line on a machine in memory. */
export async function runInMemory(argv: readonly string[], machine: MemoryMachine = {}): Promise<Outcome> {
  const written = new Map<string, string>();
  let out = "";
  let err = "";
  let bar = "";
  let clock = 0;
  const stream = Object.assign(new PassThrough(), { isTTY: machine.terminal === true, columns: 80 });
  stream.on("data", (chunk: Buffer) => {
    bar += chunk.toString();
  });
  const encoder = new TextEncoder();
  const refuse = (argument: string, path: string): void => {
    if (machine.readOnly?.includes(path)) throw new InvalidArgumentError(argument, "a writable file", path);
  };
  const io: CommandIo = {
    readFile(argument, path) {
      const text = machine.files?.[path];
      if (text === undefined) throw new InvalidArgumentError(argument, "a readable file", path);
      return typeof text === "string" ? encoder.encode(text) : text;
    },
    readStandardInput: () => Promise.resolve(encoder.encode(machine.input ?? "")),
    checkWritable: refuse,
    writeFile(argument, path, text) {
      refuse(argument, path);
      written.set(path, text);
    },
    print: (text) => {
      out += text;
    },
    complain: (text) => {
      err += text;
    },
    progressStream: stream as ProgressStream,
    milliseconds: () => {
      clock += machine.tick ?? 1;
      return clock;
    },
    date: () => "2026-12-01T12:00:00.000Z",
  };
  const code = await run(argv, io);
  await new Promise((resolve) => setImmediate(resolve));
  return { code, out, err, written, bar };
}
