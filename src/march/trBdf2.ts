/**
 * TR-BDF2 (Bank et al. 1985) with adaptive steps: second order, L-stable, one matrix C + w K for both stages, and an
 * embedded third-order formula that tells the local error (Hosea and Shampine 1996). With gamma = 2 - sqrt(2), d =
 * gamma/2, w = d h and the rates G = f - K u:
 *
 *   trapezoidal stage to t + gamma h:   (C + w K) u_g = C u + w G + w f_g
 *   BDF2 stage to t + h:                (C + w K) u_1 = C (a u_g + (1 - a) u) + w f_1,    a = 1/(gamma (2 - gamma))
 *
 * which is the Runge-Kutta formula  C (u_1 - u) = h (b G + b G_g + d G_1),  b = sqrt(2)/4. The error estimate is solved
 * with C + w K once more, so that stiff modes, which both formulas damp, do not trouble it.
 */
import { toInner } from "../linalg/numbering.ts";
import type { HeldMatrix, SparseSolver } from "../linalg/solver.ts";
import { largestMagnitude } from "../linalg/vectors.ts";
import {
  FIRST_INSTANT_SHARE,
  FIRST_STEP_SHARE,
  GROWTH_MARGIN,
  SAME_INSTANT,
  SHORTEST_STEP_POWER,
} from "./defaults.ts";
import { addLoads, freeRows, innerSystem, setHeld, signalsOf, type InnerSystem } from "./innerSystem.ts";
import { heldMatrix, ShiftedFactors } from "./shiftedFactors.ts";
import { knotsWithin } from "./signals.ts";
import { StepLoads } from "./stepLoads.ts";
import { TrBdf2History } from "./trBdf2History.ts";
import { BDF_SHARE, DIAGONAL, ERROR_WEIGHTS, GAMMA } from "./trBdf2Weights.ts";
import type { MarchOptions, Scheme } from "./types.ts";
import { createWorkspace } from "./workspace.ts";

/**
 * March one stage. Steps land on the knots of the signals. Held unknowns take their held value at time 0 as new start
 * values.
 *
 * @throws NotPositiveDefiniteError when C + w K is not positive definite
 */
export const trBdf2: Scheme = function* (system, start, options) {
  const workspace = options.workspace ?? createWorkspace();
  try {
    const solver = workspace.solverFor(system.pattern, system.coordinates);
    const inner = innerSystem(system, solver);
    const factors = new ShiftedFactors(solver, inner, FACTORS_KEPT, workspace.counts);
    const from = setHeld(inner.held, 0, toInner(solver.numbering, start, start.slice()));
    const march = new TrBdf2March(inner, solver, factors, from, options);
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

/** The step in use and the one before it, to which a landing on a knot returns. */
const FACTORS_KEPT = 2;

class TrBdf2March {
  time = 0;
  finished = false;
  private readonly capacity: HeldMatrix;
  private readonly conductance: HeldMatrix;
  private readonly loads: StepLoads;
  private readonly kept: TrBdf2History;
  private readonly knots: number[];
  private readonly firstInstant: number;
  /** the duration over 2^power is the step aimed at */
  private power: number;
  private steps = 0;
  private rejected = 0;
  /** error carried along, and its largest value from the first instant that matters on */
  private carried = 0;
  private largestError = 0;
  private u: Float64Array;
  private next: Float64Array;
  /** G = f - K u at the beginning, in the middle and at the end of the step, on the free rows */
  private rate: Float64Array;
  private nextRate: Float64Array;
  private readonly middleRate: Float64Array;
  private readonly middle: Float64Array;
  private readonly blend: Float64Array;
  private readonly extra: Float64Array;
  private readonly error: Float64Array;
  private readonly outer: Float64Array;

  constructor(
    private readonly system: InnerSystem,
    private readonly solver: SparseSolver,
    private readonly factors: ShiftedFactors,
    start: Float64Array,
    private readonly options: MarchOptions,
  ) {
    const vector = () => new Float64Array(start.length);
    this.u = start;
    [this.next, this.middle, this.blend, this.extra] = [vector(), vector(), vector(), vector()];
    [this.rate, this.middleRate, this.nextRate] = [vector(), vector(), vector()];
    [this.error, this.outer] = [vector(), vector()];
    this.capacity = heldMatrix(solver, freeRows(system, system.capacity, false));
    this.conductance = heldMatrix(solver, freeRows(system, system.conductance, false));
    this.loads = new StepLoads(system, 2);
    this.kept = new TrBdf2History(solver.numbering, start);
    this.knots = knotsWithin(signalsOf(system), options.duration);
    this.firstInstant =
      options.firstInstant > 0 ? options.firstInstant : FIRST_INSTANT_SHARE * options.duration;
    this.power = Math.ceil(Math.log2(options.duration / (FIRST_STEP_SHARE * this.firstInstant)));
    this.rateAt(0, this.u, this.rate);
  }

  release(): void {
    this.capacity.release();
    this.conductance.release();
  }

  /** Take one accepted step, however many tries it needs. */
  step(): void {
    const { duration } = this.options;
    for (;;) {
      const knot = this.knots[0]!;
      const aimed = duration * 2 ** -this.power;
      const lands = aimed >= (knot - this.time) * (1 - SAME_INSTANT);
      const step = lands ? knot - this.time : aimed;
      const endTime = lands ? knot : this.time + step;
      const local = this.tryStep(step, endTime);
      const allowed = this.allowedError(step, endTime);
      if (local > allowed && this.power < SHORTEST_STEP_POWER) {
        this.rejected++;
        // Third order in the step: an excess of more than 8 is not mended by one halving.
        this.power = Math.ceil(Math.log2(duration / step)) + (local > 8 * allowed ? 2 : 1);
        continue;
      }
      this.accept(endTime, local, lands);
      if (!lands && 8 * GROWTH_MARGIN * local < this.allowedError(2 * step, endTime + step)) this.power--;
      return;
    }
  }

  history() {
    const { factors } = this;
    return this.kept.finish({
      scheme: "tr-bdf2",
      steps: this.steps,
      rejectedSteps: this.rejected,
      factorizations: factors.factorizations,
      solves: factors.solves,
      linearIterations: factors.linearIterations,
      timeError: this.largestError,
    });
  }

  /** Both stages; @returns the largest local error */
  private tryStep(step: number, endTime: number): number {
    const { factors, loads, capacity, u, rate, middle, blend, extra, next, error } = this;
    const weight = DIAGONAL * step;
    const middleTime = this.time + GAMMA * step;
    const middleLoad = loads.at(weight, middleTime);
    for (let i = 0; i < u.length; i++) extra[i] = middleLoad[i]! + weight * rate[i]!;
    middle.set(u);
    factors.solveProduct(weight, capacity, u, extra, middle);
    for (let i = 0; i < u.length; i++) blend[i] = BDF_SHARE * middle[i]! + (1 - BDF_SHARE) * u[i]!;
    next.set(middle);
    factors.solveProduct(weight, capacity, blend, loads.at(weight, endTime), next);
    this.rateAt(middleTime, middle, this.middleRate);
    this.rateAt(endTime, next, this.nextRate);
    const [first, second, third] = ERROR_WEIGHTS;
    for (let i = 0; i < u.length; i++)
      extra[i] = step * (first * rate[i]! + second * this.middleRate[i]! + third * this.nextRate[i]!);
    factors.solve(weight, extra, error.fill(0));
    return largestMagnitude(error);
  }

  /** out = f - K u on the free rows, 0 on held rows */
  private rateAt(time: number, u: Float64Array, out: Float64Array): void {
    const { system } = this;
    this.conductance.multiply(u, out);
    for (let i = 0; i < out.length; i++) out[i] = -out[i]!;
    addLoads(system, time, out);
  }

  private accept(endTime: number, local: number, lands: boolean): void {
    this.kept.add(endTime, this.middle, this.next);
    [this.u, this.next] = [this.next, this.u];
    [this.rate, this.nextRate] = [this.nextRate, this.rate];
    // A field smooths out at least as the root of its age; no error grows on its way.
    this.carried = this.carried * Math.sqrt(this.time / endTime) + local;
    if (endTime >= this.firstInstant * (1 - SAME_INSTANT))
      this.largestError = Math.max(this.largestError, this.carried);
    this.time = endTime;
    this.steps++;
    if (lands) this.knots.shift();
    this.finished = this.knots.length === 0 || this.stopAsked();
  }

  /**
   * The tolerance is dealt out evenly over the logarithm of time: with errors that die down as the root of their age,
   * half the tolerance per unit of the logarithm adds up to the tolerance. Before the first instant that matters more
   * is allowed, as it has died down by then.
   */
  private allowedError(step: number, endTime: number): number {
    const even = (0.5 * this.options.tolerance * step) / endTime;
    return even * Math.sqrt(Math.max(1, this.firstInstant / endTime));
  }

  private stopAsked(): boolean {
    const { stop } = this.options;
    if (!stop) return false;
    const { outerOf } = this.solver.numbering;
    for (let i = 0; i < outerOf.length; i++) this.outer[outerOf[i]!] = this.u[i]!;
    return stop(this.time, this.outer);
  }
}
