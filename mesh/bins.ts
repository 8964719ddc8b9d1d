/**
 * The front's look-up: every leaf of the size tree is cut into bins about one size wide. A point is listed in every
 * bin that its ban reaches, a chord in every bin near it, so that a candidate reads one short list.
 */
import { CELL_STRIDE, OUTSIDE, type SizeTree } from "./sizeTree.ts";

/** Deepest stack of cells while a box is spread over the tree. */
const STACK = 8192;

export class Bins {
  readonly count: number;
  /** first bin of each leaf, and bins along its side */
  readonly base: Int32Array;
  readonly along: Uint8Array;
  /** linked lists: last entry of each bin for points and for chords; entry 0 ends a list */
  readonly points: Int32Array;
  readonly chords: Int32Array;
  next: Int32Array;
  item: Int32Array;
  private used = 1;
  private readonly stack = new Int32Array(STACK);

  constructor(
    private readonly tree: SizeTree,
    entries: number,
  ) {
    const { used, child, cells, scale } = tree;
    this.base = new Int32Array(used);
    this.along = new Uint8Array(used);
    let bins = 0;
    for (let c = 0; c < used; c++) {
      if (child[c]! >= 0) continue;
      const wide = (2 * cells[CELL_STRIDE * c + 2]!) / (scale * cells[CELL_STRIDE * c + 3]!);
      const n = child[c] === OUTSIDE ? 1 : Math.max(1, Math.min(255, Math.round(wide)));
      this.base[c] = bins;
      this.along[c] = n;
      bins += n * n;
    }
    this.count = bins;
    this.points = new Int32Array(bins);
    this.chords = new Int32Array(bins);
    this.next = new Int32Array(entries);
    this.item = new Int32Array(entries);
  }

  /** Bin of a place in a leaf. */
  binIn(leaf: number, x: number, y: number): number {
    const { cells } = this.tree;
    const q = CELL_STRIDE * leaf;
    const half = cells[q + 2]!;
    const n = this.along[leaf]!;
    const f = n / (2 * half);
    let u = ((x - cells[q]! + half) * f) | 0;
    let v = ((y - cells[q + 1]! + half) * f) | 0;
    if (u >= n) u = n - 1;
    if (v >= n) v = n - 1;
    return this.base[leaf]! + v * n + u;
  }

  /** Lists a point in all bins within the radius. */
  addPoint(i: number, x: number, y: number, radius: number): void {
    this.spread(this.points, i, x - radius, y - radius, x + radius, y + radius, x, y, radius);
  }

  /** Lists a chord in all bins of a box. */
  addChord(i: number, x0: number, y0: number, x1: number, y1: number): void {
    this.spread(this.chords, i, x0, y0, x1, y1, 0, 0, 0);
  }

  private spread(
    lists: Int32Array,
    i: number,
    x0: number,
    y0: number,
    x1: number,
    y1: number,
    x: number,
    y: number,
    radius: number,
  ): void {
    const { child, cells } = this.tree;
    const { stack } = this;
    let top = this.enterBox(x0, y0, x1, y1);
    while (top > 0) {
      const c = stack[--top]!;
      const q = CELL_STRIDE * c;
      const cx = cells[q]!;
      const cy = cells[q + 1]!;
      const w = cells[q + 2]!;
      if (x0 > cx + w || x1 < cx - w || y0 > cy + w || y1 < cy - w) continue;
      const first = child[c]!;
      if (first >= 0) {
        stack[top] = first;
        stack[top + 1] = first + 1;
        stack[top + 2] = first + 2;
        stack[top + 3] = first + 3;
        top += 4;
        continue;
      }
      const n = this.along[c]!;
      const side = (2 * w) / n;
      const f = 1 / side;
      const ox = cx - w;
      const oy = cy - w;
      const u0 = x0 > ox ? ((x0 - ox) * f) | 0 : 0;
      const v0 = y0 > oy ? ((y0 - oy) * f) | 0 : 0;
      const u1 = Math.min(((x1 - ox) * f) | 0, n - 1);
      const v1 = Math.min(((y1 - oy) * f) | 0, n - 1);
      const base = this.base[c]!;
      const reach2 = radius * radius;
      for (let v = v0; v <= v1; v++) {
        for (let u = u0; u <= u1; u++) {
          if (radius > 0) {
            const dx = Math.abs(ox + (u + 0.5) * side - x) - side / 2;
            const dy = Math.abs(oy + (v + 0.5) * side - y) - side / 2;
            if (dx > 0 && dy > 0 && dx * dx + dy * dy > reach2) continue;
          }
          this.list(lists, base + v * n + u, i);
        }
      }
    }
  }

  private list(lists: Int32Array, bin: number, i: number): void {
    if (this.used === this.next.length) this.grow();
    this.next[this.used] = lists[bin]!;
    this.item[this.used] = i;
    lists[bin] = this.used++;
  }

  private grow(): void {
    const next = new Int32Array(2 * this.used);
    const item = new Int32Array(2 * this.used);
    next.set(this.next);
    item.set(this.item);
    this.next = next;
    this.item = item;
  }

  /** Puts the cells of the entry table that the box meets on the stack, each once; returns how many. */
  private enterBox(x0: number, y0: number, x1: number, y1: number): number {
    const { table, tableSize: n, perCell, middleX, middleY, half, cells } = this.tree;
    const cell = (v: number) => (v < 0 ? 0 : v >= n ? n - 1 : v | 0);
    const i0 = cell((x0 - middleX + half) * perCell);
    const i1 = cell((x1 - middleX + half) * perCell);
    const j0 = cell((y0 - middleY + half) * perCell);
    const j1 = cell((y1 - middleY + half) * perCell);
    let top = 0;
    let last = -1;
    for (let j = j0; j <= j1; j++) {
      for (let i = i0; i <= i1; i++) {
        const c = table[j * n + i]!;
        if (c === last) continue;
        last = c;
        // A cell larger than the table's own fills several places of it.
        const large = cells[CELL_STRIDE * c + 2]! * perCell > 0.6;
        if (large && this.isOnStack(c, top)) continue;
        this.stack[top++] = c;
      }
    }
    return top;
  }

  private isOnStack(c: number, top: number): boolean {
    for (let i = 0; i < top; i++) if (this.stack[i] === c) return true;
    return false;
  }
}
