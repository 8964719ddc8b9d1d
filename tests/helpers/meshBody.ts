/** Volume and exposed area of the revolved mesh, for checks against closed forms. */
import { triangleArea } from "../../mesh/quality.ts";
import type { TriangleMesh } from "../../mesh/types.ts";

/** Volume of the revolved triangles [m3], by Pappus exactly: 2 pi r A with the centroid's r. */
export function meshVolume(mesh: TriangleMesh, region?: number): number {
  let volume = 0;
  mesh.triangleRegion.forEach((r, t) => {
    if (region !== undefined && r !== region) return;
    let sum = 0;
    for (let i = 0; i < 3; i++) sum += mesh.nodes[2 * mesh.triangles[3 * t + i]!]!;
    volume += ((2 * Math.PI) / 3) * sum * triangleArea(mesh, t);
  });
  return volume;
}

/** Area of the revolved exposed edges [m2]. Edges on the axis have none. */
export function meshExposedArea({ nodes, edges, edgeSides }: TriangleMesh): number {
  let area = 0;
  for (let k = 0; k < edges.length / 2; k++) {
    if (edgeSides[2 * k + 1]! >= 0) continue;
    const [a, b] = [2 * edges[2 * k]!, 2 * edges[2 * k + 1]!];
    area +=
      Math.PI * (nodes[a]! + nodes[b]!) * Math.hypot(nodes[a]! - nodes[b]!, nodes[a + 1]! - nodes[b + 1]!);
  }
  return area;
}
