/**
 * What the outline asks of the size of the triangles: the relative size along every side, in the middle of walls,
 * at corners and at requested points. The size tree spreads it into the part.
 */
import { chordsOf, type Chords } from "./chords.ts";
import { wedgesOf, type Wedge } from "./corners.ts";
import {
  ARC_MOST,
  ARC_SHARE,
  FINEST_SHARE,
  LARGEST_SHARE,
  POINT_SHARE,
  REENTRANT_ANGLE,
  REENTRANT_SHARE,
  SIDE_MOST,
  WALL_TRIANGLES,
} from "./defaults.ts";
import type { Outline, Piece } from "./outline.ts";
import { curveAt, curveTangent, distanceToCurve } from "./plane.ts";
import { wallThickness } from "./wallThickness.ts";

/** Numbers per source: x, y, dx, dy of a straight stretch, size at its two ends, and a limit that does not scale. */
export const SOURCE_STRIDE = 7;

export interface SizeSources {
  /** SOURCE_STRIDE numbers per stretch; the stretches on sides come last, from `sideStart` on */
  readonly stretches: Float64Array;
  readonly count: number;
  readonly sideStart: number;
  /** piece of each stretch on a side */
  readonly pieceOf: Int32Array;
  /** largest relative size [m] */
  readonly largest: number;
  readonly chords: Chords;
  /** wedges of material at each vertex */
  readonly wedges: Wedge[][];
  /** smallest angle with material at each vertex [rad], Infinity without any */
  readonly sharpest: Float64Array;
}

/** Relative sizes at samples along one piece. */
interface SideSamples {
  readonly piece: Piece;
  readonly x: number[];
  readonly y: number[];
  readonly size: number[];
  /** what the size must not exceed however few nodes are asked for [m] */
  readonly limit: number;
}

/** Samples of the whole outline; each piece gets its share of these, and so many at least. */
const SAMPLES = 400;
const MOST_SAMPLES = 200;
const LEAST_SAMPLES = 5;
/** An outline of more pieces than this is drawn in short strokes: their ends and middles tell enough. */
const MANY_PIECES = 300;
const LEAST_SAMPLES_OF_MANY = 2;
/** An arc's chords stay off their arc by this share of the gap to the next side at most. */
const SAGITTA_SHARE = 0.25;

export function sizeSources(outline: Outline): SizeSources {
  const largest = LARGEST_SHARE * outline.size;
  const chords = chordsOf(outline);
  const wedges = wedgesOf(outline);
  const list: number[] = [];
  const samples = sampleSizes(outline, chords, largest, list);
  addCorners(outline, samples, wedges, list);
  addPoints(outline, largest, list);
  const sideStart = list.length / SOURCE_STRIDE;
  const pieceOf: number[] = [];
  samples.forEach((side, k) => {
    addStretches(side, list);
    while (sideStart + pieceOf.length < list.length / SOURCE_STRIDE) pieceOf.push(k);
  });
  return {
    stretches: withFloor(list, FINEST_SHARE * outline.size),
    count: list.length / SOURCE_STRIDE,
    sideStart,
    pieceOf: Int32Array.from(pieceOf),
    largest,
    chords,
    wedges,
    sharpest: Float64Array.from(wedges, (at) => at.reduce((least, w) => Math.min(least, w.angle), Infinity)),
  };
}

/** The same sources with limits on the size at pieces [m], whatever the number of nodes. */
export function withLimits(sources: SizeSources, limits: readonly number[]): SizeSources {
  const stretches = sources.stretches.slice();
  sources.pieceOf.forEach((k, i) => {
    const j = SOURCE_STRIDE * (sources.sideStart + i) + 6;
    stretches[j] = Math.min(stretches[j]!, limits[k]!);
  });
  return { ...sources, stretches };
}

function withFloor(list: readonly number[], finest: number): Float64Array {
  const stretches = Float64Array.from(list);
  for (let i = 0; i < stretches.length; i += SOURCE_STRIDE) {
    for (let k = 4; k < SOURCE_STRIDE; k++) stretches[i + k] = Math.max(stretches[i + k]!, finest);
  }
  return stretches;
}

/** Sizes along all pieces; the middles of walls go straight into the list of sources. */
function sampleSizes(outline: Outline, chords: Chords, largest: number, list: number[]): SideSamples[] {
  const perimeter = outline.pieces.reduce((sum, piece) => sum + piece.length, 0);
  const skip = new Uint8Array(outline.pieces.length);
  const least = outline.pieces.length > MANY_PIECES ? LEAST_SAMPLES_OF_MANY : LEAST_SAMPLES;
  return outline.pieces.map((piece) => {
    const neighbours = [...outline.ends[piece.a]!, ...outline.ends[piece.b]!];
    for (const k of neighbours) skip[k] = 1;
    const n = Math.ceil((piece.length / perimeter) * SAMPLES);
    const samples = samplePiece(
      piece,
      Math.max(least, Math.min(MOST_SAMPLES, n)),
      largest,
      chords,
      skip,
      list,
    );
    for (const k of neighbours) skip[k] = 0;
    return samples;
  });
}

function samplePiece(
  piece: Piece,
  n: number,
  largest: number,
  chords: Chords,
  skip: Uint8Array,
  list: number[],
): SideSamples {
  const x: number[] = [];
  const y: number[] = [];
  const size: number[] = [];
  const p = [0, 0];
  const t = [0, 0];
  const middles = [
    new WallMiddle(list, (2 * piece.length) / n),
    new WallMiddle(list, (2 * piece.length) / n),
  ];
  const bend = piece.arc ? piece.arc.radius : Infinity;
  let nearest = Infinity;
  for (let i = 0; i <= n; i++) {
    curveAt(piece, i / n, p);
    curveTangent(piece, i / n, t);
    let h = Math.min(largest, SIDE_MOST * piece.length, ARC_SHARE * bend);
    for (const hand of [1, -1]) {
      const isMaterial = (hand > 0 ? piece.left : piece.right) >= 0;
      if (!isMaterial && !piece.arc) continue;
      const nx = -t[1]! * hand;
      const ny = t[0]! * hand;
      const wall = wallThickness(p[0]!, p[1]!, nx, ny, chords, skip);
      nearest = Math.min(nearest, wall);
      if (!isMaterial) continue;
      h = Math.min(h, wall / WALL_TRIANGLES);
      middles[hand > 0 ? 0 : 1]!.add(
        p[0]! + (nx * wall) / 2,
        p[1]! + (ny * wall) / 2,
        wall / WALL_TRIANGLES,
        largest,
      );
    }
    x.push(p[0]!);
    y.push(p[1]!);
    size.push(h);
  }
  // A chord must not reach across to what lies opposite: its sagitta is c^2 / (8 R).
  const byGap = piece.arc ? Math.sqrt(8 * bend * SAGITTA_SHARE * nearest) : Infinity;
  return { piece, x, y, size, limit: Math.min(ARC_MOST * bend, SIDE_MOST * piece.length, byGap) };
}

/** Joins the middles of a wall, sample after sample, into stretches of sources. */
class WallMiddle {
  private x = NaN;
  private y = NaN;
  private size = NaN;

  constructor(
    private readonly list: number[],
    private readonly reach: number,
  ) {}

  add(x: number, y: number, size: number, largest: number): void {
    if (!(size < largest)) {
      this.x = NaN;
      return;
    }
    if (Math.hypot(this.x - x, this.y - y) < this.reach) {
      this.list.push(this.x, this.y, x - this.x, y - this.y, this.size, size, Infinity);
    } else {
      this.list.push(x, y, 0, 0, size, size, Infinity);
    }
    this.x = x;
    this.y = y;
    this.size = size;
  }
}

/**
 * The field is steep at a re-entrant corner: a source of its own, so that the size grows alike on both of its sides.
 */
function addCorners(
  outline: Outline,
  samples: readonly SideSamples[],
  wedges: readonly Wedge[][],
  list: number[],
): void {
  const least = new Float64Array(outline.x.length).fill(Infinity);
  for (const { piece, size } of samples) {
    least[piece.a] = Math.min(least[piece.a]!, size[0]!);
    least[piece.b] = Math.min(least[piece.b]!, size[size.length - 1]!);
  }
  wedges.forEach((at, v) => {
    if (!at.some((w) => w.angle > REENTRANT_ANGLE)) return;
    const size = REENTRANT_SHARE * least[v]!;
    list.push(outline.x[v]!, outline.y[v]!, 0, 0, size, size, Infinity);
  });
}

/** A requested point near a side or another point needs triangles that fit between. */
function addPoints(outline: Outline, largest: number, list: number[]): void {
  outline.inner.forEach(([x, y], k) => {
    let nearest = Infinity;
    for (const piece of outline.pieces) nearest = Math.min(nearest, distanceToCurve(piece, x, y));
    outline.inner.forEach(([x2, y2], k2) => {
      if (k2 !== k) nearest = Math.min(nearest, Math.hypot(x - x2, y - y2));
    });
    const size = POINT_SHARE * nearest;
    list.push(x, y, 0, 0, Math.min(size, largest), Math.min(size, largest), size);
  });
}

/** Consecutive samples as stretches; on a line, samples that a straight fit replaces within 3 % are left out. */
function addStretches({ piece, x, y, size, limit }: SideSamples, list: number[]): void {
  for (let i = 0, j = 1; i + 1 < size.length; i = j++) {
    if (!piece.arc) while (j + 1 < size.length && isNearlyStraight(size, i, j + 1)) j++;
    list.push(x[i]!, y[i]!, x[j]! - x[i]!, y[j]! - y[i]!, size[i]!, size[j]!, limit);
  }
}

function isNearlyStraight(size: readonly number[], i: number, j: number): boolean {
  for (let k = i + 1; k < j; k++) {
    const fit = size[i]! + ((size[j]! - size[i]!) * (k - i)) / (j - i);
    if (Math.abs(size[k]! - fit) > 0.03 * size[k]!) return false;
  }
  return true;
}
