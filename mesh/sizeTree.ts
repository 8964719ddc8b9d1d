/**
 * The size field h(x, y) = scale times min(largest, min over sources of size + grading times distance), held in a
 * quadtree whose leaves are about one size wide and in which h is linear.
 *
 * On the way down a cell keeps only the sources that can be least in it and the chords that touch it. A cell
 * without chords lies wholly inside or wholly outside, by one test; what is outside is not divided further.
 */
import { chordMeetsSquare, isInside } from "./chords.ts";
import { LEAF_SIZES, MOST_CELLS, TOO_FINE } from "./defaults.ts";
import type { Outline } from "./outline.ts";
import { SOURCE_STRIDE, type SizeSources } from "./sizeSources.ts";

/** Numbers per cell: centre x, y, half width, size at the centre, its slopes in x and y. */
export const CELL_STRIDE = 6;
export const LEAF = -1;
export const OUTSIDE = -2;

/** Cells of the entry table along one side: spares a look-up the upper levels of the tree. */
const TABLE = 64;
/** A cell this deep is a leaf whatever its size: 2^-40 of the part is below the tolerance. */
const DEEPEST = 40;

const MIXED = 0;
const INSIDE = 1;

export class SizeTree {
  /** first of four children, or LEAF, or OUTSIDE */
  child: Int32Array;
  cells: Float64Array;
  used = 1;
  /** size at the last place looked up [m] */
  size = 0;
  /** the integral of 1 / (sqrt(3)/2 h^2) over the part, at scale 1: nodes inside */
  area = 0;
  /** half the integral of 1 / h along all sides, at scale 1: half of the nodes on sides */
  line = 0;

  readonly middleX: number;
  readonly middleY: number;
  readonly half: number;
  readonly tableSize = TABLE;
  readonly table = new Int32Array(TABLE * TABLE);
  readonly perCell: number;

  private readonly largest: number;
  /** half the smallest size that any source asks for, scaled */
  private least = 0;
  private factor = 1;
  private readonly sources: Float64Array;
  private readonly value: Float64Array;
  private list: Int32Array;

  /**
   * @param build    sizes are multiplied by this before they are graded; side and arc limits hold
   * @param grading  growth of the size per unit of way, at scale 1
   */
  constructor(
    outline: Outline,
    private readonly from: SizeSources,
    build: number,
    private readonly grading: number,
  ) {
    this.middleX = (outline.low[0] + outline.high[0]) / 2;
    this.middleY = (outline.low[1] + outline.high[1]) / 2;
    this.half = 0.52 * outline.size;
    this.perCell = TABLE / (2 * this.half);
    this.largest = build * from.largest;
    this.sources = scaledSources(from, build);
    this.child = new Int32Array(4096);
    this.cells = new Float64Array(CELL_STRIDE * 4096);
    this.value = new Float64Array(from.count);
    this.list = this.firstList();
    const { count, chords } = from;
    this.divide(0, this.middleX, this.middleY, this.half, 0, count, count + chords.count, MIXED, 0);
    this.scale = 1;
    this.line = this.sideIntegral();
    this.enter(0, 0, 0, TABLE);
  }

  /** Finds the leaf at a place and puts the size there into `size`. Places off the tree get the nearest cell. */
  leafAt(x: number, y: number): number {
    const { child, cells } = this;
    let i = ((x - this.middleX + this.half) * this.perCell) | 0;
    let j = ((y - this.middleY + this.half) * this.perCell) | 0;
    if (i < 0) i = 0;
    else if (i >= TABLE) i = TABLE - 1;
    if (j < 0) j = 0;
    else if (j >= TABLE) j = TABLE - 1;
    let c = this.table[j * TABLE + i]!;
    for (let k = child[c]!; k >= 0; k = child[c]!) {
      c = k + (x > cells[CELL_STRIDE * c]! ? 1 : 0) + (y > cells[CELL_STRIDE * c + 1]! ? 2 : 0);
    }
    const q = CELL_STRIDE * c;
    const size =
      this.factor * (cells[q + 3]! + cells[q + 4]! * (x - cells[q]!) + cells[q + 5]! * (y - cells[q + 1]!));
    // Outside of the part cells are large and the slope leads astray: there the size only has to be above nothing.
    this.size = size > this.least ? size : this.least;
    return c;
  }

  /** All sizes are multiplied by this; at most a hair above 1. */
  get scale(): number {
    return this.factor;
  }

  set scale(factor: number) {
    this.factor = factor;
    this.least = 0.5 * factor * this.smallestSource();
  }

  private smallestSource(): number {
    let smallest = this.largest;
    for (let j = 0; j < this.sources.length; j += SOURCE_STRIDE) {
      const h = this.sources[j + 5]!;
      smallest = Math.min(smallest, h, h + this.sources[j + 6]!);
    }
    return smallest;
  }

  sizeAt(x: number, y: number): number {
    this.leafAt(x, y);
    return this.size;
  }

  private firstList(): Int32Array {
    const { count, chords } = this.from;
    const list = new Int32Array(16 * (count + chords.count) + 4096);
    for (let i = 0; i < count; i++) list[i] = i;
    for (let i = 0; i < chords.count; i++) list[count + i] = i;
    return list;
  }

  /**
   * Divides cell k. The list holds from a to b the sources and from b to c the chords that its parent kept.
   */
  private divide(
    k: number,
    x: number,
    y: number,
    half: number,
    a: number,
    b: number,
    c: number,
    parent: number,
    depth: number,
  ): void {
    const radius = Math.SQRT2 * half;
    const best = this.leastSource(k, x, y, half, a, b);
    if (this.list.length < 2 * c - a) this.growList(2 * c - a);
    const sourcesEnd = this.keepSources(a, b, c, best + 1.3 * this.grading * radius);
    let end = sourcesEnd;
    let state = parent;
    if (state === MIXED) {
      end = this.keepChords(b, c, sourcesEnd, x, y, half);
      if (end === sourcesEnd) state = isInside(this.from.chords, x, y) ? INSIDE : OUTSIDE;
    }
    if (state === OUTSIDE) {
      this.child[k] = OUTSIDE;
    } else if (2 * half <= LEAF_SIZES * Math.max(best - 0.7 * this.grading * radius, 0) || depth >= DEEPEST) {
      this.child[k] = LEAF;
      this.area += this.leafIntegral(k, state === INSIDE);
    } else {
      const first = this.fourCells();
      this.child[k] = first;
      const d = half / 2;
      for (let q = 0; q < 4; q++) {
        const cx = x + (q & 1 ? d : -d);
        const cy = y + (q & 2 ? d : -d);
        this.divide(first + q, cx, cy, d, c, sourcesEnd, end, state, depth + 1);
      }
    }
  }

  /** Size at the cell's centre and its slope, away from the source that is least there. */
  private leastSource(k: number, x: number, y: number, half: number, a: number, b: number): number {
    const { list, sources, value, cells, grading } = this;
    let best = this.largest;
    let bx = 0;
    let by = 0;
    for (let i = a; i < b; i++) {
      const j = SOURCE_STRIDE * list[i]!;
      const sx = sources[j + 2]!;
      const sy = sources[j + 3]!;
      let dx = x - sources[j]!;
      let dy = y - sources[j + 1]!;
      let t = (dx * sx + dy * sy) * sources[j + 4]!;
      t = t < 0 ? 0 : t > 1 ? 1 : t;
      dx -= t * sx;
      dy -= t * sy;
      const v = sources[j + 5]! + t * sources[j + 6]! + grading * Math.sqrt(dx * dx + dy * dy);
      value[i - a] = v;
      if (v < best) {
        best = v;
        bx = dx;
        by = dy;
      }
    }
    const d = Math.sqrt(bx * bx + by * by);
    const slope = d > 1e-3 * half ? this.grading / d : 0;
    const q = CELL_STRIDE * k;
    cells[q] = x;
    cells[q + 1] = y;
    cells[q + 2] = half;
    cells[q + 3] = best;
    cells[q + 4] = slope * bx;
    cells[q + 5] = slope * by;
    return best;
  }

  private keepSources(a: number, b: number, at: number, most: number): number {
    const { list, value } = this;
    let end = at;
    for (let i = a; i < b; i++) if (value[i - a]! <= most) list[end++] = list[i]!;
    return end;
  }

  private keepChords(b: number, c: number, at: number, x: number, y: number, half: number): number {
    const { list } = this;
    const { ends, bulge } = this.from.chords;
    let end = at;
    for (let i = b; i < c; i++) {
      const s = list[i]!;
      if (chordMeetsSquare(ends, 4 * s, x, y, 1.01 * half + bulge[s]!)) list[end++] = s;
    }
    return end;
  }

  private growList(least: number): void {
    const list = new Int32Array(2 * least);
    list.set(this.list);
    this.list = list;
  }

  private fourCells(): number {
    const first = this.used;
    this.used += 4;
    if (this.used > MOST_CELLS) {
      throw new Error(TOO_FINE);
    }
    if (this.used > this.child.length) {
      const child = new Int32Array(2 * this.child.length);
      const cells = new Float64Array(2 * this.cells.length);
      child.set(this.child);
      cells.set(this.cells);
      this.child = child;
      this.cells = cells;
    }
    return first;
  }

  /** Nodes in a leaf by four points; a leaf on the outline counts only the points that lie inside. */
  private leafIntegral(k: number, whole: boolean): number {
    const q = CELL_STRIDE * k;
    const { cells } = this;
    const [x, y, size] = [cells[q]!, cells[q + 1]!, cells[q + 3]!];
    const [gx, gy] = [cells[q + 4]!, cells[q + 5]!];
    const s = cells[q + 2]! / 2;
    let sum = 0;
    for (let i = -s; i <= s; i += 2 * s) {
      for (let j = -s; j <= s; j += 2 * s) {
        if (!whole && !isInside(this.from.chords, x + i, y + j)) continue;
        const h = size + i * gx + j * gy;
        sum += (4 * s * s) / (Math.sqrt(0.75) * h * h);
      }
    }
    return sum;
  }

  private sideIntegral(): number {
    const { sources } = this;
    let sum = 0;
    for (let j = SOURCE_STRIDE * this.from.sideStart; j < sources.length; j += SOURCE_STRIDE) {
      const h = sources[j + 5]!;
      const dh = sources[j + 6]!;
      const inverse = Math.abs(dh) < 1e-3 * h ? 1 / h : Math.log((h + dh) / h) / dh;
      sum += 0.5 * Math.sqrt(1 / sources[j + 4]!) * inverse;
    }
    return sum;
  }

  /** Fills the entry table: for each of its cells the smallest cell of the tree that holds it. */
  private enter(k: number, i: number, j: number, n: number): void {
    const first = this.child[k]!;
    if (n === 1 || first < 0) {
      for (let row = j; row < j + n; row++) this.table.fill(k, row * TABLE + i, row * TABLE + i + n);
      return;
    }
    const h = n / 2;
    for (let q = 0; q < 4; q++) this.enter(first + q, i + (q & 1 ? h : 0), j + (q & 2 ? h : 0), h);
  }
}

/** x, y, dx, dy, 1 / length^2, size, rise of the size: the sources as the tree reads them. */
function scaledSources(from: SizeSources, build: number): Float64Array {
  const s = Float64Array.from(from.stretches);
  for (let i = 0; i < s.length; i += SOURCE_STRIDE) {
    const length2 = s[i + 2]! * s[i + 2]! + s[i + 3]! * s[i + 3]!;
    const h0 = Math.min(build * s[i + 4]!, s[i + 6]!);
    const h1 = Math.min(build * s[i + 5]!, s[i + 6]!);
    s[i + 4] = length2 > 0 ? 1 / length2 : 0;
    s[i + 5] = h0;
    s[i + 6] = h1 - h0;
  }
  return s;
}
