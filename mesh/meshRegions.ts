/**
 * The mesher: outline -> size field -> nodes on sides -> front -> Delaunay with sides -> relaxation -> repair.
 */
import { assembleMesh } from "./assembleMesh.ts";
import { carveRegions, ROW_LOCK } from "./carve.ts";
import { MOST_NODES, RELAX_PASSES, THIN_SIDE_SHARE } from "./defaults.ts";
import { packTriangles } from "./editTriangles.ts";
import type { PlacedPoints } from "./front.ts";
import { readOutline, type Outline } from "./outline.ts";
import { placeNodes } from "./placeNodes.ts";
import { recoverEdge } from "./recoverEdge.ts";
import { relax } from "./relax.ts";
import { evenOutThinPart, repair } from "./repair.ts";
import { planRows } from "./rowPlan.ts";
import type { SideNodes } from "./sideNodes.ts";
import { sizeSources } from "./sizeSources.ts";
import { slidersOf } from "./slide.ts";
import { Triangulation } from "./triangulation.ts";
import type { MeshRequest, TriangleMesh } from "./types.ts";

/**
 * Triangulates the regions of a request.
 *
 * The outline must be sound: `findOutlineFaults` says what is not, in terms of regions and sides. Vertices keep
 * their numbers 0, 1, ... in the order in which the sides first meet them.
 *
 * @throws Error when the outline's sides cross, a requested point lies outside, or the nodes asked for are not
 *         between 3 and MOST_NODES; never hangs
 */
export function meshRegions(request: MeshRequest): TriangleMesh {
  if (!(request.nodes >= 3 && request.nodes <= MOST_NODES)) {
    throw new Error(`number of nodes must lie between 3 and ${MOST_NODES}, not ${request.nodes}`);
  }
  const outline = readOutline(request);
  const sources = sizeSources(outline);
  const plan = planRows(outline, sources.wedges, request.rows ?? []);
  const { sides, points } = placeNodes(outline, sources, plan, request.nodes);
  const mesh = triangulate(outline, sides, points);
  return assembleMesh(mesh, outline, sides.x.length);
}

/** Room for the nodes that repair adds. */
const SPARE_SHARE = 1.1;
const SPARE_NODES = 64;

function triangulate(outline: Outline, sides: SideNodes, points: PlacedPoints): Triangulation {
  const room = Math.ceil(points.count * SPARE_SHARE) + SPARE_NODES;
  const mesh = new Triangulation(points.xy, points.count, room);
  lockSides(mesh, outline, sides);
  carveRegions(mesh, sides, outline);
  const size = new Float64Array(room);
  size.set(points.size);
  const fixed = new Uint8Array(room).fill(1, 0, points.fixed);
  mesh.pushAll();
  mesh.settle();
  relax(mesh, size, fixed, RELAX_PASSES);
  const work = { mesh, size, fixed, room, sliders: slidersOf(outline, sides) };
  if (sides.firstRowNode > THIN_SIDE_SHARE * points.count) evenOutThinPart(work);
  repair(work);
  packTriangles(mesh);
  return mesh;
}

function lockSides(mesh: Triangulation, outline: Outline, sides: SideNodes): void {
  for (let c = 0; c < sides.from.length; c++) {
    if (sides.piece[c]! < 0) continue;
    const [a, b, value] = [sides.from[c]!, sides.to[c]!, sides.piece[c]! + 1];
    if (mesh.lockEdge(a, b, value) || recoverEdge(mesh, a, b, value)) continue;
    const piece = outline.pieces[sides.piece[c]!]!;
    const [x, y] = [sides.x[a]!, sides.y[a]!];
    throw new Error(`side ${piece.leftSide} is crossed or covered by another near r ${x}, z ${y}`);
  }
  for (let k = 0; k < sides.rowEdges.length; k += 2) {
    const [a, b] = [sides.rowEdges[k]!, sides.rowEdges[k + 1]!];
    const e = mesh.edge(a, b);
    if (e >= 0 && mesh.lock[e]! > 0) continue;
    if (mesh.lockEdge(a, b, ROW_LOCK) || recoverEdge(mesh, a, b, ROW_LOCK)) continue;
    throw new Error(`rows: the edge between nodes ${a} and ${b} cannot be made`);
  }
}
