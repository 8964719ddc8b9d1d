/**
 * From a case on a mesh to the linear systems that are marched. Here heat meets elements: the only place that turns
 * materials and conditions into numbers for the assembly.
 */
import type { Case, Stage } from "../case/types.ts";
import { addFilm, assembleInterior, assemblyTarget, edgeAreas } from "../fem/assemble.ts";
import type { AssemblyTarget, InteriorMatrices } from "../fem/assemble.ts";
import type { ElementMesh } from "../fem/elementMesh.ts";
import type { HeldUnknowns, LinearSystem, Load } from "../march/types.ts";
import { exposedEdges, groupEdges } from "./conditions.ts";
import type { NamedSide } from "./conditions.ts";
import { signalOf } from "./signals.ts";

/** The part on one mesh: what does not change from stage to stage. */
export interface PartSystem {
  readonly mesh: ElementMesh;
  readonly target: AssemblyTarget;
  readonly interior: InteriorMatrices;
  /** degC at the start, per unknown */
  readonly start: Float64Array;
  /** integral of each shape function over the exposed surface [m2] */
  readonly exposedAreas: Float64Array;
  /** mesh sizes for the report [m3], [m2] */
  readonly volume: number;
  readonly exposedArea: number;
}

/** One stage: the system to march, and what is needed to balance its heat. */
export interface StageSystem {
  readonly linear: LinearSystem;
  /** how many of the loads, from the first on, come through sides; the rest are sources */
  readonly sideLoads: number;
  /** W/K per unknown: skin temperature times this is the heat that leaves through films */
  readonly filmWeights: Float64Array;
}

/** Assembles what all stages share. */
export function buildPart(input: Case, sides: readonly NamedSide[], mesh: ElementMesh): PartSystem {
  const target = assemblyTarget(mesh);
  const materials = input.regions.map((region) => input.materials[region.material]!);
  const interior = assembleInterior(mesh, target, {
    conductivity: materials.map((material) => constant(material.conductivity)),
    volumetricHeatCapacity: materials.map((material) => material.density * constant(material.heatCapacity)),
  });
  const exposedAreas = edgeAreas(mesh, exposedEdges(mesh, sides));
  return {
    mesh,
    target,
    interior,
    start: startField(input, mesh, interior),
    exposedAreas,
    volume: sum(interior.volumes),
    exposedArea: sum(exposedAreas),
  };
}

/** The system of one stage. Loads through sides come first, sources last. */
export function buildStage(
  input: Case,
  sides: readonly NamedSide[],
  part: PartSystem,
  stage: Stage,
): StageSystem {
  const { mesh, interior } = part;
  const conductance = interior.conduction.slice();
  const filmWeights = new Float64Array(mesh.nodes.length / 2);
  const loads: Load[] = [];
  const held: HeldUnknowns[] = [];
  const taken = new Set<number>();
  for (const { condition, edges } of groupEdges(mesh, sides, stage)) {
    if (condition.kind === "film") {
      const vector = addFilm(mesh, part.target.pattern, edges, constant(condition.film), conductance);
      for (let i = 0; i < vector.length; i++) filmWeights[i]! += vector[i]!;
      addLoad(loads, { vector, signal: signalOf(condition.ambient) });
    } else if (condition.kind === "flux") {
      addLoad(loads, { vector: edgeAreas(mesh, edges), signal: signalOf(condition.flux) });
    } else if (condition.kind === "held") {
      held.push({ unknowns: nodesOf(mesh, edges, taken), signal: signalOf(condition.held) });
    }
  }
  const sideLoads = loads.length;
  input.regions.forEach((region, i) => {
    const source = constant(region.source);
    if (source !== 0) loads.push({ vector: interior.regionVolumes[i]!, signal: signalOf(source) });
  });
  return {
    linear: {
      pattern: part.target.pattern,
      capacity: interior.capacity,
      conductance,
      loads,
      held,
      coordinates: mesh.nodes,
    },
    sideLoads,
    filmWeights,
  };
}

/** Loads driven by equal signals are one load: fewer bases for the march. */
function addLoad(loads: Load[], load: Load): void {
  const same = loads.find(
    (other) => equal(other.signal.times, load.signal.times) && equal(other.signal.values, load.signal.values),
  );
  if (!same) loads.push(load);
  else for (let i = 0; i < load.vector.length; i++) same.vector[i]! += load.vector[i]!;
}

const equal = (a: Float64Array, b: Float64Array): boolean =>
  a.length === b.length && a.every((value, i) => value === b[i]);

/** Nodes of some edges, each taken once: where two held sides meet, the first one holds the corner. */
function nodesOf(mesh: ElementMesh, edges: readonly number[], taken: Set<number>): Uint32Array {
  const nodes: number[] = [];
  for (const edge of edges)
    for (let i = 0; i < mesh.nodesPerEdge; i++) {
      const node = mesh.edges[mesh.nodesPerEdge * edge + i]!;
      if (taken.has(node)) continue;
      taken.add(node);
      nodes.push(node);
    }
  return Uint32Array.from(nodes);
}

/** Start temperatures; a node shared by regions starts at their mean, weighed by what each region stores there. */
function startField(input: Case, mesh: ElementMesh, interior: InteriorMatrices): Float64Array {
  const first = input.regions[0]!.start;
  const start = new Float64Array(mesh.nodes.length / 2).fill(first);
  if (input.regions.every((region) => region.start === first)) return start;
  const weight = new Float64Array(start.length);
  start.fill(0);
  const n = mesh.nodesPerElement;
  for (let e = 0; e < mesh.region.length; e++) {
    const region = mesh.region[e]!;
    const material = input.materials[input.regions[region]!.material]!;
    for (let i = 0; i < n; i++) {
      const node = mesh.elements[n * e + i]!;
      const share =
        Math.abs(interior.regionVolumes[region]![node]!) * material.density * constant(material.heatCapacity);
      weight[node]! += share;
      start[node]! += share * input.regions[region]!.start;
    }
  }
  for (let i = 0; i < start.length; i++) start[i]! /= weight[i]!;
  return start;
}

/** Curves that reach this file are constants: tables are refused before (unsupported.ts). */
function constant(curve: Case["regions"][number]["source"]): number {
  if (typeof curve !== "number") throw new Error("a table reached the linear system");
  return curve;
}

const sum = (values: Float64Array): number => values.reduce((total, value) => total + value, 0);
