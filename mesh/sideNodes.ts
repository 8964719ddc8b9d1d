/**
 * Nodes on the sides, spaced by the size field. They belong to their piece from birth: a node is a share t of its
 * piece, its place follows from t. Vertices come first and keep their numbers.
 */
import { ARC_MOST, MOST_NODES, SHARP_ANGLE, TOO_FINE } from "./defaults.ts";
import type { Outline, Piece } from "./outline.ts";
import { curveAt } from "./plane.ts";
import type { SizeSources } from "./sizeSources.ts";
import type { SizeTree } from "./sizeTree.ts";

/** The front works on a chord's left, on its right, or both. */
export const LEFT_HAND = 1;
export const RIGHT_HAND = 2;

export interface SideNodes {
  readonly x: number[];
  readonly y: number[];
  /** ends of the chords between neighbouring nodes */
  readonly from: number[];
  readonly to: number[];
  /** piece of each chord, -1 for chords inside the part (edges of rows) */
  readonly piece: number[];
  /** on which hands the front has to fill */
  readonly hands: number[];
  /** number of the first chord of each piece; its chords follow each other from its a to its b */
  readonly firstChord: number[];
  /** inner nodes of each piece from its a to its b, and their shares of the piece */
  readonly piecesNodes: readonly (readonly number[])[];
  readonly piecesShares: readonly (readonly number[])[];
  /** nodes from here on belong to rows */
  readonly firstRowNode: number;
  /** pairs of nodes: edges inside the rows, which must be edges of the mesh */
  readonly rowEdges: number[];
}

/** Shells at a sharp corner: at most so many, growing by at least this. */
const MOST_SHELLS = 60;
const LEAST_SHELL_GROWTH = 0.05;

/** What rows ask of the side nodes, per piece. */
export interface RowNeeds {
  /** shares at which a piece must have nodes, because rows end there */
  readonly stops: readonly (readonly number[])[];
  /** most turn of an arc's chord [rad] */
  readonly mostTurn: readonly number[];
}

export function placeSideNodes(
  outline: Outline,
  tree: SizeTree,
  from: SizeSources,
  rows: RowNeeds | null = null,
): SideNodes {
  const nodes = {
    x: [...outline.x],
    y: [...outline.y],
    from: [] as number[],
    to: [] as number[],
    piece: [] as number[],
    hands: [] as number[],
    firstChord: [] as number[],
    rowEdges: [] as number[],
    piecesNodes: [] as number[][],
    piecesShares: [] as number[][],
  };
  const mostLength = outline.pieces.map(({ arc }, k) =>
    arc ? arc.radius * (rows?.mostTurn[k] ?? ARC_MOST) : Infinity,
  );
  const firstStep = outline.x.map((x, v) =>
    outline.ends[v]!.reduce(
      (least, k) => Math.min(least, 0.99 * mostLength[k]!),
      tree.sizeAt(x, outline.y[v]!),
    ),
  );
  outline.pieces.forEach((piece, k) => {
    const stops = [
      ...shells(piece, tree, from.sharpest[piece.a]!, firstStep[piece.a]!, false),
      ...shells(piece, tree, from.sharpest[piece.b]!, firstStep[piece.b]!, true),
      ...(rows?.stops[k] ?? []),
    ].sort((s, t) => s - t);
    const shares = spacedShares(piece, stops, tree, rows?.mostTurn[k] ?? ARC_MOST);
    if (nodes.x.length + shares.length > MOST_NODES) throw new Error(TOO_FINE);
    nodes.piecesShares.push(shares);
    nodes.piecesNodes.push(placeOnPiece(nodes, piece, k, shares));
  });
  return { ...nodes, firstRowNode: nodes.x.length };
}

function placeOnPiece(
  nodes: Pick<SideNodes, "x" | "y" | "from" | "to" | "piece" | "hands" | "firstChord">,
  piece: Piece,
  k: number,
  shares: readonly number[],
): number[] {
  const p = [0, 0];
  const first = nodes.x.length;
  const hands = (piece.left >= 0 ? LEFT_HAND : 0) | (piece.right >= 0 ? RIGHT_HAND : 0);
  let last = piece.a;
  nodes.firstChord.push(nodes.from.length);
  const chordTo = (node: number) => {
    nodes.from.push(last);
    nodes.to.push(node);
    nodes.piece.push(k);
    nodes.hands.push(hands);
    last = node;
  };
  for (const t of shares) {
    curveAt(piece, t, p);
    nodes.y.push(p[1]!);
    chordTo(nodes.x.push(p[0]!) - 1);
  }
  chordTo(piece.b);
  return shares.map((_, i) => first + i);
}

/**
 * Below 60 degrees the two sides of a corner get nodes at equal distances from it, so that the triangles between
 * them are isosceles: each shell is wider than the one before until the local size is reached.
 */
function shells(piece: Piece, tree: SizeTree, angle: number, first: number, fromEnd: boolean): number[] {
  if (!(angle < SHARP_ANGLE)) return [];
  const widening = 2 * Math.sin(angle / 2);
  const p = [0, 0];
  const stops: number[] = [];
  let d = Math.min(first, 0.45 * piece.length);
  for (let n = 0; n < MOST_SHELLS && d < 0.5 * piece.length; n++) {
    stops.push(fromEnd ? 1 - d / piece.length : d / piece.length);
    d *= 1 + Math.max(widening, LEAST_SHELL_GROWTH);
    curveAt(piece, fromEnd ? 1 - d / piece.length : d / piece.length, p);
    if (widening * d > 1.2 * tree.sizeAt(p[0]!, p[1]!)) break;
  }
  return stops;
}

/** Shares of the nodes between the ends of a piece; the stops are among them. */
function spacedShares(piece: Piece, stops: readonly number[], tree: SizeTree, mostTurn: number): number[] {
  const shares: number[] = [];
  let t0 = 0;
  for (const t1 of [...stops, 1]) {
    if (t1 - t0 > 1e-9) {
      spread(piece, t0, t1, tree, mostTurn, shares);
      if (t1 < 1) shares.push(t1);
    }
    t0 = t1;
  }
  return shares;
}

/** Equal shares of the integral of ds / h between t0 and t1, found by steps of about half a size. */
function spread(
  piece: Piece,
  t0: number,
  t1: number,
  tree: SizeTree,
  mostTurn: number,
  shares: number[],
): void {
  const p = [0, 0];
  const at = [t0];
  const sums = [0];
  let sum = 0;
  for (let t = t0; t < t1;) {
    curveAt(piece, t, p);
    let step = Math.min((0.5 * tree.sizeAt(p[0]!, p[1]!)) / piece.length, t1 - t);
    if (t1 - t - step < 0.1 * step) step = t1 - t;
    curveAt(piece, t + step / 2, p);
    sum += (step * piece.length) / tree.sizeAt(p[0]!, p[1]!);
    t = t + step >= t1 ? t1 : t + step;
    at.push(t);
    sums.push(sum);
  }
  let n = Math.max(1, Math.round(sum));
  if (piece.arc) n = Math.max(n, Math.ceil((Math.abs(piece.arc.turn) * (t1 - t0)) / mostTurn));
  for (let i = 1, j = 0; i < n; i++) {
    const wanted = (sum * i) / n;
    while (sums[j + 1]! < wanted) j++;
    shares.push(at[j]! + ((at[j + 1]! - at[j]!) * (wanted - sums[j]!)) / (sums[j + 1]! - sums[j]!));
  }
}
