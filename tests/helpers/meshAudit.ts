/** One random outline meshed and held to every promise; what it breaks, in words. */
import { checkMesh } from "../../mesh/checkMesh.ts";
import { meshRegions } from "../../mesh/meshRegions.ts";
import { findOutlineFaults } from "../../mesh/outlineFaults.ts";
import type { MeshRequest, OutlineRegion } from "../../mesh/types.ts";
import { meshFigures } from "./meshFigures.ts";
import { rowsEverywhere } from "./outlines.ts";
import { randomCase, randomNumbers, type RandomCase } from "./randomOutlines.ts";

/**
 * Means that hold for whole families. All but about one mesh in a hundred reach 0.96; the others have fewer than 1,000
 * nodes of which most are given, by vertices on tilted sides or by walls of one triangle.
 */
const LEAST_MEAN: Record<string, number> = { thin: 0.9, tilted: 0.92 };
const LEAST_MEAN_ELSE = 0.945;

/** What is wrong with the mesh of a seed's outline: nothing, as a rule. */
export function auditSeed(seed: number): string[] {
  const { kind, regions, points, nodes } = randomCase(seed);
  const faults = findOutlineFaults(regions, points).filter(({ isRemark }) => !isRemark);
  if (faults.length > 0) return [`${kind}: taken for faulty: ${faults.map(({ code }) => code).join()}`];
  const request = { regions, points, nodes };
  const mesh = meshRegions(request);
  const wrong = checkMesh(mesh, request);
  const figures = meshFigures(mesh, request);
  const say = (isTrue: boolean, what: string) => {
    if (!isTrue) wrong.push(what);
  };
  say(figures.leastAngle >= 31, `smallest angle ${figures.leastAngle}`);
  say(figures.widestAngle <= 120, `widest angle ${figures.widestAngle}`);
  say(figures.sizeJump <= 2, `neighbouring sizes ${figures.sizeJump}`);
  say(figures.notDelaunay === 0, `${figures.notDelaunay} edges not Delaunay`);
  say(figures.meanQuality >= (LEAST_MEAN[kind] ?? LEAST_MEAN_ELSE), `mean quality ${figures.meanQuality}`);
  say(Math.abs(figures.nodes / nodes - 1) <= 0.15, `${figures.nodes} nodes for ${nodes}`);
  return wrong.map((what) => `${kind}: ${what}`);
}

/** The same outline with rows on all its sides: soundness only, since rows are exempt from the angle rule. */
export function auditRows(seed: number): string[] {
  const { kind, regions, points, nodes } = randomCase(seed);
  const thickness = extent(regions) / [50, 200, 1000, 5000][seed % 4]!;
  const request = { regions, points, nodes, rows: rowsEverywhere(regions, thickness) };
  return checkMesh(meshRegions(request), request).map((what) => `${kind} with rows: ${what}`);
}

function extent(regions: readonly OutlineRegion[]): number {
  const all = regions.flatMap(({ loops }) => loops.flat().map(({ from }) => from));
  const span = (k: 0 | 1) => Math.max(...all.map((p) => p[k])) - Math.min(...all.map((p) => p[k]));
  return Math.max(span(0), span(1));
}

/** A random outline with one thing spoiled; it may by luck still be sound. */
export function spoiltCase(seed: number): RandomCase {
  const found = randomCase(seed);
  const draw = randomNumbers(seed + 7919);
  const pick = (n: number) => Math.floor(draw() * n);
  const regions = structuredClone(found.regions) as {
    loops: { from: [number, number]; to: [number, number]; through?: [number, number] }[][];
  }[];
  const region = regions[pick(regions.length)]!;
  const loop = region.loops[pick(region.loops.length)]!;
  const k = pick(loop.length);
  const side = loop[k]!;
  const before = loop[(k + loop.length - 1) % loop.length]!;
  const ways = [
    () => (side.from = before.to = [4 * draw() - 1, 4 * draw() - 2]),
    () => (side.from = before.to = [...loop[pick(loop.length)]!.from]),
    () => (side.from = [side.from[0] + 0.1 * draw(), side.from[1]]),
    () => loop.splice(k, 1),
    () => (side.through = [4 * draw(), 4 * draw() - 2]),
    () => regions.push({ loops: [structuredClone(loop)] }),
    () => region.loops.push(structuredClone(loop)),
    () => loop.forEach((s) => ((s.from[0] -= 1.5), (s.to[0] -= 1.5), s.through && (s.through[0] -= 1.5))),
    () => (side.from = before.to = [side.to[0] + 1e-9, side.to[1]]),
    () => (side.from = before.to = [NaN, side.to[1]]),
    () => loop.splice(0, loop.length - 2),
  ];
  ways[pick(ways.length)]!();
  return { ...found, regions: regions as OutlineRegion[], points: [] };
}

/** An outline is meshed soundly or its fault is named; even a faulty one ends the mesher with words. */
export function auditSpoilt(seed: number): string[] {
  const { kind, regions, nodes } = spoiltCase(seed);
  const request: MeshRequest = { regions, nodes: Math.min(nodes, 1500) };
  const isFaulty = findOutlineFaults(regions).some(({ isRemark }) => !isRemark);
  try {
    const mesh = meshRegions(request);
    return isFaulty ? [] : checkMesh(mesh, request).map((what) => `${kind}, spoilt: ${what}`);
  } catch (error) {
    const said = error instanceof Error ? error.message : String(error);
    if (!isFaulty) return [`${kind}, spoilt, found sound, yet: ${said}`];
    return EXPLAINED.test(said) ? [] : [`${kind}, spoilt, broke the mesher: ${said}`];
  }
}

/** Messages of the mesher about faulty outlines, with the place or the number. */
const EXPLAINED =
  /crossed or covered|too fine|not in the mesh|not enclosed|place that is no number|empty outline/;
