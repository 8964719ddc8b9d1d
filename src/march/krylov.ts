/**
 * Rational Krylov march (shift-and-invert Lanczos): the whole of a linear stage from one factor and some tens of
 * solves, exact in time to a stated tolerance for loads piecewise linear in time.
 *
 * Nothing is solved with K, so that K may be singular; nothing is stepped, so that any instant costs one combination
 * of vectors. A basis with shift g sees the early instants less sharply the earlier they are. Where those are asked
 * for, a second basis with a smaller shift serves them, and so on; every one counts from the start of the stage.
 *
 * Bases belong to load vectors, not to what drives them: with a workspace that is kept, another ambient, held value or
 * uniform start needs no solve (krylovSystem.ts).
 */
import { toInner } from "../linalg/numbering.ts";
import { FIRST_INSTANT_SHARE, KRYLOV } from "./defaults.ts";
import { setHeld } from "./innerSystem.ts";
import type { KrylovAnswer, KrylovBasis } from "./krylovBasis.ts";
import { KrylovHistory, type InstantError, type KrylovSpan } from "./krylovHistory.ts";
import { drivenVectors, type DrivenVector } from "./krylovLoads.ts";
import type { KrylovLayer, KrylovSystem } from "./krylovSystem.ts";
import type { MarchOptions, MarchProgress, Scheme } from "./types.ts";
import { createWorkspace } from "./workspace.ts";

/**
 * March one stage. Held unknowns take their held value at time 0 as new start values.
 *
 * @throws NotPositiveDefiniteError when C + g K is not positive definite
 */
export const krylov: Scheme = function* (system, start, options) {
  const workspace = options.workspace ?? createWorkspace();
  try {
    const kept = workspace.krylovSystem(system);
    // The analysis may just have taken a while.
    yield { fraction: 0 };
    const inner = kept.inner(system);
    const from = setHeld(inner.held, 0, toInner(kept.solver.numbering, start, start.slice()));
    const before = { ...workspace.counts };
    const march = new KrylovMarch(kept, drivenVectors(inner, from, options.workspace !== undefined), options);
    yield* march.run();
    workspace.counts.solves += march.solves;
    const historyUntil = (times: Float64Array) =>
      new KrylovHistory(kept.solver.numbering, inner.held, from, march.spans, times, march.instantErrors(), {
        scheme: "krylov",
        steps: march.vectors,
        rejectedSteps: 0,
        factorizations: workspace.counts.factorizations - before.factorizations,
        solves: march.solves,
        linearIterations: march.linearIterations,
        timeError: march.timeError,
      });
    const history = historyUntil(march.instants());
    const reached = options.stop ? stopInstant(history, options.stop, start.length) : undefined;
    return reached === undefined ? history : historyUntil(history.times.filter((time) => time <= reached));
  } finally {
    if (!options.workspace) workspace.release();
  }
};

/** The first instant at which the caller wants to stop. */
function stopInstant(
  history: KrylovHistory,
  stop: NonNullable<MarchOptions["stop"]>,
  size: number,
): number | undefined {
  const u = new Float64Array(size);
  return history.times.find((time) => time > 0 && stop(time, history.at(time, u)));
}

/** A driven vector with its basis in the layer at work. */
interface Growing {
  readonly driven: DrivenVector;
  readonly basis: KrylovBasis;
  answer: KrylovAnswer;
  /** error estimates at the check instants */
  errors: number[];
}

class KrylovMarch {
  readonly spans: KrylovSpan[] = [];
  private readonly errors: InstantError[] = [];
  solves = 0;
  vectors = 0;
  linearIterations = 0;
  timeError = 0;
  private readonly firstInstant: number;

  constructor(
    private readonly system: KrylovSystem,
    private readonly driven: readonly DrivenVector[],
    private readonly options: MarchOptions,
  ) {
    const { duration, firstInstant } = options;
    this.firstInstant = Math.min(duration, firstInstant > 0 ? firstInstant : FIRST_INSTANT_SHARE * duration);
  }

  /** Spans from the latest to the earliest, each with a shift of its own. */
  *run(): Generator<MarchProgress, void, void> {
    let to = this.options.duration;
    while (to > 0) to = yield* this.span(to, this.spans.length + 1 === KRYLOV.mostSpans);
  }

  /** Instants that the march can be said to have computed: those at which its error was looked at. */
  instants(): Float64Array {
    const checked = this.checkInstants(this.options.duration);
    return Float64Array.of(0, ...checked.filter((time) => time >= this.firstInstant));
  }

  /** The estimates of all spans, ascending in time. */
  instantErrors(): InstantError[] {
    return this.errors.sort((a, b) => a.time - b.time);
  }

  /** One span that ends at `to`; @returns where it begins: 0, or the instant from which on it is good enough */
  private *span(to: number, last: boolean): Generator<MarchProgress, number, void> {
    const share = this.firstInstant >= KRYLOV.lateShare * to ? KRYLOV.shiftLate : KRYLOV.shiftEarly;
    const layer = yield* this.layer(share * to, to);
    const instants = this.checkInstants(to);
    const growing = this.driven.map((driven) => begin(driven, layer));
    let cap: number = last ? KRYLOV.mostVectors : KRYLOV.vectorsBeforeParting;
    for (const entry of growing) yield* this.grow(entry, KRYLOV.leastVectors - entry.basis.count, to);
    for (;;) {
      for (const entry of growing) assess(entry, instants);
      const estimates = estimatesOf(growing, instants);
      const from = this.goodFrom(estimates, instants);
      if (from === 0) return this.close(growing, 0, to, instants, estimates);
      const wanting = growing.filter((entry) => this.isWanting(entry, growing.length, instants, cap));
      for (const entry of wanting) yield* this.grow(entry, KRYLOV.checkEvery, to);
      if (wanting.length > 0) continue;
      if (!last && from < KRYLOV.worthParting * to) return this.close(growing, from, to, instants, estimates);
      // No more to be had: the estimate then says how far it came.
      if (cap === KRYLOV.mostVectors) return this.close(growing, 0, to, instants, estimates);
      cap = KRYLOV.mostVectors;
    }
  }

  private *layer(shift: number, to: number): Generator<MarchProgress, KrylovLayer, void> {
    const making = this.system.layer(shift);
    for (;;) {
      const step = making.next();
      if (step.done) return step.value;
      yield this.progress(to, FACTOR_SHARE * step.value);
    }
  }

  private *grow({ basis }: Growing, count: number, to: number): Generator<MarchProgress, void, void> {
    for (let k = 0; k < count && !basis.exhausted; k++) {
      basis.grow();
      this.vectors++;
      const grown = Math.min(1, basis.count / KRYLOV.vectorsBeforeParting);
      yield this.progress(to, FACTOR_SHARE + (1 - FACTOR_SHARE) * grown);
    }
  }

  /** Spans come from the latest to the earliest, and the first is most of the work. */
  private progress(to: number, share: number): MarchProgress {
    const { duration } = this.options;
    return { fraction: (duration - to * (1 - share)) / duration };
  }

  /** The instant from which on the estimate keeps to the tolerance: 0 when that is so from the first that matters. */
  private goodFrom(estimates: readonly number[], instants: readonly number[]): number {
    for (let i = instants.length - 1; i >= 0 && instants[i]! >= this.firstInstant; i--)
      if (!(estimates[i]! <= this.options.tolerance)) return instants[i + 1] ?? Infinity;
    return 0;
  }

  /** Whether a basis has a part in what is missing and may still grow. */
  private isWanting(
    { basis, errors }: Growing,
    bases: number,
    instants: readonly number[],
    cap: number,
  ): boolean {
    if (basis.exhausted || basis.count >= cap) return false;
    const part = this.options.tolerance / (2 * bases);
    return errors.some((error, i) => instants[i]! >= this.firstInstant / WINDOW && !(error <= part));
  }

  private close(
    growing: readonly Growing[],
    from: number,
    to: number,
    instants: readonly number[],
    estimates: readonly number[],
  ): number {
    this.spans.push({ from, to, answers: growing.map(({ answer }) => answer) });
    estimates.forEach((estimate, i) => {
      if (instants[i]! < Math.max(from, this.firstInstant)) return;
      this.timeError = Math.max(this.timeError, estimate);
      this.errors.push({ time: instants[i]!, error: estimate });
    });
    for (const { basis } of growing) {
      const { solves, linearIterations } = basis.takeWork();
      this.solves += solves;
      this.linearIterations += linearIterations;
    }
    return from;
  }

  /** Ascending: evenly in the logarithm from before the first instant that matters to `to`, and behind knots. */
  private checkInstants(to: number): number[] {
    const first = Math.min(this.firstInstant, to);
    const instants = new Set([to, first]);
    for (let time = to; time > first / WINDOW; time *= CHECK_RATIO) instants.add(time);
    const knots = [...new Set(this.driven.flatMap(({ drive }) => [...drive.times]))].filter(
      (t) => t > 0 && t < to,
    );
    const stride = Math.max(1, Math.ceil(knots.length / KRYLOV.mostKnotsChecked));
    for (let k = 0; k < knots.length; k += stride)
      for (const behind of BEHIND_KNOTS)
        if (knots[k]! + behind * first < to) instants.add(knots[k]! + behind * first);
    return [...instants].sort((a, b) => a - b);
  }
}

/** Share of the work of a span that its factor is, for the progress shown. */
const FACTOR_SHARE = 0.3;
/** Eight check instants per decade. */
const CHECK_RATIO = 10 ** (-1 / 8);
/** Instants behind a knot, in units of the first instant that matters: the field bends there as it does at the start. */
const BEHIND_KNOTS = [0, ...Array.from({ length: 9 }, (_, k) => 4 ** (k - 6))];
/** The error at an instant is taken as the largest estimate from this share of it on: single estimates pass through 0. */
const WINDOW = 4;

function begin(driven: DrivenVector, layer: KrylovLayer): Growing {
  const basis = layer.basisOf(driven.vector, driven.lasting);
  return { driven, basis, answer: basis.answer(driven.drive), errors: [] };
}

function assess(entry: Growing, instants: readonly number[]): void {
  entry.answer = entry.basis.answer(entry.driven.drive);
  entry.errors = instants.map((time) => entry.answer.errorAt(time));
}

/** Of all bases together: the sum of their errors, the largest of the window before each instant, on the safe side. */
function estimatesOf(growing: readonly Growing[], instants: readonly number[]): number[] {
  const sums = instants.map((_, i) => growing.reduce((sum, { errors }) => sum + errors[i]!, 0));
  return instants.map((time, i) => {
    let largest = 0;
    for (let k = i; k >= 0 && instants[k]! >= time / WINDOW; k--) largest = Math.max(largest, sums[k]!);
    return KRYLOV.safety * largest;
  });
}
