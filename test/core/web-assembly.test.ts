/**
 * The compiled part: that it is what its sources give, that it is found or done without, and that its memory holds.
 */
import { execFileSync } from "node:child_process";
import { fileURLToPath } from "node:url";
import { afterEach, describe, expect, it, vi } from "vitest";
import { InvalidArgumentError } from "../../src/core/errors.ts";
import { LinearMemory, ROLE } from "../../src/core/linear-memory.ts";
import {
  compile,
  compiled,
  decodeBase64,
  requireArithmetic,
  type WebAssemblyHost,
} from "../../src/core/web-assembly.ts";
import { WEB_ASSEMBLY_MODULE } from "../../src/core/web-assembly-module.ts";
import { Workspace } from "../../src/core/workspace.ts";

const here = (globalThis as unknown as { WebAssembly: WebAssemblyHost }).WebAssembly;
const root = fileURLToPath(new URL("../..", import.meta.url));

describe("the module", () => {
  it("is what the AssemblyScript sources give, byte for byte", () => {
    const said = execFileSync(process.execPath, [".config/generate-wasm.mjs", "--check"], {
      cwd: root,
      encoding: "utf8",
    });
    expect(said).toContain(" bytes");
  });

  it("is small enough for every browser to build it on its main thread (4096 bytes)", () => {
    expect(decodeBase64(WEB_ASSEMBLY_MODULE).length).toBeLessThanOrEqual(4096);
  });

  it("is decoded as Buffer decodes it, whatever the padding", () => {
    expect([...decodeBase64(WEB_ASSEMBLY_MODULE)]).toEqual([...Buffer.from(WEB_ASSEMBLY_MODULE, "base64")]);
    for (const text of ["", "a", "ab", "abc", "abcd", "ÿ\u0000~"]) {
      const bytes = Buffer.from(text, "latin1");
      expect([...decodeBase64(bytes.toString("base64"))]).toEqual([...bytes]);
    }
  });

  it("uses no relaxed lanes and no fused operations: 0xfd 0x80 0x02 and beyond never occur", () => {
    // Relaxed instructions are 0xfd with a number from 0x100 on, in LEB128 a second byte 0x80–0xff and a third 0x02.
    const bytes = decodeBase64(WEB_ASSEMBLY_MODULE);
    let relaxed = 0;
    for (let i = 0; i + 2 < bytes.length; i++) {
      if (bytes[i] === 0xfd && bytes[i + 1] >= 0x80 && bytes[i + 2] === 0x02) relaxed++;
    }
    expect(relaxed).toBe(0);
  });
});

describe("finding it", () => {
  it("works here, once", () => {
    expect(compiled()).toBeDefined();
    expect(compiled()).toBe(compiled());
  });

  it("does without where there is no WebAssembly, no lanes, no leave or no memory", () => {
    expect(compile(undefined)).toBeUndefined();
    const refusing = (error: Error): WebAssemblyHost => ({
      Module: class {
        constructor() {
          throw error;
        }
      },
      Instance: here.Instance,
    });
    expect(compile(refusing(new EvalError("content security policy")))).toBeUndefined();
    expect(compile(refusing(new SyntaxError("unknown instruction")))).toBeUndefined();
    const full: WebAssemblyHost = {
      Module: here.Module,
      Instance: class {
        readonly exports = {};
        constructor() {
          throw new RangeError("out of memory");
        }
      },
    };
    expect(compile(full)).toBeUndefined();
    expect(compile({ Module: here.Module, Instance: here.Instance })).toBeDefined();
  });

  it("checks the option", () => {
    expect(requireArithmetic("options.arithmetic", undefined)).toBe("automatic");
    for (const value of ["automatic", "wasm", "plain"]) {
      expect(requireArithmetic("options.arithmetic", value)).toBe(value);
    }
    for (const value of ["", "WASM", "js", 1, null, true]) {
      expect(() => requireArithmetic("options.arithmetic", value)).toThrow(InvalidArgumentError);
      expect(() => requireArithmetic("options.arithmetic", value)).toThrow(/^options\.arithmetic: /);
    }
  });
});

describe("a host that forbids compilation", () => {
  afterEach(() => {
    vi.unstubAllGlobals();
    vi.resetModules();
  });

  it("gets the same results, and an error only where it insists", async () => {
    const ours = await import("../../src/index.ts");
    const expected = ours.fredholmDeterminant(ours.airyKernel(), ours.halfLine(-2));
    const forbidding = {
      Module: class {
        constructor() {
          throw new EvalError("refused to compile");
        }
      },
    };
    for (const stub of [forbidding, undefined]) {
      vi.stubGlobal("WebAssembly", stub);
      vi.resetModules();
      const theirs = await import("../../src/index.ts");
      const { InvalidArgumentError: Refusal } = await import("../../src/core/errors.ts");
      const call = (arithmetic?: "automatic" | "wasm" | "plain") =>
        theirs.fredholmDeterminant(
          theirs.airyKernel(),
          theirs.halfLine(-2),
          arithmetic === undefined ? {} : { arithmetic },
        );
      expect(call()).toEqual(expected);
      expect(call("automatic")).toEqual(expected);
      expect(call("plain")).toEqual(expected);
      expect(() => call("wasm")).toThrow(Refusal);
      expect(() => call("wasm")).toThrow(/^options\.arithmetic: /);
    }
  });
});

describe("linear memory", () => {
  it("lends from one end, keeps from the other, and never overlaps", () => {
    const memory = new LinearMemory(new ArrayBuffer(8 * 64));
    expect(memory.free).toBe(64);
    const mark = memory.mark;
    expect(memory.lend(5)).toBe(true); // rounded up to 6
    expect(memory.mark).toBe(6);
    const kept = memory.keep(7);
    expect(kept?.length).toBe(7);
    expect(memory.free).toBe(64 - 6 - 8);
    expect(memory.lend(51)).toBe(false);
    expect(memory.keep(51)).toBeUndefined();
    expect(memory.lend(50)).toBe(true);
    expect(memory.free).toBe(0);
    memory.giveBack(mark);
    expect(memory.free).toBe(56);
    memory.view(0, 56).fill(1);
    expect([...(kept ?? [])]).toEqual([0, 0, 0, 0, 0, 0, 0]);
  });

  it("knows where an array lies, remembered or not", () => {
    const memory = new LinearMemory(new ArrayBuffer(8 * 64));
    const views = Array.from({ length: 30 }, (_, k) => memory.view(2 * k, 2));
    for (let round = 0; round < 2; round++) {
      for (const role of Object.values(ROLE)) {
        views.forEach((view, k) => {
          expect(memory.placeOf(view, role)).toBe(16 * k);
          expect(memory.placeOf(view, role)).toBe(16 * k);
        });
        const elsewhere = [new Float64Array(4), memory.view(6, 4).slice(), new Float64Array(64)];
        for (const array of elsewhere) expect(memory.placeOf(array, role)).toBe(-1);
      }
    }
    expect(memory.placeOf(memory.view(6, 4).subarray(1), ROLE.nodes)).toBe(56);
    expect(new LinearMemory(new ArrayBuffer(64)).placeOf(views[0], ROLE.nodes)).toBe(-1);
  });
});

describe("a borrowed work space", () => {
  const memory = compiled()?.memory as LinearMemory;

  it("lies in linear memory, every array at a lane, apart from the others", () => {
    const before = memory.free;
    const workspace = Workspace.borrow(20, "automatic");
    const arrays = [5, 4, 1, 6].map((count) => workspace.take(count));
    for (const array of arrays) expect(memory.placeOf(array, ROLE.nodes) % 16).toBe(0);
    arrays.forEach((array, k) => {
      array.fill(k);
    });
    arrays.forEach((array, k) => {
      expect(array.every((value) => value === k)).toBe(true);
    });
    workspace.release();
    expect(memory.free).toBe(before);
  });

  it("grows without moving what it gave, goes to ordinary memory when the other is full, and gives all back", () => {
    const before = memory.free;
    const workspace = Workspace.borrow(8, "automatic");
    const first = workspace.take(8).fill(1);
    const second = workspace.take(1000).fill(2);
    const huge = workspace.take(before).fill(3);
    expect(memory.placeOf(second, ROLE.nodes)).toBeGreaterThanOrEqual(0);
    expect(memory.placeOf(huge, ROLE.nodes)).toBe(-1);
    expect([first[7], second[0], second[999], huge[before - 1]]).toEqual([1, 2, 2, 3]);
    workspace.release();
    expect(memory.free).toBe(before);
    const plain = Workspace.borrow(8, "plain");
    expect(memory.placeOf(plain.take(8), ROLE.nodes)).toBe(-1);
    plain.release();
    expect(memory.free).toBe(before);
  });

  it("leaks nothing in 1e6 uses", () => {
    const before = memory.free;
    for (let k = 0; k < 1e6; k++) {
      const workspace = Workspace.borrow(64 + (k % 3), "automatic");
      if (k % 1000 === 0) workspace.take(200);
      workspace.release();
    }
    expect(memory.free).toBe(before);
  });
});
