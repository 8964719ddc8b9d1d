/** How many rows fit: at corners before the side nodes are placed, at every column after. */
import type { Chords } from "./chords.ts";
import {
  ARC_MOST,
  MOST_ROWS,
  ROW_MOST,
  ROW_RADIUS_SHARE,
  ROW_SAGITTA_SHARE,
  ROW_SIDE_SHARE,
  ROW_STEP_SHARE,
  ROW_WALL_SHARE,
} from "./defaults.ts";
import type { Outline } from "./outline.ts";
import { rowDepth, rowThickness, type RowCorner, type RowPlan, type RowStrip } from "./rowPlan.ts";
import { piecesWithStops } from "./rowPlan.ts";
import { LEFT_HAND, type RowNeeds } from "./sideNodes.ts";
import type { SizeTree } from "./sizeTree.ts";
import { wallThickness } from "./wallThickness.ts";

/** Rows of a schedule while they are thinner than the size along the side and together below the depth [m]. */
export function rowsThatFit(strip: RowStrip, size: number, depth: number): number {
  let k = 0;
  while (k < MOST_ROWS && rowThickness(strip, k + 1) <= ROW_MOST * size && rowDepth(strip, k + 1) <= depth)
    k++;
  return k;
}

/** Sets the rows at all corners for the present size field, and forgets what trials have shown. */
export function countRowsAtCorners(plan: RowPlan, outline: Outline, tree: SizeTree): void {
  for (const strip of plan.strips) strip.limits = [];
  for (const corner of plan.corners) {
    const size = tree.sizeAt(outline.x[corner.vertex]!, outline.y[corner.vertex]!);
    const strip = (corner.before ?? corner.after)!;
    corner.rows = corner.kind === "faded" ? 0 : rowsThatFit(strip, size, depthAtCorner(corner, outline));
  }
  levelGroups(plan);
}

/** Corners that put nodes onto one end of a piece have equally many rows: the fewest. */
export function levelGroups(plan: RowPlan): void {
  for (const { group } of plan.corners) {
    const least = Math.min(...group.map(({ rows }) => rows));
    for (const corner of group) corner.rows = least;
  }
}

function depthAtCorner(corner: RowCorner, outline: Outline): number {
  const lengths = [corner.from, corner.to].map((k) => outline.pieces[k]!.length);
  const shortest = Math.min(...lengths);
  if (corner.kind === "fanned") return Infinity;
  if (corner.kind !== "mitred") return ROW_SIDE_SHARE * shortest * Math.sin(corner.angle);
  // The mitre leans away from the corner by depth / tan(angle / 2) along each side.
  const lean = Math.abs(1 / Math.tan(corner.angle / 2));
  return lean > 0.05 && corner.angle < Math.PI
    ? (ROW_SIDE_SHARE * shortest) / lean
    : ROW_SIDE_SHARE * outline.size;
}

/** What the rows of a plan ask of the side nodes. */
export function rowNeeds(plan: RowPlan, outline: Outline): RowNeeds {
  return { stops: rowStops(plan, outline), mostTurn: mostTurns(plan, outline) };
}

function mostTurns(plan: RowPlan, outline: Outline): number[] {
  const mostTurn = outline.pieces.map(() => ARC_MOST);
  for (const strip of plan.strips) {
    mostTurn[strip.piece] = Math.min(mostTurn[strip.piece]!, mostTurnBeside(strip, outline));
  }
  return mostTurn;
}

/** Lengths [m] that triangles at each piece may have, so that the size field knows of the chords' limits. */
export function rowSizeLimits(plan: RowPlan, outline: Outline): number[] {
  const turns = mostTurns(plan, outline);
  return outline.pieces.map(({ arc }, k) =>
    arc && turns[k]! < ARC_MOST ? turns[k]! * arc.radius : Infinity,
  );
}

/**
 * Most turn of a chord [rad] with rows beside it: the true arc lies off its chord by the sagitta R turn^2 / 8, which
 * must stay a small share of the first row, or the curved triangle there would fold.
 */
function mostTurnBeside(strip: RowStrip, outline: Outline): number {
  const { arc } = outline.pieces[strip.piece]!;
  return arc
    ? Math.min(ARC_MOST, Math.sqrt((8 * ROW_SAGITTA_SHARE * strip.thickness) / arc.radius))
    : ARC_MOST;
}

/** Shares of each piece at which rows end. */
function rowStops(plan: RowPlan, outline: Outline): number[][] {
  const stops: number[][] = outline.pieces.map(() => []);
  const done = new Set<string>();
  for (const corner of plan.corners) {
    for (const k of piecesWithStops(corner)) {
      const piece = outline.pieces[k]!;
      if (done.has(`${k},${corner.vertex}`)) continue;
      done.add(`${k},${corner.vertex}`);
      const strip = (corner.before ?? corner.after)!;
      for (let row = 1; row <= corner.rows; row++) {
        const t = rowDepth(strip, row) / Math.sin(corner.angle) / piece.length;
        stops[k]!.push(piece.a === corner.vertex ? t : 1 - t);
      }
    }
  }
  return stops;
}

/** What the depth of rows must spare at a place of a strip. */
export class DepthLimit {
  private readonly skip: Uint8Array;
  private readonly bend: number;

  constructor(
    private readonly strip: RowStrip,
    private readonly outline: Outline,
    private readonly chords: Chords,
  ) {
    const piece = outline.pieces[strip.piece]!;
    this.skip = new Uint8Array(outline.pieces.length);
    for (const v of [piece.a, piece.b]) for (const k of outline.ends[v]!) this.skip[k] = 1;
    const runsToCentre = piece.arc && piece.arc.turn > 0 === (strip.hand === LEFT_HAND);
    this.bend = runsToCentre ? ROW_RADIUS_SHARE * piece.arc!.radius : Infinity;
  }

  /** Depth [m] that rows may take at x, y with the inner normal nx, ny, where the size along the side is given. */
  at(x: number, y: number, nx: number, ny: number, size: number): number {
    const wall = wallThickness(x, y, nx, ny, this.chords, this.skip);
    let depth = Math.min(this.bend, ROW_WALL_SHARE * wall);
    for (const [px, py] of this.outline.inner) {
      const above = (px - x) * nx + (py - y) * ny;
      const aside = Math.abs((px - x) * ny - (py - y) * nx);
      if (above > 0 && aside < 2 * size + 0.5 * above) depth = Math.min(depth, 0.5 * above);
    }
    for (const corner of [this.strip.start, this.strip.end]) {
      if (corner?.kind === "faded") depth = Math.min(depth, this.sparedAt(corner, x, y));
    }
    return depth;
  }

  /** At a sharp corner where rows fade the neighbouring side comes near: a third of the way to it is left to rows. */
  private sparedAt(corner: RowCorner, x: number, y: number): number {
    if (corner.angle > 0.75 * Math.PI) return Infinity;
    const away = Math.hypot(x - this.outline.x[corner.vertex]!, y - this.outline.y[corner.vertex]!);
    return ROW_WALL_SHARE * away * Math.tan(Math.min(corner.angle, Math.PI / 4));
  }
}

/**
 * Rows per column from what each allows: neighbours differ by one at most, and only where the step is no steeper
 * than the columns are apart. The ends may come out lower than they were: then their corner has to be lowered.
 *
 * @param apart  distances between neighbouring columns [m], one less than columns
 */
export function smoothedCounts(
  strip: RowStrip,
  allowed: readonly number[],
  apart: readonly number[],
): number[] {
  const counts = [...allowed];
  const mostBeside = (rows: number, gap: number) =>
    rowThickness(strip, rows + 1) <= ROW_STEP_SHARE * gap ? rows + 1 : rows;
  for (let i = 1; i < counts.length; i++) {
    counts[i] = Math.min(counts[i]!, mostBeside(counts[i - 1]!, apart[i - 1]!));
  }
  for (let i = counts.length - 2; i >= 0; i--) {
    counts[i] = Math.min(counts[i]!, mostBeside(counts[i + 1]!, apart[i]!));
  }
  return counts;
}
