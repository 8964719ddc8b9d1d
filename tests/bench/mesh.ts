/**
 * Speed of the mesher: outline to mesh, everything included, nothing kept between runs. It leaves out reading the
 * case, the search for outline faults, and refinement.
 */
import { meshRegions } from "../../mesh/meshRegions.ts";
import { meshQuality } from "../../mesh/quality.ts";
import type { MeshRequest } from "../../mesh/types.ts";

export interface MeshBench {
  readonly nodes: number;
  readonly triangles: number;
  readonly minAngleDeg: number;
  readonly meanQuality: number;
  /** median of the warm runs */
  readonly milliseconds: number;
  /** first run of the process, compilation included, if nothing was meshed before */
  readonly coldMilliseconds: number;
}

/** Warm runs: many for small meshes, whose times scatter most. */
function runsFor(nodes: number): number {
  return nodes <= 5000 ? 31 : nodes <= 100_000 ? 9 : 5;
}

/** @param nodes  number of nodes aimed at; the request's own is not used */
export function benchMesh(request: Omit<MeshRequest, "nodes">, nodes: number): MeshBench {
  const once = () => {
    const began = performance.now();
    const mesh = meshRegions({ ...request, nodes });
    return { mesh, took: performance.now() - began };
  };
  const cold = once();
  const times = Array.from({ length: runsFor(nodes) }, () => once().took).sort((p, q) => p - q);
  const { minAngleDeg, meanQuality } = meshQuality(cold.mesh);
  return {
    nodes: cold.mesh.nodes.length / 2,
    triangles: cold.mesh.triangles.length / 3,
    minAngleDeg,
    meanQuality,
    milliseconds: times[times.length >> 1]!,
    coldMilliseconds: cold.took,
  };
}
