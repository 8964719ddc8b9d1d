/** Benchmarks that start from a case: the mesher alone, and the whole way from profile to answers with its parts. */
import { readFileSync } from "node:fs";
import { performance } from "node:perf_hooks";
import { meshRegions } from "../../mesh/meshRegions.ts";
import { meshQuality } from "../../mesh/quality.ts";
import { LIBRARY } from "../../presets/materials/index.ts";
import { meshWithUnknowns } from "../../src/run/meshCase.ts";
import { marchStages } from "../../src/run/marchStages.ts";
import { KeptWork } from "../../src/run/kept.ts";
import { buildPart } from "../../src/run/partSystem.ts";
import { buildTracks } from "../../src/run/tracks.ts";
import { checkDocument, solveCase } from "../../src/solveCase.ts";
import type { RunContext } from "../../src/solveCase.ts";
import { median, timeRounds } from "./rounds.ts";

const context: RunContext = {
  cancelled: () => false,
  progress: () => undefined,
  clock: () => performance.now() / 1000,
};
const round = (value: number): number => Number(value.toPrecision(4));

function soundCase(file: string): Extract<ReturnType<typeof checkDocument>, { input: unknown }> {
  const checked = checkDocument(readFileSync(file, "utf8"), LIBRARY);
  if ("problems" in checked)
    throw new Error(checked.problems.map(({ path, message }) => `${path}: ${message}`).join("\n"));
  return checked;
}

/** Code path: outline to triangles. Left out: reading the case, elements. */
export async function benchMesh(file: string, nodes: number): Promise<Record<string, number>> {
  const { profile, input } = soundCase(file);
  const request = { regions: profile.regions, points: input.probes.map((probe) => probe.at), nodes };
  const timed = await timeRounds(() => meshRegions(request));
  const mesh = meshRegions(request);
  const { minAngleDeg, meanQuality } = meshQuality(mesh);
  return {
    nodes: mesh.nodes.length / 2,
    triangles: mesh.triangles.length / 3,
    minAngleDeg: round(minAngleDeg),
    meanQuality: round(meanQuality),
    milliseconds: round(timed.warm),
    coldMilliseconds: round(timed.cold),
  };
}

/** Code path: profile to answers on one mesh of six-node triangles, `nodes` unknowns; parts timed apart. */
export async function benchSolve(file: string, nodes: number): Promise<Record<string, number>> {
  const { profile, input } = soundCase(file);
  const text = readFileSync(file, "utf8");
  const total = await timeRounds(() => solveCase(text, LIBRARY, { nodes }, context));
  const moved = await benchMovedAmbient(text, nodes);
  const request = { regions: profile.regions, points: input.probes.map((probe) => probe.at) };
  const parts = { mesh: [] as number[], assemble: [] as number[], march: [] as number[] };
  let unknowns = 0;
  for (let i = 0; i < 7; i++) {
    const from = performance.now();
    const mesh = meshWithUnknowns(request, nodes, 6);
    const meshed = performance.now();
    const work = new KeptWork();
    const part = buildPart(input, profile.sides, mesh, 6, work);
    const assembled = performance.now();
    const settings = { scheme: undefined, tolerance: 0.01, asked: [] };
    await marchStages(input, profile.sides, part, buildTracks(part, new Map()), settings, context, work);
    parts.mesh.push(meshed - from);
    parts.assemble.push(assembled - meshed);
    parts.march.push(performance.now() - assembled);
    unknowns = part.start.length;
    work.release();
  }
  return {
    nodes: unknowns,
    meshMs: round(median(parts.mesh)),
    assembleMs: round(median(parts.assemble)),
    marchMs: round(median(parts.march)),
    totalMs: round(total.warm),
    coldMs: round(total.cold),
    movedAmbientMs: round(moved),
  };
}

/** Code path: surroundings moved by a degree, everything else kept from the run before, to answers again. */
async function benchMovedAmbient(text: string, nodes: number): Promise<number> {
  const document = JSON.parse(text) as {
    stages: { ambient?: number; sides: Record<string, { ambient?: number } | string> }[];
  };
  const kept = new KeptWork();
  let by = 0;
  const timed = await timeRounds(() => {
    by = 1 - by;
    const moved = structuredClone(document);
    for (const stage of moved.stages) {
      if (typeof stage.ambient === "number") stage.ambient += by;
      for (const side of Object.values(stage.sides))
        if (typeof side !== "string" && typeof side.ambient === "number") side.ambient += by;
    }
    return solveCase(moved, LIBRARY, { nodes }, { ...context, kept });
  });
  kept.release();
  return timed.warm;
}
