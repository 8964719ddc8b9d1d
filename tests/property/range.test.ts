/**
 * No temperature leaves the range of start and surroundings with linear triangles, capacity and film lumped, marched by
 * implicit Euler, whatever the film. On meshes without obtuse angles the matrix is then monotone but for a few positive
 * couplings that the weight r leaves next to the axis; they are allowed 1e-5 of the span. Six-node triangles may leave
 * the range for the first instants: their stated bound is tested beside. Heat balances in both.
 */
import { describe, expect, it } from "vitest";
import { SHAPES, shapeOutline, standardSizes } from "../../src/case/shapes.ts";
import { simpleCase, solved } from "../helpers/solve.ts";

const SEED = 20260101;
let state = SEED;
const random = (): number => (state = (state * 48271) % 2147483647) / 2147483647;

interface Trial {
  readonly name: string;
  readonly film: number;
  readonly from: number;
  readonly to: number;
}

const trials: Trial[] = SHAPES.map(({ kind }) => ({
  name: kind,
  film: 10 ** (1 + 4 * random()),
  from: 20 + 900 * random(),
  to: -20 + 300 * random(),
}));

function caseOf({ name, film, from, to }: Trial) {
  const made = shapeOutline(
    name as (typeof SHAPES)[number]["kind"],
    standardSizes(name as (typeof SHAPES)[number]["kind"]),
  );
  if (!("outline" in made)) throw new Error(`no outline for ${name}`);
  return simpleCase({
    outline: made.outline,
    k: 15,
    start: from,
    ambient: to,
    lasts: 600,
    sides: { "*": { film } },
    questions: [{ ask: "spread" }],
  });
}

function sectionArea({ nodes, triangles }: { nodes: Float64Array; triangles: Uint32Array }): number {
  let twice = 0;
  for (let t = 0; t < triangles.length; t += 3) {
    const [a, b, c] = [2 * triangles[t]!, 2 * triangles[t + 1]!, 2 * triangles[t + 2]!];
    twice +=
      (nodes[b]! - nodes[a]!) * (nodes[c + 1]! - nodes[a + 1]!) -
      (nodes[c]! - nodes[a]!) * (nodes[b + 1]! - nodes[a + 1]!);
  }
  return twice / 2;
}

describe(`seed ${SEED}`, () => {
  it.each(trials)("$name, film $film: linear triangles stay within start and surroundings", async (trial) => {
    const { history, run } = await solved(caseOf(trial), {
      element: 3,
      scheme: "implicit-euler",
      nodes: 400,
      accuracy: 0.02,
    });
    const [low, high] = [Math.min(trial.from, trial.to), Math.max(trial.from, trial.to)];
    const slack = 1e-5 * (high - low);
    expect(Math.min(...history.coldest)).toBeGreaterThanOrEqual(low - slack);
    expect(Math.max(...history.hottest)).toBeLessThanOrEqual(high + slack);
    expect(run.energyImbalance).toBeLessThan(1e-9);
  });

  it.each(trials)(
    "$name, film $film: six-node triangles are within 0.5 % of the range after 0.5 h^2 / diffusivity",
    async (trial) => {
      const { history, run, section, mesh } = await solved(caseOf(trial), { nodes: 1500 });
      const [low, high] = [Math.min(trial.from, trial.to), Math.max(trial.from, trial.to)];
      const beyond = Array.from(
        history.time,
        (_, i) => Math.max(low - history.coldest[i]!, history.hottest[i]! - high) / (high - low),
      );
      expect(Math.max(...beyond)).toBeLessThan(0.25);
      // corner spacing h of equilateral triangles of the mean area
      const area = sectionArea(section) / mesh.triangles;
      const settledFrom = (0.5 * ((4 * area) / Math.sqrt(3))) / (15 / (7850 * 600));
      beyond.forEach((share, i) => {
        if (history.time[i]! > settledFrom) expect(share).toBeLessThan(5e-3);
      });
      expect(run.energyImbalance).toBeLessThan(1e-9);
    },
  );
});
