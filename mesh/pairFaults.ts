/** Faults between the sides of one region: crossings, touches, thin walls, voids in the wrong place. */
import { curvesMeet, type Meeting } from "./curvesMeet.ts";
import {
  add,
  branchesCross,
  distance,
  forNearPairs,
  isShort,
  JoinedGroups,
  placedCurves,
  type Context,
  type PlacedCurve,
  type SidePlace,
} from "./faultContext.ts";
import { windingNumber } from "./insideRegion.ts";
import { curveAt, distanceToCurve, type Curve } from "./plane.ts";
import type { Point } from "./types.ts";

export function checkWithinRegion(context: Context, region: number): void {
  const sides = placedCurves(context, region).filter(({ curve }) => !isShort(curve, context.tolerance));
  const touching = new JoinedGroups(context.curves[region]!.length);
  forNearPairs(sides, null, context.thinnest, (p, q) => checkPair(context, p, q, touching));
  const [outer, ...holes] = context.curves[region]!;
  holes.forEach((hole, h) => {
    if (hole.length === 0 || !outer || isHoleInside(outer, hole)) return;
    const at = { region, loop: h + 1, side: 0 };
    add(context, "void-outside", at, { places: [[hole[0]!.ax, hole[0]!.ay]] });
  });
}

/** Some place of the void lies inside the outer loop (crossings are reported by themselves). */
function isHoleInside(outer: readonly Curve[], hole: readonly Curve[]): boolean {
  const p = [0, 0];
  return hole.some((curve) => {
    curveAt(curve, 0.5, p);
    return windingNumber(outer, p[0]!, p[1]!) !== 0;
  });
}

function checkPair(context: Context, p: PlacedCurve, q: PlacedCurve, touching: JoinedGroups): void {
  const { tolerance } = context;
  const { places, stretch } = curvesMeet(p.curve, q.curve, tolerance);
  if (stretch) {
    const [a, b] = [stretch[0].at, stretch[1].at];
    add(context, "duplicate", p.at, { other: q.at, places: [a, b], sizes: [distance(a, b)] });
    return;
  }
  let isMet = false;
  for (const meeting of places) {
    if (isJoint(context, p, q, meeting)) continue;
    isMet = true;
    if (branchesCross(context, p, q, meeting)) {
      add(context, "crossing", p.at, { other: q.at, places: [meeting.at] });
    } else if (isFirstReport(context, meeting.at)) {
      const code = touching.join(p.at.loop, q.at.loop) ? "thin-wall" : "in-pieces";
      add(context, code, p.at, { other: q.at, places: [meeting.at], sizes: [0, context.thinnest] });
    }
  }
  if (!isMet && !areNeighbours(context, p, q)) checkWall(context, p, q);
}

/** A touch at a vertex shows in up to four pairs of sides; it is said once. */
function isFirstReport({ faults, tolerance }: Context, at: Point): boolean {
  return !faults.some(
    ({ code, places }) =>
      (code === "thin-wall" || code === "in-pieces" || code === "crossing") &&
      places.some((place) => distance(place, at) <= 10 * tolerance),
  );
}

function areNeighbours(context: Context, p: PlacedCurve, q: PlacedCurve): boolean {
  return p.at.loop === q.at.loop && (follows(context, p.at, q.at) || follows(context, q.at, p.at));
}

/** True when q is the next side after p, sides without length passed over. */
function follows({ curves, tolerance }: Context, p: SidePlace, q: SidePlace): boolean {
  const loop = curves[p.region]![p.loop]!;
  let k = (p.side + 1) % loop.length;
  while (k !== p.side && isShort(loop[k]!, tolerance)) k = (k + 1) % loop.length;
  return k === q.side;
}

/** The place where one side hands over to the next. */
function isJoint(context: Context, p: PlacedCurve, q: PlacedCurve, { at }: Meeting): boolean {
  if (p.at.loop !== q.at.loop) return false;
  const reach = 10 * context.tolerance;
  const meet = (s: PlacedCurve, t: PlacedCurve) =>
    follows(context, s.at, t.at) &&
    Math.hypot(s.curve.bx - at[0], s.curve.by - at[1]) <= reach &&
    Math.hypot(t.curve.ax - at[0], t.curve.ay - at[1]) <= reach;
  return meet(p, q) || meet(q, p);
}

/** Sides that do not meet but come nearer than can be meshed. */
function checkWall(context: Context, p: PlacedCurve, q: PlacedCurve): void {
  let least = Infinity;
  let place: Point = [0, 0];
  const take = (curve: Curve, x: number, y: number) => {
    const d = distanceToCurve(curve, x, y);
    if (d >= least) return;
    least = d;
    place = [x, y];
  };
  const at = [0, 0];
  for (const [s, o] of [
    [p, q],
    [q, p],
  ] as const) {
    // Ends are nearest unless an arc bulges towards the other side: then one of many places comes near enough.
    const n = s.curve.arc || o.curve.arc ? 64 : 1;
    for (let i = 0; i <= n; i++) {
      curveAt(s.curve, i / n, at);
      take(o.curve, at[0]!, at[1]!);
    }
  }
  if (least > context.thinnest || !isFirstReport(context, place)) return;
  add(context, "thin-wall", p.at, { other: q.at, places: [place], sizes: [least, context.thinnest] });
}
