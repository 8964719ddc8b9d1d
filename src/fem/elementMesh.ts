/**
 * Elements on a triangle mesh: linear (three nodes) or quadratic (six nodes, isoparametric on arcs).
 *
 * Node order of a six-node element: corners 0, 1, 2 counter-clockwise, then the middles of sides 0-1, 1-2, 2-0.
 * Corner nodes keep their mesh numbers; middles follow. The middles are the nodes that splitting every triangle in
 * four would add, so both elements can be drawn, and can place probes, on the same set of nodes.
 */
import type { TriangleMesh } from "../../mesh/types.ts";

export type ElementOrder = 3 | 6;

export interface ElementMesh {
  readonly nodesPerElement: ElementOrder;
  /** r, z of every unknown [m], 2 each */
  readonly nodes: Float64Array;
  /** node numbers, `nodesPerElement` per element */
  readonly elements: Uint32Array;
  /** region number per element */
  readonly region: Uint16Array;
  /** nodes of each side edge: its two ends, and for six-node elements its middle; 2 or 3 each */
  readonly edges: Uint32Array;
  readonly nodesPerEdge: 2 | 3;
  /** as in TriangleMesh: outline side on the left and on the right (-1: exposed), 2 per side edge */
  readonly edgeSides: Int32Array;
}

/** Linear triangles: the mesh as it stands. */
export function linearElements(mesh: TriangleMesh): ElementMesh {
  return {
    nodesPerElement: 3,
    nodes: mesh.nodes,
    elements: mesh.triangles,
    region: mesh.triangleRegion,
    edges: mesh.edges,
    nodesPerEdge: 2,
    edgeSides: mesh.edgeSides,
  };
}

/** Six-node triangles: one more node in the middle of every mesh edge, on the true arc where the edge follows one. */
export function quadraticElements(mesh: TriangleMesh): ElementMesh {
  const corners = mesh.nodes.length / 2;
  const count = mesh.triangles.length / 3;
  const elements = new Uint32Array(6 * count);
  const middles = new Map<number, number>();
  const coordinates: number[] = [];
  const middleOf = (a: number, b: number): number => {
    const key = a < b ? a * corners + b : b * corners + a;
    let node = middles.get(key);
    if (node === undefined) {
      node = corners + middles.size;
      middles.set(key, node);
      coordinates.push(
        (mesh.nodes[2 * a]! + mesh.nodes[2 * b]!) / 2,
        (mesh.nodes[2 * a + 1]! + mesh.nodes[2 * b + 1]!) / 2,
      );
    }
    return node;
  };
  for (let e = 0; e < count; e++) {
    for (let c = 0; c < 3; c++) {
      const a = mesh.triangles[3 * e + c]!;
      const b = mesh.triangles[3 * e + ((c + 1) % 3)]!;
      elements[6 * e + c] = a;
      elements[6 * e + 3 + c] = middleOf(a, b);
    }
  }
  const edgeCount = mesh.edges.length / 2;
  const edges = new Uint32Array(3 * edgeCount);
  for (let e = 0; e < edgeCount; e++) {
    const a = mesh.edges[2 * e]!;
    const b = mesh.edges[2 * e + 1]!;
    const middle = middleOf(a, b);
    edges.set([a, b, middle], 3 * e);
    const arc = mesh.edgeArc[e]!;
    if (arc >= 0) putOnArc(mesh.arcs, arc, coordinates, 2 * (middle - corners));
  }
  const nodes = new Float64Array(2 * corners + coordinates.length);
  nodes.set(mesh.nodes);
  nodes.set(coordinates, 2 * corners);
  return {
    nodesPerElement: 6,
    nodes,
    elements,
    region: mesh.triangleRegion,
    edges,
    nodesPerEdge: 3,
    edgeSides: mesh.edgeSides,
  };
}

/** Moves a chord's middle out to its arc, along the ray from the centre (chords span less than half a turn). */
function putOnArc(arcs: Float64Array, arc: number, coordinates: number[], at: number): void {
  const centreR = arcs[3 * arc]!;
  const centreZ = arcs[3 * arc + 1]!;
  const dr = coordinates[at]! - centreR;
  const dz = coordinates[at + 1]! - centreZ;
  const scale = arcs[3 * arc + 2]! / Math.hypot(dr, dz);
  coordinates[at] = centreR + dr * scale;
  coordinates[at + 1] = centreZ + dz * scale;
}

/** The elements as linear triangles for drawing: a six-node element becomes four. Node numbers stay. */
export function drawnTriangles(mesh: ElementMesh): { triangles: Uint32Array; triangleRegion: Uint16Array } {
  if (mesh.nodesPerElement === 3) return { triangles: mesh.elements, triangleRegion: mesh.region };
  const count = mesh.elements.length / 6;
  const triangles = new Uint32Array(12 * count);
  const triangleRegion = new Uint16Array(4 * count);
  for (let e = 0; e < count; e++) {
    const [a, b, c, ab, bc, ca] = mesh.elements.subarray(6 * e, 6 * e + 6) as unknown as number[];
    triangles.set([a!, ab!, ca!, ab!, b!, bc!, ca!, bc!, c!, ab!, bc!, ca!], 12 * e);
    triangleRegion.fill(mesh.region[e]!, 4 * e, 4 * e + 4);
  }
  return { triangles, triangleRegion };
}
