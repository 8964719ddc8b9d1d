import { edgeMidpoint } from "./edgeMidpoint.ts";
import { edgeTable, halfEdgesOfSides, nextCorner, type EdgeTable } from "./edges.ts";
import type { TriangleMesh } from "./types.ts";

/**
 * Cuts every triangle into four at the middles of its edges. New side nodes lie on the true arc, tags are kept.
 *
 * Old nodes keep their numbers and places; the middle of edge k becomes node (old nodes + k), in the order of
 * `edgeTable`. Triangle t becomes 4 t .. 4 t + 3: at its first, second and third corner, and in the middle. Side
 * edge k becomes 2 k and 2 k + 1. Can be repeated any number of times.
 */
export function refineMesh(mesh: TriangleMesh): TriangleMesh {
  const table = edgeTable(mesh);
  return {
    nodes: refinedNodes(mesh, table),
    triangles: refinedTriangles(mesh, table),
    triangleRegion: repeated(mesh.triangleRegion, 4),
    ...refinedSides(mesh, table),
    arcs: mesh.arcs.slice(),
    pointNodes: mesh.pointNodes.slice(),
  };
}

function refinedNodes(mesh: TriangleMesh, { edge, count }: EdgeTable): Float64Array {
  const { nodes, triangles } = mesh;
  const out = new Float64Array(nodes.length + 2 * count);
  out.set(nodes);
  for (let e = 0; e < triangles.length; e++) {
    const a = 2 * triangles[e]!;
    const b = 2 * triangles[nextCorner(e)]!;
    const m = nodes.length + 2 * edge[e]!;
    out[m] = (nodes[a]! + nodes[b]!) / 2;
    out[m + 1] = (nodes[a + 1]! + nodes[b + 1]!) / 2;
  }
  const middle = [0, 0];
  const half = halfEdgesOfSides(mesh);
  for (let k = 0; k < half.length; k++) {
    edgeMidpoint(mesh, k, middle);
    out.set(middle, nodes.length + 2 * edge[half[k]!]!);
  }
  return out;
}

function refinedTriangles({ nodes, triangles }: TriangleMesh, { edge }: EdgeTable): Uint32Array {
  const out = new Uint32Array(4 * triangles.length);
  const first = nodes.length / 2;
  for (let e = 0, o = 0; e < triangles.length; e += 3, o += 12) {
    const a = triangles[e]!;
    const b = triangles[e + 1]!;
    const c = triangles[e + 2]!;
    const ab = first + edge[e]!;
    const bc = first + edge[e + 1]!;
    const ca = first + edge[e + 2]!;
    out.set([a, ab, ca, ab, b, bc, ca, bc, c, ab, bc, ca], o);
  }
  return out;
}

function refinedSides(mesh: TriangleMesh, { edge }: EdgeTable) {
  const half = halfEdgesOfSides(mesh);
  const edges = new Uint32Array(2 * mesh.edges.length);
  const edgeSides = new Int32Array(2 * mesh.edgeSides.length);
  for (let k = 0; k < half.length; k++) {
    const middle = mesh.nodes.length / 2 + edge[half[k]!]!;
    const [a, b] = [mesh.edges[2 * k]!, mesh.edges[2 * k + 1]!];
    const [left, right] = [mesh.edgeSides[2 * k]!, mesh.edgeSides[2 * k + 1]!];
    edges.set([a, middle, middle, b], 4 * k);
    edgeSides.set([left, right, left, right], 4 * k);
  }
  return { edges, edgeSides, edgeArc: repeated(mesh.edgeArc, 2) };
}

function repeated<T extends Uint16Array | Int32Array>(values: T, times: number): T {
  const out = new (values.constructor as new (n: number) => T)(times * values.length);
  for (let i = 0; i < out.length; i++) out[i] = values[Math.floor(i / times)]!;
  return out;
}
