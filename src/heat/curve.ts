/** Curves of the case: constants and piecewise linear tables, held constant beyond their ends. */
import type { Curve } from "../case/types.ts";

/**
 * Value of a curve at `x` (a temperature in degC or a time in s, as the curve says; a constant ignores it).
 * A table is held constant beyond its ends: it saturates, it never extrapolates.
 *
 * @throws RangeError when the table is empty or `x` is not a number
 */
export function evaluateCurve(curve: Curve, x: number): number {
  if (typeof curve === "number") return curve;
  const { points } = curve;
  if (points.length === 0 || Number.isNaN(x))
    throw new RangeError(`A table with ${points.length} points has no value at ${x}`);
  if (x <= points[0]![0]) return points[0]![1];
  const last = points[points.length - 1]!;
  if (x >= last[0]) return last[1];
  const i = segmentOf(points, x);
  const [x0, y0] = points[i]!;
  const [x1, y1] = points[i + 1]!;
  return y0 + ((y1 - y0) * (x - x0)) / (x1 - x0);
}

/** Whether a curve has one value everywhere. */
export function isConstant(curve: Curve): boolean {
  return typeof curve === "number" || curve.points.every((point) => point[1] === curve.points[0]![1]);
}

/** Places where a curve bends: the x of its points; none for a constant. */
export function curveKnots(curve: Curve): readonly number[] {
  return typeof curve === "number" ? [] : curve.points.map((point) => point[0]);
}

/**
 * Mean of a curve over [from, to], exact for a table (in either order of the ends; the value itself when they meet).
 * Used where an estimate needs one conductivity or heat capacity for a range of temperatures.
 */
export function meanOfCurve(curve: Curve, from: number, to: number): number {
  if (typeof curve === "number" || from === to) return evaluateCurve(curve, from);
  const [low, high] = from < to ? [from, to] : [to, from];
  const cuts = [low, ...curveKnots(curve).filter((x) => x > low && x < high), high];
  let integral = 0;
  for (let i = 1; i < cuts.length; i++) {
    const [a, b] = [cuts[i - 1]!, cuts[i]!];
    integral += ((b - a) * (evaluateCurve(curve, a) + evaluateCurve(curve, b))) / 2;
  }
  return integral / (high - low);
}

/** Index i with points[i].x <= x < points[i + 1].x, for x strictly inside the table. */
function segmentOf(points: readonly (readonly [number, number])[], x: number): number {
  let low = 0;
  let high = points.length - 1;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (points[middle]![0] <= x) low = middle;
    else high = middle;
  }
  return low;
}
