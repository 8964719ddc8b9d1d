/**
 * The front: points set in equilateral position from the sides inwards, first come first served.
 *
 * 1. Over the middle of every chord a seed.
 * 2. Each point in turn proposes six neighbours at 60 degrees, at the distance that the size field asks for.
 * 3. A proposal too near to a point or a side, or across a side, is refused; an accepted one settles once on the
 *    mean of the places at the right distance from the points around it.
 */
import { Bins } from "./bins.ts";
import { POINT_GAP, SETTLE_REACH, SIDE_GAP } from "./defaults.ts";
import { LEFT_HAND, RIGHT_HAND, type SideNodes } from "./sideNodes.ts";
import { OUTSIDE, type SizeTree } from "./sizeTree.ts";

export interface PlacedPoints {
  /** x, y pairs: side nodes and fixed points first, in their order */
  readonly xy: Float64Array;
  /** size at each point [m] */
  readonly size: Float64Array;
  readonly count: number;
  /** the first so many never move */
  readonly fixed: number;
  /** the front met its limit and the part is not filled */
  readonly isFull: boolean;
}

const HEIGHT = Math.sqrt(0.75);

/**
 * @param inner  x, y pairs of fixed points inside; their numbers follow those of the side nodes
 * @param most   most points, the fixed ones included
 */
export function fillFromSides(
  tree: SizeTree,
  sides: SideNodes,
  inner: readonly number[],
  most: number,
): PlacedPoints {
  const front = new Front(tree, sides, inner, most);
  front.seed();
  front.advance();
  return front.inOrderOfBins();
}

class Front {
  private readonly x: Float64Array;
  private readonly y: Float64Array;
  private readonly h: Float64Array;
  /** direction of the first proposal of each point */
  private readonly ux: Float64Array;
  private readonly uy: Float64Array;
  private readonly bin: Int32Array;
  private readonly bins: Bins;
  private readonly chordFrom: Int32Array;
  private readonly chordTo: Int32Array;
  private readonly fixed: number;
  private n = 0;
  private isFull = false;

  constructor(
    private readonly tree: SizeTree,
    private readonly sides: SideNodes,
    inner: readonly number[],
    private readonly most: number,
  ) {
    const onSides = sides.x.length;
    this.fixed = onSides + inner.length / 2;
    const room = Math.max(most, this.fixed);
    this.x = new Float64Array(room);
    this.y = new Float64Array(room);
    this.h = new Float64Array(room);
    this.ux = new Float64Array(room);
    this.uy = new Float64Array(room);
    this.bin = new Int32Array(room);
    this.bins = new Bins(tree, 12 * room + 64 * onSides);
    this.chordFrom = Int32Array.from(sides.from);
    this.chordTo = Int32Array.from(sides.to);
    for (let i = 0; i < onSides; i++) this.addFixed(sides.x[i]!, sides.y[i]!);
    for (let i = 0; i < inner.length; i += 2) this.addFixed(inner[i]!, inner[i + 1]!);
    for (let c = 0; c < this.chordFrom.length; c++) this.listChord(c);
  }

  private addFixed(x: number, y: number): void {
    const i = this.n++;
    const h = this.tree.sizeAt(x, y);
    this.x[i] = x;
    this.y[i] = y;
    this.h[i] = h;
    this.ux[i] = 1;
    this.bins.addPoint(i, x, y, h);
  }

  /** Long chords (few nodes asked for) are listed by pieces, else their boxes would cover the part. */
  private listChord(c: number): void {
    const p = this.chordFrom[c]!;
    const q = this.chordTo[c]!;
    const dx = this.x[q]! - this.x[p]!;
    const dy = this.y[q]! - this.y[p]!;
    const length = Math.hypot(dx, dy);
    const reach = 1.05 * Math.max(length, this.h[p]!, this.h[q]!);
    const n = Math.max(1, Math.min(100, Math.ceil(length / (1.5 * Math.max(this.h[p]!, this.h[q]!)))));
    for (let i = 0; i < n; i++) {
      const ax = this.x[p]! + (dx * i) / n;
      const ay = this.y[p]! + (dy * i) / n;
      const bx = this.x[p]! + (dx * (i + 1)) / n;
      const by = this.y[p]! + (dy * (i + 1)) / n;
      const [x0, y0] = [Math.min(ax, bx) - reach, Math.min(ay, by) - reach];
      this.bins.addChord(c, x0, y0, Math.max(ax, bx) + reach, Math.max(ay, by) + reach);
    }
  }

  seed(): void {
    const { x, y, tree, sides } = this;
    for (let c = 0; c < this.chordFrom.length; c++) {
      const p = this.chordFrom[c]!;
      const q = this.chordTo[c]!;
      const dx = x[q]! - x[p]!;
      const dy = y[q]! - y[p]!;
      const length = Math.sqrt(dx * dx + dy * dy);
      const mx = (x[p]! + x[q]!) / 2;
      const my = (y[p]! + y[q]!) / 2;
      for (const hand of [LEFT_HAND, RIGHT_HAND]) {
        if (!(sides.hands[c]! & hand)) continue;
        const g = hand === LEFT_HAND ? 1 : -1;
        const h = tree.sizeAt(mx - g * dy * 0.8, my + g * dx * 0.8);
        const k = g * HEIGHT * Math.min(1.2, Math.max(0.8, Math.sqrt(h / length)));
        // The way starts a hair inside: on the chord itself the crossing test could not tell the hands apart.
        const s = 1e-3 * k;
        this.propose(mx - s * dy, my + s * dx, mx - k * dy, my + k * dx, dx / length, dy / length, false);
      }
    }
  }

  advance(): void {
    const { x, y, h, ux, uy, tree } = this;
    for (let i = this.sides.x.length; i < this.n && !this.isFull; i++) {
      let vx = ux[i]!;
      let vy = uy[i]!;
      for (let k = 0; k < 6; k++) {
        const d = 0.5 * (h[i]! + tree.sizeAt(x[i]! + h[i]! * vx, y[i]! + h[i]! * vy));
        this.propose(x[i]!, y[i]!, x[i]! + d * vx, y[i]! + d * vy, vx, vy, true);
        const turned = 0.5 * vx - HEIGHT * vy;
        vy = HEIGHT * vx + 0.5 * vy;
        vx = turned;
      }
    }
  }

  private propose(
    fx: number,
    fy: number,
    px: number,
    py: number,
    ux: number,
    uy: number,
    fromPoint: boolean,
  ): void {
    const { tree, bins } = this;
    const { half, middleX, middleY } = tree;
    if (px - middleX > half || middleX - px > half || py - middleY > half || middleY - py > half) return;
    const leaf = tree.leafAt(px, py);
    if (tree.child[leaf] === OUTSIDE) return;
    const h = tree.size;
    const bin = bins.binIn(leaf, px, py);
    if (this.isNearPoint(bin, px, py, h) || this.isBarred(bin, fx, fy, px, py, h)) return;
    const n = this.n;
    if (n >= this.most) {
      this.isFull = true;
      return;
    }
    this.settle(bin, px, py, h);
    if (fromPoint) {
      const dx = this.x[n]! - fx;
      const dy = this.y[n]! - fy;
      const d = Math.sqrt(dx * dx + dy * dy);
      this.ux[n] = dx / d;
      this.uy[n] = dy / d;
    } else {
      this.ux[n] = ux;
      this.uy[n] = uy;
    }
    this.h[n] = h;
    this.bin[n] = bin;
    this.n++;
    bins.addPoint(n, this.x[n]!, this.y[n]!, POINT_GAP * 1.12 * h);
  }

  private isNearPoint(bin: number, px: number, py: number, h: number): boolean {
    const { x, y, bins } = this;
    const sizes = this.h;
    const { next, item } = bins;
    for (let l = bins.points[bin]!; l > 0; l = next[l]!) {
      const q = item[l]!;
      const dx = x[q]! - px;
      const dy = y[q]! - py;
      const d = POINT_GAP * 0.5 * (h + sizes[q]!);
      if (dx * dx + dy * dy < d * d) return true;
    }
    return false;
  }

  /** True when p lies too near to a chord, or the way f-p crosses one. */
  private isBarred(bin: number, fx: number, fy: number, px: number, py: number, h: number): boolean {
    const { x, y, bins, chordFrom, chordTo } = this;
    const { next, item } = bins;
    const gap2 = SIDE_GAP * SIDE_GAP * h * h;
    for (let l = bins.chords[bin]!; l > 0; l = next[l]!) {
      const c = item[l]!;
      const a = chordFrom[c]!;
      const b = chordTo[c]!;
      const ax = x[a]!;
      const ay = y[a]!;
      const ex = x[b]! - ax;
      const ey = y[b]! - ay;
      const length2 = ex * ex + ey * ey;
      const along = (px - ax) * ex + (py - ay) * ey;
      const beside = ex * (py - ay) - ey * (px - ax);
      if (along > 0 && along < length2 && beside * beside < gap2 * length2) return true;
      const before = ex * (fy - ay) - ey * (fx - ax);
      if (beside > 0 === before > 0) continue;
      const sx = px - fx;
      const sy = py - fy;
      const k0 = sx * (ay - fy) - sy * (ax - fx);
      const k1 = sx * (ay + ey - fy) - sy * (ax + ex - fx);
      if (k0 > 0 !== k1 > 0) return true;
    }
    return false;
  }

  /** Puts the next point to the mean of the places at the right distance from the points already near. */
  private settle(bin: number, px: number, py: number, h: number): void {
    const { x, y, bins, n } = this;
    const sizes = this.h;
    const { next, item } = bins;
    let sx = 0;
    let sy = 0;
    let k = 0;
    for (let l = bins.points[bin]!; l > 0; l = next[l]!) {
      const q = item[l]!;
      const dx = px - x[q]!;
      const dy = py - y[q]!;
      const d2 = dx * dx + dy * dy;
      const e = 0.5 * (h + sizes[q]!);
      if (d2 >= SETTLE_REACH * SETTLE_REACH * e * e) continue;
      const f = e / Math.sqrt(d2);
      sx += x[q]! + f * dx;
      sy += y[q]! + f * dy;
      k++;
    }
    x[n] = k > 1 ? sx / k : px;
    y[n] = k > 1 ? sy / k : py;
  }

  /** Inner points leave in the order of their bins, so that neighbours lie near each other in memory. */
  inOrderOfBins(): PlacedPoints {
    const { n, fixed, bin } = this;
    const first = new Int32Array(this.bins.count + 1);
    for (let i = fixed; i < n; i++) first[bin[i]! + 1]!++;
    let sum = fixed;
    for (let k = 0; k < first.length; k++) sum = first[k] = first[k]! + sum;
    const xy = new Float64Array(2 * n);
    const size = new Float64Array(n);
    for (let i = 0; i < n; i++) {
      const j = i < fixed ? i : first[bin[i]!]!++;
      xy[2 * j] = this.x[i]!;
      xy[2 * j + 1] = this.y[i]!;
      size[j] = this.h[i]!;
    }
    return { xy, size, count: n, fixed, isFull: this.isFull };
  }
}
