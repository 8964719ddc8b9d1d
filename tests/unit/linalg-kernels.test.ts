/** The kernels alone, against twins in plain TypeScript; and what happens where they cannot run. */
import { afterEach, describe, expect, it, vi } from "vitest";
import { bytesFromBase64 } from "../../src/linalg/kernels/base64.ts";
import { takeInstance } from "../../src/linalg/kernels/instance.ts";
import { denseCholesky, type Dense } from "../helpers/dense.ts";
import { seeded } from "../helpers/systems.ts";

describe("base64", () => {
  it("reads what RFC 4648, section 10, gives as examples", () => {
    const text = (code: string) => String.fromCharCode(...bytesFromBase64(code));
    expect(["", "Zg==", "Zm8=", "Zm9v", "Zm9vYg==", "Zm9vYmE=", "Zm9vYmFy"].map(text)).toEqual([
      "",
      "f",
      "fo",
      "foo",
      "foob",
      "fooba",
      "foobar",
    ]);
  });
});

const instance = takeInstance();
const kernels = instance.exports;
const put = (values: readonly number[]) => {
  const pointer = kernels.allocateReals(values.length + 8);
  instance.reals(pointer, values.length).set(values);
  return pointer;
};
const randomBlock = (rows: number, columns: number, seed: number): Dense => {
  const random = seeded(seed);
  return Array.from({ length: rows }, () => Array.from({ length: columns }, () => 2 * random() - 1));
};

describe("c -= a b'", () => {
  for (const [rows, count, depth] of [
    [1, 1, 1],
    [4, 2, 3],
    [5, 5, 8],
    [9, 4, 7],
    [13, 3, 16],
    [16, 16, 5],
  ] as const)
    for (const lower of [false, true]) {
      if (lower && rows !== count) continue;
      it(`${rows} x ${count}, depth ${depth}${lower ? ", lower triangle" : ""}`, () => {
        const a = randomBlock(rows, depth, 1);
        const b = randomBlock(count, depth, 2);
        const c = randomBlock(rows, count, 3);
        const pointer = put(c.flat());
        const stride = 8 * depth;
        kernels.subtractProducts(
          pointer,
          8 * count,
          put(a.flat()),
          rows,
          put(b.flat()),
          count,
          stride,
          depth,
          +lower,
        );
        const found = instance.reals(pointer, rows * count);
        for (let i = 0; i < rows; i++)
          for (let j = 0; j < (lower ? i + 1 : count); j++) {
            const product = a[i]!.reduce((sum, value, k) => sum + value * b[j]![k]!, 0);
            expect(found[i * count + j]).toBeCloseTo(c[i]![j]! - product, 12);
          }
      });
    }
});

describe("Cholesky of a panel", () => {
  for (const [rows, width] of [
    [1, 1],
    [6, 2],
    [7, 3],
    [4, 4],
    [19, 5],
    [30, 17],
  ] as const)
    it(`${rows} rows, ${width} columns`, () => {
      const b = randomBlock(rows, rows, 4);
      const matrix = b.map((row, i) =>
        b.map((other, j) => row.reduce((s, v, k) => s + v * other[k]!, i === j ? 1 : 0)),
      );
      const panel = put(matrix.flatMap((row) => row.slice(0, width)));
      const reciprocals = put(matrix.slice(0, width).map((row, j) => row[j]!));
      expect(kernels.factorPanel(panel, rows, width, reciprocals, 1e-13)).toBe(1);
      const twin = denseCholesky(matrix);
      const found = instance.reals(panel, rows * width);
      for (let i = 0; i < rows; i++)
        for (let j = 0; j <= Math.min(i, width - 1); j++)
          expect(found[i * width + j]).toBeCloseTo(twin[i]![j]!, 10);
      for (let j = 0; j < width; j++)
        expect(instance.reals(reciprocals, width)[j]).toBeCloseTo(1 / twin[j]![j]!, 10);
    });

  it("stops at a pivot that is not positive and says which", () => {
    const panel = put([4, 2, 2, 1]);
    const reciprocals = put([4, 1]);
    expect(kernels.factorPanel(panel, 2, 2, reciprocals, 1e-13)).toBe(0);
    expect(kernels.failedPivot.value).toBeCloseTo(0, 14);
    expect(kernels.failedDiagonal.value).toBe(1);
  });
});

describe("where WebAssembly SIMD is missing", () => {
  afterEach(() => {
    vi.unstubAllGlobals();
    vi.resetModules();
  });
  const freshSolver = async () => {
    vi.resetModules();
    const { makeSolver } = await import("../../src/linalg/solver.ts");
    const { patternFromEntries } = await import("../../src/linalg/pattern.ts");
    return makeSolver(patternFromEntries(3, [0, 1], [1, 2]), new Float64Array(6)).kind;
  };

  it("conjugate gradients serve, without being asked for", async () => {
    vi.stubGlobal("WebAssembly", undefined);
    expect(await freshSolver()).toBe("conjugate-gradients");
    vi.stubGlobal("WebAssembly", { validate: () => false });
    expect(await freshSolver()).toBe("conjugate-gradients");
  });

  it("the same where a content policy forbids compiling", async () => {
    function forbid() {
      throw new Error("refused by policy");
    }
    vi.stubGlobal("WebAssembly", { validate: () => true, Module: forbid });
    expect(await freshSolver()).toBe("conjugate-gradients");
  });

  it("elsewhere the sparse factor serves", async () => {
    expect(await freshSolver()).toBe("cholesky");
  });
});
