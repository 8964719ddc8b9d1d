/** A run that is ended at its n-th pause, for n = 1, 2, 3 ... until it completes: never a half result, never a throw. */
import { describe, expect, it } from "vitest";
import { solveCase } from "../../src/solveCase.ts";
import type { RunContext, SolveOptions } from "../../src/solveCase.ts";
import { LIBRARY } from "../../presets/materials/index.ts";
import { cylinder, simpleCase } from "../helpers/solve.ts";

const document = simpleCase({
  outline: cylinder(0.03, 0.05),
  start: 500,
  ambient: 20,
  lasts: 900,
  sides: { "*": { film: 100 } },
  questions: [{ ask: "when", where: "every-point", reaches: 200 }],
});

function endingAt(pause: number): { context: RunContext; pauses: () => number } {
  let pauses = 0;
  return {
    context: {
      cancelled: () => pauses >= pause,
      progress: () => undefined,
      breathe: async () => {
        pauses++;
      },
      clock: () => 0,
    },
    pauses: () => pauses,
  };
}

describe.each([
  ["krylov", { nodes: 200 }],
  ["implicit-euler", { nodes: 60, element: 3, scheme: "implicit-euler", accuracy: 0.05 }],
] satisfies [string, SolveOptions][])("a run by %s", (_, options) => {
  it("ended at any of its pauses is cancelled with a whole part of the run or with nothing", async () => {
    let completed = false;
    for (let pause = 1; !completed; pause += pause < 6 ? 1 : 7) {
      expect(pause).toBeLessThan(5000);
      const { context } = endingAt(pause);
      const outcome = await solveCase(document, LIBRARY, options, context);
      completed = outcome.kind === "solved";
      if (completed) continue;
      expect(outcome.kind).toBe("cancelled");
      if (outcome.kind !== "cancelled" || !outcome.result) continue;
      const { history, stages } = outcome.result;
      expect(stages.at(-1)!.ended).toBeGreaterThan(0);
      expect(history.mean.every(Number.isFinite)).toBe(true);
      expect(history.time.at(-1)).toBeCloseTo(stages.at(-1)!.ended, 9);
    }
  });

  it("gives the same answers after cancelled ones as before: nothing is left behind", async () => {
    const whole = async (): Promise<string> =>
      JSON.stringify(await solveCase(document, LIBRARY, options, endingAt(Infinity).context));
    const before = await whole();
    for (const pause of [1, 2, 5]) await solveCase(document, LIBRARY, options, endingAt(pause).context);
    expect(await whole()).toBe(before);
  });
});

describe("what was reached", () => {
  it("is kept by implicit Euler when it is ended in the middle of a stage", async () => {
    const { context } = endingAt(40);
    const outcome = await solveCase(
      document,
      LIBRARY,
      { nodes: 60, element: 3, scheme: "implicit-euler", accuracy: 0.001 },
      context,
    );
    expect(outcome.kind).toBe("cancelled");
    const result = outcome.kind === "cancelled" ? outcome.result : undefined;
    expect(result).toBeDefined();
    expect(result!.stages[0]!.ended).toBeGreaterThan(0);
    expect(result!.stages[0]!.ended).toBeLessThan(900);
  });
});
