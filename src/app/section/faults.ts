/** Where the faults of a document lie on the section: places to ring, sides to draw in red. */
import type { CaseProblem } from "../../case/types.ts";
import type { Place } from "../../editor/arcs.ts";
import { placeOfPath } from "./mend.ts";
import { sideKey } from "./outlineLayer.ts";
import { boundsOf } from "./view.ts";
import { nearestOn, sheetPlaces } from "./sheet.ts";
import type { Sheet } from "./sheet.ts";

/** Share of the part's size within which a side passes through a fault. */
const NEAR = 2e-3;

export function faultsOf(
  problems: readonly CaseProblem[],
  sheet: Sheet,
): { readonly faults: readonly Place[]; readonly sides: ReadonlySet<string> } {
  const faults = problems.flatMap((problem) => problem.places ?? []);
  const bounds = boundsOf(sheetPlaces(sheet));
  const near = NEAR * Math.max(bounds.rMax, bounds.zMax - bounds.zMin);
  const sides = new Set<string>();
  for (const loop of sheet.loops)
    for (const side of loop.sides)
      if (faults.some((place) => nearestOn(side, place).distance < near)) sides.add(sideKey(loop, side));
  for (const problem of problems) {
    const at = problem.places?.length ? null : placeOfPath(problem.path);
    if (at) sides.add(`${at.region} ${at.loop} ${at.index}`);
  }
  return { faults, sides };
}
