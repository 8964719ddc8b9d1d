/**
 * The assembly loop: takes element routines' small matrices and adds them into values on one sparsity pattern. It
 * knows of unknowns and slots, not of materials: properties arrive as numbers per region.
 *
 * Linear triangles get capacity and film lumped, six-node triangles get both consistent (see the element files).
 */
import { elementSlots, patternFromElements, slotOf } from "../linalg/pattern.ts";
import type { SparsityPattern } from "../linalg/pattern.ts";
import type { ElementMesh } from "./elementMesh.ts";
import { linearConductance, linearEdgeAreas, linearVolumes } from "./linearElement.ts";
import { quadraticEdge, quadraticMatrices } from "./quadraticElement.ts";

/** Where assembled values go: the pattern, and for each element the places of its entries in the pattern's columns. */
export interface AssemblyTarget {
  readonly pattern: SparsityPattern;
  /** n x n places per element, row-major, n nodes per element */
  readonly elementSlots: Int32Array;
}

/** The pattern of a mesh's elements and their slots: once per mesh, whatever the values. */
export function assemblyTarget(mesh: ElementMesh): AssemblyTarget {
  const group = { nodes: mesh.elements, perElement: mesh.nodesPerElement };
  const pattern = patternFromElements(mesh.nodes.length / 2, [group]);
  return { pattern, elementSlots: elementSlots(pattern, group) };
}

/** Properties per region number. */
export interface RegionProperties {
  /** W/(m K) */
  readonly conductivity: readonly number[];
  /** density times heat capacity, J/(m3 K) */
  readonly volumetricHeatCapacity: readonly number[];
}

export interface InteriorMatrices {
  /** J/K, on the pattern */
  readonly capacity: Float64Array;
  /** W/K, on the pattern */
  readonly conduction: Float64Array;
  /** integral of each shape function over the whole part [m3] */
  readonly volumes: Float64Array;
  /** the same over each region alone */
  readonly regionVolumes: readonly Float64Array[];
}

/** Capacity and conduction of the whole part. Throws where an element turns over. */
export function assembleInterior(
  mesh: ElementMesh,
  target: AssemblyTarget,
  properties: RegionProperties,
): InteriorMatrices {
  const n = mesh.nodesPerElement;
  const size = mesh.nodes.length / 2;
  const capacity = new Float64Array(target.pattern.columns.length);
  const conduction = new Float64Array(target.pattern.columns.length);
  const regionVolumes = properties.conductivity.map(() => new Float64Array(size));
  const nodes = new Float64Array(2 * n);
  const k = new Float64Array(n * n);
  const c = new Float64Array(n * n);
  const v = new Float64Array(n);
  for (let e = 0; e < mesh.region.length; e++) {
    const region = mesh.region[e]!;
    gather(mesh, e, nodes);
    if (n === 3) linearMatrices(nodes, k, c, v);
    else quadraticMatrices(nodes, k, c, v);
    const conductivity = properties.conductivity[region]!;
    const heatCapacity = properties.volumetricHeatCapacity[region]!;
    for (let i = 0; i < n * n; i++) {
      const slot = target.elementSlots[n * n * e + i]!;
      conduction[slot]! += conductivity * k[i]!;
      capacity[slot]! += heatCapacity * c[i]!;
    }
    const volumes = regionVolumes[region]!;
    for (let i = 0; i < n; i++) volumes[mesh.elements[n * e + i]!]! += v[i]!;
  }
  const volumes = new Float64Array(size);
  for (const part of regionVolumes) for (let i = 0; i < size; i++) volumes[i]! += part[i]!;
  return { capacity, conduction, volumes, regionVolumes };
}

function linearMatrices(corners: Float64Array, k: Float64Array, c: Float64Array, v: Float64Array): void {
  linearConductance(corners, 1, k);
  linearVolumes(corners, v);
  c.fill(0);
  for (let i = 0; i < 3; i++) c[4 * i] = v[i]!;
}

function gather(mesh: ElementMesh, element: number, out: Float64Array): void {
  const n = mesh.nodesPerElement;
  for (let i = 0; i < n; i++) {
    const node = mesh.elements[n * element + i]!;
    out[2 * i] = mesh.nodes[2 * node]!;
    out[2 * i + 1] = mesh.nodes[2 * node + 1]!;
  }
}

/**
 * Adds a film on some side edges to `conductance` (in place) and returns film times area per unknown [W/K], which is
 * both the load of surroundings at one degree and the weight that turns skin temperatures into heat given off.
 *
 * @param edges numbers of side edges
 * @param film  W/(m2 K), not negative
 */
export function addFilm(
  mesh: ElementMesh,
  pattern: SparsityPattern,
  edges: readonly number[],
  film: number,
  conductance: Float64Array,
): Float64Array {
  const load = new Float64Array(mesh.nodes.length / 2);
  const n = mesh.nodesPerEdge;
  const matrix = new Float64Array(9);
  const areas = new Float64Array(3);
  for (const edge of edges) {
    edgeMatrix(mesh, edge, matrix, areas);
    for (let i = 0; i < n; i++) {
      const row = mesh.edges[n * edge + i]!;
      load[row]! += film * areas[i]!;
      for (let j = 0; j < n; j++) {
        const value = film * matrix[n * i + j]!;
        if (value !== 0) conductance[slotOf(pattern, row, mesh.edges[n * edge + j]!)]! += value;
      }
    }
  }
  return load;
}

/** Areas of some side edges gathered per unknown [m2]: the load of a unit flux, the weights of a surface mean. */
export function edgeAreas(mesh: ElementMesh, edges: readonly number[]): Float64Array {
  const load = new Float64Array(mesh.nodes.length / 2);
  const n = mesh.nodesPerEdge;
  const matrix = new Float64Array(9);
  const areas = new Float64Array(3);
  for (const edge of edges) {
    edgeMatrix(mesh, edge, matrix, areas);
    for (let i = 0; i < n; i++) load[mesh.edges[n * edge + i]!]! += areas[i]!;
  }
  return load;
}

const edgeNodes = new Float64Array(6);

/** Film matrix (n x n, unit film) and areas of one side edge by the element's own rule: lumped or consistent. */
function edgeMatrix(mesh: ElementMesh, edge: number, matrix: Float64Array, areas: Float64Array): void {
  const n = mesh.nodesPerEdge;
  for (let i = 0; i < n; i++) {
    const node = mesh.edges[n * edge + i]!;
    edgeNodes[2 * i] = mesh.nodes[2 * node]!;
    edgeNodes[2 * i + 1] = mesh.nodes[2 * node + 1]!;
  }
  if (n === 3) return quadraticEdge(edgeNodes, matrix, areas);
  linearEdgeAreas(edgeNodes, areas);
  matrix.fill(0);
  matrix[0] = areas[0]!;
  matrix[3] = areas[1]!;
}
