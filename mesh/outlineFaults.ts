/**
 * What is wrong with an outline, as plain data, all of it at once. The words are made by whoever knows the names.
 */
import { JOIN_SHARE, THINNEST_SHARE } from "./defaults.ts";
import { curvesMeet, type Meeting } from "./curvesMeet.ts";
import { isInRegion, regionCurves, windingNumber, type RegionCurves } from "./insideRegion.ts";
import { curveOf, extentOf, loopArea } from "./outline.ts";
import { arcExtremes, curveAt, curveTangent, distanceToCurve, isInLine, type Curve } from "./plane.ts";
import type { OutlineRegion, OutlineSide, Point } from "./types.ts";

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

/** Most places named for one pair of regions that overlap. */
const MOST_PLACES = 8;

interface Context {
  readonly regions: readonly OutlineRegion[];
  readonly curves: readonly RegionCurves[];
  readonly size: number;
  /** points nearer than this are one [m] */
  readonly tolerance: number;
  /** walls thinner than this cannot be meshed [m] */
  readonly thinnest: number;
  readonly faults: OutlineFault[];
}

/**
 * All faults and remarks of an outline. An outline without faults (remarks aside) is meshed by `meshRegions`.
 *
 * @param points  places that must become nodes: reported when outside of all regions
 */
export function findOutlineFaults(
  regions: readonly OutlineRegion[],
  points: readonly Point[] = [],
): OutlineFault[] {
  const notNumbers = findNotNumbers(regions, points);
  if (notNumbers.length > 0) return notNumbers;
  const { size } = extentOf(regions);
  const context: Context = {
    regions,
    curves: regions.map(regionCurves),
    size,
    tolerance: JOIN_SHARE * size,
    thinnest: THINNEST_SHARE * size,
    faults: [],
  };
  regions.forEach((region, r) => {
    if (region.loops.length === 0) add(context, "few-sides", { region: r, loop: 0, side: 0 }, { sizes: [0] });
    region.loops.forEach((loop, l) => checkLoop(context, loop, r, l));
  });
  regions.forEach((_, r) => checkWithinRegion(context, r));
  checkBetweenRegions(context);
  checkPoints(context, points);
  return context.faults;
}

function add(
  { faults }: Context,
  code: OutlineFaultCode,
  at: SidePlace,
  rest: Partial<Omit<OutlineFault, "code" | "at">> = {},
): void {
  faults.push({ code, isRemark: false, at, places: [], sizes: [], ...rest });
}

function findNotNumbers(regions: readonly OutlineRegion[], points: readonly Point[]): OutlineFault[] {
  const faults: OutlineFault[] = [];
  const isBad = (p: Point) => !Number.isFinite(p[0]) || !Number.isFinite(p[1]);
  const report = (at: SidePlace, place: Point, point?: number) => {
    const numbered = point === undefined ? {} : { point };
    faults.push({ code: "not-a-number", isRemark: false, at, places: [place], sizes: [], ...numbered });
  };
  regions.forEach(({ loops }, region) =>
    loops.forEach((sides, loop) =>
      sides.forEach(({ from, to, through }, side) => {
        for (const p of through ? [from, through] : [from]) if (isBad(p)) report({ region, loop, side }, p);
        const next = sides[(side + 1) % sides.length]!.from;
        if (isBad(to) && !isBad(next)) report({ region, loop, side }, to);
      }),
    ),
  );
  points.forEach((p, k) => {
    if (isBad(p)) report({ region: -1, loop: -1, side: -1 }, p, k);
  });
  return faults;
}

// ---- one loop by itself --------------------------------------------------------------------------------------

function checkLoop(context: Context, loop: readonly OutlineSide[], region: number, l: number): void {
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

function distance(p: Point, q: Point): number {
  return Math.hypot(p[0] - q[0], p[1] - q[1]);
}

function leastRadius(side: OutlineSide): Point {
  const { arc } = curveOf(side);
  const places = [side.from, side.to, ...(arc ? arcExtremes(arc) : [])];
  return places.reduce((least, p) => (p[0] < least[0] ? p : least));
}

// ---- sides of one region against each other -------------------------------------------------------------------

interface PlacedCurve {
  readonly curve: Curve;
  readonly at: SidePlace;
  readonly low: Point;
  readonly high: Point;
}

function placedCurves({ regions, curves }: Context, region: number): PlacedCurve[] {
  return curves[region]!.flatMap((loop, l) =>
    loop.map((curve, side) => {
      const { low, high } = extentOf([{ loops: [[regions[region]!.loops[l]![side]!]] }]);
      return { curve, at: { region, loop: l, side }, low, high };
    }),
  );
}

/** Calls back for every pair whose boxes come within reach of each other (sorted by r, swept). */
function forNearPairs(
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

function isBefore(p: SidePlace, q: SidePlace): boolean {
  return p.loop !== q.loop ? p.loop < q.loop : p.side < q.side;
}

function checkWithinRegion(context: Context, region: number): void {
  const sides = placedCurves(context, region).filter(({ curve }) => !isShort(curve, context.tolerance));
  const touching = new LoopGroups(context.curves[region]!.length);
  forNearPairs(sides, null, context.thinnest, (p, q) => checkPair(context, p, q, touching));
  const [outer, ...holes] = context.curves[region]!;
  holes.forEach((hole, h) => {
    if (hole.length === 0 || !outer || isHoleInside(outer, hole)) return;
    const at = { region, loop: h + 1, side: 0 };
    add(context, "void-outside", at, { places: [[hole[0]!.ax, hole[0]!.ay]] });
  });
}

function isShort(curve: Curve, tolerance: number): boolean {
  return Math.hypot(curve.bx - curve.ax, curve.by - curve.ay) <= tolerance;
}

/** Some place of the void lies inside the outer loop (crossings are reported by themselves). */
function isHoleInside(outer: readonly Curve[], hole: readonly Curve[]): boolean {
  const p = [0, 0];
  return hole.some((curve) => {
    curveAt(curve, 0.5, p);
    return windingNumber(outer, p[0]!, p[1]!) !== 0;
  });
}

/** Loops joined by touching; a touch within one group cuts the region apart. */
class LoopGroups {
  private readonly group: number[];

  constructor(loops: number) {
    this.group = Array.from({ length: loops }, (_, k) => k);
  }

  /** Joins two loops; false when they were joined already. */
  join(p: number, q: number): boolean {
    const [a, b] = [this.group[p]!, this.group[q]!];
    if (a === b) return false;
    this.group.forEach((g, k) => {
      if (g === b) this.group[k] = a;
    });
    return true;
  }
}

function checkPair(context: Context, p: PlacedCurve, q: PlacedCurve, touching: LoopGroups): void {
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

/** True when the ways of the two loops through a place change hands there, not only touch. */
function branchesCross(context: Context, p: PlacedCurve, q: PlacedCurve, { at, t, u }: Meeting): boolean {
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

// ---- regions against each other --------------------------------------------------------------------------------

function checkBetweenRegions(context: Context): void {
  const all = context.regions.map((_, r) =>
    placedCurves(context, r).filter(({ curve }) => !isShort(curve, context.tolerance)),
  );
  const joined = new LoopGroups(all.length);
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

// ---- requested points ------------------------------------------------------------------------------------------

function checkPoints(context: Context, points: readonly Point[]): void {
  points.forEach(([x, y], point) => {
    if (context.curves.some((loops) => isInRegion(loops, x, y))) return;
    let nearest = Infinity;
    for (const curve of context.curves.flat(2)) nearest = Math.min(nearest, distanceToCurve(curve, x, y));
    if (nearest <= context.tolerance) return;
    const at = { region: -1, loop: -1, side: -1 };
    add(context, "point-outside", at, { point, places: [[x, y]], sizes: [nearest] });
  });
}
