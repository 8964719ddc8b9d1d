/** Which edges a mesh has, and which triangles lie on them. */
import type { TriangleMesh } from "./types.ts";

/** Half-edges of triangles: half-edge e = 3 t + i runs from corner i of triangle t to the next corner. */
export interface EdgeTable {
  /** opposite half-edge, or -1 on the hull */
  readonly twin: Int32Array;
  /** undirected edge number of each half-edge, counted in the order met */
  readonly edge: Int32Array;
  readonly count: number;
  /** half-edges that share their direction with another: 0 in a sound mesh */
  readonly doubled: number;
}

export function nextCorner(e: number): number {
  return e % 3 === 2 ? e - 2 : e + 1;
}

/** Pairs the half-edges by bucketing them on their lower node: linear time. */
export function edgeTable({ triangles, nodes }: Pick<TriangleMesh, "triangles" | "nodes">): EdgeTable {
  const n = triangles.length;
  const head = new Int32Array(nodes.length / 2).fill(-1);
  const chain = new Int32Array(n);
  const twin = new Int32Array(n).fill(-1);
  const edge = new Int32Array(n);
  let count = 0;
  let doubled = 0;
  for (let e = 0; e < n; e++) {
    const a = triangles[e]!;
    const b = triangles[nextCorner(e)]!;
    const low = a < b ? a : b;
    const partner = findOpposite(triangles, head[low]!, chain, a, b);
    if (partner >= 0 && twin[partner]! < 0) {
      twin[partner] = e;
      twin[e] = partner;
      edge[e] = edge[partner]!;
      continue;
    }
    if (hasSame(triangles, head[low]!, chain, a, b)) doubled++;
    edge[e] = count++;
    chain[e] = head[low]!;
    head[low] = e;
  }
  return { twin, edge, count, doubled };
}

function findOpposite(
  triangles: Uint32Array,
  first: number,
  chain: Int32Array,
  a: number,
  b: number,
): number {
  for (let e = first; e >= 0; e = chain[e]!) {
    if (triangles[e] === b && triangles[nextCorner(e)] === a) return e;
  }
  return -1;
}

function hasSame(triangles: Uint32Array, first: number, chain: Int32Array, a: number, b: number): boolean {
  for (let e = first; e >= 0; e = chain[e]!) {
    if (triangles[e] === a && triangles[nextCorner(e)] === b) return true;
  }
  return false;
}

/** Half-edge of each side edge, the one that runs from its first to its second node; -1 when there is none. */
export function halfEdgesOfSides(mesh: TriangleMesh): Int32Array {
  const { edges, triangles } = mesh;
  const head = new Int32Array(mesh.nodes.length / 2).fill(-1);
  const chain = new Int32Array(edges.length / 2);
  for (let k = 0; k < chain.length; k++) {
    chain[k] = head[edges[2 * k]!]!;
    head[edges[2 * k]!] = k;
  }
  const half = new Int32Array(chain.length).fill(-1);
  for (let e = 0; e < triangles.length; e++) {
    const b = triangles[nextCorner(e)]!;
    for (let k = head[triangles[e]!]!; k >= 0; k = chain[k]!) if (edges[2 * k + 1] === b) half[k] = e;
  }
  return half;
}
