/**
 * What is wrong with an outline, as plain data, all of it at once. The words are made by whoever knows the names.
 */
import { JOIN_SHARE, THINNEST_SHARE } from "./defaults.ts";
import { add, type Context, type OutlineFault, type SidePlace } from "./faultContext.ts";
import { isInRegion, regionCurves } from "./insideRegion.ts";
import { checkLoop } from "./loopFaults.ts";
import { extentOf } from "./outline.ts";
import { checkWithinRegion } from "./pairFaults.ts";
import { distanceToCurve } from "./plane.ts";
import { checkBetweenRegions } from "./regionFaults.ts";
import type { OutlineRegion, Point } from "./types.ts";

export type { OutlineFault, OutlineFaultCode, SidePlace } from "./faultContext.ts";

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
