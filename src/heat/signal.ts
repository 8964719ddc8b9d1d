/** Curves over time, added up and cut into straight pieces, for estimates that are exact on each piece. */
import type { Curve } from "../case/types.ts";
import { curveKnots, evaluateCurve } from "./curve.ts";

export interface WeightedCurve {
  readonly weight: number;
  readonly curve: Curve;
}

/** A stretch of time on which a signal is a straight line. */
export interface Piece {
  /** s */
  readonly from: number;
  readonly to: number;
  /** at `from` */
  readonly value: number;
  /** per s */
  readonly slope: number;
}

/** Sum of weight times curve, all over time: a curve that bends wherever one of them does; exact. */
export function addCurves(terms: readonly WeightedCurve[]): Curve {
  const sum = (time: number) =>
    terms.reduce((s, { weight, curve }) => s + weight * evaluateCurve(curve, time), 0);
  const knots = new Set(terms.flatMap(({ weight, curve }) => (weight === 0 ? [] : curveKnots(curve))));
  if (knots.size === 0) return sum(0);
  return { over: "time", points: [...knots].sort((a, b) => a - b).map((time) => [time, sum(time)] as const) };
}

/**
 * A curve over time cut into its straight pieces on [0, duration], in order; one piece when the duration is 0.
 *
 * @param duration  [s], 0 or more
 */
export function straightPieces(curve: Curve, duration: number): Piece[] {
  const inner = curveKnots(curve).filter((time) => time > 0 && time < duration);
  const cuts = [0, ...inner, duration];
  return cuts.slice(1).map((to, i) => {
    const from = cuts[i]!;
    const value = evaluateCurve(curve, from);
    const slope = to > from ? (evaluateCurve(curve, to) - value) / (to - from) : 0;
    return { from, to, value, slope };
  });
}
