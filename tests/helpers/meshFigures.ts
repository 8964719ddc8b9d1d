/** Figures of a mesh that the tests hold to promises. */
import { incircle } from "robust-predicates";
import { wedgesOf } from "../../mesh/corners.ts";
import { edgeTable, halfEdgesOfSides } from "../../mesh/edges.ts";
import { readOutline } from "../../mesh/outline.ts";
import { triangleAngles, triangleArea, triangleQuality } from "../../mesh/quality.ts";
import type { MeshRequest, TriangleMesh } from "../../mesh/types.ts";

const DEGREE = Math.PI / 180;

export interface MeshFigures {
  /** angles of triangles without a vertex at a sharp corner [deg] */
  readonly leastAngle: number;
  readonly widestAngle: number;
  readonly meanQuality: number;
  /** largest ratio of the sizes of triangles that share an edge, away from sharp corners */
  readonly sizeJump: number;
  /** free edges that are not locally Delaunay */
  readonly notDelaunay: number;
  readonly nodes: number;
}

/** @param sharp  corners below this many degrees, and their triangles, are left out */
export function meshFigures(mesh: TriangleMesh, request: MeshRequest, sharp = 62): MeshFigures {
  const near = nearSharpCorners(mesh, request, sharp * DEGREE);
  const angles = new Float64Array(2);
  let [leastAngle, widestAngle, sum] = [180, 0, 0];
  for (let t = 0; t < mesh.triangleRegion.length; t++) {
    sum += triangleQuality(mesh, t);
    if (near[t]) continue;
    triangleAngles(mesh, t, angles);
    leastAngle = Math.min(leastAngle, angles[0]!);
    widestAngle = Math.max(widestAngle, angles[1]!);
  }
  const nodes = mesh.nodes.length / 2;
  return {
    leastAngle,
    widestAngle,
    meanQuality: sum / mesh.triangleRegion.length,
    nodes,
    ...pairFigures(mesh, near),
  };
}

/** Triangles with a corner at a vertex whose material is sharper than the limit. */
function nearSharpCorners(mesh: TriangleMesh, request: MeshRequest, limit: number): Uint8Array {
  const outline = readOutline(request);
  const places = new Set<string>();
  wedgesOf(outline).forEach((wedges, v) => {
    if (wedges.some((w) => w.angle < limit)) places.add(`${outline.x[v]},${outline.y[v]}`);
  });
  return Uint8Array.from(mesh.triangleRegion, (_, t) => {
    for (let i = 0; i < 3; i++) {
      const v = 2 * mesh.triangles[3 * t + i]!;
      if (places.has(`${mesh.nodes[v]},${mesh.nodes[v + 1]}`)) return 1;
    }
    return 0;
  });
}

function pairFigures(mesh: TriangleMesh, near: Uint8Array): { sizeJump: number; notDelaunay: number } {
  const { twin } = edgeTable(mesh);
  const isSide = new Uint8Array(twin.length);
  for (const e of halfEdgesOfSides(mesh)) {
    isSide[e] = 1;
    if (twin[e]! >= 0) isSide[twin[e]!] = 1;
  }
  const at = (e: number) => {
    const v = 2 * mesh.triangles[e]!;
    return [mesh.nodes[v]!, mesh.nodes[v + 1]!] as const;
  };
  let [sizeJump, notDelaunay] = [1, 0];
  for (let e = 0; e < twin.length; e++) {
    const o = twin[e]!;
    if (o < e) continue;
    const [t, u] = [Math.floor(e / 3), Math.floor(o / 3)];
    const ratio = Math.sqrt(triangleArea(mesh, t) / triangleArea(mesh, u));
    if (!near[t] && !near[u]) sizeJump = Math.max(sizeJump, ratio, 1 / ratio);
    if (isSide[e]) continue;
    const across = o % 3 === 0 ? o + 2 : o - 1;
    if (incircle(...at(3 * t), ...at(3 * t + 1), ...at(3 * t + 2), ...at(across)) > 0) notDelaunay++;
  }
  return { sizeJump, notDelaunay };
}
