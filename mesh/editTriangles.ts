/** Local changes of a triangulation: a node onto an edge, a node taken out, the arrays packed. */
import { next, previous, type Triangulation } from "./triangulation.ts";

/** Puts node v, which already has its place, onto the edge of half-edge e. */
export function splitEdge(mesh: Triangulation, e: number, v: number): void {
  const { twin, leaving } = mesh;
  const o = twin[e]!;
  const f = splitOneHand(mesh, e, v);
  if (o < 0) {
    twin[f] = -1;
    leaving[v] = f;
    return;
  }
  const g = splitOneHand(mesh, o, v);
  // Now e runs a-v, f v-b, o b-v, g v-a.
  twin[e] = g;
  twin[g] = e;
  twin[f] = o;
  twin[o] = f;
}

/** Triangle (a, b, c) on e becomes (a, v, c) and (v, b, c); returns the new half-edge v-b. */
function splitOneHand(mesh: Triangulation, e: number, v: number): number {
  const { corner, twin, lock, region, leaving } = mesh;
  const g = next(e);
  const h = previous(e);
  const f = mesh.slot();
  const c = corner[h]!;
  const b = corner[g]!;
  const beyond = twin[g]!;
  corner[f] = v;
  corner[f + 1] = b;
  corner[f + 2] = c;
  region[f / 3] = region[(e / 3) | 0]!;
  twin[f + 1] = beyond;
  if (beyond >= 0) twin[beyond] = f + 1;
  lock[f] = lock[e]!;
  lock[f + 1] = lock[g]!;
  lock[f + 2] = 0;
  corner[g] = v;
  twin[g] = f + 2;
  twin[f + 2] = g;
  lock[g] = 0;
  leaving[b] = f + 1;
  leaving[c] = h;
  leaving[v] = f;
  mesh.push(h);
  mesh.push(f + 1);
  return f;
}

/** Takes an inner node out: flips until three triangles are left around it, then one. False when it cannot. */
export function removeNode(mesh: Triangulation, v: number): boolean {
  const { corner, twin, lock } = mesh;
  for (let flips = 0; flips < 60; flips++) {
    const spokes: number[] = [];
    const start = mesh.leaving[v]!;
    for (let e = start; ;) {
      spokes.push(e);
      e = twin[previous(e)]!;
      if (e < 0 || spokes.length > 64) return false;
      if (e === start) break;
    }
    if (spokes.some((e) => lock[e])) return false;
    if (spokes.length === 3) {
      mergeThree(mesh, v, spokes);
      return true;
    }
    const turned = bestSpoke(mesh, v, spokes);
    if (turned < 0) return false;
    const across = twin[turned]!;
    mesh.flip(turned);
    for (const e of [turned, across]) {
      mesh.push(e);
      mesh.push(next(e));
      mesh.push(previous(e));
    }
  }
  return false;

  /** The spoke whose turning cuts off the best new triangle. */
  function bestSpoke(m: Triangulation, centre: number, spokes: readonly number[]): number {
    let best = -1;
    let quality = 0;
    for (const e of spokes) {
      const w = corner[next(e)]!;
      const p = corner[previous(twin[e]!)]!;
      const z = corner[previous(e)]!;
      const area = m.turn(p, w, z);
      if (!(area > 0 && m.turn(z, centre, p) > 0)) continue;
      const q = area / (distance2(m.xy, p, w) + distance2(m.xy, w, z) + distance2(m.xy, z, p));
      if (q <= quality) continue;
      quality = q;
      best = e;
    }
    return best;
  }
}

function mergeThree(mesh: Triangulation, v: number, spokes: readonly number[]): void {
  const { corner, twin, lock, leaving } = mesh;
  const outer = spokes.map(next);
  const corners = outer.map((e) => corner[e]!);
  const beyond = outer.map((e) => twin[e]!);
  const locks = outer.map((e) => lock[e]!);
  const t = spokes[0]! - (spokes[0]! % 3);
  for (let i = 0; i < 3; i++) {
    corner[t + i] = corners[i]!;
    twin[t + i] = beyond[i]!;
    if (beyond[i]! >= 0) twin[beyond[i]!] = t + i;
    lock[t + i] = locks[i]!;
    leaving[corners[i]!] = t + i;
  }
  for (const e of spokes.slice(1)) {
    const f = e - (e % 3);
    corner.fill(-1, f, f + 3);
    twin.fill(-1, f, f + 3);
    lock.fill(0, f, f + 3);
    mesh.free.push(f);
  }
  leaving[v] = -1;
  for (let i = 0; i < 3; i++) mesh.push(t + i);
}

function distance2(xy: Float64Array, i: number, j: number): number {
  const dx = xy[2 * i]! - xy[2 * j]!;
  const dy = xy[2 * i + 1]! - xy[2 * j + 1]!;
  return dx * dx + dy * dy;
}

/** Packs the arrays: keeps triangles that have a region, in the order of their lowest node. */
export function packTriangles(mesh: Triangulation): void {
  const { corner, twin, lock, region } = mesh;
  const triangles = mesh.used / 3;
  const to = newPlaces(mesh, triangles);
  const old = {
    corner: corner.slice(0, mesh.used),
    twin: twin.slice(0, mesh.used),
    lock: lock.slice(0, mesh.used),
    region: region.slice(0, triangles),
  };
  let kept = 0;
  for (let t = 0; t < triangles; t++) {
    const u = to[t]!;
    if (u < 0) continue;
    kept++;
    region[u] = old.region[t]!;
    for (let i = 0; i < 3; i++) {
      const o = old.twin[3 * t + i]!;
      const beyond = o >= 0 ? to[(o / 3) | 0]! : -1;
      corner[3 * u + i] = old.corner[3 * t + i]!;
      lock[3 * u + i] = old.lock[3 * t + i]!;
      twin[3 * u + i] = beyond >= 0 ? 3 * beyond + (o % 3) : -1;
    }
  }
  mesh.used = 3 * kept;
  mesh.free.length = 0;
  mesh.leaving.fill(-1);
  for (let e = 0; e < mesh.used; e++) mesh.leaving[corner[e]!] = e;
  // A node on the hull starts at the hull, so that a walk meets all its triangles.
  for (let e = 0; e < mesh.used; e++) if (twin[e]! < 0) mesh.leaving[corner[e]!] = e;
}

/** New number of each triangle, -1 when it goes. */
function newPlaces(mesh: Triangulation, triangles: number): Int32Array {
  const { corner, region } = mesh;
  const lowest = new Int32Array(triangles).fill(-1);
  const first = new Int32Array(mesh.leaving.length + 1);
  for (let t = 0; t < triangles; t++) {
    if (corner[3 * t]! < 0 || region[t]! < 0) continue;
    lowest[t] = Math.min(corner[3 * t]!, corner[3 * t + 1]!, corner[3 * t + 2]!);
    first[lowest[t]! + 1]!++;
  }
  for (let i = 1; i < first.length; i++) first[i]! += first[i - 1]!;
  const to = new Int32Array(triangles).fill(-1);
  for (let t = 0; t < triangles; t++) if (lowest[t]! >= 0) to[t] = first[lowest[t]!]!++;
  return to;
}
