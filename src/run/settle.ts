/** Is a list of nested levels good enough? Stated uncertainties, and what is still asked of the mesh. */
import type { ElementOrder } from "../fem/elementMesh.ts";
import { SOUNDING_SHARES } from "./level.ts";
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

/**
 * Error in time at an instant of the case [K]: what the march of its stage tells there, and what the stages before it
 * ended with. null: no instant in particular, so the largest of all.
 */
function timeErrorAt(level: Level, time: number | null): number {
  if (time === null) return timeErrorOf(level);
  let error = 0;
  for (const { began, ended, history } of level.timeline.stages) {
    const local = Math.min(time, ended) - began;
    error += history.errorAt?.(local) ?? history.facts.timeError;
    if (time <= ended) break;
  }
  return error;
}

/** Uncertainty of every answer and of the field, space and time together. */
export function statedUncertainty(levels: readonly Level[], element: ElementOrder): StatedUncertainty {
  const last = levels.at(-1)!;
  const lists = last.answers.map((_, i) => levels.map((level) => level.answers[i]!.value));
  const answers = last.answers.map((answer, i) => {
    const inSpace = spatialUncertainty(lists[i]!, poolOf(answer, last.answers, lists), element);
    return inSpace === null ? null : inSpace + timeShare(answer, timeErrorAt(last, answer.at));
  });
  const soundings = last.soundings.map((_, i) => levels.map((level) => level.soundings[i]!));
  const pool = pooledChange(soundings);
  const stated = soundings.map((values) => spatialUncertainty(values, pool, element));
  const inTime = Math.max(...SOUNDING_SHARES.map((share) => timeErrorAt(last, share * last.timeline.ended)));
  const temperature = stated.includes(null) ? null : Math.max(...(stated as number[])) + inTime;
  return { answers, temperature };
}

/** Answers that fall within this factor in time are pooled. */
const SAME_INSTANT = 1.5;

/**
 * Root mean square of the last change over answers of one kind: times with times, temperatures with those of about the
 * same instant, since a field settles from late to early.
 */
function poolOf(
  answer: FieldAnswer,
  answers: readonly FieldAnswer[],
  lists: readonly (readonly (number | null)[])[],
): number {
  const near = ({ unit, at }: FieldAnswer): boolean => {
    if (unit !== answer.unit) return false;
    if (unit === "s" || at === null || answer.at === null || at === answer.at) return true;
    return Math.max(at, answer.at) <= SAME_INSTANT * Math.min(at, answer.at);
  };
  return pooledChange(lists.filter((_, i) => near(answers[i]!)));
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
