/**
 * Which strips of rows a request asks for, and what becomes of them at corners. None of this depends on the number
 * of nodes.
 *
 * A strip lies along one piece, in the region on one of its hands; it is travelled so that the region is on the left.
 * Strips that meet share one schedule of thicknesses, the finest, so that their rows fit together.
 */
import type { Wedge } from "./corners.ts";
import { ROW_CORNER_LEAST, ROW_CORNER_MOST, ROW_MITRE_MOST } from "./defaults.ts";
import type { Outline, Piece } from "./outline.ts";
import { LEFT_HAND, RIGHT_HAND } from "./sideNodes.ts";
import type { SideRows } from "./types.ts";

/**
 * crossed: the rows of both strips run through to the other's side, a grid in the corner.
 * mitred:  both strips end in one common column along the bisector.
 * fanned:  at a re-entrant corner, columns from the normal of one side round to that of the other.
 * landed:  the rows end on the neighbouring side, which has none of its own.
 * faded:   the rows drop out one by one towards the corner.
 */
export type CornerKind = "crossed" | "mitred" | "fanned" | "landed" | "faded";

export interface RowCorner {
  readonly kind: CornerKind;
  readonly vertex: number;
  /** opening of the wedge [rad] */
  readonly angle: number;
  /** strip that ends here, strip that starts here */
  readonly before: RowStrip | null;
  readonly after: RowStrip | null;
  /** pieces of the wedge: the one that leaves counter-clockwise first, and the one that closes it */
  readonly from: number;
  readonly to: number;
  /** corners that put nodes onto the same end of a piece and so must have equally many rows */
  readonly group: RowCorner[];
  /** rows here at the present size of triangles */
  rows: number;
}

export interface RowStrip {
  readonly piece: number;
  /** LEFT_HAND: travelled from a to b, region on the piece's left; RIGHT_HAND: from b to a */
  readonly hand: number;
  thickness: number;
  growth: number;
  start: RowCorner | null;
  end: RowCorner | null;
  /** lengths along the strip between which a trial showed that only so many rows fit [m, m, rows] */
  limits: [from: number, to: number, rows: number][];
}

export interface RowPlan {
  readonly strips: readonly RowStrip[];
  readonly corners: readonly RowCorner[];
}

/** Depth of k rows [m]. */
export function rowDepth({ thickness, growth }: Pick<RowStrip, "thickness" | "growth">, k: number): number {
  if (Math.abs(growth - 1) < 1e-9) return thickness * k;
  return (thickness * (Math.pow(growth, k) - 1)) / (growth - 1);
}

/** Thickness of row k, counted from 1 [m]. */
export function rowThickness(
  { thickness, growth }: Pick<RowStrip, "thickness" | "growth">,
  k: number,
): number {
  return thickness * Math.pow(growth, k - 1);
}

/** The plan of a request, or null when no side asks for rows. */
export function planRows(
  outline: Outline,
  wedges: readonly (readonly Wedge[])[],
  rows: readonly SideRows[],
): RowPlan | null {
  const wanted = new Map(rows.filter(isUsable).map((row) => [row.side, row]));
  const strips: RowStrip[] = [];
  const byPlace = new Map<number, RowStrip>();
  outline.pieces.forEach((piece, k) => {
    for (const hand of [LEFT_HAND, RIGHT_HAND]) {
      const row = wanted.get(hand === LEFT_HAND ? piece.leftSide : piece.rightSide);
      if (!row) continue;
      const { thickness, growth } = row;
      const strip: RowStrip = { piece: k, hand, thickness, growth, start: null, end: null, limits: [] };
      strips.push(strip);
      byPlace.set(4 * k + hand, strip);
    }
  });
  if (strips.length === 0) return null;
  const corners = wedges.flat().flatMap((wedge) => cornerOf(outline, wedge, byPlace, wedges));
  groupCorners(corners);
  shareSchedules(strips, corners);
  return { strips, corners };
}

function isUsable({ thickness, growth }: SideRows): boolean {
  return thickness > 0 && Number.isFinite(thickness) && growth >= 1 && Number.isFinite(growth);
}

/** The hand of the wedge's region on a piece, seen from the wedge's first or closing piece. */
function handIn(piece: Piece, vertex: number, isFirst: boolean): number {
  return (piece.a === vertex) === isFirst ? LEFT_HAND : RIGHT_HAND;
}

function cornerOf(
  outline: Outline,
  wedge: Wedge,
  byPlace: ReadonlyMap<number, RowStrip>,
  wedges: readonly (readonly Wedge[])[],
): RowCorner[] {
  const { vertex, from, to, angle } = wedge;
  const after = byPlace.get(4 * from + handIn(outline.pieces[from]!, vertex, true)) ?? null;
  const before = byPlace.get(4 * to + handIn(outline.pieces[to]!, vertex, false)) ?? null;
  if (!after && !before) return [];
  const kind = kindOf(outline, wedge, before, after, byPlace, wedges);
  const corner: RowCorner = { kind, vertex, angle, before, after, from, to, group: [], rows: 0 };
  if (after) after.start = corner;
  if (before) before.end = corner;
  return [corner];
}

function kindOf(
  outline: Outline,
  wedge: Wedge,
  before: RowStrip | null,
  after: RowStrip | null,
  byPlace: ReadonlyMap<number, RowStrip>,
  wedges: readonly (readonly Wedge[])[],
): CornerKind {
  const isSquare = wedge.angle >= ROW_CORNER_LEAST && wedge.angle <= ROW_CORNER_MOST;
  const bothFree = [wedge.from, wedge.to].every((k) => isFreeToLand(outline, wedge, k, byPlace, wedges));
  if (before && after) {
    if (isSquare) return bothFree ? "crossed" : "faded";
    if (wedge.angle < ROW_CORNER_LEAST) return "faded";
    return wedge.angle <= ROW_MITRE_MOST ? "mitred" : "fanned";
  }
  const neighbour = before ? wedge.from : wedge.to;
  return isSquare && isFreeToLand(outline, wedge, neighbour, byPlace, wedges) ? "landed" : "faded";
}

/**
 * The small edges of rows that end on a side need a match across it: nothing of the part there, or rows of the
 * region across that end on it at the same corner.
 */
function isFreeToLand(
  outline: Outline,
  wedge: Wedge,
  k: number,
  byPlace: ReadonlyMap<number, RowStrip>,
  wedges: readonly (readonly Wedge[])[],
): boolean {
  const piece = outline.pieces[k]!;
  if (piece.left < 0 || piece.right < 0) return true;
  const across = wedges[wedge.vertex]!.find((w) => w !== wedge && (w.from === k || w.to === k));
  if (!across) return true;
  if (across.angle < ROW_CORNER_LEAST || across.angle > ROW_CORNER_MOST) return false;
  const other = across.from === k ? across.to : across.from;
  const hand = handIn(outline.pieces[other]!, wedge.vertex, other === across.from);
  return byPlace.has(4 * other + hand);
}

function groupCorners(corners: readonly RowCorner[]): void {
  const byEnd = new Map<string, RowCorner[]>();
  for (const corner of corners) {
    for (const k of piecesWithStops(corner)) {
      const key = `${k},${corner.vertex}`;
      byEnd.set(key, [...(byEnd.get(key) ?? []), corner]);
    }
  }
  for (const corner of corners) {
    const group = new Set([corner]);
    // Two pieces at most: one round for the corner's own, one for theirs.
    for (let round = 0; round < 4; round++) {
      for (const member of [...group]) {
        for (const k of piecesWithStops(member))
          byEnd.get(`${k},${member.vertex}`)!.forEach((c) => group.add(c));
      }
    }
    corner.group.push(...group);
  }
}

/** Pieces on which a corner's rows end. */
export function piecesWithStops(corner: RowCorner): number[] {
  if (corner.kind === "crossed") return [corner.from, corner.to];
  if (corner.kind === "landed") return [corner.before ? corner.from : corner.to];
  return [];
}

/** Strips that meet take the finest schedule among them. */
function shareSchedules(strips: readonly RowStrip[], corners: readonly RowCorner[]): void {
  for (let changed = true, round = 0; changed && round < strips.length + 1; round++) {
    changed = false;
    for (const corner of corners) {
      if (corner.kind === "faded") continue;
      const met = corner.group.concat(corner).flatMap(({ before, after }) => [before, after]);
      const finest = met.reduce((best, s) => (s && (!best || s.thickness < best.thickness) ? s : best), null);
      for (const strip of met) {
        if (!strip || !finest || strip.thickness === finest.thickness) continue;
        strip.thickness = finest.thickness;
        strip.growth = finest.growth;
        changed = true;
      }
    }
  }
}

/** Leaves out the first row everywhere: what was the second becomes the first. */
export function coarsenRows({ strips }: RowPlan): void {
  for (const strip of strips) strip.thickness *= Math.max(1.2, strip.growth);
}
