/** Faults of one loop by itself. */
import { add, distance, type Context, type SidePlace } from "./faultContext.ts";
import { curveOf, loopArea } from "./outline.ts";
import { arcExtremes, isInLine } from "./plane.ts";
import type { OutlineSide, Point } from "./types.ts";

export function checkLoop(context: Context, loop: readonly OutlineSide[], region: number, l: number): void {
  const at = (side: number): SidePlace => ({ region, loop: l, side });
  const { tolerance, size } = context;
  const hasArc = loop.some((side) => curveOf(side).arc);
  const start: Point[] = loop.length > 0 ? [loop[0]!.from] : [];
  if (loop.length < (hasArc ? 2 : 3)) {
    add(context, "few-sides", at(0), { places: start, sizes: [loop.length] });
  } else if (Math.abs(loopArea(loop)) < tolerance * size) {
    add(context, "no-area", at(0), { places: start, sizes: [Math.abs(loopArea(loop))] });
  }
  loop.forEach((side, s) => {
    const { from, to, through } = side;
    const length = distance(from, to);
    if (length <= tolerance) add(context, "zero-length", at(s), { places: [from], sizes: [length] });
    else if (through && isInLine(from, through, to)) {
      add(context, "arc-in-line", at(s), { isRemark: true, places: [from, through, to] });
    }
    const lowest = leastRadius(side);
    if (lowest[0] < -tolerance)
      add(context, "negative-radius", at(s), { places: [lowest], sizes: [lowest[0]] });
    const next = loop[(s + 1) % loop.length]!;
    const gap = distance(to, next.from);
    if (gap > tolerance) {
      add(context, "gap", at(s), { other: at((s + 1) % loop.length), places: [to, next.from], sizes: [gap] });
    }
  });
}

function leastRadius(side: OutlineSide): Point {
  const { arc } = curveOf(side);
  const places = [side.from, side.to, ...(arc ? arcExtremes(arc) : [])];
  return places.reduce((least, p) => (p[0] < least[0] ? p : least));
}
