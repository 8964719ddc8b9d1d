/**
 * History of TR-BDF2: every step is redrawn by the parabola through its beginning, middle and end. Of the middle value
 * only the distance from the straight line is stored, in single precision: it is small, so that nothing is lost that
 * the scheme had.
 */
import { toOuter, type Numbering } from "../linalg/numbering.ts";
import { signalAt } from "./signals.ts";
import { computedInstant, intervalOf } from "./steppedHistory.ts";
import { GAMMA, STEP_WEIGHTS } from "./trBdf2Weights.ts";
import type { MarchFacts, Signal, StageHistory } from "./types.ts";

export class TrBdf2History {
  private readonly times: number[] = [0];
  private readonly states: Float64Array[];
  /** middle value less the straight line there, per step */
  private readonly bulges: Float32Array[] = [];

  constructor(
    private readonly numbering: Numbering,
    start: Float64Array,
  ) {
    this.states = [start.slice()];
  }

  add(endTime: number, middle: Float64Array, next: Float64Array): void {
    const from = this.states[this.states.length - 1]!;
    const bulge = new Float32Array(next.length);
    for (let i = 0; i < next.length; i++) bulge[i] = middle[i]! - (1 - GAMMA) * from[i]! - GAMMA * next[i]!;
    this.times.push(endTime);
    this.states.push(next.slice());
    this.bulges.push(bulge);
  }

  finish(facts: MarchFacts): StageHistory {
    return new Parabolas(
      this.numbering,
      Float64Array.from(this.times),
      [...this.states],
      [...this.bulges],
      facts,
    );
  }
}

class Parabolas implements StageHistory {
  private readonly inner: Float64Array;
  /** integral up to the step that was asked last: callers go forward in time */
  private summed = 0;
  private sum: Float64Array;

  constructor(
    private readonly numbering: Numbering,
    readonly times: Float64Array,
    private readonly states: readonly Float64Array[],
    private readonly bulges: readonly Float32Array[],
    readonly facts: MarchFacts,
  ) {
    this.inner = new Float64Array(states[0]!.length);
    this.sum = new Float64Array(states[0]!.length);
  }

  at(time: number, out: Float64Array): Float64Array {
    const step = Math.min(intervalOf(this.times, time), this.bulges.length - 1);
    if (step < 0) return toOuter(this.numbering, this.states[0]!, out);
    const share = (time - this.times[step]!) / (this.times[step + 1]! - this.times[step]!);
    // 1 in the middle of the step as the scheme has it, 0 at both ends
    const rise = (share * (1 - share)) / (GAMMA * (1 - GAMMA));
    const { inner } = this;
    const from = this.states[step]!;
    const to = this.states[step + 1]!;
    const bulge = this.bulges[step]!;
    for (let i = 0; i < inner.length; i++)
      inner[i] = from[i]! + share * (to[i]! - from[i]!) + rise * bulge[i]!;
    return toOuter(this.numbering, inner, out);
  }

  integral(time: number, out: Float64Array): Float64Array {
    const steps = computedInstant(this.times, time);
    if (steps < this.summed) {
      this.sum.fill(0);
      this.summed = 0;
    }
    for (; this.summed < steps; this.summed++) this.addStep(this.summed);
    return toOuter(this.numbering, this.sum, out);
  }

  signalIntegral(signal: Signal, time: number): number {
    const [begin, middle, end] = STEP_WEIGHTS;
    let sum = 0;
    for (let k = 0; k + 1 < this.times.length && this.times[k + 1]! <= time; k++) {
      const from = this.times[k]!;
      const step = this.times[k + 1]! - from;
      sum += step * (begin * signalAt(signal, from) + middle * signalAt(signal, from + GAMMA * step));
      sum += step * end * signalAt(signal, this.times[k + 1]!);
    }
    return sum;
  }

  private addStep(step: number): void {
    const [begin, middle, end] = STEP_WEIGHTS;
    const length = this.times[step + 1]! - this.times[step]!;
    const from = this.states[step]!;
    const to = this.states[step + 1]!;
    const bulge = this.bulges[step]!;
    for (let i = 0; i < from.length; i++) {
      const halfway = (1 - GAMMA) * from[i]! + GAMMA * to[i]! + bulge[i]!;
      this.sum[i]! += length * (begin * from[i]! + middle * halfway + end * to[i]!);
    }
  }
}
