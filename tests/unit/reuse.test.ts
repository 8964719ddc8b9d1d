/** Work kept between runs: what an edit does not touch is not done again. The work is counted, not timed. */
import { describe, expect, it } from "vitest";
import { LIBRARY } from "../../presets/materials/index.ts";
import type { CaseDocument } from "../../src/case/types.ts";
import { KeptWork, solveCase } from "../../src/solveCase.ts";
import { answerOf, cylinder, simpleCase } from "../helpers/solve.ts";

const base = (): CaseDocument =>
  simpleCase({
    outline: cylinder(0.03, 0.05),
    start: 500,
    ambient: 20,
    lasts: 1500,
    sides: { "*": { film: 100 } },
    questions: [{ ask: "when", where: "every-point", reaches: 60 }],
  });

interface Counted {
  readonly meshes: number;
  readonly assemblies: number;
  readonly stages: number;
  readonly analyses: number;
  readonly factorizations: number;
  readonly solves: number;
}

const countsOf = ({ counts, workspace }: KeptWork): Counted => ({ ...counts, ...workspace.counts });

/** Solves the base case, then an edited one on the same kept work. @returns the work of the second, and its answer */
async function workOfEdit(
  edit: (document: CaseDocument) => void,
): Promise<{ work: Counted; value: number; fresh: number }> {
  const kept = new KeptWork();
  const run = async (document: CaseDocument, with_: KeptWork): Promise<number> => {
    const context = { cancelled: () => false, progress: () => undefined, clock: () => 0, kept: with_ };
    const outcome = await solveCase(document, LIBRARY, { previewOnly: true }, context);
    if (outcome.kind !== "solved") throw new Error(JSON.stringify(outcome));
    return answerOf(outcome.result, "when").value!;
  };
  await run(base(), kept);
  const before = countsOf(kept);
  const document = base();
  edit(document);
  const value = await run(document, kept);
  const after = countsOf(kept);
  const work = Object.fromEntries(
    Object.entries(after).map(([key, count]) => [key, count - before[key as keyof Counted]]),
  ) as unknown as Counted;
  return { work, value, fresh: await run(document, new KeptWork()) };
}

const nothing: Counted = { meshes: 0, assemblies: 0, stages: 0, analyses: 0, factorizations: 0, solves: 0 };

describe("an edit", () => {
  it("of nothing does nothing again", async () => {
    const { work, value, fresh } = await workOfEdit(() => undefined);
    expect(work).toEqual(nothing);
    expect(value).toBe(fresh);
  });

  it("of the surroundings meshes, assembles, factorizes and solves nothing, and its answer is that of a fresh run", async () => {
    const { work, value, fresh } = await workOfEdit((document) => (document.stages[0]!.ambient = 35));
    expect(work).toEqual(nothing);
    expect(Math.abs(value / fresh - 1)).toBeLessThan(1e-4);
  });

  it("of the start temperature likewise", async () => {
    const { work, value, fresh } = await workOfEdit((document) => (document.start = 520));
    expect(work).toEqual(nothing);
    expect(Math.abs(value / fresh - 1)).toBeLessThan(1e-4);
  });

  it("of a film meshes nothing and assembles nothing inside", async () => {
    const { work, value, fresh } = await workOfEdit(
      (document) => (document.stages[0]!.sides = { "*": { film: 130 } }),
    );
    expect([work.meshes, work.assemblies, work.analyses]).toEqual([0, 0, 0]);
    expect([work.stages, work.factorizations]).toEqual([1, 1]);
    expect(Math.abs(value / fresh - 1)).toBeLessThan(1e-9);
  });

  it("of the outline does everything anew, once", async () => {
    const { work, value, fresh } = await workOfEdit(
      (document) => (document.part.regions[0]!.outline = cylinder(0.032, 0.05)),
    );
    expect(work.meshes).toBe(1);
    expect(work.assemblies).toBe(1);
    expect(value).toBe(fresh);
  });
});
