/** Nodes, edges and triangles of rows on their way into the side nodes, and what stands in their way. */
import { crossingChords } from "./chordCrossings.ts";
import { ROW_POINT_GAP } from "./defaults.ts";
import type { Outline } from "./outline.ts";
import { curveLength, distanceToCurve } from "./plane.ts";
import { levelGroups } from "./rowCounts.ts";
import { rowDepth, type RowPlan, type RowStrip } from "./rowPlan.ts";
import { LEFT_HAND, type SideNodes } from "./sideNodes.ts";

/** A chord on top of rows, with the strip and the lengths along it to which it belongs. */
interface TopChord {
  readonly chord: number;
  readonly strip: RowStrip;
  readonly from: number;
  readonly to: number;
  readonly rows: number;
}

export class RowBuilder {
  /** some rows did not fit and were taken away: the side nodes have to be placed again */
  hasFault = false;
  private readonly tops: TopChord[] = [];
  private readonly covered: { hand: number; chord: number }[] = [];
  private readonly chordsOnSides: number;

  constructor(
    readonly outline: Outline,
    readonly plan: RowPlan,
    readonly sides: SideNodes,
    /** share of the trials used up, 0 to 1 */
    private readonly patience: number,
  ) {
    this.chordsOnSides = sides.from.length;
  }

  /** Chords of a piece: the number of the first, and of the one after the last. */
  chordsOf(piece: number): [number, number] {
    const { firstChord } = this.sides;
    return [firstChord[piece]!, firstChord[piece + 1] ?? this.chordsOnSides];
  }

  /** Nothing more is to be laid: hides what rows cover from the front. True when all rows fit. */
  finish(): boolean {
    for (const { hand, chord } of this.covered) this.sides.hands[chord]! &= ~hand;
    if (!this.hasFault) this.limitCrossings();
    levelGroups(this.plan);
    return !this.hasFault;
  }

  /** Rows to try next where so many did not fit: one less, later half of them, in the end none. */
  fewer(rows: number): number {
    if (this.patience < 0.4) return rows - 1;
    return this.patience < 0.7 ? rows >> 1 : 0;
  }

  /** The front does not start from this chord on this hand. */
  cover(chord: number, hand: number): void {
    this.covered.push({ hand, chord });
  }

  /** Unit normal into the strip's region. */
  normalAt({ piece, hand }: RowStrip, node: number): [number, number] {
    const { arc, ax, ay, bx, by, length } = this.outline.pieces[piece]!;
    const sign = hand === LEFT_HAND ? 1 : -1;
    if (!arc) return [(-sign * (by - ay)) / length, (sign * (bx - ax)) / length];
    const inwards = (sign * Math.sign(arc.turn)) / arc.radius;
    return [(arc.x - this.sides.x[node]!) * inwards, (arc.y - this.sides.y[node]!) * inwards];
  }

  /** Nodes above a base node in the direction of the column, which is 1 long per unit of depth. */
  column(base: number, strip: RowStrip, rows: number, dx: number, dy: number): number[] {
    const { x, y } = this.sides;
    const nodes = [base];
    for (let k = 1; k <= rows; k++) {
      const depth = rowDepth(strip, k);
      nodes.push(this.addNode(x[base]! + depth * dx, y[base]! + depth * dy));
    }
    return nodes;
  }

  /** The front goes on from here, on the left of a-b. */
  topChord(a: number, b: number, strip: RowStrip, from: number, to: number, rows: number): void {
    const { sides } = this;
    this.tops.push({ chord: sides.from.length, strip, from, to, rows });
    sides.from.push(a);
    sides.to.push(b);
    sides.piece.push(-1);
    sides.hands.push(LEFT_HAND);
  }

  /** Along this stretch of the strip only so many rows from now on. */
  limit(strip: RowStrip, from: number, to: number, rows: number): void {
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

  private limitCrossings(): void {
    const crossing = crossingChords(this.sides, this.chordsOnSides);
    for (const { chord, strip, from, to, rows } of this.tops) {
      if (crossing.has(chord)) this.limit(strip, from, to, this.fewer(rows));
    }
  }

  /** True when a requested point lies inside the polygon or too near to one of its edges that face the front. */
  isPointNear(polygon: readonly number[], edges: readonly number[]): boolean {
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

  addNode(x: number, y: number): number {
    this.sides.y.push(y);
    return this.sides.x.push(x) - 1;
  }

  distance(a: number, b: number): number {
    const { x, y } = this.sides;
    return Math.hypot(x[a]! - x[b]!, y[a]! - y[b]!);
  }

  /** Four corners counter-clockwise, cut along the shorter diagonal; false when a triangle is turned over. */
  quad(a: number, b: number, c: number, d: number): boolean {
    if (this.distance(a, c) <= this.distance(b, d)) {
      const sound = this.triangle(a, b, c);
      return this.triangle(a, c, d) && sound;
    }
    const sound = this.triangle(a, b, d);
    return this.triangle(b, c, d) && sound;
  }

  triangle(a: number, b: number, c: number): boolean {
    const { x, y, rowEdges } = this.sides;
    rowEdges.push(a, b, b, c, c, a);
    const area = (x[b]! - x[a]!) * (y[c]! - y[a]!) - (y[b]! - y[a]!) * (x[c]! - x[a]!);
    return area > 0;
  }
}
