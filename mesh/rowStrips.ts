/**
 * Lays the rows: columns of nodes on the side nodes of each strip, cells between them cut into triangles, and the
 * chords on top from which the front goes on. Columns stand straight, so that the cells are right-angled and
 * Delaunay; at corners they lean over a short way.
 */
import { ROW_LEAN_DEPTHS, ROW_SIZE_DROP } from "./defaults.ts";
import type { Outline } from "./outline.ts";
import { RowBuilder } from "./rowBuilder.ts";
import { layCorner, type CornerColumns } from "./rowCorners.ts";
import {
  countRowsAtCorners,
  DepthLimit,
  levelGroups,
  rowNeeds,
  rowsThatFit,
  smoothedCounts,
} from "./rowCounts.ts";
import { rowDepth, type RowCorner, type RowPlan, type RowStrip } from "./rowPlan.ts";
import { LEFT_HAND, placeSideNodes, type SideNodes } from "./sideNodes.ts";
import type { SizeSources } from "./sizeSources.ts";
import type { SizeTree } from "./sizeTree.ts";

/** Trials to make all rows fit; each failed one takes rows away somewhere, the later the more. */
const MOST_TRIALS = 24;
/** Rounds in which corners are lowered until their strips agree; each lowers some corner by a row at least. */
const MOST_ROUNDS = 300;

/**
 * Side nodes and, where the plan says so, rows of nodes beside them. Rows that cannot be made to fit in the bounded
 * number of trials are left out altogether.
 */
export function placeSidesAndRows(
  outline: Outline,
  tree: SizeTree,
  sources: SizeSources,
  plan: RowPlan | null,
): SideNodes {
  if (plan) {
    countRowsAtCorners(plan, outline, tree);
    for (let trial = 0, round = 0; trial < MOST_TRIALS && round < MOST_ROUNDS; round++) {
      const sides = placeSideNodes(outline, tree, sources, rowNeeds(plan, outline));
      const outcome = new RowLayer(outline, tree, sources, plan, sides, trial / MOST_TRIALS).lay();
      if (outcome === "laid") return sides;
      if (outcome === "faulty") trial++;
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
  private readonly builder: RowBuilder;
  private readonly handed = new Map<RowCorner, CornerColumns | null>();

  constructor(
    private readonly outline: Outline,
    private readonly tree: SizeTree,
    private readonly sources: SizeSources,
    private readonly plan: RowPlan,
    private readonly sides: SideNodes,
    patience: number,
  ) {
    this.builder = new RowBuilder(outline, plan, sides, patience);
  }

  /** laid when all rows fit; else rows were taken away and the side nodes must be placed again. */
  lay(): "laid" | "lowered" | "faulty" {
    const columns = this.plan.strips.map((strip) => this.columnsOf(strip));
    if (!this.cornersAgree(columns)) return "lowered";
    for (const corner of this.plan.corners) this.handed.set(corner, layCorner(this.builder, corner));
    if (!this.builder.hasFault) {
      for (const c of columns) this.layColumns(c);
      for (const c of columns) this.layCells(c);
    }
    return this.builder.finish() ? "laid" : "faulty";
  }

  // ---- counts ----------------------------------------------------------------------------------------------

  private columnsOf(strip: RowStrip): Columns {
    const base = this.nodesAlong(strip);
    const along = [0];
    for (let i = 1; i < base.length; i++)
      along.push(along[i - 1]! + this.builder.distance(base[i - 1]!, base[i]!));
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
    const [nx, ny] = this.builder.normalAt(strip, node);
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
    const { from, to } = this.sides;
    const nodes: number[] = [];
    const [first, end] = this.builder.chordsOf(piece);
    for (let c = first; c < end; c++) nodes.push(from[c]!);
    nodes.push(to[end - 1]!);
    return hand === LEFT_HAND ? nodes : nodes.reverse();
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
      const [nx, ny] = this.builder.normalAt(strip, base[i]!);
      const lean = this.leanAt(c, i);
      // The travel direction has the normal on its left.
      c.nodes.push(this.builder.column(base[i]!, strip, rows, nx + lean * ny, ny - lean * nx));
    }
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
      for (let k = 0; k < rows; k++) sound = this.builder.quad(p[k]!, q[k]!, q[k + 1]!, p[k + 1]!) && sound;
      if (p.length > q.length) sound = this.builder.triangle(p[rows]!, q[rows]!, p[rows + 1]!) && sound;
      if (q.length > p.length) sound = this.builder.triangle(p[rows]!, q[rows]!, q[rows + 1]!) && sound;
      const most = Math.max(p.length, q.length) - 1;
      if (most === 0) continue;
      const cell = [base[i]!, base[i + 1]!, q[q.length - 1]!, p[p.length - 1]!];
      if (this.builder.isPointNear(cell, [2])) sound = false;
      if (!sound) this.builder.limit(strip, along[i]!, along[i + 1]!, this.builder.fewer(most));
      this.builder.topChord(p[p.length - 1]!, q[q.length - 1]!, strip, along[i]!, along[i + 1]!, most);
      this.coverBase(strip, base[i]!, base[i + 1]!, i);
    }
  }

  /** The front does not start from a side that has rows. */
  private coverBase({ piece, hand }: RowStrip, a: number, b: number, i: number): void {
    const { from, to } = this.sides;
    const [first, end] = this.builder.chordsOf(piece);
    const chord = hand === LEFT_HAND ? first + i : end - 1 - i;
    if (from[chord] !== (hand === LEFT_HAND ? a : b) || to[chord] !== (hand === LEFT_HAND ? b : a)) {
      throw new Error(`rows: chord ${chord} of piece ${piece} is not the base of column ${i}`);
    }
    this.builder.cover(chord, hand);
  }
}
