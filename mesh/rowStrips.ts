/**
 * Lays the rows: columns of nodes on the side nodes of each strip, cells between them cut into triangles, and the
 * chords on top from which the front goes on. Columns stand straight, so that the cells are right-angled and
 * Delaunay; at corners they lean over a short way.
 */
import { ROW_FAN_STEP, ROW_LEAN_DEPTHS, ROW_POINT_GAP, ROW_SIZE_DROP } from "./defaults.ts";
import type { Outline } from "./outline.ts";
import { curveLength, distanceToCurve } from "./plane.ts";
import {
  countRowsAtCorners,
  DepthLimit,
  levelGroups,
  rowNeeds,
  rowsThatFit,
  smoothedCounts,
} from "./rowCounts.ts";
import { rowDepth, type RowCorner, type RowPlan, type RowStrip } from "./rowPlan.ts";
import { LEFT_HAND, placeSideNodes, RIGHT_HAND, type SideNodes } from "./sideNodes.ts";
import type { SizeSources } from "./sizeSources.ts";
import type { SizeTree } from "./sizeTree.ts";
import { crossingChords } from "./chordCrossings.ts";

/** Trials to make all rows fit; each failed one takes rows away somewhere. */
const MOST_TRIALS = 24;

/** Side nodes and, where the plan says so, rows of nodes beside them. */
export function placeSidesAndRows(
  outline: Outline,
  tree: SizeTree,
  sources: SizeSources,
  plan: RowPlan | null,
): SideNodes {
  if (plan) {
    countRowsAtCorners(plan, outline, tree);
    for (let trial = 0; trial < MOST_TRIALS; trial++) {
      const sides = placeSideNodes(outline, tree, sources, rowNeeds(plan, outline));
      if (new RowLayer(outline, tree, sources, plan, sides).lay()) return sides;
    }
  }
  return placeSideNodes(outline, tree, sources);
}

/** One strip's columns: node numbers from the side upwards. */
interface Columns {
  readonly strip: RowStrip;
  /** side nodes in the direction of travel, the first and last being the strip's ends */
  readonly base: number[];
  /** length from the strip's start to each base node [m] */
  readonly along: number[];
  readonly counts: number[];
  readonly nodes: number[][];
  /** columns at either end that belong to the grid of a crossed corner */
  readonly first: number;
  readonly last: number;
}

class RowLayer {
  /** the column that each corner hands to the strip that ends and to the strip that starts there */
  private readonly handed = new Map<RowCorner, { end: number[]; start: number[] }>();
  /** top chords and the strip and lengths they belong to, for the crossing test */
  private readonly tops: { chord: number; strip: RowStrip; from: number; to: number; rows: number }[] = [];
  private readonly covered: { piece: number; hand: number; chord: number }[] = [];
  private hasFault = false;

  constructor(
    private readonly outline: Outline,
    private readonly tree: SizeTree,
    private readonly sources: SizeSources,
    private readonly plan: RowPlan,
    private readonly sides: SideNodes,
  ) {}

  /** True when all rows fit; false when some were taken away and the side nodes must be placed again. */
  lay(): boolean {
    const columns = this.plan.strips.map((strip) => this.columnsOf(strip));
    if (!this.cornersAgree(columns)) return false;
    for (const corner of this.plan.corners) this.layCorner(corner);
    if (this.hasFault) {
      levelGroups(this.plan);
      return false;
    }
    for (const c of columns) this.layColumns(c);
    for (const c of columns) this.layCells(c);
    for (const { hand, chord } of this.covered) this.sides.hands[chord]! &= ~hand;
    return !this.hasFault && !this.limitCrossings();
  }

  // ---- counts ----------------------------------------------------------------------------------------------

  private columnsOf(strip: RowStrip): Columns {
    const base = this.nodesAlong(strip);
    const along = [0];
    for (let i = 1; i < base.length; i++) along.push(along[i - 1]! + this.distance(base[i - 1]!, base[i]!));
    const first = strip.start?.kind === "crossed" ? strip.start.rows : 0;
    const last = base.length - 1 - (strip.end?.kind === "crossed" ? strip.end.rows : 0);
    const limit = new DepthLimit(strip, this.outline, this.sources.chords);
    const allowed: number[] = [];
    for (let i = first; i <= last; i++) allowed.push(this.allowedAt(strip, base[i]!, along[i]!, limit));
    if (strip.start) allowed[0] = strip.start.rows;
    if (strip.end)
      allowed[allowed.length - 1] = Math.min(strip.end.rows, allowed.length > 1 ? Infinity : allowed[0]!);
    const apart = allowed.map((_, k) => along[first + k + 1]! - along[first + k]!);
    return { strip, base, along, counts: smoothedCounts(strip, allowed, apart), nodes: [], first, last };
  }

  private allowedAt(strip: RowStrip, node: number, along: number, limit: DepthLimit): number {
    const { x, y } = this.sides;
    const size = this.tree.sizeAt(x[node]!, y[node]!);
    const [nx, ny] = this.normalAt(strip, node);
    let rows = rowsThatFit(strip, size, limit.at(x[node]!, y[node]!, nx, ny, size));
    const sizeAbove = (k: number) => {
      const depth = rowDepth(strip, k);
      return this.tree.sizeAt(x[node]! + depth * nx, y[node]! + depth * ny);
    };
    while (rows > 0 && sizeAbove(rows) < ROW_SIZE_DROP * size) rows--;
    for (const [from, to, most] of strip.limits)
      if (along >= from && along <= to) rows = Math.min(rows, most);
    return rows;
  }

  /** The side nodes of a strip in its direction of travel. */
  private nodesAlong({ piece, hand }: RowStrip): number[] {
    const { from, to, firstChord } = this.sides;
    const nodes: number[] = [];
    const end = firstChord[piece + 1] ?? from.length;
    for (let c = firstChord[piece]!; c < end; c++) nodes.push(from[c]!);
    nodes.push(to[end - 1]!);
    return hand === LEFT_HAND ? nodes : nodes.reverse();
  }

  /** Unit normal into the strip's region. */
  private normalAt({ piece, hand }: RowStrip, node: number): [number, number] {
    const { arc, ax, ay, bx, by, length } = this.outline.pieces[piece]!;
    const sign = hand === LEFT_HAND ? 1 : -1;
    if (!arc) return [(-sign * (by - ay)) / length, (sign * (bx - ax)) / length];
    const inwards = (sign * Math.sign(arc.turn)) / arc.radius;
    return [(arc.x - this.sides.x[node]!) * inwards, (arc.y - this.sides.y[node]!) * inwards];
  }

  /** Lowers corners whose strips cannot take as many rows; false when any was lowered. */
  private cornersAgree(columns: readonly Columns[]): boolean {
    let agree = true;
    const lower = (corner: RowCorner | null, rows: number) => {
      if (!corner || corner.rows <= rows) return;
      corner.rows = rows;
      agree = false;
    };
    for (const { strip, counts, first, last } of columns) {
      // Grids from both ends that meet leave no columns between them.
      if (last < first) {
        lower(strip.start, strip.start!.rows - 1);
        lower(strip.end, strip.end!.rows - 1);
        continue;
      }
      lower(strip.start, counts[0]!);
      lower(strip.end, counts[counts.length - 1]!);
    }
    levelGroups(this.plan);
    return agree;
  }

  // ---- corners ---------------------------------------------------------------------------------------------

  private layCorner(corner: RowCorner): void {
    if (corner.rows === 0) return;
    if (corner.kind === "crossed") this.layCrossed(corner);
    else if (corner.kind === "landed") this.layLanded(corner);
    else if (corner.kind === "mitred") this.layMitre(corner);
    else if (corner.kind === "fanned") this.layFan(corner);
  }

  /** The first side nodes of a piece from a vertex, the vertex included, and the chords between them. */
  private firstNodes(corner: RowCorner, k: number): number[] {
    const { from, to, firstChord } = this.sides;
    const fromA = this.outline.pieces[k]!.a === corner.vertex;
    const end = firstChord[k + 1] ?? from.length;
    const nodes = [corner.vertex];
    for (let row = 0; row < corner.rows; row++) {
      const chord = fromA ? firstChord[k]! + row : end - 1 - row;
      nodes.push(fromA ? to[chord]! : from[chord]!);
      // The wedge lies to the left of the way out along its first piece, to the right along its closing one.
      const isLeft = fromA === (k === corner.from);
      this.covered.push({ piece: k, hand: isLeft ? LEFT_HAND : RIGHT_HAND, chord });
    }
    return nodes;
  }

  private layLanded(corner: RowCorner): void {
    const column = this.firstNodes(corner, corner.before ? corner.from : corner.to);
    this.handed.set(corner, { end: column, start: column });
  }

  /** Column along the bisector of the wedge. */
  private layMitre(corner: RowCorner): void {
    const strip = (corner.after ?? corner.before)!;
    const [nx, ny] = this.normalAt(strip, corner.vertex);
    // Along the way out on the first piece, or back on the closing one.
    const [tx, ty] = corner.after ? [ny, -nx] : [-ny, nx];
    const lean = 1 / Math.tan(corner.angle / 2);
    const column = this.column(corner.vertex, strip, corner.rows, nx + lean * tx, ny + lean * ty);
    this.handed.set(corner, { end: column, start: column });
  }

  /** Columns from the normal of the side that ends here round to the normal of the side that starts. */
  private layFan(corner: RowCorner): void {
    const { vertex, rows, before, after } = corner;
    const strip = before!;
    const opening = corner.angle - Math.PI;
    const steps = Math.max(1, Math.round(opening / ROW_FAN_STEP));
    const [nx, ny] = this.normalAt(strip, vertex);
    const columns = Array.from({ length: steps + 1 }, (_, k) => {
      const angle = Math.atan2(ny, nx) - (opening * k) / steps;
      return this.column(vertex, strip, rows, Math.cos(angle), Math.sin(angle));
    });
    for (let k = 0; k < steps; k++) {
      const [p, q] = [columns[k]!, columns[k + 1]!];
      this.triangle(vertex, q[1]!, p[1]!);
      for (let row = 1; row < rows; row++) this.quad(p[row]!, q[row]!, q[row + 1]!, p[row + 1]!);
      this.topChord(p[rows]!, q[rows]!, after!, 0, 0, rows);
    }
    this.handed.set(corner, { end: columns[0]!, start: columns[steps]! });
  }

  /** The grid: node (i, j) is i rows above the first piece and j rows above the closing one. */
  private layCrossed(corner: RowCorner): void {
    const { x, y } = this.sides;
    const out = this.firstNodes(corner, corner.from);
    const back = this.firstNodes(corner, corner.to);
    const v = corner.vertex;
    const grid = back.map((b, i) =>
      out.map((o, j) => {
        if (i === 0) return o;
        if (j === 0) return b;
        return this.addNode(x[o]! + x[b]! - x[v]!, y[o]! + y[b]! - y[v]!);
      }),
    );
    const { rows } = corner;
    for (let i = 0; i < rows; i++) {
      for (let j = 0; j < rows; j++) {
        const isSound = this.quad(grid[i]![j]!, grid[i]![j + 1]!, grid[i + 1]![j + 1]!, grid[i + 1]![j]!);
        if (isSound) continue;
        corner.rows = Math.min(corner.rows, Math.max(i, j));
        this.hasFault = true;
      }
    }
    if (this.isPointNear([v, out[rows]!, grid[rows]![rows]!, back[rows]!], [1, 2])) {
      corner.rows--;
      this.hasFault = true;
    }
    this.handed.set(corner, { end: [...grid[rows]!], start: grid.map((row) => row[rows]!) });
  }

  // ---- columns and cells -----------------------------------------------------------------------------------

  private layColumns(c: Columns): void {
    const { strip, base, counts, first, last } = c;
    for (let i = first; i <= last; i++) {
      const rows = counts[i - first]!;
      const given =
        (i === first && strip.start && this.handed.get(strip.start)?.start) ||
        (i === last && strip.end && this.handed.get(strip.end)?.end);
      if (given) {
        c.nodes.push(given.slice(0, rows + 1));
        continue;
      }
      const [nx, ny] = this.normalAt(strip, base[i]!);
      const lean = this.leanAt(c, i);
      // The travel direction has the normal on its left.
      c.nodes.push(this.column(base[i]!, strip, rows, nx + lean * ny, ny - lean * nx));
    }
  }

  private column(base: number, strip: RowStrip, rows: number, dx: number, dy: number): number[] {
    const { x, y } = this.sides;
    const nodes = [base];
    for (let k = 1; k <= rows; k++) {
      const depth = rowDepth(strip, k);
      nodes.push(this.addNode(x[base]! + depth * dx, y[base]! + depth * dy));
    }
    return nodes;
  }

  /** Shift along the travel direction per depth, fading from the corner's own lean to nothing. */
  private leanAt({ strip, along, first, last }: Columns, i: number): number {
    let lean = 0;
    for (const [corner, sign, from] of [
      [strip.start, 1, along[first]!],
      [strip.end, -1, along[last]!],
    ] as const) {
      if (!corner || corner.rows === 0 || corner.kind === "fanned") continue;
      const angle = corner.kind === "mitred" ? corner.angle / 2 : corner.angle;
      const whole = sign / Math.tan(angle);
      if (Math.abs(whole) < 1e-6) continue;
      const fade = ROW_LEAN_DEPTHS * rowDepth(strip, corner.rows);
      lean += whole * Math.max(0, 1 - Math.abs(along[i]! - from) / fade);
    }
    return lean;
  }

  private layCells(c: Columns): void {
    const { strip, base, along, nodes, first, last } = c;
    for (let i = first; i < last; i++) {
      const p = nodes[i - first]!;
      const q = nodes[i + 1 - first]!;
      const rows = Math.min(p.length, q.length) - 1;
      let sound = true;
      for (let k = 0; k < rows; k++) sound = this.quad(p[k]!, q[k]!, q[k + 1]!, p[k + 1]!) && sound;
      if (p.length > q.length) sound = this.triangle(p[rows]!, q[rows]!, p[rows + 1]!) && sound;
      if (q.length > p.length) sound = this.triangle(p[rows]!, q[rows]!, q[rows + 1]!) && sound;
      const most = Math.max(p.length, q.length) - 1;
      if (most === 0) continue;
      const cell = [base[i]!, base[i + 1]!, q[q.length - 1]!, p[p.length - 1]!];
      if (this.isPointNear(cell, [2])) sound = false;
      if (!sound) this.limit(strip, along[i]!, along[i + 1]!, most - 1);
      this.topChord(p[p.length - 1]!, q[q.length - 1]!, strip, along[i]!, along[i + 1]!, most);
      this.coverBase(strip, base[i]!, base[i + 1]!, i);
    }
  }

  private topChord(a: number, b: number, strip: RowStrip, from: number, to: number, rows: number): void {
    const { sides } = this;
    this.tops.push({ chord: sides.from.length, strip, from, to, rows });
    sides.from.push(a);
    sides.to.push(b);
    sides.piece.push(-1);
    sides.hands.push(LEFT_HAND);
  }

  /** The front does not start from a side that has rows. */
  private coverBase({ piece, hand }: RowStrip, a: number, b: number, i: number): void {
    const { firstChord, from, to } = this.sides;
    const end = firstChord[piece + 1] ?? this.chordsOnSides();
    const chord = hand === LEFT_HAND ? firstChord[piece]! + i : end - 1 - i;
    if (from[chord] !== (hand === LEFT_HAND ? a : b) || to[chord] !== (hand === LEFT_HAND ? b : a)) {
      throw new Error(`rows: chord ${chord} of piece ${piece} is not the base of column ${i}`);
    }
    this.covered.push({ piece, hand, chord });
  }

  private chordsOnSides(): number {
    return this.tops.length > 0 ? this.tops[0]!.chord : this.sides.from.length;
  }

  private limit(strip: RowStrip, from: number, to: number, rows: number): void {
    strip.limits.push([from, to, Math.max(0, rows)]);
    for (const [corner, at] of [
      [strip.start, 0],
      [strip.end, this.outline.pieces[strip.piece]!.length],
    ] as const) {
      const reach = 1e-9 * this.outline.size;
      if (corner && corner.rows > rows && from - reach <= at && at <= to + reach)
        corner.rows = Math.max(0, rows);
    }
    this.hasFault = true;
  }

  /** Top chords that cross a side or each other take rows away; true when there are any. */
  private limitCrossings(): boolean {
    const first = this.chordsOnSides();
    const crossing = crossingChords(this.sides, first);
    for (const { chord, strip, from, to, rows } of this.tops) {
      if (crossing.has(chord)) this.limit(strip, from, to, rows - 1);
    }
    if (this.hasFault) levelGroups(this.plan);
    return this.hasFault;
  }

  /** True when a requested point lies inside the polygon or too near to one of its edges that face the front. */
  private isPointNear(polygon: readonly number[], edges: readonly number[]): boolean {
    const { x, y } = this.sides;
    const curve = (k: number) => {
      const [a, b] = [polygon[k]!, polygon[(k + 1) % polygon.length]!];
      return { ax: x[a]!, ay: y[a]!, bx: x[b]!, by: y[b]!, arc: null };
    };
    return this.outline.inner.some(([px, py]) => {
      const isInside = polygon.every((_, k) => {
        const { ax, ay, bx, by } = curve(k);
        return (bx - ax) * (py - ay) - (by - ay) * (px - ax) >= 0;
      });
      return (
        isInside ||
        edges.some((k) => distanceToCurve(curve(k), px, py) < ROW_POINT_GAP * curveLength(curve(k)))
      );
    });
  }

  // ---- nodes and edges -------------------------------------------------------------------------------------

  private addNode(x: number, y: number): number {
    this.sides.y.push(y);
    return this.sides.x.push(x) - 1;
  }

  private distance(a: number, b: number): number {
    const { x, y } = this.sides;
    return Math.hypot(x[a]! - x[b]!, y[a]! - y[b]!);
  }

  /** Four corners counter-clockwise, cut along the shorter diagonal; false when a triangle is turned over. */
  private quad(a: number, b: number, c: number, d: number): boolean {
    if (this.distance(a, c) <= this.distance(b, d)) {
      const sound = this.triangle(a, b, c);
      return this.triangle(a, c, d) && sound;
    }
    const sound = this.triangle(a, b, d);
    return this.triangle(b, c, d) && sound;
  }

  private triangle(a: number, b: number, c: number): boolean {
    const { x, y, rowEdges } = this.sides;
    rowEdges.push(a, b, b, c, c, a);
    const area = (x[b]! - x[a]!) * (y[c]! - y[a]!) - (y[b]! - y[a]!) * (x[c]! - x[a]!);
    return area > 0;
  }
}
