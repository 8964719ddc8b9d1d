/** What the quick estimates get to see of a case: volume, areas, films, mean properties, stages as they went. */
import type { Case, Condition, Curve } from "../case/types.ts";
import type { CaseFacts, Facing, SideFacts, SideTreatment, StageFacts } from "../compare/facts.ts";
import { thickestSpot } from "../profile/thickestSpot.ts";
import type { Line, Profile, ProfileSide } from "../profile/types.ts";
import { conditionOf } from "./conditions.ts";
import type { Timeline } from "./timeline.ts";

/** @param times instants of the field's history [s from the start of the case] */
export function estimateFacts(
  input: Case,
  profile: Profile,
  timeline: Timeline,
  times: Float64Array,
): CaseFacts {
  const materials = input.regions.map((region) => input.materials[region.material]!);
  const volumes = profile.regions.map((region) => region.volume);
  const heat = materials.map((material) => material.density * constant(material.heatCapacity));
  const spot = thickestSpot(profile);
  return {
    volume: profile.volume,
    start: meanBy(
      volumes.map((volume, i) => volume * heat[i]!),
      input.regions.map((region) => region.start),
    ),
    conductivity: meanBy(
      volumes,
      materials.map((material) => constant(material.conductivity)),
    ),
    volumetricHeatCapacity: meanBy(volumes, heat),
    outerRadius: profile.high[0],
    boreRadius: profile.sides.some((side) => side.kind === "axis") ? 0 : Math.max(0, profile.low[0]),
    height: profile.high[1] - profile.low[1],
    ...(spot ? { thickestRadius: spot.radius } : {}),
    stages: timeline.stages.map((run, i) => stageFacts(input, profile, i, run.ended - run.began)),
    times,
    remarks:
      new Set(input.regions.map((region) => region.material)).size > 1
        ? ["Conductivity and heat capacity are means over the volume of all regions."]
        : [],
  };
}

function stageFacts(input: Case, profile: Profile, index: number, duration: number): StageFacts {
  const stage = input.stages[index]!;
  const sides = profile.sides
    .filter((side) => side.exposedArea > 0)
    .map((side): SideFacts => ({
      name: side.name,
      area: side.exposedArea,
      facing: facingOf(side, profile),
      treatment: treatmentOf(conditionOf(stage, side.name)),
    }));
  const source = input.regions.reduce(
    (sum, region, i) => sum + constant(region.source) * profile.regions[i]!.volume,
    0,
  );
  return { name: stage.name, duration, sides, source };
}

function treatmentOf(condition: Condition | undefined): SideTreatment {
  if (!condition || condition.kind === "insulated") return { kind: "insulated" };
  if (condition.kind === "film")
    return { kind: "film", film: constant(condition.film), ambient: condition.ambient };
  return condition;
}

/** Which way a side looks: from its direction and from which side of it the region lies. */
function facingOf(side: ProfileSide, profile: Profile): Facing {
  const [r0, z0] = side.from;
  const [r1, z1] = side.to;
  const slack = 1e-9 * Math.max(1, profile.high[0]);
  if (side.through) return "askew";
  if (Math.abs(z1 - z0) <= slack) return "end";
  if (Math.abs(r1 - r0) > slack) return "askew";
  const counterClockwise = signedArea(profile.regions[side.region]!.loops[side.loop]!) > 0;
  const regionInside = side.loop === 0;
  // going up a counter-clockwise outer loop, the region lies on the left: towards the axis
  const towardsAxis = z1 > z0 === (counterClockwise === regionInside);
  return towardsAxis ? "wall" : "bore";
}

/** Twice the area of the loop's chords; the sign tells its direction. */
const signedArea = (loop: readonly Line[]): number =>
  loop.reduce((sum, { from, to, through }) => {
    const cross = (a: readonly [number, number], b: readonly [number, number]): number =>
      a[0] * b[1] - b[0] * a[1];
    return sum + (through ? cross(from, through) + cross(through, to) : cross(from, to));
  }, 0);

function meanBy(weights: readonly number[], values: readonly number[]): number {
  const total = weights.reduce((sum, weight) => sum + weight, 0);
  return values.reduce((sum, value, i) => sum + weights[i]! * value, 0) / total;
}

function constant(curve: Curve): number {
  if (typeof curve !== "number") throw new Error("a table reached the estimates as if it were a constant");
  return curve;
}
