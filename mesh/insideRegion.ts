/** Is a place inside a region, arcs taken exactly. */
import { curveOf } from "./outline.ts";
import type { Curve } from "./plane.ts";
import type { OutlineRegion } from "./types.ts";

/** Times that closed curves run round a place, counter-clockwise positive. */
export function windingNumber(loop: readonly Curve[], x: number, y: number): number {
  let angle = 0;
  for (const curve of loop) angle += angleSeen(curve, x, y);
  return Math.round(angle / (2 * Math.PI));
}

/** Angle through which the view turns from the start of the curve to its end. */
function angleSeen({ ax, ay, bx, by, arc }: Curve, x: number, y: number): number {
  const cross = (ax - x) * (by - y) - (ay - y) * (bx - x);
  const dot = (ax - x) * (bx - x) + (ay - y) * (by - y);
  const chord = Math.atan2(cross, dot);
  if (!arc || Math.hypot(x - arc.x, y - arc.y) >= arc.radius) return chord;
  // Between chord and arc the view turns the other way round.
  const hand = (bx - ax) * (y - ay) - (by - ay) * (x - ax);
  const isBetween = arc.turn > 0 ? hand < 0 : hand > 0;
  return isBetween ? chord + 2 * Math.PI * Math.sign(arc.turn) : chord;
}

export type RegionCurves = readonly (readonly Curve[])[];

export function regionCurves(region: OutlineRegion): RegionCurves {
  return region.loops.map((loop) => loop.map(curveOf));
}

/** True inside the outer loop and outside of all voids; places on a side may fall either way. */
export function isInRegion(loops: RegionCurves, x: number, y: number): boolean {
  if (loops.length === 0 || windingNumber(loops[0]!, x, y) === 0) return false;
  return loops.slice(1).every((hole) => windingNumber(hole, x, y) === 0);
}
