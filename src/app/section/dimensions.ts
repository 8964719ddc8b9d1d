/** The sizes on the drawing: diameters at both ends, lengths along the axis. A size leads to the point that sets it. */
import type { Place } from "../../editor/arcs.ts";
import type { LoopIndex } from "../../editor/outline.ts";
import type { Sheet, SheetSide } from "./sheet.ts";
import { toScreen } from "./view.ts";
import type { Spot, View } from "./view.ts";

export interface Dimension {
  readonly kind: "diameter" | "length";
  /** m */
  readonly value: number;
  /** places that are measured */
  readonly from: Place;
  readonly to: Place;
  /** the point, or the arc, whose entry changes it */
  readonly point: LoopIndex & { readonly arc: boolean };
  /** diameters: which end of the part it stands at; lengths: row, counted from the part outwards */
  readonly end: "near" | "far";
  readonly row: number;
}

/** More length levels than this are measured in a chain with the whole below it. */
const MOST_LEVELS = 2;

interface Corner extends LoopIndex {
  readonly at: Place;
  /** stands on an arc, between its ends */
  readonly arc: boolean;
}

export function dimensionsOf(sheet: Sheet): Dimension[] {
  const outlines = sheet.loops.filter((loop) => loop.loop === 0);
  const corners = outlines.flatMap((loop) =>
    loop.vertices.map((vertex, index): Corner => ({
      region: loop.region,
      loop: 0,
      index,
      at: vertex.at,
      arc: false,
    })),
  );
  const bulges = outlines.flatMap((loop) =>
    loop.sides
      .filter((side) => side.curved)
      .map((side): Corner => ({
        region: loop.region,
        loop: 0,
        index: side.index,
        at: widestOf(side),
        arc: true,
      })),
  );
  const sound = ({ at }: Corner): boolean => Number.isFinite(at[0] + at[1]);
  const known = corners.filter(sound);
  if (known.length < 2) return [];
  return [...diameters([...known, ...bulges.filter(sound)], isHollow(sheet)), ...lengths(known)];
}

const widestOf = (side: SheetSide): Place =>
  side.points.reduce((best, place) => (place[0] > best[0] ? place : best), side.points[0]!);

/** A part that nowhere reaches the axis has a bore. */
function isHollow(sheet: Sheet): boolean {
  return sheet.loops.every((loop) => loop.vertices.every((vertex) => vertex.at[0] > 1e-6));
}

function diameters(corners: readonly Corner[], hollow: boolean): Dimension[] {
  const widest = pickMost(corners, ({ at }) => at[0] * 1e6 - at[1]);
  const farEnd = Math.max(...corners.map(({ at }) => (at[0] > 1e-6 ? at[1] : -Infinity)));
  const top = pickMost(
    corners.filter(({ at }) => at[1] > farEnd - 1e-9),
    ({ at }) => at[0],
  );
  const bore = hollow ? pickMost(corners, ({ at }) => -at[0] * 1e6 + at[1]) : null;
  const other = bore ?? (Math.abs(top.at[0] - widest.at[0]) > 1e-6 ? top : null);
  const diameter = (corner: Corner, end: "near" | "far"): Dimension => ({
    kind: "diameter",
    value: 2 * corner.at[0],
    from: corner.at,
    to: [-corner.at[0], corner.at[1]],
    point: corner,
    end,
    row: 0,
  });
  const found = other ? [diameter(widest, "near"), diameter(other, "far")] : [diameter(widest, "near")];
  return found.filter(({ value }) => value > 1e-6);
}

function pickMost(corners: readonly Corner[], measure: (corner: Corner) => number): Corner {
  return corners.reduce((best, corner) => (measure(corner) > measure(best) ? corner : best));
}

function lengths(corners: readonly Corner[]): Dimension[] {
  const byLevel = new Map<number, Corner>();
  for (const corner of corners) {
    const level = Math.round(corner.at[1] * 1e6);
    const held = byLevel.get(level);
    if (!held || corner.at[0] > held.at[0]) byLevel.set(level, corner);
  }
  const levels = [...byLevel.entries()].sort((a, b) => a[0] - b[0]).map(([, corner]) => corner);
  const [first, ...rest] = levels;
  if (!first || rest.length === 0) return [];
  const length = (from: Corner, to: Corner, row: number): Dimension => ({
    kind: "length",
    value: to.at[1] - from.at[1],
    from: from.at,
    to: to.at,
    point: to,
    end: "near",
    row,
  });
  if (rest.length <= MOST_LEVELS) return rest.map((corner, row) => length(first, corner, row));
  return [...rest.map((corner, k) => length(levels[k]!, corner, 0)), length(first, rest.at(-1)!, 1)];
}

/** A dimension on the board: its line, extension lines, heads and the middle where the figure stands. */
export interface DrawnDimension {
  readonly path: string;
  readonly heads: string;
  readonly middle: Spot;
  readonly upright: boolean;
  /** px between the heads */
  readonly room: number;
}

export interface DimensionRoom {
  /** edges of the part on the board [px]: where the mirrored half ends, and both ends along the axis */
  readonly mirrored: number;
  readonly near: number;
  readonly far: number;
  readonly gap: number;
}

/** Where the mirrored half ends and where the part begins and ends, on the board. */
export function dimensionRoom(
  view: View,
  bounds: { rMax: number; zMin: number; zMax: number },
  gap: number,
): DimensionRoom {
  const [x, y] = toScreen(view, -bounds.rMax, bounds.zMin);
  const [x2, y2] = toScreen(view, -bounds.rMax, bounds.zMax);
  return view.lying ? { mirrored: y, near: x, far: x2, gap } : { mirrored: x, near: y, far: y2, gap };
}

export function drawDimension(dimension: Dimension, view: View, room: DimensionRoom): DrawnDimension {
  const mirror = (place: Place): Spot => toScreen(view, -Math.abs(place[0]), place[1]);
  if (dimension.kind === "length") {
    const out = view.lying ? 1 : -1;
    const line = room.mirrored + out * room.gap * (dimension.row + 1);
    return measured(mirror(dimension.from), mirror(dimension.to), line, !view.lying, out);
  }
  const near = dimension.end === "near";
  const out = (near ? -1 : 1) * (view.lying ? 1 : -1);
  const line = (near ? room.near : room.far) + out * (room.gap + 12);
  return measured(toScreen(view, ...dimension.from), mirror(dimension.from), line, view.lying, out);
}

/** Two spots measured along a line at `line` (its y when across, its x when upright); `out` is the side it lies on. */
function measured(a: Spot, b: Spot, line: number, upright: boolean, out: number): DrawnDimension {
  const over = out * 4;
  const [from, to] = upright ? [a[1], b[1]] : [a[0], b[0]];
  const [low, high] = [Math.min(from, to), Math.max(from, to)];
  const path = upright
    ? `M${a[0] + over} ${a[1]}H${line + over}M${b[0] + over} ${b[1]}H${line + over}M${line} ${low}V${high}`
    : `M${a[0]} ${a[1] + over}V${line + over}M${b[0]} ${b[1] + over}V${line + over}M${low} ${line}H${high}`;
  const heads = upright
    ? `M${line} ${low}l-2 7h4zM${line} ${high}l-2 -7h4z`
    : `M${low} ${line}l7 -2v4zM${high} ${line}l-7 -2v4z`;
  const middle: Spot = upright ? [line, (low + high) / 2] : [(low + high) / 2, line];
  return { path, heads, middle, upright, room: high - low };
}
