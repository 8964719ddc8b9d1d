/** Faults between regions: places that belong to two, regions that touch no other. */
import { curvesMeet } from "./curvesMeet.ts";
import {
  add,
  branchesCross,
  forNearPairs,
  isShort,
  JoinedGroups,
  placedCurves,
  type Context,
  type PlacedCurve,
  type SidePlace,
} from "./faultContext.ts";
import { isInRegion } from "./insideRegion.ts";
import { curveAt, curveTangent } from "./plane.ts";
import type { Point } from "./types.ts";

/** Most places named for one pair of regions that overlap. */
const MOST_PLACES = 8;

export function checkBetweenRegions(context: Context): void {
  const all = context.regions.map((_, r) =>
    placedCurves(context, r).filter(({ curve }) => !isShort(curve, context.tolerance)),
  );
  const joined = new JoinedGroups(all.length);
  for (let r = 0; r < all.length; r++) {
    for (let s = r + 1; s < all.length; s++) {
      const shared = checkRegionPair(context, all[r]!, all[s]!, r, s);
      if (shared) joined.join(r, s);
    }
  }
  for (let r = 1; r < all.length; r++) {
    const first = all[r]![0];
    if (!first || !joined.join(0, r)) continue;
    add(
      context,
      "stands-apart",
      { region: r, loop: 0, side: 0 },
      {
        isRemark: true,
        places: [[first.curve.ax, first.curve.ay]],
      },
    );
  }
}

/** Reports an overlap; true when the regions share a stretch of side. */
function checkRegionPair(
  context: Context,
  first: readonly PlacedCurve[],
  second: readonly PlacedCurve[],
  r: number,
  s: number,
): boolean {
  const cuts = new Map<PlacedCurve, number[]>();
  const cut = (p: PlacedCurve, t: number) => cuts.set(p, [...(cuts.get(p) ?? []), t]);
  const crossings: Point[] = [];
  let isShared = false;
  let pair: [SidePlace, SidePlace] | null = null;
  forNearPairs(first, second, context.tolerance, (p, q) => {
    const { places, stretch } = curvesMeet(p.curve, q.curve, context.tolerance);
    if (stretch) isShared = true;
    for (const m of [...places, ...(stretch ?? [])]) {
      cut(p, m.t);
      cut(q, m.u);
      if (stretch || !branchesCross(context, p, q, m)) continue;
      pair ??= [p.at, q.at];
      crossings.push(m.at);
    }
  });
  const inBoth = placeInBoth(context, [...first, ...second], cuts, r, s);
  if (!inBoth) return isShared;
  const [at, other] = pair ?? [inBoth.at, { region: inBoth.at.region === r ? s : r, loop: 0, side: 0 }];
  const places = crossings.length > 0 ? crossings.slice(0, MOST_PLACES) : [inBoth.place];
  add(context, "overlap", at, { other, places });
  return true;
}

/** A place beside some piece of a side that lies inside both regions, or null. */
function placeInBoth(
  context: Context,
  sides: readonly PlacedCurve[],
  cuts: ReadonlyMap<PlacedCurve, readonly number[]>,
  r: number,
  s: number,
): { place: Point; at: SidePlace } | null {
  const aside = 10 * context.tolerance;
  const p = [0, 0];
  const tangent = [0, 0];
  for (const side of sides) {
    const stops = [0, ...(cuts.get(side) ?? []), 1].sort((a, b) => a - b);
    for (let i = 0; i + 1 < stops.length; i++) {
      const length = Math.hypot(side.curve.bx - side.curve.ax, side.curve.by - side.curve.ay);
      if ((stops[i + 1]! - stops[i]!) * length < 100 * context.tolerance) continue;
      const t = (stops[i]! + stops[i + 1]!) / 2;
      curveAt(side.curve, t, p);
      curveTangent(side.curve, t, tangent);
      for (const hand of [aside, -aside]) {
        const x = p[0]! - hand * tangent[1]!;
        const y = p[1]! + hand * tangent[0]!;
        const isInBoth = isInRegion(context.curves[r]!, x, y) && isInRegion(context.curves[s]!, x, y);
        if (isInBoth) return { place: [x, y], at: side.at };
      }
    }
  }
  return null;
}
