/**
 * Everything the commands ask of the machine, as one interface, so that tests can run them in memory.
 * `nodeIo` is the real one; this folder is the only place that touches files, the process and the clock.
 */
import { randomBytes } from "node:crypto";
import {
  accessSync,
  constants,
  readFileSync,
  realpathSync,
  renameSync,
  statSync,
  unlinkSync,
  writeFileSync,
} from "node:fs";
import { dirname } from "node:path";
import { InvalidArgumentError } from "../core/errors.ts";

/** Where the progress bar is drawn; `isTTY` false or missing turns it off. */
export type ProgressStream = NodeJS.WritableStream & { readonly isTTY?: boolean };

/** The machine as the commands see it. */
export interface CommandIo {
  /** Bytes of a file. `argument` is the option that named it, for the error. */
  readFile(argument: string, path: string): Uint8Array;
  /** Bytes of the standard input until its end. */
  readStandardInput(): Promise<Uint8Array>;
  /** Throws when `path` can't be written, before any work is done for it. */
  checkWritable(argument: string, path: string): void;
  /** Writes the whole file or nothing. */
  writeFile(argument: string, path: string, text: string): void;
  /** Prints to the standard output. */
  print(text: string): void;
  /** Prints to the standard error. */
  complain(text: string): void;
  /** Stream of the progress bar. */
  readonly progressStream: ProgressStream;
  /** Milliseconds, steadily increasing. */
  milliseconds(): number;
  /** Date and time as text. */
  date(): string;
}

const REASONS: Readonly<Record<string, string>> = {
  ENOENT: "no such file or directory",
  EISDIR: "it is a directory",
  ENOTDIR: "a part of the path is not a directory",
  EACCES: "permission denied",
  EPERM: "operation not permitted",
  EROFS: "the file system is read-only",
  ENOSPC: "no space left",
  ENAMETOOLONG: "the name is too long",
  ERR_FS_FILE_TOO_LARGE: "the file is too large",
};

function reason(error: unknown): string {
  const code =
    typeof error === "object" && error !== null && "code" in error ? String(error.code) : "unknown error";
  return REASONS[code] ?? code;
}

function unreadable(argument: string, path: string, error: unknown): InvalidArgumentError {
  return new InvalidArgumentError(argument, `a readable file (${reason(error)})`, path);
}

function unwritable(argument: string, path: string, error: unknown): InvalidArgumentError {
  return new InvalidArgumentError(argument, `a writable file (${reason(error)})`, path);
}

/** What stands at a path: nothing, a regular file, a directory, or something else such as a device. */
function standing(path: string): "nothing" | "file" | "directory" | "other" {
  const stat = statSync(path, { throwIfNoEntry: false });
  if (stat === undefined) return "nothing";
  if (stat.isDirectory()) return "directory";
  return stat.isFile() ? "file" : "other";
}

function checkWritable(argument: string, path: string): void {
  try {
    const what = standing(path);
    if (what === "directory") throw Object.assign(new Error(), { code: "EISDIR" });
    if (what !== "nothing") accessSync(path, constants.W_OK);
    // The temporary sibling is made in the directory, so that must be writable too.
    if (what !== "other") accessSync(dirname(what === "file" ? realpathSync(path) : path), constants.W_OK);
  } catch (error) {
    throw unwritable(argument, path, error);
  }
}

/** Writes to a temporary sibling and renames it: a reader sees the old file or the new one, never a part. */
function writeWhole(argument: string, path: string, text: string): void {
  checkWritable(argument, path);
  const what = standing(path);
  try {
    // A device or a pipe can't be replaced by renaming; it takes the text directly.
    if (what === "other") {
      writeFileSync(path, text);
      return;
    }
    const target = what === "file" ? realpathSync(path) : path;
    const temporary = `${target}.${randomBytes(6).toString("hex")}.partial`;
    try {
      writeFileSync(temporary, text, { flag: "wx" });
      renameSync(temporary, target);
    } catch (error) {
      if (standing(temporary) === "file") unlinkSync(temporary);
      throw error;
    }
  } catch (error) {
    throw unwritable(argument, path, error);
  }
}

/** The real machine. */
export function nodeIo(): CommandIo {
  return {
    readFile(argument, path) {
      try {
        return readFileSync(path);
      } catch (error) {
        throw unreadable(argument, path, error);
      }
    },
    async readStandardInput() {
      const chunks: Buffer[] = [];
      for await (const chunk of process.stdin) chunks.push(Buffer.from(chunk));
      return Buffer.concat(chunks);
    },
    checkWritable,
    writeFile: writeWhole,
    print: (text) => void process.stdout.write(text),
    complain: (text) => void process.stderr.write(text),
    progressStream: process.stderr,
    milliseconds: () => performance.now(),
    date: () => new Date().toISOString(),
  };
}
