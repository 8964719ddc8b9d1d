/** A mesh for a profile near a wanted number of unknowns. */
import { meshRegions } from "../../mesh/meshRegions.ts";
import type { MeshRequest, TriangleMesh } from "../../mesh/types.ts";
import type { ElementOrder } from "../fem/elementMesh.ts";

/** Unknowns that a mesh carries: its nodes, and for six-node elements one more per mesh edge. */
export function unknownsOf(mesh: TriangleMesh, element: ElementOrder): number {
  const corners = mesh.nodes.length / 2;
  if (element === 3) return corners;
  const oneSided = mesh.edgeSides.filter((side, i) => i % 2 === 1 && side < 0).length;
  return corners + (3 * (mesh.triangles.length / 3) + oneSided) / 2;
}

/** Share by which the number of unknowns may miss the wanted one. */
const MISS = 0.1;
const TRIES = 4;

/** Meshes, counts, and asks again for more or fewer corners until the unknowns are near enough. */
export function meshWithUnknowns(
  request: Omit<MeshRequest, "nodes">,
  unknowns: number,
  element: ElementOrder,
): TriangleMesh {
  let nodes = element === 6 ? Math.max(12, unknowns / 4) : unknowns;
  let best: { mesh: TriangleMesh; miss: number } | null = null;
  for (let turn = 0; turn < TRIES; turn++) {
    const mesh = meshRegions({ ...request, nodes: Math.round(nodes) });
    const found = unknownsOf(mesh, element);
    const miss = Math.abs(found - unknowns) / unknowns;
    if (!best || miss < best.miss) best = { mesh, miss };
    if (miss <= MISS) break;
    nodes *= unknowns / found;
  }
  return best!.mesh;
}
