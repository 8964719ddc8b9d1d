/** A curve of an estimate, read between its instants by cubics that keep their sense, stage by stage. */

import {
  firstComing as firstComingOf,
  firstReached as firstOf,
  timeReached as totalOf,
} from "../heat/crossings.ts";
import type { Going, SampledCurve } from "../heat/crossings.ts";

/** One stage on the time of the case [s]. */
export interface StageWindow {
  readonly name: string;
  readonly began: number;
  readonly ended: number;
}

export interface EstimateCurve {
  readonly time: Float64Array;
  readonly values: Float64Array;
  /** slopes to the right and to the left of each instant: they differ where a stage ends */
  readonly after: Float64Array;
  readonly before: Float64Array;
}

/**
 * Lays cubics through the instants. Slopes come from the parabola through three instants, limited so that the cubic
 * never leaves the range of its two ends (Fritsch and Carlson, SIAM J. Numer. Anal. 17 (1980) 238, from memory); a
 * stage boundary is a bend and is left one.
 */
export function curveThrough(
  time: Float64Array,
  values: Float64Array,
  stages: readonly StageWindow[],
): EstimateCurve {
  const bends = new Set(stages.map((stage) => stage.ended));
  const [after, before] = [new Float64Array(time.length), new Float64Array(time.length)];
  const secant = (i: number) => (values[i + 1]! - values[i]!) / (time[i + 1]! - time[i]!);
  const isEnd = (i: number) => i === 0 || i === time.length - 1 || bends.has(time[i]!);
  for (let i = 0; i < time.length; i++)
    if (!isEnd(i)) after[i] = before[i] = innerSlope(time, i, secant(i - 1), secant(i));
  // ends and bends: the parabola that fits the next slope inward, or the chord between two of them
  for (let i = 0; i < time.length; i++) {
    if (!isEnd(i)) continue;
    if (i + 1 < time.length) after[i] = endSlope(secant(i), isEnd(i + 1) ? null : after[i + 1]!);
    if (i > 0) before[i] = endSlope(secant(i - 1), isEnd(i - 1) ? null : before[i - 1]!);
  }
  return { time, values, after, before };
}

/** Slope at the end of an interval of which the other end's is known. */
function endSlope(chord: number, other: number | null): number {
  const slope = other === null ? chord : 2 * chord - other;
  return slope * chord <= 0 ? 0 : Math.sign(chord) * Math.min(Math.abs(slope), 3 * Math.abs(chord));
}

function innerSlope(time: Float64Array, i: number, left: number, right: number): number {
  if (left * right <= 0) return 0;
  const [a, b] = [time[i]! - time[i - 1]!, time[i + 1]! - time[i]!];
  const slope = (left * b + right * a) / (a + b);
  return Math.sign(slope) * Math.min(Math.abs(slope), 3 * Math.abs(left), 3 * Math.abs(right));
}

/** Value at an instant; held beyond the ends. */
export function readCurve(curve: EstimateCurve, time: number): number {
  const i = intervalOf(curve.time, time);
  const [t0, t1] = [curve.time[i]!, curve.time[i + 1]!];
  if (time <= t0) return curve.values[i]!;
  if (time >= t1) return curve.values[i + 1]!;
  const h = t1 - t0;
  const x = (time - t0) / h;
  const [y0, y1] = [curve.values[i]!, curve.values[i + 1]!];
  const bend = (1 - x) * (1 - x) * x * h * curve.after[i]! - x * x * (1 - x) * h * curve.before[i + 1]!;
  return y0 + (y1 - y0) * x * x * (3 - 2 * x) + bend;
}

/** Slope at an instant [per s]. */
export function slopeOfCurve(curve: EstimateCurve, time: number): number {
  const i = intervalOf(curve.time, time);
  const [t0, t1] = [curve.time[i]!, curve.time[i + 1]!];
  const h = t1 - t0;
  const x = Math.min(1, Math.max(0, (time - t0) / h));
  const rise = (curve.values[i + 1]! - curve.values[i]!) / h;
  return (
    6 * rise * x * (1 - x) + curve.after[i]! * (1 - x) * (1 - 3 * x) + curve.before[i + 1]! * x * (3 * x - 2)
  );
}

/** The curve as the search for levels takes it. */
const sampled = (curve: EstimateCurve): SampledCurve => ({
  times: curve.time,
  values: curve.values,
  at: (time) => readCurve(curve, time),
});

/** First instant not before `from` at which the level is reached; null when it never is. */
export const firstReached = (curve: EstimateCurve, level: number, going: Going, from = 0): number | null =>
  firstOf(sampled(curve), level, going, from);

/** First instant at which the level is come to from the other side; as firstReached where it never was there. */
export const firstComing = (curve: EstimateCurve, level: number, going: Going): number | null =>
  firstComingOf(sampled(curve), level, going);

/** Seconds spent at or beyond the level. */
export const timeReached = (curve: EstimateCurve, level: number, going: Going): number =>
  totalOf(sampled(curve), level, going);

/** Integral of a function of the temperature over the whole run, by Simpson's rule between instants. */
export function integrateOver(curve: EstimateCurve, f: (temperature: number) => number): number {
  let total = 0;
  for (let i = 1; i < curve.time.length; i++) {
    const [from, to] = [curve.time[i - 1]!, curve.time[i]!];
    const middle = f(readCurve(curve, (from + to) / 2));
    total += ((to - from) * (f(curve.values[i - 1]!) + 4 * middle + f(curve.values[i]!))) / 6;
  }
  return total;
}

/** i with time[i] <= t < time[i + 1], the first or last interval beyond the ends. */
function intervalOf(times: Float64Array, time: number): number {
  let [low, high] = [0, times.length - 1];
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (times[middle]! <= time) low = middle;
    else high = middle;
  }
  return low;
}
