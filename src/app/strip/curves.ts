/** The curves of a result as lines to draw, and their values at an instant. */
import { line as drawLine } from "d3-shape";
import type { CaseResult } from "../../run/result.ts";
import { ONE_TEMPERATURE, seriesName } from "../controls/words.ts";
import type { Scales } from "./scales.ts";

export type Habit = "core" | "mean" | "skin" | "probe" | "series" | "lumped";

export interface Curve {
  readonly habit: Habit;
  readonly name: string;
  /** s, ascending */
  readonly time: Float64Array;
  /** degC */
  readonly values: Float64Array;
}

/** The curves in the order in which the reading at the cursor lists them. */
export function curvesOf(result: CaseResult): Curve[] {
  const { time, mean, surfaceMean, core, probes } = result.history;
  const { series, lumped } = result.estimates;
  const curves: Curve[] = [
    { habit: "core", name: "core", time, values: core.temperature },
    { habit: "mean", name: "mean", time, values: mean },
    { habit: "skin", name: "skin", time, values: surfaceMean },
  ];
  if (series !== null)
    curves.push({
      habit: "series",
      name: seriesName(series.shape),
      time: series.history.time,
      values: series.history.core,
    });
  if (lumped !== null)
    curves.push({
      habit: "lumped",
      name: ONE_TEMPERATURE,
      time: lumped.history.time,
      values: lumped.history.temperature,
    });
  for (const [name, values] of Object.entries(probes)) {
    const taken = curves.some((curve) => curve.habit !== "probe" && curve.name === name);
    curves.push({ habit: "probe", name: taken ? `${name}, probe` : name, time, values });
  }
  return curves;
}

/** Value at an instant, linear between the kept ones, held beyond the ends; NaN for an empty curve. */
export function valueAt(time: Float64Array, values: Float64Array, at: number): number {
  if (time.length === 0) return NaN;
  let low = 0;
  let high = time.length - 1;
  if (at <= time[0]!) return values[0]!;
  if (at >= time[high]!) return values[high]!;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (time[middle]! <= at) low = middle;
    else high = middle;
  }
  const share = (at - time[low]!) / (time[high]! - time[low]!);
  return values[low]! + share * (values[high]! - values[low]!);
}

/**
 * The first instant at which a curve passes a level in the given direction [s]; null when it never does. A curve that
 * is past the level from the start counts only once it has been on the other side.
 */
export function firstPassing(
  time: Float64Array,
  values: Float64Array,
  level: number,
  going: "up" | "down",
): number | null {
  const sign = going === "up" ? 1 : -1;
  for (let i = 1; i < time.length; i++) {
    const [before, now] = [sign * (values[i - 1]! - level), sign * (values[i]! - level)];
    if (before < 0 && now >= 0) return time[i - 1]! + (before / (before - now)) * (time[i]! - time[i - 1]!);
  }
  return null;
}

/** px of travel below which a point adds nothing to a line */
const FINEST = 0.6;

/** Points of a curve on the sheet (x, y pairs), without those that would fall on the one before. */
export function pointsOf(curve: Curve, scales: Scales): Float64Array {
  const points: number[] = [];
  let [lastX, lastY] = [-Infinity, -Infinity];
  for (let i = 0; i < curve.time.length; i++) {
    const [x, y] = [scales.x(curve.time[i]!), scales.y(curve.values[i]!)];
    const far = Math.abs(x - lastX) >= FINEST || Math.abs(y - lastY) >= FINEST;
    if (!far && i < curve.time.length - 1) continue;
    points.push(x, y);
    [lastX, lastY] = [x, y];
  }
  return Float64Array.from(points);
}

export function pathOf(points: Float64Array): string {
  const indices = Array.from({ length: points.length / 2 }, (_, i) => i);
  const path = drawLine<number>()
    .x((i) => points[2 * i]!)
    .y((i) => points[2 * i + 1]!)
    .digits(1);
  return path(indices) ?? "";
}

/** Points evenly along the way of a line, for marks and for telling where the sheet is crowded; every `apart` px. */
export function along(points: Float64Array, apart: number): Float64Array {
  const out: number[] = [];
  let left = apart / 2;
  for (let i = 2; i + 1 < points.length; i += 2) {
    const [x0, y0, x1, y1] = [points[i - 2]!, points[i - 1]!, points[i]!, points[i + 1]!];
    const length = Math.hypot(x1 - x0, y1 - y0);
    while (left <= length) {
      const share = left / length;
      out.push(x0 + share * (x1 - x0), y0 + share * (y1 - y0));
      left += apart;
    }
    left -= length;
  }
  return Float64Array.from(out);
}

/** Lowest and highest temperature [degC] of curves and of further values, for the scale. */
export function extent(curves: readonly Curve[], more: readonly number[]): [number, number] {
  let low = Infinity;
  let high = -Infinity;
  const take = (value: number): void => {
    if (!Number.isFinite(value)) return;
    low = Math.min(low, value);
    high = Math.max(high, value);
  };
  for (const curve of curves) curve.values.forEach(take);
  more.forEach(take);
  return low <= high ? [low, high] : [0, 100];
}
