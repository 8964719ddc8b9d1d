/** The part on one mesh: pattern, capacity and conduction. Here materials become numbers for the assembly. */
import type { TriangleMesh } from "../../mesh/types.ts";
import type { Case, Curve } from "../case/types.ts";
import { assembleInterior, assemblyTarget, edgeAreas } from "../fem/assemble.ts";
import type { AssemblyTarget, InteriorMatrices } from "../fem/assemble.ts";
import { linearElements, quadraticElements } from "../fem/elementMesh.ts";
import type { ElementMesh, ElementOrder } from "../fem/elementMesh.ts";
import { exposedEdges } from "./conditions.ts";
import type { NamedSide } from "./conditions.ts";
import type { KeptWork } from "./kept.ts";

/** What depends on the outline and the materials alone. */
export interface PartMatrices {
  readonly mesh: ElementMesh;
  readonly target: AssemblyTarget;
  readonly interior: InteriorMatrices;
  /** integral of each shape function over the exposed surface [m2] */
  readonly exposedAreas: Float64Array;
  /** mesh sizes for the report [m3], [m2] */
  readonly volume: number;
  readonly exposedArea: number;
}

export interface PartSystem extends PartMatrices {
  /** the kept matrices themselves: what stages are kept under */
  readonly matrices: PartMatrices;
  /** degC at the start, per unknown */
  readonly start: Float64Array;
}

/** Assembles what all stages share, or takes it from what was kept. */
export function buildPart(
  input: Case,
  sides: readonly NamedSide[],
  mesh: TriangleMesh,
  element: ElementOrder,
  kept: KeptWork,
): PartSystem {
  const materials = input.regions.map((region) => input.materials[region.material]!);
  const properties = {
    conductivity: materials.map((material) => constant(material.conductivity)),
    volumetricHeatCapacity: materials.map((material) => material.density * constant(material.heatCapacity)),
  };
  const key = JSON.stringify([element, properties, sides.map((side) => side.kind)]);
  const matrices = kept.part(mesh, key, () => {
    const elements = element === 6 ? quadraticElements(mesh) : linearElements(mesh);
    const target = assemblyTarget(elements);
    const interior = assembleInterior(elements, target, properties);
    const exposedAreas = edgeAreas(elements, exposedEdges(elements, sides));
    return {
      mesh: elements,
      target,
      interior,
      exposedAreas,
      volume: sum(interior.volumes),
      exposedArea: sum(exposedAreas),
    };
  });
  return { ...matrices, matrices, start: startField(input, matrices, properties.volumetricHeatCapacity) };
}

/** Start temperatures; a node shared by regions starts at their mean, weighed by what each region stores there. */
function startField(
  input: Case,
  { mesh, interior }: PartMatrices,
  heatCapacity: readonly number[],
): Float64Array {
  const first = input.regions[0]!.start;
  const start = new Float64Array(mesh.nodes.length / 2).fill(first);
  if (input.regions.every((region) => region.start === first)) return start;
  const weight = new Float64Array(start.length);
  start.fill(0);
  const n = mesh.nodesPerElement;
  for (let e = 0; e < mesh.region.length; e++) {
    const region = mesh.region[e]!;
    for (let i = 0; i < n; i++) {
      const node = mesh.elements[n * e + i]!;
      const share = Math.abs(interior.regionVolumes[region]![node]!) * heatCapacity[region]!;
      weight[node]! += share;
      start[node]! += share * input.regions[region]!.start;
    }
  }
  for (let i = 0; i < start.length; i++) start[i]! /= weight[i]!;
  return start;
}

/** Curves that reach the linear system are constants: tables are refused before (unsupported.ts). */
export function constant(curve: Curve): number {
  if (typeof curve !== "number") throw new Error("a table reached the linear system");
  return curve;
}

const sum = (values: Float64Array): number => values.reduce((total, value) => total + value, 0);
