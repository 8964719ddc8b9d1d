/** Quality of a mesh, for the output, the tests and the page. */
import type { TriangleMesh } from "./types.ts";

export interface MeshQuality {
  readonly minAngleDeg: number;
  readonly maxAngleDeg: number;
  /** mean of 4 sqrt(3) area / (sum of squared sides), 1 for equilateral triangles */
  readonly meanQuality: number;
  /** number of the triangle with the smallest angle */
  readonly worstTriangle: number;
  /** triangles by smallest angle, in steps of HISTOGRAM_STEP_DEG from 0 to 60 */
  readonly histogram: Uint32Array;
}

export const HISTOGRAM_STEP_DEG = 3;

export function meshQuality(mesh: TriangleMesh): MeshQuality {
  const count = mesh.triangles.length / 3;
  const histogram = new Uint32Array(60 / HISTOGRAM_STEP_DEG);
  const angles = new Float64Array(2);
  let [minAngleDeg, maxAngleDeg, sum, worstTriangle] = [180, 0, 0, -1];
  for (let t = 0; t < count; t++) {
    sum += triangleQuality(mesh, t);
    triangleAngles(mesh, t, angles);
    const [least, most] = [angles[0]!, angles[1]!];
    histogram[Math.max(0, Math.min(histogram.length - 1, Math.floor(least / HISTOGRAM_STEP_DEG)))]!++;
    if (least < minAngleDeg) {
      minAngleDeg = least;
      worstTriangle = t;
    }
    if (most > maxAngleDeg) maxAngleDeg = most;
  }
  return { minAngleDeg, maxAngleDeg, meanQuality: sum / count, worstTriangle, histogram };
}

/** Area of a triangle in the half plane [m2], negative when it runs clockwise. */
export function triangleArea({ nodes, triangles }: TriangleMesh, t: number): number {
  const a = 2 * triangles[3 * t]!;
  const b = 2 * triangles[3 * t + 1]!;
  const c = 2 * triangles[3 * t + 2]!;
  const ux = nodes[b]! - nodes[a]!;
  const uy = nodes[b + 1]! - nodes[a + 1]!;
  return (ux * (nodes[c + 1]! - nodes[a + 1]!) - uy * (nodes[c]! - nodes[a]!)) / 2;
}

/** Squared lengths of the sides opposite to the corners. */
function squaredSides({ nodes, triangles }: TriangleMesh, t: number): [number, number, number] {
  const squared = (i: number, j: number) => {
    const p = 2 * triangles[3 * t + i]!;
    const q = 2 * triangles[3 * t + j]!;
    return (nodes[p]! - nodes[q]!) ** 2 + (nodes[p + 1]! - nodes[q + 1]!) ** 2;
  };
  return [squared(1, 2), squared(2, 0), squared(0, 1)];
}

/** 4 sqrt(3) area / (sum of squared sides): 1 for an equilateral triangle, 0 for a flat one. */
export function triangleQuality(mesh: TriangleMesh, t: number): number {
  const [u, v, w] = squaredSides(mesh, t);
  return (4 * Math.sqrt(3) * triangleArea(mesh, t)) / (u + v + w);
}

/** @param out smallest and largest angle [deg] */
export function triangleAngles(mesh: TriangleMesh, t: number, out: Float64Array): void {
  const [u, v, w] = squaredSides(mesh, t);
  const twice = 2 * triangleArea(mesh, t);
  const angles = [v + w - u, w + u - v, u + v - w].map((x) => (Math.atan2(2 * twice, x) * 180) / Math.PI);
  out[0] = Math.min(...angles);
  out[1] = Math.max(...angles);
}
