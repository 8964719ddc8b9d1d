/** The profile of a case: its sides as the mesher numbers them, what they touch, and the measures of the part. */
import type { Case, Region, Vertex } from "../case/types.ts";
import { findTouches, remaining } from "./coincide.ts";
import type { Touch } from "./coincide.ts";
import { curveOf, extremesOf, integrate, lateralArea } from "./curve.ts";
import type { Curve } from "./curve.ts";
import { JOIN_SHARE } from "./defaults.ts";
import type { Line, Place, Profile, ProfileRegion, ProfileSide } from "./types.ts";

/**
 * Never throws: the profile of a faulty outline is built too (its measures then mean little), so that the faults can
 * be found in it and told.
 */
export function buildProfile(given: Case): Profile {
  const named = given.regions.flatMap(namedSides);
  const curves = named.map((side) => curveOf(side));
  const { low, high } = boxAround(curves);
  const tolerance = JOIN_SHARE * Math.max(high[0] - low[0], high[1] - low[1]);
  const touches = findTouches(
    curves,
    named.map((side) => side.region),
    tolerance,
  );
  const sides = named.map((side, i) => measured(side, i, curves[i]!, touches[i]!, tolerance));
  const regions = given.regions.map((region) =>
    measuredRegion(region, given.materials[region.material]?.density),
  );
  const volume = total(regions, (region) => region.volume);
  const exposedArea = total(sides, (side) => side.exposedArea);
  return {
    regions,
    sides,
    sectionArea: total(regions, (region) => region.sectionArea),
    volume,
    mass: total(regions, (region) => region.mass),
    exposedArea,
    exposedAreas: exposedAreas(sides),
    characteristicLength: volume / exposedArea,
    low,
    high,
  };
}

/** A closed loop of vertices as sides; the last one returns to the first vertex. */
export function loopLines(loop: readonly Vertex[]): Line[] {
  return loop.map(({ at, through }, i) => {
    const to = loop[(i + 1) % loop.length]!.at;
    return through ? { from: at, to, through } : { from: at, to };
  });
}

type NamedSide = Line & Pick<ProfileSide, "region" | "loop" | "index" | "name">;

function namedSides(region: Region, number: number): NamedSide[] {
  return [region.outline, ...region.holes].flatMap((loop, l) =>
    loopLines(loop).map((line, index) => ({
      ...line,
      region: number,
      loop: l,
      index,
      name: loop[index]!.side,
    })),
  );
}

function measured(
  side: NamedSide,
  number: number,
  curve: Curve,
  touches: readonly Touch[],
  tolerance: number,
): ProfileSide {
  const onAxis = !curve.arc && Math.abs(side.from[0]) <= tolerance && Math.abs(side.to[0]) <= tolerance;
  const sliver = curve.length > 0 ? tolerance / curve.length : 1;
  const exposed = onAxis
    ? []
    : remaining(
        touches.map((touch) => touch.span),
        sliver,
      );
  const partly = touches.length > 0 && exposed.length > 0;
  return {
    ...side,
    number,
    kind: onAxis ? "axis" : partly ? "partly" : exposed.length > 0 ? "exposed" : "interface",
    length: curve.length,
    area: lateralArea(curve),
    exposed,
    exposedArea: total(exposed, ([from, to]) => lateralArea(curve, from, to)),
    touches: onAxis ? [] : [...new Set(touches.map((touch) => touch.other))],
  };
}

function exposedAreas(sides: readonly ProfileSide[]): Record<string, number> {
  const areas = new Map<string, number>();
  for (const { name, kind, exposedArea } of sides) {
    if (kind === "exposed" || kind === "partly") areas.set(name, (areas.get(name) ?? 0) + exposedArea);
  }
  return Object.fromEntries(areas);
}

/** Section and revolved measures by integrals around the loops (Green), holes taken off. */
function measuredRegion(region: Region, density = 0): ProfileRegion {
  const loops = [region.outline, ...region.holes].map(loopLines);
  const sums = loops.map((loop, l) => signedMoments(loop, l === 0 ? 1 : -1));
  const [area, areaR, areaZ, areaRz] = [0, 1, 2, 3].map((k) => total(sums, (sum) => sum[k]!)) as Moments;
  const volume = 2 * Math.PI * areaR;
  return {
    loops,
    name: region.name,
    sectionArea: area,
    volume,
    mass: density * volume,
    centroid: [areaR / area, areaZ / area],
    centreZ: areaRz / areaR,
  };
}

type Moments = [area: number, areaR: number, areaZ: number, areaRz: number];

/** Integrals of 1, r, z and r z over what a loop encloses, whichever way it runs, times `sign`. */
function signedMoments(loop: readonly Line[], sign: 1 | -1): Moments {
  const curves = loop.map(curveOf);
  const around = (f: (r: number, z: number) => number) =>
    total(curves, (curve) => integrate(curve, ([r, z], velocity) => f(r, z) * velocity[1]));
  const sums: Moments = [
    around((r) => r),
    around((r) => (r * r) / 2),
    around((r, z) => r * z),
    around((r, z) => (r * r * z) / 2),
  ];
  const way = sums[0] < 0 ? -sign : sign;
  return sums.map((sum) => way * sum) as Moments;
}

function boxAround(curves: readonly Curve[]): { low: Place; high: Place } {
  let [lowR, lowZ, highR, highZ] = [Infinity, Infinity, -Infinity, -Infinity];
  for (const [r, z] of curves.flatMap(extremesOf)) {
    [lowR, lowZ] = [Math.min(lowR, r), Math.min(lowZ, z)];
    [highR, highZ] = [Math.max(highR, r), Math.max(highZ, z)];
  }
  return { low: [lowR, lowZ], high: [highR, highZ] };
}

function total<T>(items: readonly T[], amount: (item: T) => number): number {
  return items.reduce((sum, item) => sum + amount(item), 0);
}
