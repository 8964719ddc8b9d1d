/** Which exposed sides get rows of thin elements, so that the first instants asked for are right. */
import { firstRow } from "../../mesh/sizeField.ts";
import type { SideRows } from "../../mesh/types.ts";
import type { Case, Condition, Curve } from "../case/types.ts";
import { thickestSpot } from "../profile/thickestSpot.ts";
import type { Profile } from "../profile/types.ts";
import { conditionOf } from "./conditions.ts";
import { ROWS_FROM } from "./defaults.ts";

/**
 * Rows for the sides whose film (the largest of all stages) warrants them.
 *
 * @param asked instants that questions and the caller name [s]
 */
export function thermalRows(input: Case, profile: Profile, asked: readonly number[]): SideRows[] {
  const spot = thickestSpot(profile);
  if (!spot) return [];
  const instant = Math.min(
    ROWS_FROM * Math.min(...input.stages.map((stage) => stage.lasts)),
    ...asked.filter((time) => time > 0),
  );
  return profile.sides.flatMap((side) => {
    if (side.exposedArea === 0) return [];
    const material = input.materials[input.regions[side.region]!.material]!;
    const conductivity = mean(material.conductivity);
    const row = firstRow({
      instant,
      diffusivity: conductivity / (material.density * mean(material.heatCapacity)),
      film: Math.max(...input.stages.map((stage) => filmOf(conditionOf(stage, side.name)))),
      conductivity,
      halfThickness: spot.radius,
    });
    return row ? [{ side: side.number, ...row }] : [];
  });
}

function filmOf(condition: Condition | undefined): number {
  if (!condition || condition.kind === "insulated") return 0;
  return condition.kind === "film" ? most(condition.film) : Infinity;
}

const valuesOf = (curve: Curve): number[] =>
  typeof curve === "number" ? [curve] : curve.points.map((point) => point[1]);
const most = (curve: Curve): number => Math.max(...valuesOf(curve));
const mean = (curve: Curve): number => {
  const values = valuesOf(curve);
  return values.reduce((sum, value) => sum + value, 0) / values.length;
};
