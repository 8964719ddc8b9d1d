/** One estimate beside one answer of the field: how far off, in which unit, and on which side. */
import type { Question } from "../case/types.ts";
import {
  answerFromEstimate,
  historyOfLumped,
  historyOfSeries,
  readingOfEstimate,
} from "./answerFromEstimate.ts";
import type { EstimateHistory, PartContext } from "./answerFromEstimate.ts";
import { AGREEMENT } from "./defaults.ts";
import type { Comparison, Estimates } from "./types.ts";

/** The field's answer, as far as a comparison needs it. */
export interface FieldReading {
  readonly value: number | null;
  /** s from the start of the case; null where that has no meaning */
  readonly at: number | null;
  /** K/s of the asked place at that instant; 0 where it has no meaning */
  readonly slope: number;
  /** in the unit of the value; null when not known */
  readonly numericalUncertainty: number | null;
}

export interface ComparisonContext extends PartContext {
  /** K between the extremes of start and surroundings: what temperatures are measured against */
  readonly span: number;
}

/** Both estimates beside an answer. */
export interface EstimatedAnswer {
  readonly lumped: number | null;
  readonly series: number | null;
  readonly comparison: { readonly lumped: Comparison | null; readonly series: Comparison | null };
}

/** Answers a question by both estimates and compares each with the field. */
export function answerByEstimates(
  question: Question,
  field: FieldReading,
  estimates: Estimates,
  context: ComparisonContext,
): EstimatedAnswer {
  const beside = (history: EstimateHistory | null) => {
    if (history === null) return { value: null, comparison: null };
    const value = answerFromEstimate(question, history, context);
    const there = field.at === null ? null : readingOfEstimate(question, history, field.at, context);
    return { value, comparison: compareAnswer(question, field, value, there, context.span) };
  };
  const lumped = beside(estimates.lumped && historyOfLumped(estimates.lumped));
  const series = beside(estimates.series && historyOfSeries(estimates.series));
  return {
    lumped: lumped.value,
    series: series.value,
    comparison: { lumped: lumped.comparison, series: series.comparison },
  };
}

/**
 * Compares one value of an estimate with the field's answer.
 *
 * An estimate errs on the unsafe side when it runs ahead of the part: it is early, its temperature is further on, it
 * cools or heats faster, it promises more time at temperature, more dose or more heat, or a smaller spread. Within the
 * numerical uncertainty or half a percent (of the answer, for temperatures of the span) it agrees.
 *
 * @param estimate             in the unit of the answer; null when the estimate has none
 * @param estimateTemperature  of the estimate at the field's instant, for the difference in K [degC]; null if unknown
 * @param span                 K between the extremes of start and surroundings, positive
 */
export function compareAnswer(
  question: Question,
  field: FieldReading,
  estimate: number | null,
  estimateTemperature: number | null,
  span: number,
): Comparison | null {
  if (estimate === null || field.value === null) return null;
  const difference = estimate - field.value;
  const tolerance = Math.max(
    field.numericalUncertainty ?? 0,
    AGREEMENT * scaleOf(question, field.value, span),
  );
  const side =
    Math.abs(difference) <= tolerance ? "agrees" : runsAhead(question, field, estimate) ? "unsafe" : "safe";
  const share = shareOff(question, field.value, difference, span);
  return { difference, ...inOtherUnits(question, field, difference, estimateTemperature), share, side };
}

function shareOff(question: Question, value: number, difference: number, span: number): number {
  const scale = scaleOf(question, value, span);
  return scale > 0 ? Math.abs(difference) / scale : difference === 0 ? 0 : Infinity;
}

function scaleOf(question: Question, value: number, span: number): number {
  return question.ask === "reading" || question.ask === "spread" ? span : Math.abs(value);
}

function runsAhead(question: Question, { value, slope }: FieldReading, estimate: number): boolean {
  const difference = estimate - value!;
  switch (question.ask) {
    case "when":
    case "passage":
    case "spread":
      return difference < 0;
    case "reading":
      // a part that stands still has no ahead: whatever differs there counts as unsafe
      return slope === 0 || difference * slope > 0;
    case "rate":
    case "heat":
      return Math.abs(estimate) > Math.abs(value!);
    case "held-above":
    case "held-below":
    case "dose":
      return difference > 0;
  }
}

/** The difference as a temperature at the field's instant, and as a time at the field's temperature. */
function inOtherUnits(
  question: Question,
  { slope, at }: FieldReading,
  difference: number,
  estimateTemperature: number | null,
): { kelvin: number | null; seconds: number | null } {
  switch (question.ask) {
    case "when":
      return {
        kelvin: estimateTemperature === null ? null : estimateTemperature - question.reaches,
        seconds: difference,
      };
    case "reading":
      // ahead in temperature is early in time
      return { kelvin: difference, seconds: asTime(difference, slope, at) };
    case "spread":
      return { kelvin: difference, seconds: null };
    case "passage":
    case "held-above":
    case "held-below":
      return { kelvin: null, seconds: difference };
    case "rate":
    case "dose":
    case "heat":
      return { kelvin: null, seconds: null };
  }
}

/**
 * A difference of readings as a time, by the slope there. None where the part hardly moves: a time longer than the part
 * has been under way says nothing.
 */
function asTime(kelvin: number, slope: number, at: number | null): number | null {
  if (slope === 0 || at === null) return null;
  const seconds = -kelvin / slope;
  return Math.abs(seconds) <= at ? seconds : null;
}
