/** When a curve that can be asked at any instant passes a level. */

export type Going = "up" | "down";

/** Relative width to which the instant of an event is narrowed: far below any stated uncertainty. */
const EVENT_WIDTH = 1e-10;

export interface SampledCurve {
  /** instants, ascending, and the values there */
  readonly times: ArrayLike<number>;
  readonly values: ArrayLike<number>;
  /** the value at any instant between the first and the last */
  at(time: number): number;
}

/** Has a value reached the level, coming from above (down) or from below (up)? */
export const reached = (value: number, level: number, going: Going): boolean =>
  going === "down" ? value <= level : value >= level;

/**
 * First instant not before `from` at which the curve has reached the level; null when it never does. Passings between
 * two samples that leave both samples on the same side are not seen: sample finely enough.
 */
export function firstReached(curve: SampledCurve, level: number, going: Going, from?: number): number | null {
  const { times, values } = curve;
  let before = from ?? times[0]!;
  if (reached(curve.at(before), level, going)) return before;
  for (let i = 0; i < times.length; i++) {
    const time = times[i]!;
    if (time <= before) continue;
    if (reached(values[i]!, level, going)) return passing(curve, level, before, time);
    before = time;
  }
  return null;
}

/**
 * First instant at which the curve comes to the level from the other side: a part that starts below a level has
 * "fallen to" it only after it was above. Where it never was on the other side, as firstReached.
 */
export function firstComing(curve: SampledCurve, level: number, going: Going): number | null {
  const { times, values } = curve;
  for (let i = 0; i < times.length; i++)
    if (!reached(values[i]!, level, going))
      return firstReached(curve, level, going, times[i]!) ?? beforeAll(curve, level, going);
  return firstReached(curve, level, going);
}

/** Reached at the start and never again: the start is the answer. */
const beforeAll = (curve: SampledCurve, level: number, going: Going): number | null =>
  reached(curve.values[0]!, level, going) ? curve.times[0]! : null;

/** Total time that the curve spends at or above (`up`) or at or below (`down`) the level [s]. */
export function timeReached(curve: SampledCurve, level: number, going: Going): number {
  let total = 0;
  for (let i = 1; i < curve.times.length; i++) {
    const from = curve.times[i - 1]!;
    const to = curve.times[i]!;
    const first = reached(curve.values[i - 1]!, level, going);
    const last = reached(curve.values[i]!, level, going);
    if (first && last) total += to - from;
    else if (first !== last) {
      const at = passing(curve, level, from, to);
      total += first ? at - from : to - at;
    }
  }
  return total;
}

/**
 * The instant between two that lie on either side of the level, narrowed by false position with the Illinois
 * correction and halving as a safeguard, to EVENT_WIDTH of the way.
 */
export function passing(curve: SampledCurve, level: number, from: number, to: number): number {
  let a = from;
  let b = to;
  let fa = curve.at(a) - level;
  let fb = curve.at(b) - level;
  if (fa === 0) return a;
  if (fb === 0 || fa * fb > 0) return b;
  const width = EVENT_WIDTH * Math.max(Math.abs(from), Math.abs(to));
  for (let turn = 0; turn < 60 && b - a > width; turn++) {
    let middle = b - (fb * (b - a)) / (fb - fa);
    if (turn % 8 === 7 || !(middle > a && middle < b)) middle = (a + b) / 2;
    const f = curve.at(middle) - level;
    if (f === 0) return middle;
    if (f * fb < 0) {
      a = b;
      fa = fb;
    } else fa /= 2;
    b = middle;
    fb = f;
    if (a > b) [a, b, fa, fb] = [b, a, fb, fa];
  }
  return Math.abs(fa) < Math.abs(fb) ? a : b;
}
