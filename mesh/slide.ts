/**
 * Side nodes sliding along their side. In walls of one or two triangles there is little else to improve by; the node
 * stays on its line or arc because its place is computed from its share of the piece.
 */
import { SLIDE_MOST } from "./defaults.ts";
import type { Outline } from "./outline.ts";
import { curveAt } from "./plane.ts";
import { next, previous, type Triangulation } from "./triangulation.ts";
import type { SideNodes } from "./sideNodes.ts";

/** Side nodes that may slide: neither vertices nor feet of rows. */
export interface Sliders {
  readonly outline: Outline;
  /** piece of each node, -1 where it may not slide */
  readonly piece: Int32Array;
  /** present share of each node on its piece */
  readonly share: Float64Array;
  /** shares between which each node may slide, 2 per node */
  readonly range: Float64Array;
}

export function slidersOf(outline: Outline, sides: SideNodes): Sliders {
  const n = sides.firstRowNode;
  const piece = new Int32Array(n).fill(-1);
  const share = new Float64Array(n);
  const range = new Float64Array(2 * n);
  const withRows = new Set(sides.rowEdges);
  outline.pieces.forEach((_, k) => {
    const nodes = sides.piecesNodes[k]!;
    const shares = sides.piecesShares[k]!;
    nodes.forEach((v, i) => {
      if (withRows.has(v)) return;
      const t = shares[i]!;
      piece[v] = k;
      share[v] = t;
      range[2 * v] = t - SLIDE_MOST * (t - (shares[i - 1] ?? 0));
      range[2 * v + 1] = t + SLIDE_MOST * ((shares[i + 1] ?? 1) - t);
    });
  });
  return { outline, piece, share, range };
}

/** Corners b, c of all triangles (v, b, c) around a node, on both hands of a side. */
export function starOf(mesh: Triangulation, v: number): number[] {
  const { corner, twin } = mesh;
  const star: number[] = [];
  const start = mesh.leaving[v]!;
  if (start < 0) return star;
  let e = start;
  do {
    star.push(corner[next(e)]!, corner[previous(e)]!);
    e = twin[previous(e)]!;
  } while (e >= 0 && e !== start);
  if (e === start) return star;
  for (let o = twin[start]!; o >= 0; o = twin[next(o)]!) {
    const f = next(o);
    star.push(corner[next(f)]!, corner[previous(f)]!);
  }
  return star;
}

/**
 * Slides a node to where its star is best.
 *
 * @param value  of a star, larger is better; reads the node's place from the mesh
 * @returns true when it moved; its edges are marked for flips
 */
export function slideNode(
  mesh: Triangulation,
  sliders: Sliders,
  v: number,
  value: (star: readonly number[]) => number,
): boolean {
  const { xy } = mesh;
  const { piece, share, range } = sliders;
  const curve = sliders.outline.pieces[piece[v]!]!;
  const star = starOf(mesh, v);
  const place = [0, 0];
  const valueAt = (t: number): number => {
    curveAt(curve, t, place);
    xy[2 * v] = place[0]!;
    xy[2 * v + 1] = place[1]!;
    return value(star);
  };
  const [low, high] = [range[2 * v]!, range[2 * v + 1]!];
  const first = value(star);
  let best = first;
  let t = share[v]!;
  for (let step = (high - low) / 4, k = 0; k < 5; k++, step /= 2) {
    for (const at of [Math.max(low, t - step), Math.min(high, t + step)]) {
      const q = valueAt(at);
      if (q <= best + 1e-9) continue;
      best = q;
      t = at;
    }
  }
  const isBetter = best > first + 1e-6;
  if (isBetter) share[v] = t;
  valueAt(share[v]!);
  if (!isBetter) return false;
  for (const e of edgesAround(mesh, v)) mesh.push(e);
  return true;
}

/** Half-edges of all triangles around a node that could want a flip. */
function edgesAround(mesh: Triangulation, v: number): number[] {
  const { twin } = mesh;
  const edges: number[] = [];
  const start = mesh.leaving[v]!;
  let e = start;
  do {
    edges.push(e, next(e), previous(e));
    e = twin[previous(e)]!;
  } while (e >= 0 && e !== start);
  if (e < 0) {
    for (let o = twin[start]!; o >= 0; o = twin[next(o)]!) edges.push(o, next(o), previous(o));
  }
  return edges;
}
