/**
 * A constrained Delaunay triangulation on flat half-edge arrays, started by Delaunator and kept by flips.
 *
 * Half-edge e runs from corner[e] to corner[next(e)] and belongs to triangle e / 3; twin[e] is its opposite or -1;
 * lock[e] is 0 for a free edge, else the edge may not be flipped (its value is the caller's). A triangle taken out
 * has corner -1.
 */
import Delaunator from "delaunator";
import { incircle, orient2d } from "robust-predicates";

export const next = (e: number): number => (e % 3 === 2 ? e - 2 : e + 1);
export const previous = (e: number): number => (e % 3 === 0 ? e + 2 : e - 1);

/** Far points around the part: with them no node of the part lies on the hull, where Delaunator drops slivers. */
const FAR = 8;

export class Triangulation {
  /** nodes in use, taken-out ones included; the far points lie behind them until `dropFarPoints` */
  nodes: number;
  readonly xy: Float64Array;
  corner: Int32Array;
  twin: Int32Array;
  lock: Int32Array;
  /** region per triangle, -1 outside */
  region: Int32Array;
  /** half-edges in use */
  used: number;
  /** some half-edge that leaves each node, or -1 */
  readonly leaving: Int32Array;
  /** first half-edges of triangles taken out */
  readonly free: number[] = [];

  private stack = new Int32Array(4096);
  private top = 0;

  /**
   * @param xy     x, y pairs
   * @param count  points in use
   * @param room   most points it may ever hold
   */
  constructor(xy: Float64Array, count: number, room: number) {
    const points = withFarPoints(xy, count);
    // Delaunator turns clockwise with y upwards: it is given the mirror image.
    const mirrored = points.slice();
    for (let i = 1; i < mirrored.length; i += 2) mirrored[i] = -mirrored[i]!;
    const { triangles, halfedges } = new Delaunator(mirrored);
    this.nodes = count;
    this.xy = new Float64Array(2 * (Math.max(room, count) + FAR));
    this.xy.set(points);
    this.used = triangles.length;
    const length = Math.max(triangles.length, 6 * room) + 6;
    this.corner = new Int32Array(length);
    this.corner.set(triangles);
    this.twin = new Int32Array(length).fill(-1);
    this.twin.set(halfedges);
    this.lock = new Int32Array(length);
    this.region = new Int32Array(length / 3).fill(-1);
    this.leaving = new Int32Array(Math.max(room, count) + FAR).fill(-1);
    for (let e = 0; e < this.used; e++) this.leaving[this.corner[e]!] = e;
  }

  /** Positive when node c lies to the left of a-b; exact in sign. */
  turn(a: number, b: number, c: number): number {
    const { xy } = this;
    return -orient2d(xy[2 * a]!, xy[2 * a + 1]!, xy[2 * b]!, xy[2 * b + 1]!, xy[2 * c]!, xy[2 * c + 1]!);
  }

  /** Half-edge from a to b, or -1. */
  edge(a: number, b: number): number {
    const { corner, twin } = this;
    const start = this.leaving[a]!;
    if (start < 0) return -1;
    for (let e = start; ;) {
      if (corner[next(e)] === b) return e;
      const o = twin[previous(e)]!;
      if (o < 0) break;
      if (o === start) return -1;
      e = o;
    }
    // Met the hull: go round the other way.
    for (let e = start; ;) {
      const o = twin[e]!;
      if (o < 0) return -1;
      e = next(o);
      if (e === start || corner[next(e)] === b) return e === start ? -1 : e;
    }
  }

  /** Locks both half-edges of an edge with a value above 0; false when there is no such edge. */
  lockEdge(a: number, b: number, value: number): boolean {
    let e = this.edge(a, b);
    // On the hull only one of the two half-edges exists.
    if (e < 0) e = this.edge(b, a);
    if (e < 0) return false;
    this.lock[e] = value;
    if (this.twin[e]! >= 0) this.lock[this.twin[e]!] = value;
    return true;
  }

  /** Turns the edge of half-edge a inside its quadrilateral. */
  flip(a: number): void {
    const { corner, twin, lock, leaving } = this;
    const b = twin[a]!;
    const al = next(a);
    const ar = previous(a);
    const bl = previous(b);
    const br = next(b);
    const p0 = corner[ar]!;
    const pr = corner[a]!;
    const pl = corner[al]!;
    const p1 = corner[bl]!;
    const ha = twin[bl]!;
    const hb = twin[ar]!;
    corner[a] = p1;
    corner[b] = p0;
    twin[a] = ha;
    if (ha >= 0) twin[ha] = a;
    lock[a] = lock[bl]!;
    twin[b] = hb;
    if (hb >= 0) twin[hb] = b;
    lock[b] = lock[ar]!;
    twin[ar] = bl;
    twin[bl] = ar;
    lock[ar] = 0;
    lock[bl] = 0;
    leaving[p1] = a;
    leaving[pl] = al;
    leaving[p0] = ar;
    leaving[pr] = br;
  }

  /** Marks a half-edge for the next `settle`. */
  push(e: number): void {
    if (this.top === this.stack.length) {
      const stack = new Int32Array(2 * this.top);
      stack.set(this.stack);
      this.stack = stack;
    }
    this.stack[this.top++] = e;
  }

  pushAll(): void {
    for (let e = 0; e < this.used; e++) if (this.twin[e]! > e && !this.lock[e]) this.push(e);
  }

  /** Flips marked edges, and those they disturb, until all are locally Delaunay (Lawson). Returns the flips made. */
  settle(): number {
    const { twin, lock, corner } = this;
    let flips = 0;
    // Flips end by themselves in exact arithmetic; the limit guards against folded triangles.
    const most = 40 * (this.used + 1000);
    while (this.top > 0) {
      const a = this.stack[--this.top]!;
      const b = twin[a]!;
      if (b < 0 || lock[a] || corner[a]! < 0 || !this.wantsFlip(a, b)) continue;
      if (++flips > most) {
        this.top = 0;
        break;
      }
      const br = next(b);
      this.flip(a);
      this.push(a);
      this.push(b);
      this.push(next(a));
      this.push(br);
    }
    return flips;
  }

  /** True when the node across lies inside the circle of a's triangle and the quadrilateral is not folded. */
  private wantsFlip(a: number, b: number): boolean {
    const { corner, xy } = this;
    const p = 2 * corner[a]!;
    const q = 2 * corner[next(a)]!;
    const r = 2 * corner[previous(a)]!;
    const s = 2 * corner[previous(b)]!;
    const dx = xy[s]!;
    const dy = xy[s + 1]!;
    const ax = xy[p]! - dx;
    const ay = xy[p + 1]! - dy;
    const bx = xy[q]! - dx;
    const by = xy[q + 1]! - dy;
    const cx = xy[r]! - dx;
    const cy = xy[r + 1]! - dy;
    const a2 = ax * ax + ay * ay;
    const b2 = bx * bx + by * by;
    const c2 = cx * cx + cy * cy;
    const bxcy = bx * cy;
    const cxby = cx * by;
    const cxay = cx * ay;
    const axcy = ax * cy;
    const axby = ax * by;
    const bxay = bx * ay;
    let inside = a2 * (bxcy - cxby) + b2 * (cxay - axcy) + c2 * (axby - bxay);
    const doubt =
      1.2e-15 *
      (a2 * (Math.abs(bxcy) + Math.abs(cxby)) +
        b2 * (Math.abs(cxay) + Math.abs(axcy)) +
        c2 * (Math.abs(axby) + Math.abs(bxay)));
    if (inside < doubt && inside > -doubt) {
      inside = incircle(xy[p]!, xy[p + 1]!, xy[q]!, xy[q + 1]!, xy[r]!, xy[r + 1]!, dx, dy);
    }
    if (!(inside > 0)) return false;
    return this.turn(p / 2, q / 2, s / 2) < 0;
  }

  /** Room for a triangle: its first half-edge. */
  slot(): number {
    const e = this.free.pop();
    if (e !== undefined) return e;
    this.used += 3;
    return this.used - 3;
  }

  /** Nodes around a node whose triangles close around it; empty when they do not. */
  ringOf(v: number): number[] {
    const { corner, twin } = this;
    const ring: number[] = [];
    const start = this.leaving[v]!;
    if (start < 0) return ring;
    let e = start;
    do {
      ring.push(corner[next(e)]!);
      e = twin[previous(e)]!;
      if (e < 0) return [];
    } while (e !== start);
    return ring;
  }
}

function withFarPoints(xy: Float64Array, count: number): Float64Array {
  let [x0, x1, y0, y1] = [Infinity, -Infinity, Infinity, -Infinity];
  for (let i = 0; i < 2 * count; i += 2) {
    x0 = Math.min(x0, xy[i]!);
    x1 = Math.max(x1, xy[i]!);
    y0 = Math.min(y0, xy[i + 1]!);
    y1 = Math.max(y1, xy[i + 1]!);
  }
  const far = 1.5 * Math.max(x1 - x0, y1 - y0);
  const points = new Float64Array(2 * (count + FAR));
  points.set(xy.subarray(0, 2 * count));
  for (let k = 0; k < FAR; k++) {
    const angle = (2 * Math.PI * k) / FAR + 0.1;
    points[2 * (count + k)] = (x0 + x1) / 2 + far * Math.cos(angle);
    points[2 * (count + k) + 1] = (y0 + y1) / 2 + far * Math.sin(angle);
  }
  return points;
}
