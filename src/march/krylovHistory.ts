/** The history of a Krylov march: any instant is a combination of basis vectors. */
import { toOuter, type Numbering } from "../linalg/numbering.ts";
import { setHeld, type InnerSystem } from "./innerSystem.ts";
import type { KrylovAnswer } from "./krylovBasis.ts";
import { signalIntegral } from "./signals.ts";
import type { MarchFacts, Signal, StageHistory } from "./types.ts";

/** Answers that hold from one instant to another; all of them count from time 0. */
export interface KrylovSpan {
  readonly from: number;
  readonly to: number;
  readonly answers: readonly KrylovAnswer[];
}

/** What the error was estimated to be at an instant. */
export interface InstantError {
  readonly time: number;
  readonly error: number;
}

export class KrylovHistory implements StageHistory {
  private readonly inner: Float64Array;

  /**
   * @param start  inner numbers, held unknowns at their held values of time 0
   * @param spans  from the latest to the earliest, together 0 to the duration
   * @param errors ascending in time
   */
  constructor(
    private readonly numbering: Numbering,
    private readonly held: InnerSystem["held"],
    private readonly start: Float64Array,
    private readonly spans: readonly KrylovSpan[],
    readonly times: Float64Array,
    private readonly errors: readonly InstantError[],
    readonly facts: MarchFacts,
  ) {
    this.inner = new Float64Array(start.length);
  }

  at(time: number, out: Float64Array): Float64Array {
    const { inner } = this;
    inner.set(this.start);
    if (time > 0) for (const answer of this.spanAt(time).answers) answer.addField(time, inner);
    return toOuter(this.numbering, setHeld(this.held, time, inner), out);
  }

  /** Balanced to rounding at any instant, not only those of `times`. */
  integral(time: number, out: Float64Array): Float64Array {
    const { inner, start } = this;
    for (let i = 0; i < inner.length; i++) inner[i] = time * start[i]!;
    if (time > 0) for (const answer of this.spanAt(time).answers) answer.addIntegral(time, inner);
    for (const { unknowns, signal } of this.held) {
      const value = signalIntegral(signal, time);
      for (const i of unknowns) inner[i] = value;
    }
    return toOuter(this.numbering, inner, out);
  }

  signalIntegral(signal: Signal, time: number): number {
    return signalIntegral(signal, time);
  }

  /** The larger of the estimates on either side; before the first of them nothing better than the largest is known. */
  errorAt(time: number): number {
    const after = this.errors.findIndex((each) => each.time >= time);
    if (after === 0) return this.facts.timeError;
    if (after < 0) return this.errors.at(-1)?.error ?? this.facts.timeError;
    return Math.max(this.errors[after - 1]!.error, this.errors[after]!.error);
  }

  private spanAt(time: number): KrylovSpan {
    return this.spans.find(({ from }) => time > from) ?? this.spans[this.spans.length - 1]!;
  }
}
