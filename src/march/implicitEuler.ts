/**
 * Implicit Euler with its steps controlled by doubling: each step is taken once whole and twice halved; the halves
 * are kept, the difference tells their local error. With lumped capacity and film no value leaves the range that
 * start and surroundings span, at any step: the scheme is the safe baseline.
 *
 * The error of the whole march is followed too. A local error d of a step is carried on by the later ones as any
 * difference of two solutions is, by the scheme without loads:  E_(n+1) = F^-1 C E_n + d.  One more solve a step
 * buys an honest figure for the largest error in time.
 */
import { toInner } from "../linalg/numbering.ts";
import type { HeldMatrix, SparseSolver } from "../linalg/solver.ts";
import { largestDifference, largestMagnitude } from "../linalg/vectors.ts";
import {
  AIM,
  FACTORS_KEPT,
  FIRST_INSTANT_SHARE,
  FIRST_STEP_SHARE,
  GROWTH_MARGIN,
  INTERPOLATION_SHARE,
  LEAST_STEP_SHARE,
  SAME_INSTANT,
  SHORTEST_STEP_POWER,
  STEP_SHARE_OF_REMAINDER,
} from "./defaults.ts";
import { freeRows, innerSystem, setHeld, signalsOf, type InnerSystem } from "./innerSystem.ts";
import { heldMatrix, ShiftedFactors } from "./shiftedFactors.ts";
import { knotsWithin } from "./signals.ts";
import { SteppedHistory } from "./steppedHistory.ts";
import { StepLoads } from "./stepLoads.ts";
import type { MarchFacts, MarchOptions, Scheme } from "./types.ts";
import { createWorkspace } from "./workspace.ts";

/**
 * March one stage by implicit Euler. Steps land on the knots of the signals. Held unknowns take their held value at
 * time 0, whatever the start says, as new start values: the jump gives the neighbours no push through a consistent
 * capacity, which would send them out of range for the first instants.
 *
 * @throws NotPositiveDefiniteError when C + dt K is not positive definite
 */
export const implicitEuler: Scheme = function* (system, start, options) {
  const workspace = options.workspace ?? createWorkspace();
  try {
    const solver = workspace.solverFor(system.pattern, system.coordinates);
    const inner = innerSystem(system, solver);
    const factors = new ShiftedFactors(solver, inner, FACTORS_KEPT, workspace.counts);
    const march = new EulerMarch(
      inner,
      solver,
      factors,
      setHeld(inner.held, 0, toInner(solver.numbering, start, start.slice())),
      options,
    );
    try {
      while (!march.finished) {
        march.step();
        yield { fraction: march.time / options.duration, soFar: () => march.history() };
      }
      return march.history();
    } finally {
      march.release();
      factors.release();
    }
  } finally {
    if (!options.workspace) workspace.release();
  }
};

class EulerMarch {
  time = 0;
  finished = false;
  /** C with zero rows for held unknowns */
  private readonly capacity: HeldMatrix;
  private readonly loads: StepLoads;
  private readonly kept: SteppedHistory;
  private readonly knots: number[];
  private readonly firstInstant: number;
  /** the duration over 2^power is the step aimed at */
  private power: number;
  /** rate at which the error of the past dies down by itself [1/s] */
  private relaxation = 0;
  private rejected = 0;
  private steps = 0;
  private largestError = 0;
  private u: Float64Array;
  private halfway: Float64Array;
  private next: Float64Array;
  private readonly whole: Float64Array;
  private readonly error: Float64Array;
  private readonly carried: Float64Array;
  private readonly nothing: Float64Array;
  private readonly outer: Float64Array;

  constructor(
    system: InnerSystem,
    private readonly solver: SparseSolver,
    private readonly factors: ShiftedFactors,
    start: Float64Array,
    private readonly options: MarchOptions,
  ) {
    const vector = () => new Float64Array(start.length);
    this.u = start;
    [this.halfway, this.next, this.whole, this.error] = [vector(), vector(), vector(), vector()];
    [this.carried, this.nothing, this.outer] = [vector(), vector(), vector()];
    this.capacity = heldMatrix(solver, freeRows(system, system.capacity, false));
    this.loads = new StepLoads(system, FACTORS_KEPT);
    this.kept = new SteppedHistory(solver.numbering, system, start);
    this.knots = knotsWithin(signalsOf(system), options.duration);
    this.firstInstant =
      options.firstInstant > 0 ? options.firstInstant : FIRST_INSTANT_SHARE * options.duration;
    this.power = Math.ceil(Math.log2(options.duration / (FIRST_STEP_SHARE * this.firstInstant)));
  }

  /** Take one accepted step, however many tries it needs. */
  step(): void {
    const { options } = this;
    for (;;) {
      const knot = this.knots[0]!;
      const aimed = options.duration * 2 ** -this.power;
      const lands = aimed >= (knot - this.time) * (1 - SAME_INSTANT);
      const step = lands ? knot - this.time : aimed;
      const endTime = lands ? knot : this.time + step;
      const local = this.tryStep(step, endTime);
      const allowed = this.allowedError(step, endTime);
      if (local > allowed && this.power < SHORTEST_STEP_POWER) {
        this.rejected++;
        // Two orders in the step: an excess of more than 4 is not mended by one halving.
        this.power = Math.ceil(Math.log2(options.duration / step)) + (local > 4 * allowed ? 2 : 1);
        continue;
      }
      this.accept(step, endTime, local, lands);
      if (!lands && 4 * GROWTH_MARGIN * local < this.allowedError(2 * step, endTime + step)) this.power--;
      return;
    }
  }

  release(): void {
    this.capacity.release();
  }

  history() {
    const { factors } = this;
    const facts: MarchFacts = {
      scheme: "implicit-euler",
      steps: this.steps,
      rejectedSteps: this.rejected,
      factorizations: factors.factorizations,
      solves: factors.solves,
      linearIterations: factors.linearIterations,
      timeError: this.largestError + INTERPOLATION_SHARE * this.options.tolerance,
    };
    return this.kept.finish(this.time, this.u, facts);
  }

  /** Whole step and two halves; @returns the largest difference, which is the local error of the halves */
  private tryStep(step: number, endTime: number): number {
    const { capacity, factors, loads, u, whole, halfway, next } = this;
    const half = step / 2;
    whole.set(u);
    factors.solveProduct(step, capacity, u, loads.at(step, endTime), whole);
    for (let i = 0; i < u.length; i++) halfway[i] = 0.5 * (u[i]! + whole[i]!);
    factors.solveProduct(half, capacity, u, loads.at(half, endTime - half), halfway);
    next.set(whole);
    factors.solveProduct(half, capacity, halfway, loads.at(half, endTime), next);
    return largestDifference(whole, next);
  }

  private accept(step: number, endTime: number, local: number, lands: boolean): void {
    this.carryError(step, endTime);
    const spacing =
      local > 0 ? step * Math.sqrt((2 * INTERPOLATION_SHARE * this.options.tolerance) / local) : Infinity;
    this.kept.add(this.time, this.u, endTime, spacing, step, this.halfway, this.next);
    [this.u, this.next] = [this.next, this.u];
    this.time = endTime;
    this.steps++;
    if (lands) {
      this.knots.shift();
      this.kept.keepNext();
    }
    this.finished = this.knots.length === 0 || this.stopAsked();
  }

  /** E := F^-1 C E + d, and how fast E would die down by itself. */
  private carryError(step: number, endTime: number): void {
    const { error, carried, whole, next } = this;
    const before = largestMagnitude(error);
    if (before > 0) {
      carried.set(error);
      this.factors.solveProduct(step, this.capacity, error, this.nothing, carried);
      this.relaxation = Math.max(0, 1 - largestMagnitude(carried) / before) / step;
    } else carried.fill(0);
    for (let i = 0; i < error.length; i++) error[i] = carried[i]! + whole[i]! - next[i]!;
    if (endTime >= this.firstInstant * (1 - SAME_INSTANT))
      this.largestError = Math.max(this.largestError, largestMagnitude(error));
  }

  /**
   * Local error that a step may add: its even part of the tolerance by the time over which errors die down (their own
   * relaxation, or the age of the field where that is shorter), never more than a share of what is left of the
   * tolerance. Before the first instant that matters more is allowed, as it has died down by then.
   */
  private allowedError(step: number, endTime: number): number {
    const tolerance = AIM * this.options.tolerance;
    const even = tolerance * Math.min(1, step * Math.max(this.relaxation, 1 / endTime));
    const early = Math.sqrt(Math.max(1, this.firstInstant / endTime));
    const left = STEP_SHARE_OF_REMAINDER * (tolerance - largestMagnitude(this.error));
    return early * Math.max(Math.min(even, left), LEAST_STEP_SHARE * even);
  }

  private stopAsked(): boolean {
    const { stop } = this.options;
    if (!stop) return false;
    const { outerOf } = this.solver.numbering;
    for (let i = 0; i < outerOf.length; i++) this.outer[outerOf[i]!] = this.u[i]!;
    return stop(this.time, this.outer);
  }
}
