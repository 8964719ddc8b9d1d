/** From the working triangulation to the flat arrays that leave the mesher. */
import { isSideLock } from "./carve.ts";
import type { Outline } from "./outline.ts";
import { next, type Triangulation } from "./triangulation.ts";
import type { TriangleMesh } from "./types.ts";

/** @param firstInner  node number of the first requested point inside the part */
export function assembleMesh(mesh: Triangulation, outline: Outline, firstInner: number): TriangleMesh {
  const { corner, used, region } = mesh;
  const to = new Int32Array(mesh.nodes).fill(-1);
  for (let e = 0; e < used; e++) to[corner[e]!] = 0;
  let count = 0;
  for (let i = 0; i < to.length; i++) if (to[i] === 0) to[i] = count++;
  const nodes = new Float64Array(2 * count);
  for (let i = 0; i < to.length; i++) {
    if (to[i]! < 0) continue;
    nodes[2 * to[i]!] = mesh.xy[2 * i]!;
    nodes[2 * to[i]! + 1] = mesh.xy[2 * i + 1]!;
  }
  const triangles = new Uint32Array(used);
  for (let e = 0; e < used; e++) triangles[e] = to[corner[e]!]!;
  return {
    nodes,
    triangles,
    triangleRegion: Uint16Array.from(region.subarray(0, used / 3)),
    ...sideEdges(mesh, outline, to),
    arcs: Float64Array.from(outline.circles.flatMap((arc) => [arc.x, arc.y, arc.radius])),
    pointNodes: Uint32Array.from(outline.pointVertex, (v) => nodeOfPoint(v, firstInner, to)),
  };
}

function nodeOfPoint(v: number, firstInner: number, to: Int32Array): number {
  const node = to[v >= 0 ? v : firstInner - 1 - v]!;
  if (node < 0) throw new Error("a requested point is not in the mesh: it lies outside the part");
  return node;
}

type SideEdges = Pick<TriangleMesh, "edges" | "edgeSides" | "edgeArc">;

/** Each side edge once, with a triangle on its left; tags follow the sense of the edge. */
function sideEdges(mesh: Triangulation, outline: Outline, to: Int32Array): SideEdges {
  const { corner, twin, lock, used, xy } = mesh;
  const edges: number[] = [];
  const edgeSides: number[] = [];
  const edgeArc: number[] = [];
  for (let e = 0; e < used; e++) {
    if (!isSideLock(lock[e]!) || twin[e]! > e) continue;
    const piece = outline.pieces[lock[e]! - 1]!;
    const a = corner[e]!;
    const b = corner[next(e)]!;
    const along = runsAlong(piece, xy, a, b);
    edges.push(to[a]!, to[b]!);
    edgeSides.push(along ? piece.leftSide : piece.rightSide, along ? piece.rightSide : piece.leftSide);
    edgeArc.push(piece.circle);
  }
  return {
    edges: Uint32Array.from(edges),
    edgeSides: Int32Array.from(edgeSides),
    edgeArc: Int32Array.from(edgeArc),
  };
}

/** True when the way a-b runs in the sense of the piece; chords of an arc turn by 40 degrees at most. */
function runsAlong(piece: Outline["pieces"][number], xy: Float64Array, a: number, b: number): boolean {
  const dx = xy[2 * b]! - xy[2 * a]!;
  const dy = xy[2 * b + 1]! - xy[2 * a + 1]!;
  const { arc } = piece;
  if (!arc) return dx * (piece.bx - piece.ax) + dy * (piece.by - piece.ay) > 0;
  return ((xy[2 * a]! - arc.x) * dy - (xy[2 * a + 1]! - arc.y) * dx) * arc.turn > 0;
}
