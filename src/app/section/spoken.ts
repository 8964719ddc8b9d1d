/** Words for the things of the section, on the sheet and for listeners. */
import type { ConditionDocument, CurveDocument, StageDocument } from "../../case/types.ts";
import { shownUnit, toShown } from "../../case/units.ts";
import type { Dimension, UnitSystem } from "../../case/units.ts";
import type { FoundCondition } from "../../editor/conditions.ts";
import { siOf } from "../../editor/quantities.ts";
import { quantity, temperature } from "../controls/figures.ts";
import { coordinate } from "./rulers.ts";
import type { SheetLoop, SheetSide } from "./sheet.ts";

/** "Wall, side 2"; a side without a name of its own is "Side 2". */
export function sideName(side: SheetSide): string {
  const own = `side ${side.index + 1}`;
  return side.name === own ? capital(own) : `${capital(side.name)}, ${own}`;
}

export const capital = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);

/** "still air 25 °C, film 12", "insulated", "held at 200 °C". */
export function conditionWords(
  found: FoundCondition | undefined,
  stage: StageDocument | undefined,
  units: UnitSystem,
): string {
  if (found === undefined) return "needs a condition";
  const { condition } = found;
  if (condition === "insulated") return "insulated";
  if ("held" in condition) return `held at ${curveWords(condition.held, "temperature", units)}`;
  if ("flux" in condition) return `flux ${curveWords(condition.flux, "heatFlux", units)}`;
  return filmWords(condition, stage, units);
}

type Film = Extract<ConditionDocument, { film: CurveDocument }>;

function filmWords(condition: Film, stage: StageDocument | undefined, units: UnitSystem): string {
  const around = (stage?.name ?? "surroundings").toLowerCase();
  const ambient = condition.ambient ?? stage?.ambient;
  const degrees = ambient === undefined ? "" : ` ${curveWords(ambient, "temperature", units)}`;
  const film =
    typeof condition.film === "object" ? "by table" : figureOf(condition.film, "filmCoefficient", units);
  const radiates = condition.emissivity === undefined ? "" : ", radiating";
  return `${around}${degrees}, film ${film}${radiates}`;
}

function curveWords(curve: CurveDocument, dimension: Dimension, units: UnitSystem): string {
  if (typeof curve === "object") return "by table";
  const si = siOf(curve, dimension);
  if (!Number.isFinite(si)) return String(curve);
  return dimension === "temperature" ? temperature(si, units).text : quantity(si, dimension, units).text;
}

function figureOf(curve: number | string, dimension: Dimension, units: UnitSystem): string {
  const si = siOf(curve, dimension);
  return Number.isFinite(si) ? String(Number(toShown(si, dimension, units).toPrecision(4))) : String(curve);
}

/** "Point 3, wall to top, r 160.0, z 900.0 mm". */
export function vertexWords(loop: SheetLoop, index: number, units: UnitSystem): string {
  const { at } = loop.vertices[index]!;
  const [arriving, leaving] = [loop.sides.at(index - 1)!, loop.sides[index]!];
  const corner =
    arriving.onAxis || leaving.onAxis
      ? "on the axis"
      : arriving.name === leaving.name
        ? arriving.name
        : `${arriving.name} to ${leaving.name}`;
  return `Point ${index + 1}, ${corner}, r ${coordinate(at[0], units)}, z ${coordinate(at[1], units)} ${shownUnit("length", units)}`;
}
