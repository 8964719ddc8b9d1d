/**
 * The mesher: outline -> size field -> nodes on sides -> front -> Delaunay with sides -> relaxation -> repair.
 */
import { assembleMesh } from "./assembleMesh.ts";
import { carveRegions, ROW_LOCK } from "./carve.ts";
import {
  COUNT_TOLERANCE,
  GRADING,
  GRADING_MOST,
  GRADING_STEP,
  MOST_ROWS,
  ROW_NODES_SHARE,
  THIN_SIDE_SHARE,
  TOO_FINE,
  MOST_NODES,
  MOST_PLACINGS,
  PACKING,
  RELAX_PASSES,
} from "./defaults.ts";
import { packTriangles } from "./editTriangles.ts";
import { fillFromSides, type PlacedPoints } from "./front.ts";
import { readOutline, type Outline } from "./outline.ts";
import { recoverEdge } from "./recoverEdge.ts";
import { relax } from "./relax.ts";
import { evenOutThinPart, repair } from "./repair.ts";
import { coarsenRows, planRows, type RowPlan } from "./rowPlan.ts";
import { placeSidesAndRows } from "./rowStrips.ts";
import type { SideNodes } from "./sideNodes.ts";
import { sizeSources, type SizeSources } from "./sizeSources.ts";
import { slidersOf } from "./slide.ts";
import { SizeTree } from "./sizeTree.ts";
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

interface Placing {
  readonly sides: SideNodes;
  readonly points: PlacedPoints;
}

/** Places nodes, and again with another aim while their number is off; no triangulation is made meanwhile. */
function placeNodes(outline: Outline, sources: SizeSources, plan: RowPlan | null, nodes: number): Placing {
  const inner = outline.inner.flat();
  const field = new ScaledField(outline, sources, nodes);
  const search = new AimSearch(nodes);
  let best: Placing | null = null;
  for (let k = 0; k < MOST_PLACINGS; k++) {
    field.aimAt(search.aim);
    const sides = placeAffordableRows(outline, field.tree, sources, plan, nodes);
    const most = Math.ceil(1.5 * field.expected()) + 2 * sides.x.length + 100;
    if (!(most < 4 * MOST_NODES)) throw new Error(TOO_FINE);
    const points = fillFromSides(field.tree, sides, inner, most);
    if (!best || missOf(points.count, nodes) < missOf(best.points.count, nodes)) best = { sides, points };
    if (missOf(points.count, nodes) < COUNT_TOLERANCE) break;
    search.take(points.count);
  }
  return best!;
}

/** Rows that would take too many of the nodes are made thicker. */
function placeAffordableRows(
  outline: Outline,
  tree: SizeTree,
  sources: SizeSources,
  plan: RowPlan | null,
  nodes: number,
): SideNodes {
  for (let k = 0; k < MOST_ROWS; k++) {
    const sides = placeSidesAndRows(outline, tree, sources, plan);
    if (!plan || sides.x.length - sides.firstRowNode <= ROW_NODES_SHARE * nodes) return sides;
    coarsenRows(plan);
  }
  return placeSidesAndRows(outline, tree, sources, null);
}

/** Finds the aim that gives the nodes wanted: in proportion first, then by the slope between the last two trials. */
class AimSearch {
  aim: number;
  private last: { aim: number; count: number } | null = null;

  constructor(private readonly wanted: number) {
    this.aim = wanted / PACKING;
  }

  take(count: number): void {
    const { aim, last, wanted } = this;
    let slope = 1;
    if (last && last.aim !== aim && last.count !== count) {
      slope = Math.log(count / last.count) / Math.log(aim / last.aim);
    }
    this.last = { aim, count };
    this.aim = aim * Math.pow(wanted / count, 1 / Math.max(0.3, Math.min(1.5, slope)));
  }
}

function missOf(count: number, nodes: number): number {
  return Math.abs(Math.log(count / nodes));
}

/**
 * The size field scaled to a number of nodes. One tree serves every scale up to 1, whose meshes are then similar to
 * each other; a coarser field has a tree of its own, graded again, on which arcs and short sides keep their limits.
 */
class ScaledField {
  tree: SizeTree;
  private built: number;
  private grading = GRADING;

  constructor(
    private readonly outline: Outline,
    private readonly sources: SizeSources,
    nodes: number,
  ) {
    // A wall of a hair's breadth must not be resolved when few nodes are asked for: half its sides' nodes say so.
    this.built = Math.max(1, sideNodesAtFull(sources) / nodes);
    this.tree = new SizeTree(outline, sources, this.built, this.grading);
  }

  /** Sets the scale for a number of nodes. */
  aimAt(nodes: number): void {
    this.buildFor(nodes);
    // Vertices close together hold the size down: let it grow faster away from them.
    while (this.scaleFor(nodes) > 1 + SCALE_SLACK && this.grading < GRADING_MOST) {
      this.grading *= GRADING_STEP;
      this.tree = new SizeTree(this.outline, this.sources, this.built, this.grading);
      this.buildFor(nodes);
    }
    this.tree.scale = Math.min(this.scaleFor(nodes), 1 + SCALE_SLACK);
  }

  private buildFor(nodes: number): void {
    for (let k = 0; k < 8; k++) {
      const scale = this.scaleFor(nodes);
      const wanted = Math.max(1, this.built * (scale > 1 ? Math.pow(scale, 1.1) : scale));
      if (Math.abs(wanted / this.built - 1) < 0.015) return;
      this.built = wanted;
      this.tree = new SizeTree(this.outline, this.sources, wanted, this.grading);
    }
  }

  /** Nodes expected at the present scale, before packing. */
  expected(): number {
    const { area, line, scale } = this.tree;
    return area / (scale * scale) + line / scale;
  }

  /** The scale at which area / scale^2 + line / scale = nodes. */
  private scaleFor(nodes: number): number {
    const { area, line } = this.tree;
    return (line + Math.sqrt(line * line + 4 * nodes * area)) / (2 * nodes);
  }
}

function sideNodesAtFull({ stretches, sideStart, count }: SizeSources): number {
  let sum = 0;
  for (let i = sideStart; i < count; i++) {
    const s = stretches.subarray(7 * i, 7 * i + 7);
    sum += (0.5 * Math.hypot(s[2]!, s[3]!)) / Math.max(s[4]!, s[5]!);
  }
  return sum;
}

/** A tree serves scales this much above the one it was built for. */
const SCALE_SLACK = 0.03;

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
