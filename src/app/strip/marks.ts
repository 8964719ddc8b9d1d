/** Where the answers stand on the chart: balloons, asked levels, the bracket of a spread, the span of an arrival. */
import type { Question } from "../../case/types.ts";
import type { Answer, CaseResult } from "../../run/result.ts";
import { firstPassing, valueAt } from "./curves.ts";

export interface AnswerMark {
  /** number of the answer, from 0 */
  readonly index: number;
  /** s from the start of the case */
  readonly at: number;
  /** degC */
  readonly degC: number;
  /** asked level: a dashed line from one instant to another */
  readonly level: { readonly degC: number; readonly from: number; readonly to: number } | null;
  /** ends of a bracket [degC]: coldest and hottest */
  readonly bracket: readonly [number, number] | null;
  /** a thin line down to the time scale: the answer is an instant */
  readonly drops: boolean;
}

/** The marks of all answers that have a place on the chart. */
export function marksOf(result: CaseResult): AnswerMark[] {
  return result.answers.flatMap((answer, index) => {
    const mark = markOf(result, answer, index);
    return mark === null ? [] : [mark];
  });
}

function markOf(result: CaseResult, answer: Answer, index: number): AnswerMark | null {
  const { question, value, at } = answer;
  const plain = { index, level: null, bracket: null, drops: false };
  if (value === null) return unanswered(result, question, index);
  switch (question.ask) {
    case "when":
      return {
        ...plain,
        at: value,
        degC: question.reaches,
        level: { degC: question.reaches, from: stageStart(result, value), to: value },
        drops: true,
      };
    case "reading":
      return { ...plain, at: question.at, degC: value };
    case "spread":
      return at === null ? null : spreadMark(result, at, index);
    case "passage":
      return at === null ? null : { ...plain, at, degC: question.to };
    case "rate":
      return at === null ? null : { ...plain, at, degC: question.at };
    case "held-above":
    case "held-below":
      return levelOnly(result, question.level, index);
    default:
      return null;
  }
}

/** A level that was asked for and not reached is drawn over the whole run, with its balloon at the end. */
function unanswered(result: CaseResult, question: Question, index: number): AnswerMark | null {
  if (question.ask !== "when") return null;
  return levelOnly(result, question.reaches, index);
}

function levelOnly(result: CaseResult, degC: number, index: number): AnswerMark {
  const end = result.stages.at(-1)?.ended ?? 0;
  return { index, at: end, degC, level: { degC, from: 0, to: end }, bracket: null, drops: false };
}

function spreadMark(result: CaseResult, at: number, index: number): AnswerMark {
  const { time, coldest, hottest } = result.history;
  const bracket = [valueAt(time, coldest, at), valueAt(time, hottest, at)] as const;
  return { index, at, degC: (bracket[0] + bracket[1]) / 2, level: null, bracket, drops: false };
}

function stageStart(result: CaseResult, at: number): number {
  return result.stages.findLast((stage) => stage.began <= at)?.began ?? 0;
}

/** Which way a "when" question looks at its level: as it says, or from where the part is at the start. */
export function directionOf(result: CaseResult, question: Extract<Question, { ask: "when" }>): "up" | "down" {
  if (question.going !== undefined) return question.going;
  return (result.history.mean[0] ?? 0) < question.reaches ? "up" : "down";
}

/** From the first point to get there to the last [s]; null for a question without an arrival or one not reached. */
export function arrivalSpan(result: CaseResult, index: number): readonly [number, number] | null {
  const answer = result.answers[index];
  if (answer === undefined || answer.question.ask !== "when") return null;
  const { question } = answer;
  const { time, coldest, hottest } = result.history;
  const going = directionOf(result, question);
  const [leader, laggard] = going === "up" ? [hottest, coldest] : [coldest, hottest];
  const first = firstPassing(time, leader, question.reaches, going);
  const last = firstPassing(time, laggard, question.reaches, going) ?? result.stages.at(-1)?.ended ?? null;
  return first === null || last === null || last <= first ? null : [first, last];
}
