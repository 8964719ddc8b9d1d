/** How many nodes: the scale of the size field, and the search for it. */
import {
  COUNT_TOLERANCE,
  GRADING,
  GRADING_MOST,
  GRADING_STEP,
  MOST_NODES,
  MOST_PLACINGS,
  PACKING,
  ROW_NODES_SHARE,
  TOO_FINE,
} from "./defaults.ts";
import { fillFromSides, type PlacedPoints } from "./front.ts";
import type { Outline } from "./outline.ts";
import { rowSizeLimits, rowsThatFit } from "./rowCounts.ts";
import { coarsenRows, type RowPlan } from "./rowPlan.ts";
import { placeSidesAndRows } from "./rowStrips.ts";
import type { SideNodes } from "./sideNodes.ts";
import { SOURCE_STRIDE, withLimits, type SizeSources } from "./sizeSources.ts";
import { SizeTree } from "./sizeTree.ts";

/** Each makes rows thicker by their growth. */
const MOST_COARSENINGS = 200;
/** Trees built to find the scale for one aim. */
const MOST_BUILDS = 8;
/** A tree serves scales this much above the one it was built for. */
const SCALE_SLACK = 0.03;

export interface Placing {
  readonly sides: SideNodes;
  readonly points: PlacedPoints;
}

/** Places nodes on sides, in rows and inside, as many as wanted as nearly as can be. */
export function placeNodes(
  outline: Outline,
  sources: SizeSources,
  plan: RowPlan | null,
  nodes: number,
): Placing {
  if (!plan) return searchPlacing(outline, sources, null, nodes, nodes / PACKING);
  const field = new ScaledField(outline, sources, nodes);
  const share = Math.min(1, field.scaleFor(nodes));
  for (let k = 0; k < MOST_COARSENINGS; k++) {
    const budget = rowBudget(field.tree, sources, plan, nodes);
    if (budget.inRows > 1.3 * ROW_NODES_SHARE * nodes) {
      coarsenRows(plan);
      continue;
    }
    const limits = rowSizeLimits(plan, outline).map((limit) => limit / share);
    const placing = searchPlacing(outline, withLimits(sources, limits), plan, nodes, budget.aim);
    const { sides, points } = placing;
    if (sides.x.length - sides.firstRowNode <= ROW_NODES_SHARE * Math.min(nodes, points.count))
      return placing;
    coarsenRows(plan);
  }
  return searchPlacing(outline, sources, null, nodes, nodes / PACKING);
}

/**
 * Nodes that rows will take, estimated, and the nodes left for the size field to aim at: rows * columns along the
 * strips, and rows squared where they cross in a corner.
 */
function rowBudget(
  tree: SizeTree,
  sources: SizeSources,
  plan: RowPlan,
  nodes: number,
): { inRows: number; aim: number } {
  const { columns, length } = columnsAlong(sources, plan);
  const grids = plan.corners.filter(({ kind }) => kind === "crossed").length;
  const strip = plan.strips.reduce((finest, s) => (s.thickness < finest.thickness ? s : finest));
  let scale = 1;
  let inRows = 0;
  for (let k = 0; k < 20; k++) {
    const rows = rowsThatFit(strip, (scale * length) / columns, Infinity);
    inRows = (rows * columns) / scale + grids * rows * rows;
    const left = Math.max(nodes - inRows, 0.2 * nodes);
    const { area, line } = tree;
    const wanted = (line + Math.sqrt(line * line + 4 * left * area)) / (2 * left);
    if (Math.abs(wanted / scale - 1) < 0.02) break;
    scale = Math.sqrt(scale * wanted);
  }
  return { inRows, aim: Math.max(0.2 * nodes, nodes - inRows) / PACKING };
}

/** Columns of all strips at scale 1 and the length of the strips [m]. */
function columnsAlong(sources: SizeSources, { strips }: RowPlan): { columns: number; length: number } {
  const withRows = new Set(strips.map(({ piece }) => piece));
  let [columns, length] = [0, 0];
  sources.pieceOf.forEach((piece, i) => {
    if (!withRows.has(piece)) return;
    const s = sources.stretches.subarray(SOURCE_STRIDE * (sources.sideStart + i));
    const stretch = Math.hypot(s[2]!, s[3]!);
    length += stretch;
    columns += (2 * stretch) / (s[4]! + s[5]!);
  });
  return { columns, length };
}

/** Places nodes, and again with another aim while their number is off; no triangulation is made meanwhile. */
function searchPlacing(
  outline: Outline,
  sources: SizeSources,
  plan: RowPlan | null,
  nodes: number,
  aim: number,
): Placing {
  const inner = outline.inner.flat();
  const field = new ScaledField(outline, sources, nodes);
  const search = new AimSearch(nodes, aim);
  let best: Placing | null = null;
  for (let k = 0; k < MOST_PLACINGS; k++) {
    field.aimAt(search.aim);
    const sides = placeSidesAndRows(outline, field.tree, sources, plan);
    const most = Math.ceil(1.5 * field.expected()) + 2 * sides.x.length + 100;
    if (!(most < 4 * MOST_NODES)) throw new Error(TOO_FINE);
    const points = fillFromSides(field.tree, sides, inner, most);
    if (!best || missOf(points.count, nodes) < missOf(best.points.count, nodes)) best = { sides, points };
    if (missOf(points.count, nodes) < COUNT_TOLERANCE) break;
    search.take(points.count);
  }
  return best!;
}

/** Finds the aim that gives the nodes wanted: in proportion first, then by the slope between the last two trials. */
class AimSearch {
  private last: { aim: number; count: number } | null = null;

  constructor(
    private readonly wanted: number,
    public aim: number,
  ) {}

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
    for (let k = 0, before = Infinity; k < MOST_BUILDS; k++) {
      const scale = this.scaleFor(nodes);
      // Limits of sides and arcs alone hold the number of nodes: larger sizes elsewhere change nothing.
      if (scale > 1 && scale > 0.98 * before) return;
      before = scale;
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
  scaleFor(nodes: number): number {
    const { area, line } = this.tree;
    return (line + Math.sqrt(line * line + 4 * nodes * area)) / (2 * nodes);
  }
}

function sideNodesAtFull({ stretches, sideStart, count }: SizeSources): number {
  let sum = 0;
  for (let i = sideStart; i < count; i++) {
    const s = stretches.subarray(SOURCE_STRIDE * i, SOURCE_STRIDE * (i + 1));
    sum += (0.5 * Math.hypot(s[2]!, s[3]!)) / Math.max(s[4]!, s[5]!);
  }
  return sum;
}
