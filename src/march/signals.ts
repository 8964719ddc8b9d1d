/** Signals: functions of time, piecewise linear and continuous, constant beyond their ends. */
import type { Signal } from "./types.ts";

export function signalAt({ times, values }: Signal, time: number): number {
  const last = times.length - 1;
  if (time <= times[0]!) return values[0]!;
  if (time >= times[last]!) return values[last]!;
  const left = leftKnot(times, time);
  const share = (time - times[left]!) / (times[left + 1]! - times[left]!);
  return values[left]! + share * (values[left + 1]! - values[left]!);
}

/** Exact integral over [0, time]. */
export function signalIntegral(signal: Signal, time: number): number {
  let sum = 0;
  let from = 0;
  let valueFrom = signalAt(signal, 0);
  for (const knot of signal.times) {
    if (knot <= 0) continue;
    if (knot >= time) break;
    const value = signalAt(signal, knot);
    sum += 0.5 * (knot - from) * (value + valueFrom);
    from = knot;
    valueFrom = value;
  }
  return sum + 0.5 * (time - from) * (valueFrom + signalAt(signal, time));
}

/** A corner of a signal after time 0: where it lies and by how much the slope changes there. */
export interface SlopeChange {
  readonly time: number;
  readonly change: number;
}

/** The signal over time > 0 as its value at 0 and its changes of slope; the slope at 0 counts as the first change. */
export function slopeChanges({ times, values }: Signal): SlopeChange[] {
  const changes: SlopeChange[] = [];
  let slope = 0;
  for (let k = 0; k < times.length; k++) {
    const after = k + 1 < times.length ? (values[k + 1]! - values[k]!) / (times[k + 1]! - times[k]!) : 0;
    if (times[k]! <= 0) {
      // What lies before 0 matters only by the slope that is left at 0.
      if (k + 1 < times.length && times[k + 1]! > 0) {
        if (after !== 0) changes.push({ time: 0, change: after });
        slope = after;
      }
    } else if (after !== slope) {
      changes.push({ time: times[k]!, change: after - slope });
      slope = after;
    }
  }
  return changes;
}

/** Knots of all signals strictly inside (0, duration), and the duration itself, ascending and distinct. */
export function knotsWithin(signals: readonly Signal[], duration: number): number[] {
  const knots = new Set<number>([duration]);
  for (const { times } of signals) for (const time of times) if (time > 0 && time < duration) knots.add(time);
  return [...knots].sort((a, b) => a - b);
}

/** Index of the last knot at or before `time`, which lies strictly inside the table. */
function leftKnot(times: Float64Array, time: number): number {
  let low = 0;
  let high = times.length - 1;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (times[middle]! <= time) low = middle;
    else high = middle;
  }
  return low;
}
