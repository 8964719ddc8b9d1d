/** Answers in words: value and doubt, place, what each estimate says and how far it is out. */
import type { Question, QuestionDocument } from "../../case/types.ts";
import { shownUnit, toShown } from "../../case/units.ts";
import type { Dimension, UnitSystem } from "../../case/units.ts";
import type { Comparison, SeriesEstimate } from "../../compare/types.ts";
import type { Answer, StageSpan } from "../../run/result.ts";
import {
  difference,
  digits,
  duration,
  joined,
  place,
  quantity,
  temperature,
  time,
} from "../controls/figures.ts";
import type { Figure } from "../controls/figures.ts";
import { ONE_TEMPERATURE, seriesName } from "../controls/words.ts";
import { siValue } from "./sentences.ts";

/** A value of an answer in its unit. */
export function figureOf(
  unit: Answer["unit"],
  value: number,
  doubt: number | null,
  system: UnitSystem,
): Figure {
  switch (unit) {
    case "s":
      return time(value, doubt);
    case "degC":
      return temperature(value, system, doubt);
    case "K":
      return difference(value, system, doubt);
    case "K/s":
      return quantity(value, "rate", system, sensible(value, doubt));
    case "min":
      return dose(value, sensible(value, doubt));
    case "J":
      return energy(value, sensible(value, doubt), system);
  }
}

/** Share of a value below which its doubt is not told: five figures are more than any input is known to. */
const LEAST_SHARE = 5e-5;
const sensible = (value: number, doubt: number | null): number | null =>
  doubt === null ? null : Math.max(doubt, LEAST_SHARE * Math.abs(value));

/** Equivalent minutes of a dose: never hours, they are not times of the clock. */
function dose(minutes: number, doubt: number | null): Figure {
  const { text, doubt: told } = quantity(minutes, "share", "si", doubt);
  return { text: `${text}\u00a0min`, doubt: told === "" ? "" : `${told}\u00a0min` };
}

/** Heat is told without a sign, as taken up or given off: kJ below 10 MJ, else MJ; Btu as they come. */
function energy(joules: number, doubt: number | null, system: UnitSystem): Figure {
  const size = Math.abs(joules);
  if (!inMegajoules(size, system)) return quantity(size, "energy", system, doubt);
  const mega = quantity(size / 1e6, "share", system, doubt === null ? null : doubt / 1e6);
  return { text: `${mega.text}\u00a0MJ`, doubt: mega.doubt === "" ? "" : `${mega.doubt}\u00a0MJ` };
}

const inMegajoules = (joules: number, system: UnitSystem): boolean =>
  system === "si" && Math.abs(joules) >= 1e7;

/** Which kind of point decides, and where: "last: on the axis, z 307"; for a spread when and in which stage. */
export function whereLine(answer: Answer, stages: readonly StageSpan[], system: UnitSystem): string {
  const { question, at } = answer;
  if (question.ask === "spread" && at !== null) return `at ${duration(at)}${stageWords(at, stages)}`;
  if (answer.place === null) return question.ask === "heat" ? heatWords(answer.value) : "";
  return `${deciding(question)}${place(answer.place, system)}`;
}

function deciding(question: Question): string {
  if (!("where" in question)) return "";
  return { "every-point": "last: ", "any-point": "first: " }[question.where] ?? "";
}

/** ", in Furnace"; nothing where there is one stage only. */
function stageWords(at: number, stages: readonly StageSpan[]): string {
  const stage = stages.findLast(({ began }) => began <= at);
  return stages.length < 2 || stage === undefined ? "" : `, in ${stage.name}`;
}

const heatWords = (value: number | null): string =>
  value === null || value === 0 ? "" : value < 0 ? "given off" : "taken up";

export interface EstimateLine {
  readonly habit: "lumped" | "series";
  readonly name: string;
  /** "2 h 52 min, "; "" when it cannot say */
  readonly value: string;
  /** "53 min early", "agrees", "cannot say" */
  readonly verdict: string;
  readonly unsafe: boolean;
}

/** One line per estimate the run has, in the order of the chart's key. */
export function estimateLines(
  answer: Answer,
  series: SeriesEstimate | null,
  hasLumped: boolean,
  system: UnitSystem,
): EstimateLine[] {
  const lines: EstimateLine[] = [];
  if (hasLumped) lines.push(estimateLine("lumped", ONE_TEMPERATURE, answer, system));
  if (series !== null) lines.push(estimateLine("series", seriesName(series.shape), answer, system));
  return lines;
}

/** The estimate is told to the same digits as the answer beside it. */
function estimateLine(
  habit: "lumped" | "series",
  name: string,
  { unit, numericalUncertainty, ...answer }: Answer,
  system: UnitSystem,
): EstimateLine {
  const value = answer[habit];
  const comparison = answer.comparison[habit];
  if (value === null) return { habit, name, value: "", verdict: "cannot say", unsafe: false };
  const shown = figureOf(unit, value, numericalUncertainty, system).text;
  if (comparison === null) return { habit, name, value: shown, verdict: "", unsafe: false };
  return {
    habit,
    name,
    value: `${shown}, `,
    verdict: offBy(unit, comparison, system),
    unsafe: comparison.side === "unsafe",
  };
}

/** By how much an estimate is out, in the words of the quantity: early and late, too hot and too cold, too little. */
export function offBy(
  unit: Answer["unit"],
  { difference: off, side }: Comparison,
  system: UnitSystem,
): string {
  if (side === "agrees") return "agrees";
  const size = Math.abs(off);
  switch (unit) {
    case "s":
      return `${span(size)} ${off < 0 ? "early" : "late"}`;
    case "degC":
      return `${kelvin(size, system)} too ${off > 0 ? "hot" : "cold"}`;
    case "K":
      return `${kelvin(size, system)} too ${off > 0 ? "much" : "little"}`;
    default:
      return `${figureOf(unit, Number(size.toPrecision(2)), null, system).text} too ${off > 0 ? "much" : "little"}`;
  }
}

/** How far a temperature is out: whole kelvin from ten on, tenths below. */
function kelvin(size: number, system: UnitSystem): string {
  const shown = toShown(size, "temperatureDifference", system);
  return joined(digits(shown, shown < 10 ? 1 : 0), shownUnit("temperatureDifference", system));
}

/** A difference of times: minutes from two minutes on, up to three hours. */
export function span(seconds: number): string {
  if (seconds < 120) return duration(seconds, seconds < 10 ? 0.1 : 1);
  if (seconds < 10_800) return `${digits(seconds / 60, seconds < 600 ? 1 : 0)}\u00a0min`;
  return duration(seconds);
}

// --- laying answers beside questions --------------------------------------------------------------------------------

/** Which dimension the fields of a question have. */
const DIMENSION: Readonly<Record<string, Dimension>> = {
  reaches: "temperature",
  from: "temperature",
  to: "temperature",
  level: "temperature",
  reference: "temperature",
  z: "temperatureDifference",
  until: "time",
};

/** A key that two questions share when they ask the same, whatever the units they were written in. */
export function questionKey(question: QuestionDocument | Question): string {
  const fields = Object.entries(question)
    .filter(([, value]) => value !== undefined)
    .map(([name, value]) => {
      const dimension =
        name === "at" ? (question.ask === "reading" ? "time" : "temperature") : DIMENSION[name];
      const si =
        dimension === undefined ? value : Number(siValue(value as string | number, dimension).toPrecision(9));
      return `${name}=${String(si)}`;
    });
  return fields.sort().join("&");
}

/** The answer to each question of the sheet: to the same question wherever it stood; else none. */
export function matchAnswers(
  questions: readonly QuestionDocument[],
  answers: readonly Answer[],
): (Answer | null)[] {
  const left = [...answers];
  return questions.map((question) => {
    const key = questionKey(question);
    const found = left.findIndex((answer) => questionKey(answer.question) === key);
    return found < 0 ? null : left.splice(found, 1)[0]!;
  });
}

/** What stood there before the running gesture: "was 3 h 46 min"; "" when nothing comparable did. */
export function wasWords(now: Answer | null, was: Answer | null, system: UnitSystem): string {
  if (was === null || was.value === null || was === now) return "";
  return `was ${figureOf(was.unit, was.value, null, system).text}`;
}

/** A value on the scale of the calliper: seconds for times, else the shown unit. */
export function onCalliper(unit: Answer["unit"], value: number | null, system: UnitSystem): number | null {
  if (value === null) return null;
  if (unit === "s" || unit === "min") return value;
  if (unit === "J" && inMegajoules(value, system)) return Math.abs(value) / 1e6;
  const dimension = (
    { degC: "temperature", K: "temperatureDifference", "K/s": "rate", J: "energy" } as const
  )[unit];
  return toShown(unit === "J" ? Math.abs(value) : value, dimension, system);
}

/** The doubt on the same scale: a difference, so without the offset of a temperature. */
export function doubtOnCalliper(
  unit: Answer["unit"],
  value: number,
  doubt: number | null,
  system: UnitSystem,
): number | null {
  if (doubt === null) return null;
  if (unit === "J")
    return onCalliper(unit, value, system)! * (doubt / Math.max(Math.abs(value), Number.MIN_VALUE));
  return onCalliper(unit === "degC" ? "K" : unit, doubt, system);
}
