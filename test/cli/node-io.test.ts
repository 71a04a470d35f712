/** The real machine: files read, written whole or not at all. */
import {
  chmodSync,
  existsSync,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  rmSync,
  symlinkSync,
  writeFileSync,
} from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { nodeIo } from "../../src/cli/io.ts";
import { InvalidArgumentError } from "../../src/core/errors.ts";

const io = nodeIo();
let folder = "";
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), "edgelaw-test-"));
});
afterEach(() => {
  rmSync(folder, { recursive: true, force: true });
});

describe("reading", () => {
  it("gives the bytes", () => {
    writeFileSync(join(folder, "a.csv"), "1,2\n");
    expect(new TextDecoder().decode(io.readFile("--data", join(folder, "a.csv")))).toBe("1,2\n");
  });

  it("names the option, the file and the reason", () => {
    const missing = join(folder, "none.csv");
    expect(() => io.readFile("--data", missing)).toThrow(InvalidArgumentError);
    expect(() => io.readFile("--data", missing)).toThrow(/--data: expected a readable file \(no such file/);
    expect(() => io.readFile("--data", folder)).toThrow(/it is a directory/);
    writeFileSync(join(folder, "a"), "");
    expect(() => io.readFile("--data", join(folder, "a", "b"))).toThrow(/not a directory/);
  });
});

describe("writing", () => {
  it("writes a new file and replaces an old one, leaving nothing beside it", () => {
    const path = join(folder, "report.html");
    io.writeFile("--output", path, "first");
    io.writeFile("--output", path, "second");
    expect(readFileSync(path, "utf8")).toBe("second");
    expect(readdirSync(folder)).toEqual(["report.html"]);
  });

  it("writes through a symbolic link instead of replacing it", () => {
    writeFileSync(join(folder, "real.txt"), "old");
    symlinkSync(join(folder, "real.txt"), join(folder, "link.txt"));
    io.writeFile("--output", join(folder, "link.txt"), "new");
    expect(readFileSync(join(folder, "real.txt"), "utf8")).toBe("new");
  });

  it("writes to a device without renaming over it", () => {
    io.writeFile("--output", "/dev/null", "text");
    expect(existsSync("/dev/null")).toBe(true);
    expect(readFileSync("/dev/null", "utf8")).toBe("");
  });

  it("refuses a directory, a missing folder and a file as folder, before anything is written", () => {
    mkdirSync(join(folder, "sub"));
    writeFileSync(join(folder, "a"), "");
    for (const path of [join(folder, "sub"), join(folder, "none", "r.html"), join(folder, "a", "r.html")]) {
      for (const act of [
        () => io.checkWritable("--output", path),
        () => io.writeFile("--output", path, "x"),
      ]) {
        expect(act).toThrow(InvalidArgumentError);
        expect(act).toThrow(/--output: expected a writable file \(/);
      }
    }
    expect(readdirSync(folder).sort()).toEqual(["a", "sub"]);
  });

  it("leaves the old file whole when the new one can't be put in its place", () => {
    const path = join(folder, "kept.txt");
    writeFileSync(path, "old");
    const root = process.getuid?.() === 0;
    chmodSync(folder, 0o500);
    try {
      // A superuser may write anywhere; then the write succeeds whole.
      if (root) io.writeFile("--output", path, "new");
      else expect(() => io.writeFile("--output", path, "new")).toThrow(/permission denied/);
      expect(readFileSync(path, "utf8")).toBe(root ? "new" : "old");
      expect(readdirSync(folder)).toEqual(["kept.txt"]);
    } finally {
      chmodSync(folder, 0o700);
    }
  });
});
