/** Makes a wanted edge present by flips (after S. W. Sloan, A fast algorithm for generating constrained Delaunay
 *  triangulations, Computers and Structures 47, 1993). */
import { next, previous, type Triangulation } from "./triangulation.ts";

/** Flips tried for one edge before it is given up. */
const MOST_FLIPS = 100_000;

/**
 * Turns crossing edges until a-b is an edge, and the disturbed ones back to Delaunay. The edge is left locked with
 * the value given.
 *
 * @returns false when a node lies on a-b or a locked edge crosses it: the sides of the outline cross there.
 */
export function recoverEdge(mesh: Triangulation, a: number, b: number, value: number): boolean {
  const crossing = edgesAcross(mesh, a, b);
  if (!crossing) return false;
  const made: [number, number][] = [];
  let tries = 0;
  while (crossing.length > 0) {
    if (++tries > MOST_FLIPS) return false;
    const [p, q] = crossing.shift()!;
    const e = mesh.edge(p, q);
    const c = mesh.corner[previous(e)]!;
    const d = mesh.corner[previous(mesh.twin[e]!)]!;
    if (!isStrictlyConvex(mesh, p, q, c, d)) {
      crossing.push([p, q]);
      continue;
    }
    mesh.flip(e);
    const stillAcross =
      c !== a && c !== b && d !== a && d !== b && mesh.turn(a, b, c) * mesh.turn(a, b, d) < 0;
    (stillAcross ? crossing : made).push([c, d]);
  }
  if (!mesh.lockEdge(a, b, value)) return false;
  for (const [p, q] of made) mesh.push(mesh.edge(p, q));
  mesh.settle();
  return true;
}

/** Edges that cross the straight way from a to b, in order; null when a node or a locked edge is in the way. */
function edgesAcross(mesh: Triangulation, a: number, b: number): [number, number][] | null {
  const { corner, twin, lock } = mesh;
  const start = mesh.leaving[a]!;
  let e = start;
  for (;;) {
    const p = corner[next(e)]!;
    const q = corner[previous(e)]!;
    if (mesh.turn(a, b, p) < 0 && mesh.turn(a, b, q) > 0 && mesh.turn(a, p, b) > 0) break;
    e = twin[previous(e)]!;
    if (e < 0 || e === start) return null;
  }
  const across: [number, number][] = [];
  for (let f = next(e); ;) {
    if (lock[f]) return null;
    across.push([corner[f]!, corner[next(f)]!]);
    const o = twin[f]!;
    const v = corner[previous(o)]!;
    if (v === b) return across;
    const side = mesh.turn(a, b, v);
    if (side === 0) return null;
    f = side > 0 ? next(o) : previous(o);
  }
}

function isStrictlyConvex(mesh: Triangulation, p: number, q: number, c: number, d: number): boolean {
  return mesh.turn(c, d, q) * mesh.turn(c, d, p) < 0;
}
