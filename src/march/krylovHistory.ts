/** The march of a stage by Krylov segments, at any instant of it. */
import { toOuter } from "../linalg/numbering.ts";
import type { Numbering } from "../linalg/numbering.ts";
import type { InnerSystem } from "./innerSystem.ts";
import { signalIntegral } from "./signals.ts";
import type { MarchFacts, Signal, StageHistory } from "./types.ts";

/** A stretch of the stage with its own start and bases; times of the stage, vectors in the inner numbering. */
export interface KrylovSegment {
  readonly from: number;
  readonly to: number;
  fieldAt(time: number, out: Float64Array): Float64Array;
  /** out += integral over [from, time] of the unknowns that are not held */
  integralAt(time: number, out: Float64Array): Float64Array;
}

export class KrylovHistory implements StageHistory {
  readonly times: Float64Array;
  private readonly inner: Float64Array;

  constructor(
    private readonly numbering: Numbering,
    private readonly system: InnerSystem,
    private readonly segments: readonly KrylovSegment[],
    duration: number,
    readonly facts: MarchFacts,
  ) {
    this.times = Float64Array.of(0, ...segments.slice(0, -1).map((segment) => segment.to), duration);
    this.inner = new Float64Array(system.pattern.size);
  }

  at(time: number, out: Float64Array): Float64Array {
    const segment = this.segments.find((each) => time <= each.to) ?? this.segments.at(-1)!;
    return toOuter(this.numbering, segment.fieldAt(time, this.inner), out);
  }

  /** Exact for any instant, not only those of `times`. */
  integral(time: number, out: Float64Array): Float64Array {
    this.inner.fill(0);
    for (const segment of this.segments) {
      if (segment.from >= time) break;
      segment.integralAt(Math.min(time, segment.to), this.inner);
    }
    for (const { unknowns, signal } of this.system.held) {
      const value = signalIntegral(signal, time);
      for (const i of unknowns) this.inner[i] = value;
    }
    return toOuter(this.numbering, this.inner, out);
  }

  signalIntegral(signal: Signal, time: number): number {
    return signalIntegral(signal, time);
  }
}
