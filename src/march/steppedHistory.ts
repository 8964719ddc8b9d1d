/**
 * History of implicit Euler: states and integrals at kept instants, straight lines between them. Steps are far
 * shorter than the field needs to be redrawn, so only as many states are kept as straight interpolation within a
 * share of the tolerance asks for; the integrals count every step.
 */
import { toOuter, type Numbering } from "../linalg/numbering.ts";
import { setHeld, type InnerSystem } from "./innerSystem.ts";
import { signalAt } from "./signals.ts";
import type { MarchFacts, StageHistory } from "./types.ts";

export class SteppedHistory {
  /** kept instants, with state and integral of each in the inner numbering */
  private readonly times: number[] = [];
  private readonly states: Float64Array[] = [];
  private readonly integrals: Float64Array[] = [];
  /** ends of all steps of the scheme (halves count singly) */
  private readonly stepEnds: number[] = [0];
  private readonly running: Float64Array;
  /** longest stretch from the last kept instant that a straight line may bridge */
  private reach = Infinity;
  private keepNextState = true;

  constructor(
    private readonly numbering: Numbering,
    system: InnerSystem,
    start: Float64Array,
  ) {
    this.running = new Float64Array(start.length);
    this.keep(0, setHeld(system.held, 0, start.slice()));
    this.keepNextState = true;
  }

  /**
   * Take note of a step from (time, u) by `halfway` to (endTime, next).
   *
   * @param spacing  stretch that a straight line may bridge at the curvature of this step [s]
   */
  add(
    time: number,
    u: Float64Array,
    endTime: number,
    spacing: number,
    step: number,
    halfway: Float64Array,
    next: Float64Array,
  ): void {
    const last = this.times[this.times.length - 1]!;
    const reach = Math.min(this.reach, spacing);
    if (time > last && (this.keepNextState || endTime - last > reach)) {
      this.keep(time, u.slice());
      this.keepNextState = false;
      this.reach = spacing;
    } else this.reach = reach;
    for (let i = 0; i < next.length; i++) this.running[i]! += 0.5 * step * (halfway[i]! + next[i]!);
    this.stepEnds.push(endTime - 0.5 * step, endTime);
  }

  /** The state reached last is to be kept: the field bends there. */
  keepNext(): void {
    this.keepNextState = true;
  }

  finish(time: number, u: Float64Array, facts: MarchFacts): StageHistory {
    const times = Float64Array.from([...this.times, ...(time > 0 ? [time] : [])]);
    const states = [...this.states, u.slice()];
    const integrals = [...this.integrals, this.running.slice()];
    const stepEnds = Float64Array.from(this.stepEnds);
    const { numbering } = this;
    return {
      times,
      facts,
      at(instant, out) {
        const left = intervalOf(times, instant);
        const right = Math.min(left + 1, times.length - 1);
        const share = right === left ? 0 : (instant - times[left]!) / (times[right]! - times[left]!);
        return blendToOuter(numbering, states[left]!, states[right]!, share, out);
      },
      integral: (instant, out) => toOuter(numbering, integrals[computedInstant(times, instant)]!, out),
      signalIntegral(signal, instant) {
        let sum = 0;
        for (let k = 1; k < stepEnds.length && stepEnds[k]! <= instant; k++)
          sum += (stepEnds[k]! - stepEnds[k - 1]!) * signalAt(signal, stepEnds[k]!);
        return sum;
      },
    };
  }

  private keep(time: number, state: Float64Array): void {
    this.times.push(time);
    this.states.push(state);
    this.integrals.push(this.running.slice());
  }
}

/** Index of the interval of ascending `times` that holds `instant`; instants outside belong to the nearest end. */
export function intervalOf(times: Float64Array, instant: number): number {
  let low = 0;
  let high = times.length - 1;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (times[middle]! <= instant) low = middle;
    else high = middle;
  }
  return high > low && instant >= times[high]! ? high : low;
}

/** @throws when `instant` is none of `times`: integrals in the sense of a scheme exist at its own instants only */
export function computedInstant(times: Float64Array, instant: number): number {
  const index = intervalOf(times, instant);
  if (times[index] !== instant) throw new Error(`${instant} s is not an instant that the scheme computed`);
  return index;
}

function blendToOuter(
  { outerOf }: Numbering,
  left: Float64Array,
  right: Float64Array,
  share: number,
  out: Float64Array,
): Float64Array {
  for (let i = 0; i < outerOf.length; i++) out[outerOf[i]!] = left[i]! + share * (right[i]! - left[i]!);
  return out;
}
