/**
 * What rows at exposed sides are for: at equal numbers of nodes they bring the first instants at least three times
 * closer than a mesh graded by geometry alone, and cost nothing late. Both meshes against a fine one with rows;
 * six-node triangles, the march exact in time to 1e-6 of the span. Sizes, materials and films are invented.
 */
import { describe, expect, it } from "vitest";
import { meshRegions } from "../../mesh/meshRegions.ts";
import { firstRow } from "../../mesh/sizeField.ts";
import type { SideRows, TriangleMesh } from "../../mesh/types.ts";
import { LIBRARY } from "../../presets/materials/index.ts";
import type { CaseDocument } from "../../src/case/types.ts";
import { KeptWork } from "../../src/run/kept.ts";
import { solveLevel } from "../../src/run/level.ts";
import { fieldAt } from "../../src/run/timeline.ts";
import { checkDocument } from "../../src/solveCase.ts";
import { parts, rowsEverywhere } from "../helpers/outlines.ts";
import { quietContext } from "../helpers/solve.ts";

interface Trial {
  readonly part: string;
  readonly material: { density: number; conductivity: number; heatCapacity: number };
  readonly film: number;
  readonly halfThickness: number;
  /** the first is the instant that the rows are made for [s] */
  readonly early: readonly number[];
  readonly late: readonly number[];
  /** places on sides, so that they draw no small triangles of their own, and one deep inside */
  readonly places: readonly (readonly [number, number])[];
  readonly nodes: number;
}

const trials: Record<string, Trial> = {
  "stepped shaft, 600 nodes": {
    part: "shaft",
    material: { density: 7850, conductivity: 45, heatCapacity: 480 },
    film: 900,
    halfThickness: 0.2,
    early: [0.5, 1, 2],
    late: [1800, 7200],
    places: [
      [0.2, 0.15],
      [0.11, 0.45],
      [0.05, 0.6],
      [0.1, 0],
      [0.15, 0.3],
      [0, 0.3],
    ],
    nodes: 600,
  },
  "bottle with a wall of 3 mm, 1,600 nodes": {
    part: "bottle",
    material: { density: 2500, conductivity: 1, heatCapacity: 840 },
    film: 300,
    halfThickness: 0.0015,
    early: [0.02, 0.05],
    late: [5, 20],
    places: [
      [0.037, 0.07],
      [0.034, 0.07],
      [0.014, 0.19],
      [0.037, 0.03],
      [0.034, 0.12],
    ],
    nodes: 1600,
  },
};

const START = 1000;
const FINE_NODES = 12_000;

function documentOf({ part, material, film, late, places }: Trial): CaseDocument {
  const [outer] = parts[part]![0]!.loops;
  return {
    corelag: 1,
    title: "Rows beside a mesh without (invented)",
    part: {
      regions: [
        {
          name: "part",
          material: "stuff",
          outline: outer!.map(({ from, to, through }) => ({
            at: [from[0], from[1]],
            side: from[0] === 0 && to[0] === 0 ? "axis" : "skin",
            ...(through ? { through: [through[0], through[1]] as [number, number] } : {}),
          })),
        },
      ],
    },
    materials: { stuff: material },
    start: START,
    stages: [{ name: "cooling", lasts: late.at(-1)!, ambient: 0, sides: { "*": { film } } }],
    probes: places.map((at, i) => ({ name: `place ${i}`, at: [...at] })),
  };
}

/** Temperatures of all places, per instant, on one mesh [degC]. */
async function readings(trial: Trial, mesh: TriangleMesh): Promise<number[][]> {
  const checked = checkDocument(documentOf(trial), LIBRARY);
  if ("problems" in checked) throw new Error(JSON.stringify(checked.problems));
  const { input, profile } = checked;
  const asked = [...trial.early, ...trial.late];
  const settings = { scheme: undefined, tolerance: 1e-6 * START, asked };
  const level = await solveLevel(input, profile.sides, mesh, 6, settings, quietContext, new KeptWork());
  const field = new Float64Array(level!.timeline.size);
  return asked.map((time) => {
    fieldAt(level!.timeline, time, field);
    return trial.places.map((_, i) => field[mesh.pointNodes[i]!]!);
  });
}

/** Largest error of each instant as a share of the span. */
function errors(found: number[][], truth: number[][]): number[] {
  return found.map((row, k) => Math.max(...row.map((value, i) => Math.abs(value - truth[k]![i]!))) / START);
}

describe("rows at exposed sides", { timeout: 180_000 }, () => {
  for (const [name, trial] of Object.entries(trials)) {
    it(`${name}: three times closer early, no worse late`, async () => {
      const regions = parts[trial.part]!;
      const { density, conductivity, heatCapacity } = trial.material;
      const row = firstRow({
        instant: trial.early[0]!,
        diffusivity: conductivity / (density * heatCapacity),
        film: trial.film,
        conductivity,
        halfThickness: trial.halfThickness,
      })!;
      const rows: SideRows[] = rowsEverywhere(regions, row.thickness, row.growth);
      const points = trial.places;
      const truth = await readings(trial, meshRegions({ regions, points, rows, nodes: FINE_NODES }));
      const plain = errors(
        await readings(trial, meshRegions({ regions, points, nodes: trial.nodes })),
        truth,
      );
      const rowed = errors(
        await readings(trial, meshRegions({ regions, points, rows, nodes: trial.nodes })),
        truth,
      );
      trial.early.forEach((time, k) => {
        expect(plain[k]! / rowed[k]!, `gain at ${time} s: ${plain[k]} to ${rowed[k]}`).toBeGreaterThan(3);
      });
      trial.late.forEach((time, i) => {
        const k = trial.early.length + i;
        // Below a hundred-thousandth of the span, fifty times under the default accuracy, nothing is asked.
        expect(rowed[k]!, `late at ${time} s, plain ${plain[k]}`).toBeLessThan(Math.max(plain[k]!, 1e-5));
      });
    });
  }
});
