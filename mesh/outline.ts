/**
 * The outline as one planar graph: vertices, and pieces of sides between them with what lies on either hand.
 *
 * Sides are cut at every vertex that lies on them (T-junctions between regions, requested points), and pieces that
 * coincide become one piece with a region on the left and another on the right.
 */
import { JOIN_SHARE } from "./defaults.ts";
import {
  arcExtremes,
  areaUnder,
  arcThrough,
  curveAt,
  curveLength,
  distanceToCurve,
  partOfArc,
  shareOnCurve,
  type Arc,
  type Curve,
} from "./plane.ts";
import type { MeshRequest, OutlineRegion, OutlineSide, Point } from "./types.ts";

/** Part of an outline side between two neighbouring vertices. */
export interface Piece extends Curve {
  /** vertex numbers of its ends */
  readonly a: number;
  readonly b: number;
  /** number of its circle in `Outline.circles`, -1 on a line */
  readonly circle: number;
  readonly length: number;
  /** region and outline side on the left of the way a-b and on the right; -1 where nothing lies */
  left: number;
  leftSide: number;
  right: number;
  rightSide: number;
}

export interface Outline {
  /** vertices x, y */
  readonly x: number[];
  readonly y: number[];
  readonly pieces: Piece[];
  /** numbers of the pieces that end at each vertex */
  readonly ends: number[][];
  /** one arc per curved outline side, in the order met */
  readonly circles: Arc[];
  readonly low: Point;
  readonly high: Point;
  /** larger extent [m] */
  readonly size: number;
  readonly tolerance: number;
  /** vertex number of each requested point, or -1 - k for the k-th of `inner` */
  readonly pointVertex: number[];
  /** requested points inside the part, each once */
  readonly inner: Point[];
}

/** One loop's side with its number over all regions. */
export interface NumberedSide {
  readonly side: OutlineSide;
  readonly number: number;
  readonly region: number;
  readonly loop: number;
}

/** All sides in the order region, loop, side: the numbering that the mesh's tags and the rows use. */
export function numberedSides(regions: readonly OutlineRegion[]): NumberedSide[] {
  const all: NumberedSide[] = [];
  regions.forEach((region, r) => {
    region.loops.forEach((loop, l) => {
      for (const side of loop) all.push({ side, number: all.length, region: r, loop: l });
    });
  });
  return all;
}

export function curveOf(side: OutlineSide): Curve {
  const { from, to, through } = side;
  const arc = through ? arcThrough(from, through, to) : null;
  return { ax: from[0], ay: from[1], bx: to[0], by: to[1], arc };
}

/** Signed area of a loop [m2], positive when it runs counter-clockwise. */
export function loopArea(loop: readonly OutlineSide[]): number {
  return loop.reduce((sum, side) => sum + areaUnder(curveOf(side)), 0);
}

/** Corners of the box around all sides, arcs included. */
export function extentOf(regions: readonly OutlineRegion[]): { low: Point; high: Point; size: number } {
  const low = [Infinity, Infinity] as [number, number];
  const high = [-Infinity, -Infinity] as [number, number];
  const take = (x: number, y: number) => {
    low[0] = Math.min(low[0], x);
    low[1] = Math.min(low[1], y);
    high[0] = Math.max(high[0], x);
    high[1] = Math.max(high[1], y);
  };
  for (const { side } of numberedSides(regions)) {
    take(...side.from);
    take(...side.to);
    const { arc } = curveOf(side);
    if (arc) for (const place of arcExtremes(arc)) take(...place);
  }
  return { low, high, size: Math.max(high[0] - low[0], high[1] - low[1]) };
}

/** The request's outline as a planar graph. Faults are not looked for here: see `findOutlineFaults`. */
export function readOutline(request: MeshRequest): Outline {
  const { low, high, size } = extentOf(request.regions);
  if (!(size > 0 && Number.isFinite(size))) throw new Error("an empty outline, or a place that is no number");
  const tolerance = JOIN_SHARE * size;
  const places = new PlaceBook(tolerance);
  const circles: Arc[] = [];
  const whole = wholeSides(request.regions, places, circles);
  const { pointVertex, inner } = placePoints(request.points ?? [], whole, places, tolerance);
  const pieces = mergePieces(cutSides(whole, places, tolerance), 10 * tolerance);
  const ends: number[][] = places.x.map(() => []);
  pieces.forEach((piece, k) => {
    ends[piece.a]!.push(k);
    ends[piece.b]!.push(k);
  });
  return { x: places.x, y: places.y, pieces, ends, circles, low, high, size, tolerance, pointVertex, inner };
}

/** Numbers places, one number for places nearer than the tolerance. */
class PlaceBook {
  readonly x: number[] = [];
  readonly y: number[] = [];
  private readonly cells = new Map<string, number[]>();

  constructor(private readonly tolerance: number) {}

  numberOf(x: number, y: number): number {
    const cx = Math.round(x / (4 * this.tolerance));
    const cy = Math.round(y / (4 * this.tolerance));
    for (let i = -1; i <= 1; i++) {
      for (let j = -1; j <= 1; j++) {
        for (const v of this.cells.get(`${cx + i},${cy + j}`) ?? []) {
          if (Math.hypot(this.x[v]! - x, this.y[v]! - y) < this.tolerance) return v;
        }
      }
    }
    const v = this.x.push(x) - 1;
    this.y.push(y);
    const key = `${cx},${cy}`;
    const cell = this.cells.get(key);
    if (cell) cell.push(v);
    else this.cells.set(key, [v]);
    return v;
  }
}

function wholeSides(regions: readonly OutlineRegion[], places: PlaceBook, circles: Arc[]): Piece[] {
  const sides: Piece[] = [];
  // A loop that runs the wrong way round (outer loops counter-clockwise, voids clockwise) is read backwards.
  const backwards = regions.map((region) => region.loops.map((loop, l) => loopArea(loop) < 0 === (l === 0)));
  for (const { side, number, region, loop } of numberedSides(regions)) {
    const turned = backwards[region]![loop]!;
    const [from, to] = turned ? [side.to, side.from] : [side.from, side.to];
    const a = places.numberOf(from[0], from[1]);
    const b = places.numberOf(to[0], to[1]);
    if (a === b) continue;
    const arc = side.through ? arcThrough(from, side.through, to) : null;
    const circle = arc ? circles.push(arc) - 1 : -1;
    sides.push(pieceBetween(places, a, b, arc, circle, region, number));
  }
  return sides;
}

function pieceBetween(
  places: PlaceBook,
  a: number,
  b: number,
  arc: Arc | null,
  circle: number,
  left: number,
  leftSide: number,
): Piece {
  const curve = { ax: places.x[a]!, ay: places.y[a]!, bx: places.x[b]!, by: places.y[b]!, arc };
  return { ...curve, a, b, circle, length: curveLength(curve), left, leftSide, right: -1, rightSide: -1 };
}

/** Requested points on a side become vertices there; the others are kept as inner points, each once. */
function placePoints(
  points: readonly Point[],
  sides: readonly Piece[],
  places: PlaceBook,
  tolerance: number,
): { pointVertex: number[]; inner: Point[] } {
  const inner: Point[] = [];
  const pointVertex = points.map(([x, y]) => {
    if (sides.some((side) => distanceToCurve(side, x, y) <= tolerance)) return places.numberOf(x, y);
    const known = inner.findIndex((p) => Math.hypot(p[0] - x, p[1] - y) < tolerance);
    return -1 - (known >= 0 ? known : inner.push([x, y]) - 1);
  });
  return { pointVertex, inner };
}

function boxAround({ ax, ay, bx, by, arc }: Curve, margin: number) {
  const ends = [[ax, ay] as const, [bx, by] as const, ...(arc ? arcExtremes(arc) : [])];
  const xs = ends.map(([x]) => x);
  const ys = ends.map(([, y]) => y);
  return {
    x0: Math.min(...xs) - margin,
    x1: Math.max(...xs) + margin,
    y0: Math.min(...ys) - margin,
    y1: Math.max(...ys) + margin,
  };
}

function cutSides(sides: readonly Piece[], places: PlaceBook, tolerance: number): Piece[] {
  const pieces: Piece[] = [];
  for (const side of sides) {
    const cuts: [t: number, vertex: number][] = [];
    const reach = boxAround(side, 2 * tolerance);
    for (let v = 0; v < places.x.length; v++) {
      const x = places.x[v]!;
      const y = places.y[v]!;
      if (x < reach.x0 || x > reach.x1 || y < reach.y0 || y > reach.y1) continue;
      if (v === side.a || v === side.b) continue;
      const t = shareOnCurve(side, x, y, tolerance);
      if (t > 0 && t < 1) cuts.push([t, v]);
    }
    cuts.sort((p, q) => p[0] - q[0]);
    let a = side.a;
    let t0 = 0;
    for (const [t1, b] of [...cuts, [1, side.b] as const]) {
      const arc = side.arc && partOfArc(side.arc, t0, t1);
      pieces.push(pieceBetween(places, a, b, arc, side.circle, side.left, side.leftSide));
      a = b;
      t0 = t1;
    }
  }
  return pieces;
}

/** Pieces that run the same way in opposite senses become one, with a region on either hand. */
function mergePieces(pieces: readonly Piece[], tolerance: number): Piece[] {
  const kept: Piece[] = [];
  const byEnds = new Map<string, Piece[]>();
  const p = [0, 0];
  const q = [0, 0];
  for (const piece of pieces) {
    curveAt(piece, 0.5, p);
    const twin = (byEnds.get(`${piece.b},${piece.a}`) ?? []).find((other) => {
      curveAt(other, 0.5, q);
      return other.right < 0 && Math.hypot(p[0]! - q[0]!, p[1]! - q[1]!) < tolerance;
    });
    if (twin) {
      twin.right = piece.left;
      twin.rightSide = piece.leftSide;
      continue;
    }
    kept.push(piece);
    const key = `${piece.a},${piece.b}`;
    const others = byEnds.get(key);
    if (others) others.push(piece);
    else byEnds.set(key, [piece]);
  }
  return kept;
}
