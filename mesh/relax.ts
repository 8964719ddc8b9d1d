/** Relaxation: every free node to the centroid of its triangles, small ones weighing more, flips after each pass. */
import type { Triangulation } from "./triangulation.ts";

/** Rounds of putting nodes back that turned a triangle over; each round only puts back more. */
const MOST_RETURNS = 20;

/**
 * @param size   size at each node: a triangle weighs area / size^2
 * @param fixed  1 for nodes that stay
 */
export function relax(mesh: Triangulation, size: Float64Array, fixed: Uint8Array, passes: number): void {
  const n = mesh.nodes;
  const sumX = new Float64Array(n);
  const sumY = new Float64Array(n);
  const weight = new Float64Array(n);
  for (let pass = 0; pass < passes; pass++) {
    sumX.fill(0);
    sumY.fill(0);
    weight.fill(0);
    sumCentroids(mesh, size, sumX, sumY, weight);
    const before = mesh.xy.slice(0, 2 * n);
    for (let i = 0; i < n; i++) {
      if (fixed[i] || !(weight[i]! > 0)) continue;
      mesh.xy[2 * i] = sumX[i]! / (3 * weight[i]!);
      mesh.xy[2 * i + 1] = sumY[i]! / (3 * weight[i]!);
    }
    putBackFolded(mesh, before);
    mesh.pushAll();
    mesh.settle();
  }
}

function sumCentroids(
  mesh: Triangulation,
  size: Float64Array,
  sumX: Float64Array,
  sumY: Float64Array,
  weight: Float64Array,
): void {
  const { xy, corner, used } = mesh;
  for (let e = 0; e < used; e += 3) {
    const a = corner[e]!;
    const b = corner[e + 1]!;
    const c = corner[e + 2]!;
    const ax = xy[2 * a]!;
    const ay = xy[2 * a + 1]!;
    const bx = xy[2 * b]!;
    const by = xy[2 * b + 1]!;
    const cx = xy[2 * c]!;
    const cy = xy[2 * c + 1]!;
    const h = size[a]! + size[b]! + size[c]!;
    const w = ((bx - ax) * (cy - ay) - (by - ay) * (cx - ax)) / (h * h);
    const gx = w * (ax + bx + cx);
    const gy = w * (ay + by + cy);
    sumX[a]! += gx;
    sumX[b]! += gx;
    sumX[c]! += gx;
    sumY[a]! += gy;
    sumY[b]! += gy;
    sumY[c]! += gy;
    weight[a]! += w;
    weight[b]! += w;
    weight[c]! += w;
  }
}

function putBackFolded(mesh: Triangulation, before: Float64Array): void {
  const { xy, corner, used } = mesh;
  for (let round = 0, folded = true; folded && round < MOST_RETURNS; round++) {
    folded = false;
    for (let e = 0; e < used; e += 3) {
      const a = 2 * corner[e]!;
      const b = 2 * corner[e + 1]!;
      const c = 2 * corner[e + 2]!;
      const area =
        (xy[b]! - xy[a]!) * (xy[c + 1]! - xy[a + 1]!) - (xy[b + 1]! - xy[a + 1]!) * (xy[c]! - xy[a]!);
      if (area > 0) continue;
      folded = true;
      for (const v of [a, b, c]) {
        xy[v] = before[v]!;
        xy[v + 1] = before[v + 1]!;
      }
    }
  }
}
