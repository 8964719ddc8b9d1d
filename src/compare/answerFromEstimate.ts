/**
 * A question, answered by an estimate alone.
 *
 * An estimate knows a core, a mean, a surface and the place that follows first (the edge of a finite round, else the
 * surface); the one-temperature estimate has one curve for them all. The places of a question are read thus:
 *
 * | place        | read as                                                                                   |
 * | ------------ | ----------------------------------------------------------------------------------------- |
 * | every-point  | hottest while cooling, coldest while heating: the last to get there                        |
 * | any-point    | the other way round: the first to get there                                                |
 * | hottest      | hotter of core and edge at each instant                                                    |
 * | coldest      | colder of the two                                                                          |
 * | mean         | mean                                                                                       |
 * | surface-mean | surface                                                                                    |
 * | a probe      | the one temperature; the core for a probe that lies at the core; else the series is silent |
 */
import type { Question } from "../case/types.ts";
import {
  curveThrough,
  firstComing,
  firstReached,
  integrateOver,
  readCurve,
  slopeOfCurve,
  timeReached,
} from "./estimateCurve.ts";
import type { Going } from "../heat/crossings.ts";
import type { EstimateCurve, StageWindow } from "./estimateCurve.ts";
import type { LumpedEstimate, SeriesEstimate } from "./types.ts";

/** Curves of an estimate by place [degC] over one time [s]. */
export interface EstimateHistory {
  readonly time: Float64Array;
  readonly core: Float64Array;
  readonly mean: Float64Array;
  readonly surface: Float64Array;
  readonly edge: Float64Array;
  /** every place has the same temperature */
  readonly uniform: boolean;
}

export function historyOfLumped({ history }: LumpedEstimate): EstimateHistory {
  const { time, temperature } = history;
  return {
    time,
    core: temperature,
    mean: temperature,
    surface: temperature,
    edge: temperature,
    uniform: true,
  };
}

export function historyOfSeries({ history }: SeriesEstimate): EstimateHistory {
  return { ...history, edge: history.edge ?? history.surface, uniform: false };
}

/** What an answer needs beside the estimate. */
export interface PartContext {
  /** stages on the time of the case */
  readonly stages: readonly StageWindow[];
  /** rho c V [J/K], for the heat taken up */
  readonly heatCapacity: number;
  /** probes that lie where the part is slowest */
  readonly coreProbes: ReadonlySet<string>;
}

/** The answer of an estimate in the unit of the question; null where the estimate has none. */
export function answerFromEstimate(
  question: Question,
  history: EstimateHistory,
  context: PartContext,
): number | null {
  const track = (where: string, going: Going) => trackOf(history, where, going, context);
  switch (question.ask) {
    case "when": {
      const going = goingOf(question, history);
      const curve = track(question.where, going);
      if (!curve) return null;
      return question.going
        ? firstComing(curve, question.reaches, going)
        : firstReached(curve, question.reaches, going);
    }
    case "reading": {
      const curve = track(question.where, trendOf(history));
      return curve && question.at <= history.time.at(-1)! ? readCurve(curve, question.at) : null;
    }
    case "spread":
      return spreadOf(history, context.stages, question.stage);
    case "passage": {
      const going = question.from > question.to ? "down" : "up";
      return passageOf(track(question.where, going), question.from, question.to, going);
    }
    case "rate": {
      const going = goingTowards(history, question.at);
      const curve = track(question.where, going);
      const time = curve && firstReached(curve, question.at, going);
      return curve && time !== null ? slopeOfCurve(curve, time) : null;
    }
    case "held-above":
    case "held-below": {
      const going = question.ask === "held-above" ? "up" : "down";
      const curve = track(question.where, going);
      return curve && timeReached(curve, question.level, going);
    }
    case "dose": {
      const curve = track(question.where, "up");
      return curve && integrateOver(curve, (t) => 10 ** ((t - question.reference) / question.z)) / 60;
    }
    case "heat":
      return heatOf(history, context, question.until);
  }
}

/** Temperature of the estimate at the place of a question at an instant [degC]; null where it has none. */
export function readingOfEstimate(
  question: Question,
  history: EstimateHistory,
  time: number,
  context: PartContext,
): number | null {
  if (!("where" in question) || time > history.time.at(-1)!) return null;
  const curve = trackOf(history, question.where, goingOf(question, history), context);
  return curve && readCurve(curve, time);
}

/** Which way the question looks: as asked, towards its level from the start, or with the run. */
function goingOf(question: Question, history: EstimateHistory): Going {
  if (question.ask === "when") return question.going ?? goingTowards(history, question.reaches);
  if (question.ask === "rate") return goingTowards(history, question.at);
  if (question.ask === "passage") return question.from > question.to ? "down" : "up";
  if (question.ask === "held-below") return "down";
  return question.ask === "reading" ? trendOf(history) : "up";
}

function goingTowards(history: EstimateHistory, level: number): Going {
  return history.mean[0]! > level ? "down" : "up";
}

function trendOf({ mean }: EstimateHistory): Going {
  return mean.at(-1)! < mean[0]! ? "down" : "up";
}

function trackOf(
  history: EstimateHistory,
  where: string,
  going: Going,
  { stages, coreProbes }: PartContext,
): EstimateCurve | null {
  const values = valuesOf(history, where, going, coreProbes);
  return values && curveThrough(history.time, values, stages);
}

function valuesOf(
  history: EstimateHistory,
  where: string,
  going: Going,
  coreProbes: ReadonlySet<string>,
): Float64Array | null {
  const { core, edge, mean, surface } = history;
  const hottest = () => core.map((value, i) => Math.max(value, edge[i]!));
  const coldest = () => core.map((value, i) => Math.min(value, edge[i]!));
  switch (where) {
    case "every-point":
      return going === "down" ? hottest() : coldest();
    case "any-point":
      return going === "down" ? coldest() : hottest();
    case "hottest":
      return hottest();
    case "coldest":
      return coldest();
    case "mean":
      return mean;
    case "surface-mean":
      return surface;
    default:
      return history.uniform || coreProbes.has(where) ? core : null;
  }
}

function spreadOf(
  { time, core, edge }: EstimateHistory,
  stages: readonly StageWindow[],
  name: string | undefined,
): number | null {
  const stage = stages.find((window) => window.name === name);
  if (name !== undefined && stage === undefined) return null;
  const inside = (i: number) => stage === undefined || (time[i]! >= stage.began && time[i]! <= stage.ended);
  return core.reduce((most, value, i) => (inside(i) ? Math.max(most, Math.abs(value - edge[i]!)) : most), 0);
}

function passageOf(curve: EstimateCurve | null, from: number, to: number, going: Going): number | null {
  const first = curve && firstReached(curve, from, going);
  const last = curve && first !== null ? firstReached(curve, to, going, first) : null;
  return first !== null && last !== null ? last - first : null;
}

function heatOf(history: EstimateHistory, context: PartContext, until: number | undefined): number | null {
  const end = until ?? history.time.at(-1)!;
  if (end > history.time.at(-1)!) return null;
  const mean = curveThrough(history.time, history.mean, context.stages);
  return context.heatCapacity * (readCurve(mean, end) - history.mean[0]!);
}
