/** The questions of a case, answered from its run: exact instants are sought on the dense field, not between samples. */
import type { Question } from "../case/types.ts";
import { firstComing, firstReached, timeReached } from "../heat/crossings.ts";
import type { Going, SampledCurve } from "../heat/crossings.ts";
import { goingFrom } from "./marchStages.ts";
import { heatWeights } from "./ledger.ts";
import type { Answer, History } from "./result.ts";
import type { PartSystem } from "./partSystem.ts";
import { fieldAt } from "./timeline.ts";
import type { Timeline } from "./timeline.ts";
import { dot, trackFor } from "./tracks.ts";
import type { Track, Tracks } from "./tracks.ts";

/** What the field alone says: the answer before estimates and uncertainty are laid beside it. */
export interface FieldAnswer {
  readonly question: Question;
  readonly value: number | null;
  readonly unit: Answer["unit"];
  readonly at: number | null;
  readonly place: readonly [number, number] | null;
  /** K/s of the asked track at that instant: turns kelvin into seconds; 0 where it has no meaning */
  readonly slope: number;
  readonly remark: string;
}

/** All that answering needs. */
export interface Asked {
  readonly part: PartSystem;
  readonly tracks: Tracks;
  readonly timeline: Timeline;
  readonly history: History;
}

export function answerQuestion(question: Question, asked: Asked): FieldAnswer {
  switch (question.ask) {
    case "when":
      return answerWhen(question, asked);
    case "reading":
      return answerReading(question, asked);
    case "spread":
      return answerSpread(question, asked);
    case "passage":
      return answerPassage(question, asked);
    case "rate":
      return answerRate(question, asked);
    case "held-above":
    case "held-below":
      return answerHeld(question, asked);
    case "dose":
      return answerDose(question, asked);
    case "heat":
      return answerHeat(question, asked);
  }
}

type Of<Ask extends Question["ask"]> = Extract<Question, { ask: Ask }>;
const SECOND_SHARE = 1e-6;

/** The curve of a track: sampled values where the history has them, the dense field in between. */
function curveOf({ timeline, history, tracks }: Asked, track: Track): SampledCurve {
  const field = new Float64Array(timeline.size);
  const at = (time: number): number => track.of(fieldAt(timeline, time, field));
  return { times: history.time, values: sampled(history, tracks, track), at };
}

function sampled(history: History, tracks: Tracks, track: Track): Float64Array {
  if (track === tracks.coldest) return history.coldest;
  if (track === tracks.hottest) return history.hottest;
  if (track === tracks.mean) return history.mean;
  if (track === tracks.surfaceMean) return history.surfaceMean;
  return history.probes[track.name]!;
}

/** Slope of a track at an instant, from the dense field a millionth of the run to either side [K/s]. */
function slopeAt(curve: SampledCurve, time: number): number {
  const end = curve.times[curve.times.length - 1]!;
  const step = SECOND_SHARE * end;
  const from = Math.max(0, time - step);
  const to = Math.min(end, time + step);
  return to > from ? (curve.at(to) - curve.at(from)) / (to - from) : 0;
}

const placeAt = ({ timeline }: Asked, track: Track, time: number): readonly [number, number] | null =>
  track.placeOf(fieldAt(timeline, time, new Float64Array(timeline.size)));

/** Which way a level is approached: as asked, else from where the place stands at the start. */
function goingTo(asked: Asked, where: string, level: number, given?: Going): Going {
  if (given) return given;
  const named = asked.tracks.probes.get(where);
  return goingFrom(named ? named.of(asked.part.start) : asked.history.mean[0]!, level);
}

function answerWhen(question: Of<"when">, asked: Asked): FieldAnswer {
  const going = goingTo(asked, question.where, question.reaches, question.going);
  const track = trackFor(asked.tracks, question.where, going);
  const curve = curveOf(asked, track);
  const time = question.going
    ? firstComing(curve, question.reaches, going)
    : firstReached(curve, question.reaches, going);
  if (time === null) return unanswered(question, "s", notReached(curve, going));
  return {
    question,
    value: time,
    unit: "s",
    at: time,
    place: placeAt(asked, track, time),
    slope: slopeAt(curve, time),
    remark: time === 0 ? "It is there from the start." : "",
  };
}

function notReached(curve: SampledCurve, going: Going): string {
  const last = curve.values[curve.values.length - 1]!;
  const nearest = Array.from(curve.values).reduce((best, value) =>
    going === "down" ? Math.min(best, value) : Math.max(best, value),
  );
  const words = nearest === last ? "" : `, the nearest it came was ${nearest.toFixed(1)}`;
  return `It does not get there within the stages given: at the end it is at ${last.toFixed(1)} degC${words}. Give the last stage more time, or ask for another level.`;
}

const unanswered = (question: Question, unit: Answer["unit"], remark: string): FieldAnswer => ({
  question,
  value: null,
  unit,
  at: null,
  place: null,
  slope: 0,
  remark,
});

function answerReading(question: Of<"reading">, asked: Asked): FieldAnswer {
  const { timeline, history } = asked;
  if (question.at > timeline.ended)
    return unanswered(
      question,
      "degC",
      `The case ends at ${timeline.ended.toFixed(1)} s, before the instant asked for.`,
    );
  const going: Going = history.mean.at(-1)! < history.mean[0]! ? "down" : "up";
  const track = trackFor(asked.tracks, question.where, going);
  const curve = curveOf(asked, track);
  return {
    question,
    value: curve.at(question.at),
    unit: "degC",
    at: question.at,
    place: placeAt(asked, track, question.at),
    slope: slopeAt(curve, question.at),
    remark: "",
  };
}

/** Largest hottest minus coldest: the best sample, then golden-section search between its neighbours. */
function answerSpread(question: Of<"spread">, asked: Asked): FieldAnswer {
  const { timeline, history, tracks } = asked;
  const stage = timeline.stages.find((run) => run.name === question.stage);
  if (question.stage !== undefined && !stage)
    return unanswered(question, "K", `The run did not get to stage "${question.stage}".`);
  const from = stage?.began ?? 0;
  const to = stage?.ended ?? timeline.ended;
  let best = -1;
  for (let i = 0; i < history.time.length; i++) {
    if (history.time[i]! < from || history.time[i]! > to) continue;
    if (best < 0 || spreadIn(history, i) > spreadIn(history, best)) best = i;
  }
  const field = new Float64Array(timeline.size);
  const spread = (time: number): number => {
    fieldAt(timeline, time, field);
    return tracks.hottest.of(field) - tracks.coldest.of(field);
  };
  const low = Math.max(from, history.time[Math.max(0, best - 1)]!);
  const high = Math.min(to, history.time[Math.min(history.time.length - 1, best + 1)]!);
  const at = highest(spread, low, high);
  fieldAt(timeline, at, field);
  const direction = history.mean.at(-1)! < history.mean[0]! ? tracks.hottest : tracks.coldest;
  return {
    question,
    value: spread(at),
    unit: "K",
    at,
    place: direction.placeOf(field),
    slope: 0,
    remark: "",
  };
}

const spreadIn = (history: History, i: number): number => history.hottest[i]! - history.coldest[i]!;

/** Place of the maximum of a function with one hump between two instants, to 1e-6 of the way. */
function highest(f: (time: number) => number, from: number, to: number): number {
  const golden = (Math.sqrt(5) - 1) / 2;
  let [a, b] = [from, to];
  let [x, y] = [b - golden * (b - a), a + golden * (b - a)];
  let [fx, fy] = [f(x), f(y)];
  while (b - a > 1e-6 * (to - from)) {
    if (fx >= fy) {
      [b, y, fy] = [y, x, fx];
      x = b - golden * (b - a);
      fx = f(x);
    } else {
      [a, x, fx] = [x, y, fy];
      y = a + golden * (b - a);
      fy = f(y);
    }
  }
  return [from, (a + b) / 2, to].reduce((best, time) => (f(time) > f(best) ? time : best));
}

function answerPassage(question: Of<"passage">, asked: Asked): FieldAnswer {
  const going: Going = question.from > question.to ? "down" : "up";
  const track = trackFor(asked.tracks, question.where, going);
  const curve = curveOf(asked, track);
  const first = firstReached(curve, question.from, going);
  const last = first === null ? null : firstReached(curve, question.to, going, first);
  if (first === null || last === null) return unanswered(question, "s", notReached(curve, going));
  return {
    question,
    value: last - first,
    unit: "s",
    at: last,
    place: placeAt(asked, track, last),
    slope: slopeAt(curve, last),
    remark: "",
  };
}

function answerRate(question: Of<"rate">, asked: Asked): FieldAnswer {
  const going = goingTo(asked, question.where, question.at);
  const track = trackFor(asked.tracks, question.where, going);
  const curve = curveOf(asked, track);
  const time = firstReached(curve, question.at, going);
  if (time === null) return unanswered(question, "K/s", notReached(curve, going));
  return {
    question,
    value: slopeAt(curve, time),
    unit: "K/s",
    at: time,
    place: placeAt(asked, track, time),
    slope: 0,
    remark: "",
  };
}

/** Every point is above a level while the coldest is; some point is while the hottest is. */
function answerHeld(question: Of<"held-above" | "held-below">, asked: Asked): FieldAnswer {
  const going: Going = question.ask === "held-above" ? "up" : "down";
  const track = trackFor(asked.tracks, question.where, going);
  const curve = curveOf(asked, track);
  const seconds = timeReached(curve, question.level, going);
  return { question, value: seconds, unit: "s", at: null, place: null, slope: 0, remark: "" };
}

/**
 * Equivalent minutes at the reference temperature, integral of 10^((T - reference) / z) dt. Summed at every unknown, so
 * that the place with the least (every-point, coldest) or the most (any-point, hottest) dose is found in the whole field.
 * Between kept instants Simpson's rule with the dense field in the middle.
 */
function answerDose(question: Of<"dose">, asked: Asked): FieldAnswer {
  const { history, tracks, part } = asked;
  const { reference, z, where } = question;
  const lethality = (temperature: number): number => 10 ** ((temperature - reference) / z) / 60;
  const base = { question, unit: "min", at: null, slope: 0, remark: "" } as const;
  if (where === "mean" || where === "surface-mean" || tracks.probes.has(where)) {
    const curve = curveOf(asked, trackFor(tracks, where, "up"));
    const value = simpson(history.time, (time) => lethality(curve.at(time)));
    return { ...base, value, place: tracks.probes.get(where)?.placeOf(part.start) ?? null };
  }
  const dose = doseField(asked, lethality);
  const least = where === "every-point" || where === "coldest";
  let best = 0;
  for (let i = 1; i < dose.length; i++) if (least ? dose[i]! < dose[best]! : dose[i]! > dose[best]!) best = i;
  return { ...base, value: dose[best]!, place: [part.mesh.nodes[2 * best]!, part.mesh.nodes[2 * best + 1]!] };
}

function doseField({ timeline, history }: Asked, lethality: (temperature: number) => number): Float64Array {
  const dose = new Float64Array(timeline.size);
  const field = new Float64Array(timeline.size);
  const add = (time: number, weight: number): void => {
    fieldAt(timeline, time, field);
    for (let i = 0; i < dose.length; i++) dose[i]! += weight * lethality(field[i]!);
  };
  for (let i = 1; i < history.time.length; i++) {
    const [from, to] = [history.time[i - 1]!, history.time[i]!];
    add(from, (to - from) / 6);
    add((from + to) / 2, (4 * (to - from)) / 6);
    add(to, (to - from) / 6);
  }
  return dose;
}

function simpson(times: Float64Array, f: (time: number) => number): number {
  let total = 0;
  for (let i = 1; i < times.length; i++) {
    const [from, to] = [times[i - 1]!, times[i]!];
    total += ((to - from) / 6) * (f(from) + 4 * f((from + to) / 2) + f(to));
  }
  return total;
}

function answerHeat(question: Of<"heat">, asked: Asked): FieldAnswer {
  const { timeline, part } = asked;
  const at = question.until ?? timeline.ended;
  if (at > timeline.ended)
    return unanswered(
      question,
      "J",
      `The case ends at ${timeline.ended.toFixed(1)} s, before the instant asked for.`,
    );
  const weights = heatWeights(part);
  const field = fieldAt(timeline, at, new Float64Array(timeline.size));
  return {
    question,
    value: dot(weights, field) - dot(weights, part.start),
    unit: "J",
    at,
    place: null,
    slope: 0,
    remark: "",
  };
}

/** Instants that questions name, so that the march is right there and the curves have them. */
export function instantsAsked(questions: readonly Question[]): number[] {
  return questions.flatMap((question) => {
    if (question.ask === "reading") return [question.at];
    return question.ask === "heat" && question.until !== undefined ? [question.until] : [];
  });
}
