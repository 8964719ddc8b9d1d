import type { TriangleMesh } from "./types.ts";

/**
 * Middle of a side edge on its true side: half-way on a line, on the circle above the chord's middle on an arc.
 *
 * @param edge  number of the side edge
 * @param out   r, z [m]
 */
export function edgeMidpoint(mesh: TriangleMesh, edge: number, out: Float64Array | number[]): void {
  const { nodes, edges, edgeArc, arcs } = mesh;
  const a = 2 * edges[2 * edge]!;
  const b = 2 * edges[2 * edge + 1]!;
  const r = (nodes[a]! + nodes[b]!) / 2;
  const z = (nodes[a + 1]! + nodes[b + 1]!) / 2;
  const arc = 3 * edgeArc[edge]!;
  out[0] = r;
  out[1] = z;
  if (arc < 0) return;
  // Chords turn by 40 degrees at most, so that the chord's middle is never near the centre.
  const dr = r - arcs[arc]!;
  const dz = z - arcs[arc + 1]!;
  const stretch = arcs[arc + 2]! / Math.hypot(dr, dz);
  out[0] = arcs[arc]! + stretch * dr;
  out[1] = arcs[arc + 1]! + stretch * dz;
}
