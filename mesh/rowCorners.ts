/** Rows at corners: grids, mitres, fans, and columns that lie on the neighbouring side. */
import { ROW_FAN_STEP } from "./defaults.ts";
import type { RowBuilder } from "./rowBuilder.ts";
import type { RowCorner } from "./rowPlan.ts";
import { LEFT_HAND, RIGHT_HAND } from "./sideNodes.ts";

/** Nodes from the side upwards that a corner hands to the strip that ends there and to the one that starts. */
export interface CornerColumns {
  readonly end: number[];
  readonly start: number[];
}

/** Lays what belongs to a corner itself; null where rows fade out towards it. */
export function layCorner(builder: RowBuilder, corner: RowCorner): CornerColumns | null {
  if (corner.rows === 0) return null;
  switch (corner.kind) {
    case "crossed":
      return layCrossed(builder, corner);
    case "landed":
      return layLanded(builder, corner);
    case "mitred":
      return layMitre(builder, corner);
    case "fanned":
      return layFan(builder, corner);
    case "faded":
      return null;
  }
}

/** The first side nodes of a piece from a vertex, the vertex included, and the chords between them. */
function firstNodes(builder: RowBuilder, corner: RowCorner, k: number): number[] {
  const { from, to } = builder.sides;
  const fromA = builder.outline.pieces[k]!.a === corner.vertex;
  const [first, end] = builder.chordsOf(k);
  const nodes = [corner.vertex];
  for (let row = 0; row < corner.rows; row++) {
    const chord = fromA ? first + row : end - 1 - row;
    nodes.push(fromA ? to[chord]! : from[chord]!);
    // The wedge lies to the left of the way out along its first piece, to the right along its closing one.
    const isLeft = fromA === (k === corner.from);
    builder.cover(chord, isLeft ? LEFT_HAND : RIGHT_HAND);
  }
  return nodes;
}

function layLanded(builder: RowBuilder, corner: RowCorner): CornerColumns {
  const column = firstNodes(builder, corner, corner.before ? corner.from : corner.to);
  return { end: column, start: column };
}

/** Column along the bisector of the wedge. */
function layMitre(builder: RowBuilder, corner: RowCorner): CornerColumns {
  const strip = (corner.after ?? corner.before)!;
  const [nx, ny] = builder.normalAt(strip, corner.vertex);
  // Along the way out on the first piece, or back on the closing one.
  const [tx, ty] = corner.after ? [ny, -nx] : [-ny, nx];
  const lean = 1 / Math.tan(corner.angle / 2);
  const column = builder.column(corner.vertex, strip, corner.rows, nx + lean * tx, ny + lean * ty);
  return { end: column, start: column };
}

/** Columns from the normal of the side that ends here round to the normal of the side that starts. */
function layFan(builder: RowBuilder, corner: RowCorner): CornerColumns {
  const { vertex, rows, before, after } = corner;
  const strip = before!;
  const opening = corner.angle - Math.PI;
  const steps = Math.max(1, Math.round(opening / ROW_FAN_STEP));
  const [nx, ny] = builder.normalAt(strip, vertex);
  const columns = Array.from({ length: steps + 1 }, (_, k) => {
    const angle = Math.atan2(ny, nx) - (opening * k) / steps;
    return builder.column(vertex, strip, rows, Math.cos(angle), Math.sin(angle));
  });
  for (let k = 0; k < steps; k++) {
    const [p, q] = [columns[k]!, columns[k + 1]!];
    builder.triangle(vertex, q[1]!, p[1]!);
    for (let row = 1; row < rows; row++) builder.quad(p[row]!, q[row]!, q[row + 1]!, p[row + 1]!);
    builder.topChord(p[rows]!, q[rows]!, after!, 0, 0, rows);
  }
  return { end: columns[0]!, start: columns[steps]! };
}

/** The grid: node (i, j) is i rows above the first piece and j rows above the closing one. */
function layCrossed(builder: RowBuilder, corner: RowCorner): CornerColumns {
  const { x, y } = builder.sides;
  const out = firstNodes(builder, corner, corner.from);
  const back = firstNodes(builder, corner, corner.to);
  const v = corner.vertex;
  const grid = back.map((b, i) =>
    out.map((o, j) => {
      if (i === 0) return o;
      if (j === 0) return b;
      return builder.addNode(x[o]! + x[b]! - x[v]!, y[o]! + y[b]! - y[v]!);
    }),
  );
  const { rows } = corner;
  for (let i = 0; i < rows; i++) {
    for (let j = 0; j < rows; j++) {
      const isSound = builder.quad(grid[i]![j]!, grid[i]![j + 1]!, grid[i + 1]![j + 1]!, grid[i + 1]![j]!);
      if (isSound) continue;
      corner.rows = Math.min(corner.rows, builder.fewer(Math.max(i, j) + 1));
      builder.hasFault = true;
    }
  }
  if (builder.isPointNear([v, out[rows]!, grid[rows]![rows]!, back[rows]!], [1, 2])) {
    corner.rows = Math.min(corner.rows, builder.fewer(rows));
    builder.hasFault = true;
  }
  return { end: [...grid[rows]!], start: grid.map((row) => row[rows]!) };
}
