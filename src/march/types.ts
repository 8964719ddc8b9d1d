/**
 * What a time scheme needs to know. Nothing here knows of heat: two symmetric matrices on one pattern, load
 * vectors and the signals that drive them.
 */
import type { SparsityPattern } from "../linalg/pattern.ts";
import type { MarchWorkspace } from "./workspace.ts";

/** A function of time, piecewise linear, held constant beyond its ends; `times` strictly increasing [s]. */
export interface Signal {
  readonly times: Float64Array;
  readonly values: Float64Array;
}

/** One load: a vector (one value per unknown) driven by a signal. */
export interface Load {
  readonly vector: Float64Array;
  readonly signal: Signal;
}

/** Unknowns whose value is prescribed by a signal. */
export interface HeldUnknowns {
  readonly unknowns: Uint32Array;
  readonly signal: Signal;
}

/**
 * The linear semi-discrete system of one stage:
 *
 *   C du/dt + K u = sum over g of a_g(t) p_g,     u = held values on the held unknowns.
 *
 * C is symmetric positive definite, K symmetric positive semi-definite (films included); the values of both
 * stand on one pattern. Time counts from the beginning of the stage [s].
 */
export interface LinearSystem {
  readonly pattern: SparsityPattern;
  readonly capacity: Float64Array;
  readonly conductance: Float64Array;
  readonly loads: readonly Load[];
  readonly held: readonly HeldUnknowns[];
  /** r, z of each unknown, 2 per unknown: only for ordering */
  readonly coordinates: Float64Array;
}

/** The march of one stage: what was reached, at any instant of it. */
export interface StageHistory {
  /** instants the scheme computed, from 0 to the last reached, ascending [s of the stage] */
  readonly times: Float64Array;
  /** the unknowns at any instant between the first and the last of `times`, into `out` */
  at(time: number, out: Float64Array): Float64Array;
  /**
   * Integral of u over [0, time] for a `time` among `times`, weighed as the scheme itself weighs it, into `out`, so that
   * C (u - u0) + K (integral of u) = sum of p_g (integral of a_g) holds on the free unknowns to the tolerance of the solves;
   * u0 is the field at time 0, held unknowns at their held values.
   */
  integral(time: number, out: Float64Array): Float64Array;
  /** integral of a signal over [0, time] in the same sense */
  signalIntegral(signal: Signal, time: number): number;
  /**
   * Estimate of the error in time at one instant, where the scheme can tell it apart from the largest of all instants
   * (facts.timeError); absent where it cannot.
   */
  errorAt?(time: number): number;
  readonly facts: MarchFacts;
}

export interface MarchFacts {
  readonly scheme: SchemeName;
  readonly steps: number;
  readonly rejectedSteps: number;
  readonly factorizations: number;
  readonly solves: number;
  readonly linearIterations: number;
  /** estimate of the largest error in time over all unknowns and instants, in the units of u */
  readonly timeError: number;
}

export type SchemeName = "implicit-euler" | "tr-bdf2" | "krylov";

export interface MarchOptions {
  readonly duration: number;
  /** error in time aimed at, in the units of u */
  readonly tolerance: number;
  /** first instant whose value matters [s of the stage]; the tolerance holds from here on */
  readonly firstInstant: number;
  /** stop before `duration`: called at each accepted step with the time and the unknowns; true ends the march there */
  readonly stop?: (time: number, u: Float64Array) => boolean;
  /** what the host keeps between marches, so that nothing is worked out twice; without it everything is made anew */
  readonly workspace?: MarchWorkspace;
}

/** What a march reports on its way; the host decides whether to pause or to end it. */
export interface MarchProgress {
  /** share of the duration done, 0 to 1 */
  readonly fraction: number;
  /** what was computed so far, for a host that ends the march here; absent where nothing can be told yet */
  readonly soFar?: () => StageHistory;
}

/** A scheme is a generator: it yields progress and returns the history, so that a host can cancel between yields. */
export type Scheme = (
  system: LinearSystem,
  start: Float64Array,
  options: MarchOptions,
) => Generator<MarchProgress, StageHistory, void>;
