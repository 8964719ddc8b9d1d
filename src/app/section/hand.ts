/** The hand on the board: dragging points, sides, bulges of arcs and probes, with their grid. */
import type { UnitSystem } from "../../case/units.ts";
import { moveProbe } from "../../editor/conditions.ts";
import { FINE_STEP, GRID, LONG_STEP } from "../../editor/defaults.ts";
import type { Place } from "../../editor/arcs.ts";
import { bendSide, moveSide, moveVertex } from "../../editor/outline.ts";
import type { LoopIndex } from "../../editor/outline.ts";
import type { Recipe } from "../../editor/history.ts";

export type Grip =
  | ({ readonly kind: "vertex" } & LoopIndex)
  | ({ readonly kind: "side" } & LoopIndex)
  | ({ readonly kind: "bulge" } & LoopIndex)
  | { readonly kind: "probe"; readonly index: number };

const INCH = 0.0254;
/** Grids of the inch world that come nearest to 1, 10 and 0.1 mm [m]. */
const INCH_STEPS = { plain: 0.05 * INCH, shift: 0.5 * INCH, alt: 0.005 * INCH } as const;

/** Step of a movement from the keys held [m]: Shift ten, Alt a tenth. */
export function stepOf(units: UnitSystem, keys: { shiftKey: boolean; altKey: boolean }): number {
  const steps = units === "si" ? { plain: GRID, shift: LONG_STEP, alt: FINE_STEP } : INCH_STEPS;
  return keys.shiftKey ? steps.shift : keys.altKey ? steps.alt : steps.plain;
}

/** The nearest place of the grid, never across the axis. */
export function snapped([r, z]: Place, step: number): Place {
  return [Math.max(0, Math.round(r / step) * step), Math.round(z / step) * step];
}

/** What one drag does, from where it began. */
export class Drag {
  readonly gesture = `drag ${Drag.#count++}`;
  static #count = 0;
  #moved = 0;

  /**
   * @param grip   what was taken
   * @param from   where the thing was [m]
   * @param grabbed where the pointer took it [m]
   * @param normal outward way of the side, for sides
   */
  constructor(
    readonly grip: Grip,
    readonly from: Place,
    readonly grabbed: Place,
    readonly normal: Place = [0, 0],
  ) {}

  /** Label and recipe of the move to a pointer place [m]; null when nothing moves. */
  to(pointer: Place, step: number): { readonly label: string; readonly recipe: Recipe } | null {
    const { grip } = this;
    const travel: Place = [pointer[0] - this.grabbed[0], pointer[1] - this.grabbed[1]];
    const place = snapped([this.from[0] + travel[0], this.from[1] + travel[1]], step);
    if (grip.kind === "vertex")
      return { label: `move of point ${grip.index + 1}`, recipe: (draft) => moveVertex(draft, grip, place) };
    if (grip.kind === "probe")
      return { label: "move of a probe", recipe: (draft) => moveProbe(draft, grip.index, place) };
    if (grip.kind === "bulge")
      return { label: `bending side ${grip.index + 1}`, recipe: (draft) => bendSide(draft, grip, place) };
    const distance = Math.round((travel[0] * this.normal[0] + travel[1] * this.normal[1]) / step) * step;
    const further = distance - this.#moved;
    if (Math.abs(further) < step / 2) return null;
    this.#moved = distance;
    return { label: `move of side ${grip.index + 1}`, recipe: (draft) => moveSide(draft, grip, further) };
  }
}
