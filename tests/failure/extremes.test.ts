/** Values no material has: the run ends with words, never with a throw, a hang or a number that means nothing. */
import { describe, expect, it } from "vitest";
import { LIBRARY } from "../../presets/materials/index.ts";
import type { VertexDocument } from "../../src/case/types.ts";
import { solveCase } from "../../src/solveCase.ts";
import { cylinder, quietContext, simpleCase, sphere } from "../helpers/solve.ts";

const extreme = (values: { outline: VertexDocument[]; k: number; c: number; film: number }) =>
  simpleCase({
    outline: values.outline,
    k: values.k,
    c: values.c,
    start: 500,
    ambient: 20,
    lasts: 600,
    sides: { "*": { film: values.film } },
    questions: [{ ask: "when", where: "every-point", reaches: 100 }],
  });

describe("a case with values far beyond any material", () => {
  it("that cannot be factorized is not solved, and says which unknown broke down", async () => {
    const outcome = await solveCase(
      extreme({ outline: cylinder(0.03, 0.05), k: 1e300, c: 500, film: 100 }),
      LIBRARY,
      { nodes: 200 },
      quietContext,
    );
    expect(outcome.kind).toBe("failed");
    expect(outcome.kind === "failed" && outcome.failure.message).toMatch(/singular|positive/);
    expect(outcome.kind === "failed" && outcome.failure.mend).toMatch(/materials and films/);
  });

  it("on which the quick estimates break down keeps its field, without them, and says so", async () => {
    const outcome = await solveCase(
      extreme({ outline: sphere(0.04), k: 1e-9, c: 1e-300, film: 1e12 }),
      LIBRARY,
      { nodes: 200 },
      quietContext,
    );
    expect(outcome.kind).toBe("solved");
    if (outcome.kind !== "solved") return;
    expect(outcome.result.estimates.series).toBeNull();
    expect(outcome.result.estimates.remarks.join(" ")).toMatch(/could not be worked out/);
    expect(outcome.result.history.mean.every(Number.isFinite)).toBe(true);
  });
});
