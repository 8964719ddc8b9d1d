/** Edits that the strip sends: stage ends, limits, surroundings, a further stage. Recipes only; the page applies them. */
import type { ConditionDocument, CurveDocument, Quantity, StageDocument } from "../../case/types.ts";
import type { UnitSystem } from "../../case/units.ts";
import { toShown } from "../../case/units.ts";
import type { Recipe } from "../../editor/history.ts";
import type { Knot, LinePlace, StageBlock } from "./schedule.ts";
import type { TimeGraduations } from "./graduations.ts";

/** Steps of a hand on a stage end: s for an arrow key, with Page keys, with Shift. */
export function timeSteps(word: TimeGraduations["word"]): readonly [number, number, number] {
  const base = { seconds: 1, minutes: 1, hours: 60, days: 3600 }[word];
  return word === "minutes" ? [10, 60, 300] : [base, 5 * base, 10 * base];
}

/** px that one step of a drag should be worth, so that the hand can hit it */
const STEP_PIXELS = 3;

/** The finest step [s] that a drag can hit on a scale of so many px per second. */
export function dragStep(steps: readonly number[], pixelsPerSecond: number): number {
  return steps.find((step) => step * pixelsPerSecond >= STEP_PIXELS) ?? steps.at(-1)!;
}

export const snapped = (value: number, step: number): number => Math.round(value / step) * step;

/** A time as the document keeps it: whole hours, minutes or seconds with their unit. */
export function timeText(seconds: number): string {
  const rounded = Number(seconds.toFixed(3));
  if (rounded >= 3600 && rounded % 3600 === 0) return `${rounded / 3600} h`;
  return rounded >= 60 && rounded % 60 === 0 ? `${rounded / 60} min` : `${rounded} s`;
}

/** A temperature as the document keeps it, in the unit that is shown, to the step of the hand. */
export function temperatureText(degC: number, system: UnitSystem, decimals = 0): string {
  const shown = Number(toShown(degC, "temperature", system).toFixed(decimals));
  return `${shown === 0 ? 0 : shown} ${system === "us" ? "degF" : "degC"}`;
}

/** Shortest stage that a drag leaves, as a share of the step */
const LEAST_STEPS = 1;

/** Moves the end of a stage that lasts a time; `ended` counts from the start of the case [s]. */
export function endStage(block: StageBlock, ended: number, step: number): Recipe {
  const lasts = Math.max(LEAST_STEPS * step, snapped(ended, step) - block.began);
  return (draft) => {
    const stage = draft.stages[block.index];
    if (stage !== undefined && stage.until === undefined) stage.lasts = timeText(lasts);
  };
}

/** Moves the limit of an "until" stage. */
export function limitStage(block: StageBlock, degC: number, system: UnitSystem): Recipe {
  return (draft) => {
    const until = draft.stages[block.index]?.until;
    if (until !== undefined) until.reaches = temperatureText(degC, system);
  };
}

/** Moves one knot of a line of surroundings up or down. */
export function moveKnot(place: LinePlace, knot: Knot, degC: number, system: UnitSystem): Recipe {
  const text = temperatureText(degC, system);
  return (draft) => {
    const stage = draft.stages[place.stage];
    if (stage === undefined) return;
    const owner = ownerOf(stage, place);
    if (owner === null) return;
    const curve = owner[place.field];
    if (curve === undefined) return;
    if (knot.index === null) owner[place.field] = text;
    else setPoint(curve, knot.index, text);
  };
}

function ownerOf(
  stage: StageDocument,
  place: LinePlace,
): Partial<Record<"ambient" | "held", CurveDocument>> | null {
  if (place.side === null) return stage;
  const condition: ConditionDocument | undefined = stage.sides[place.side];
  if (condition === undefined || typeof condition === "string" || "flux" in condition) return null;
  return condition;
}

function setPoint(curve: CurveDocument, index: number, y: Quantity): void {
  if (typeof curve === "number" || typeof curve === "string") return;
  const point = (Array.isArray(curve) ? curve : curve.points)[index];
  if (point !== undefined) point[1] = y;
}

/** A further stage behind the last: the same surroundings for the same time, to be changed by hand. */
export function addStage(): Recipe {
  return (draft) => {
    const last = draft.stages.at(-1);
    if (last === undefined) return;
    const next = JSON.parse(JSON.stringify(last)) as StageDocument; // a document is JSON
    delete next.until;
    delete next.atMost;
    next.name = `Stage ${draft.stages.length + 1}`;
    next.lasts = last.lasts ?? "1 h";
    draft.stages.push(next);
  };
}
