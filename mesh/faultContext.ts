/** What the searches for outline faults share: the record of a fault, the sides as curves, pairs near each other. */
import type { RegionCurves } from "./insideRegion.ts";
import { extentOf } from "./outline.ts";
import { curveTangent, type Curve } from "./plane.ts";
import type { Meeting } from "./curvesMeet.ts";
import type { OutlineRegion, Point } from "./types.ts";

/**
 * | code           | places                        | sizes                                   |
 * | -------------- | ----------------------------- | --------------------------------------- |
 * | not-a-number   | the side's end                | -                                       |
 * | few-sides      | start of the loop             | sides in the loop                       |
 * | no-area        | start of the loop             | area m2                                 |
 * | gap            | end of `side`, start of `other` | distance m                            |
 * | zero-length    | the side's start              | length m                                |
 * | duplicate      | ends of the stretch shared    | its length m                            |
 * | crossing       | the crossing                  | -                                       |
 * | thin-wall      | the place                     | thickness m, least that can be meshed m |
 * | in-pieces      | where the region comes apart  | -                                       |
 * | void-outside   | start of the void             | -                                       |
 * | overlap        | crossings, or a place in both | -                                       |
 * | negative-radius | the place with the least r   | that r m                                |
 * | arc-in-line    | the arc's three points        | -                                       |
 * | stands-apart   | start of the region           | -                                       |
 * | point-outside  | the point                     | distance to the nearest side m          |
 */
export type OutlineFaultCode =
  | "not-a-number"
  | "few-sides"
  | "no-area"
  | "gap"
  | "zero-length"
  | "duplicate"
  | "crossing"
  | "thin-wall"
  | "in-pieces"
  | "void-outside"
  | "overlap"
  | "negative-radius"
  | "arc-in-line"
  | "stands-apart"
  | "point-outside";

/** One side by its place in the outline: region, loop (0 the outer one) and side within the loop. */
export interface SidePlace {
  readonly region: number;
  readonly loop: number;
  readonly side: number;
}

export interface OutlineFault {
  readonly code: OutlineFaultCode;
  /** said, but no reason to refuse the outline */
  readonly isRemark: boolean;
  /** the side concerned, or the first side of the loop concerned; -1 in all for a requested point */
  readonly at: SidePlace;
  /** the other side, where two are concerned */
  readonly other?: SidePlace;
  /** number of the requested point */
  readonly point?: number;
  readonly places: readonly Point[];
  readonly sizes: readonly number[];
}

export interface Context {
  readonly regions: readonly OutlineRegion[];
  readonly curves: readonly RegionCurves[];
  readonly size: number;
  /** points nearer than this are one [m] */
  readonly tolerance: number;
  /** walls thinner than this cannot be meshed [m] */
  readonly thinnest: number;
  readonly faults: OutlineFault[];
}

export function add(
  { faults }: Context,
  code: OutlineFaultCode,
  at: SidePlace,
  rest: Partial<Omit<OutlineFault, "code" | "at">> = {},
): void {
  faults.push({ code, isRemark: false, at, places: [], sizes: [], ...rest });
}

export function distance(p: Point, q: Point): number {
  return Math.hypot(p[0] - q[0], p[1] - q[1]);
}

export interface PlacedCurve {
  readonly curve: Curve;
  readonly at: SidePlace;
  readonly low: Point;
  readonly high: Point;
}

export function placedCurves({ regions, curves }: Context, region: number): PlacedCurve[] {
  return curves[region]!.flatMap((loop, l) =>
    loop.map((curve, side) => {
      const { low, high } = extentOf([{ loops: [[regions[region]!.loops[l]![side]!]] }]);
      return { curve, at: { region, loop: l, side }, low, high };
    }),
  );
}

/** Calls back for every pair whose boxes come within reach of each other (sorted by r, swept). */
export function forNearPairs(
  first: readonly PlacedCurve[],
  second: readonly PlacedCurve[] | null,
  reach: number,
  visit: (p: PlacedCurve, q: PlacedCurve) => void,
): void {
  const sorted = [...(second ?? first)].sort((p, q) => p.low[0] - q.low[0]);
  for (const p of first) {
    for (const q of sorted) {
      if (q.low[0] > p.high[0] + reach) break;
      if (q.high[0] < p.low[0] - reach || q.low[1] > p.high[1] + reach || q.high[1] < p.low[1] - reach)
        continue;
      if (!second && !isBefore(p.at, q.at)) continue;
      visit(p, q);
    }
  }
}

export function isBefore(p: SidePlace, q: SidePlace): boolean {
  return p.loop !== q.loop ? p.loop < q.loop : p.side < q.side;
}

export function isShort(curve: Curve, tolerance: number): boolean {
  return Math.hypot(curve.bx - curve.ax, curve.by - curve.ay) <= tolerance;
}

/** Things joined step by step (loops by touching, regions by sharing sides). */
export class JoinedGroups {
  private readonly group: number[];

  constructor(loops: number) {
    this.group = Array.from({ length: loops }, (_, k) => k);
  }

  /** Joins two; false when they were joined already. */
  join(p: number, q: number): boolean {
    const [a, b] = [this.group[p]!, this.group[q]!];
    if (a === b) return false;
    this.group.forEach((g, k) => {
      if (g === b) this.group[k] = a;
    });
    return true;
  }
}

/** True when the ways of the two loops through a place change hands there, not only touch. */
export function branchesCross(
  context: Context,
  p: PlacedCurve,
  q: PlacedCurve,
  { at, t, u }: Meeting,
): boolean {
  const [p0, p1] = branchesAt(context, p, t, at);
  const [q0, q1] = branchesAt(context, q, u, at);
  const turn = (angle: number) => angle - p0 - 2 * Math.PI * Math.floor((angle - p0) / (2 * Math.PI));
  const opening = turn(p1);
  const hands = [turn(q0), turn(q1)];
  const isClear = hands.every((h) => [0, opening, 2 * Math.PI].every((limit) => Math.abs(h - limit) > 1e-6));
  return isClear && hands[0]! < opening !== hands[1]! < opening;
}

/** Angles under which a loop arrives (looking back) and leaves at a place on one of its sides. */
function branchesAt(context: Context, p: PlacedCurve, t: number, at: Point): [number, number] {
  const loop = context.curves[p.at.region]![p.at.loop]!;
  const reach = 10 * context.tolerance;
  const isNear = (x: number, y: number) => Math.hypot(x - at[0], y - at[1]) <= reach;
  const { side } = p.at;
  const n = loop.length;
  const arrives = isNear(p.curve.ax, p.curve.ay) ? loop[(side + n - 1) % n]! : p.curve;
  const leaves = isNear(p.curve.bx, p.curve.by) ? loop[(side + 1) % n]! : p.curve;
  const tangent = [0, 0];
  curveTangent(arrives, arrives === p.curve ? t : 1, tangent);
  const back = Math.atan2(-tangent[1]!, -tangent[0]!);
  curveTangent(leaves, leaves === p.curve ? t : 0, tangent);
  return [back, Math.atan2(tangent[1]!, tangent[0]!)];
}
