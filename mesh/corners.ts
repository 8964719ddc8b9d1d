/** Angles that the sides make at each vertex, and which of them hold material. */
import { curveTangent } from "./plane.ts";
import type { Outline } from "./outline.ts";

/** A wedge of one region at a vertex, between two pieces, counter-clockwise from the first to the second. */
export interface Wedge {
  readonly vertex: number;
  readonly from: number;
  readonly to: number;
  /** opening [rad], up to 2 pi */
  readonly angle: number;
  readonly region: number;
}

/** All wedges that hold material, by vertex. */
export function wedgesOf(outline: Outline): Wedge[][] {
  return outline.ends.map((_, vertex) => wedgesAt(outline, vertex));
}

function wedgesAt(outline: Outline, vertex: number): Wedge[] {
  const t = [0, 0];
  const spokes = outline.ends[vertex]!.map((k) => {
    const piece = outline.pieces[k]!;
    const leaves = piece.a === vertex;
    curveTangent(piece, leaves ? 0 : 1, t);
    const angle = leaves ? Math.atan2(t[1]!, t[0]!) : Math.atan2(-t[1]!, -t[0]!);
    // Two sides may leave in one direction (an arc tangent to a line): the bend tells which comes first.
    const bend = piece.arc ? (Math.sign(piece.arc.turn) * (leaves ? 1 : -1)) / piece.arc.radius : 0;
    return { k, angle, bend, region: leaves ? piece.left : piece.right };
  });
  spokes.sort((p, q) => (Math.abs(p.angle - q.angle) < 1e-9 ? p.bend - q.bend : p.angle - q.angle));
  const wedges: Wedge[] = [];
  spokes.forEach((spoke, i) => {
    if (spoke.region < 0) return;
    const next = spokes[(i + 1) % spokes.length]!;
    let angle = next.angle - spoke.angle;
    if (i + 1 === spokes.length || angle < -1e-9) angle += 2 * Math.PI;
    wedges.push({ vertex, from: spoke.k, to: next.k, angle: Math.max(angle, 0), region: spoke.region });
  });
  return wedges;
}
