/** Is a list of nested levels good enough? Stated uncertainties, and what is still asked of the mesh. */
import type { ElementOrder } from "../fem/elementMesh.ts";
import type { Level } from "./level.ts";
import type { FieldAnswer } from "./questions.ts";
import { pooledChange, spatialUncertainty } from "./uncertainty.ts";

export interface StatedUncertainty {
  /** one per question, in the unit of its value; null where it cannot be stated */
  readonly answers: readonly (number | null)[];
  /** K: largest over the soundings of the field; null with one level */
  readonly temperature: number | null;
}

/** Error in time of a level's march [K]: the largest over its stages. */
export const timeErrorOf = (level: Level): number =>
  Math.max(...level.timeline.stages.map((stage) => stage.history.facts.timeError));

/** Uncertainty of every answer and of the field, space and time together. */
export function statedUncertainty(levels: readonly Level[], element: ElementOrder): StatedUncertainty {
  const last = levels.at(-1)!;
  const inTime = timeErrorOf(last);
  const lists = last.answers.map((_, i) => levels.map((level) => level.answers[i]!.value));
  const pools = new Map<string, number>();
  for (const unit of new Set(last.answers.map((answer) => answer.unit)))
    pools.set(unit, pooledChange(lists.filter((_, i) => last.answers[i]!.unit === unit)));
  const answers = last.answers.map((answer, i) => {
    const inSpace = spatialUncertainty(lists[i]!, pools.get(answer.unit)!, element);
    return inSpace === null ? null : inSpace + timeShare(answer, inTime);
  });
  const soundings = last.soundings.map((_, i) => levels.map((level) => level.soundings[i]!));
  const pool = pooledChange(soundings);
  const stated = soundings.map((values) => spatialUncertainty(values, pool, element));
  const temperature = stated.includes(null) ? null : Math.max(...(stated as number[])) + inTime;
  return { answers, temperature };
}

/** The error in time [K] carried into the unit of an answer. */
function timeShare(answer: FieldAnswer, kelvin: number): number {
  switch (answer.unit) {
    case "degC":
      return kelvin;
    case "K":
      return 2 * kelvin;
    case "s":
      return answer.slope === 0 ? 0 : kelvin / Math.abs(answer.slope);
    default:
      return 0;
  }
}

/**
 * Is every stated uncertainty within the aim?
 *
 * @param aim K: the case's accuracy times its temperature span
 */
export function settled(levels: readonly Level[], stated: StatedUncertainty, aim: number): boolean {
  if (stated.temperature === null || stated.temperature > aim) return false;
  return levels.at(-1)!.answers.every((answer, i) => {
    const uncertainty = stated.answers[i];
    if (uncertainty === null || uncertainty === undefined) return answer.value === null;
    return uncertainty <= aimOf(answer, aim);
  });
}

/** The aim [K] in the unit of an answer; answers without a direct relation are held to one part in a hundred. */
function aimOf(answer: FieldAnswer, aim: number): number {
  const { question, unit, slope } = answer;
  const value = Math.abs(answer.value ?? 0);
  if (unit === "degC") return aim;
  if (unit === "K") return 2 * aim;
  if (unit === "s" && slope !== 0) return Math.max(aim / Math.abs(slope), 1e-6 * value);
  if (question.ask === "dose") return value * Math.max((Math.LN10 / question.z) * aim, 1e-3);
  return 0.01 * value;
}
