/**
 * One face for the ways of solving a sparse symmetric positive definite system, so that who marches in time need not
 * know which is at work: an exact sparse factor in WebAssembly, or conjugate gradients with an incomplete factor in
 * plain TypeScript where WebAssembly SIMD is missing.
 *
 * Analysis (pattern only) is done once by `makeSolver`; values come and go through factors. Everything a solver takes
 * and gives after the analysis is in its own ("inner") numbering: see numbering.ts.
 */
import { bandOrdering } from "./bandOrdering.ts";
import { conjugateGradients, conjugateGradientsWork, sparseOperator } from "./conjugateGradients.ts";
import { RELATIVE_RESIDUAL } from "./defaults.ts";
import { NotPositiveDefiniteError } from "./errors.ts";
import { graphCoordinates } from "./graphCoordinates.ts";
import { incompleteCholesky } from "./incompleteCholesky.ts";
import { forgetIdleInstances, kernelsAvailable } from "./kernels/instance.ts";
import {
  gatherValues,
  numberingFrom,
  renumberPattern,
  toInner,
  toOuter,
  type Numbering,
  type RenumberedPattern,
} from "./numbering.ts";
import { multiply, type SparsityPattern } from "./pattern.ts";
import { choleskySolver } from "./sparseCholesky.ts";

export type SolverKind = "cholesky" | "conjugate-gradients";

/** A matrix held where it multiplies fastest. Vectors in the inner numbering. */
export interface HeldMatrix {
  /** values on the inner pattern, taken over */
  refresh(values: Float64Array): void;
  /** out = A x; `out` must not be `x` */
  multiply(x: Float64Array, out: Float64Array): Float64Array;
  /** give its room back to the solver; dead afterwards */
  release(): void;
}

/** What is needed to solve with one matrix. Vectors in the inner numbering. */
export interface Factor {
  /**
   * Take over the values of a matrix (on the inner pattern), in place of the last one.
   * @throws NotPositiveDefiniteError with the unknown (outer number), the pivot and the reason
   */
  refresh(values: Float64Array): void;
  /**
   * The same in steps of some 20 ms: yields the share done. Only one factor of a solver may be under way at a time; a
   * factor left half done is empty.
   */
  refreshInSteps(values: Float64Array): Generator<number, void, void>;
  /**
   * Solve A x = b. `x` holds a guess on entry, which an exact factor ignores. `x` may be `b` for an exact factor only.
   * @returns iterations spent: 1 for an exact factor
   */
  solve(b: Float64Array, x: Float64Array): number;
  /**
   * out = A^-1 (M x + extra), the work of one implicit step, with a matrix M of the same solver. `out` holds a guess on
   * entry and may be `x`.
   * @returns iterations spent
   */
  solveProduct(matrix: HeldMatrix, x: Float64Array, extra: Float64Array, out: Float64Array): number;
  /** give its room back to the solver; dead afterwards */
  release(): void;
}

export interface SparseSolver {
  readonly kind: SolverKind;
  readonly numbering: Numbering;
  /** the pattern in the inner numbering, with the outer place of each entry */
  readonly inner: RenumberedPattern;
  readonly facts: AnalysisFacts;
  /** a new factor, empty until refreshed */
  factor(): Factor;
  matrix(): HeldMatrix;
  /**
   * Give the memory back for the next solver to use; factors and matrices of this one are dead afterwards. See also
   * `giveBackMemory`.
   */
  release(): void;
}

export interface AnalysisFacts {
  /** nonzeros of the triangular factor */
  readonly factorEntries: number;
  /** multiplications and additions of one numeric factorization */
  readonly factorWork: number;
}

export interface SolverOptions {
  /** "cholesky" where it can run, unless one is forced */
  readonly kind?: SolverKind;
  /** of conjugate gradients */
  readonly relativeResidual?: number;
}

/** Conjugate gradients with an incomplete factor, in a numbering of narrow band. */
export function conjugateGradientsSolver(
  pattern: SparsityPattern,
  options: SolverOptions = {},
): SparseSolver {
  const numbering = numberingFrom(bandOrdering(pattern));
  const inner = renumberPattern(pattern, numbering);
  const aim = { relativeResidual: options.relativeResidual ?? RELATIVE_RESIDUAL };
  const work = conjugateGradientsWork(pattern.size);
  return {
    kind: "conjugate-gradients",
    numbering,
    inner,
    facts: {
      factorEntries: (inner.source.length + pattern.size) / 2,
      factorWork: 0,
    },
    factor() {
      const preconditioner = incompleteCholesky(inner.pattern);
      const own = new Float64Array(inner.source.length);
      const b = new Float64Array(pattern.size);
      const operator = sparseOperator(inner.pattern, own);
      const refresh = (values: Float64Array) => {
        own.set(values);
        withOuterNumber(numbering, () => preconditioner.refresh(own));
      };
      return {
        refresh,
        // An incomplete factor is soon done: one step.
        *refreshInSteps(values) {
          yield 0;
          refresh(values);
        },
        solve: (rhs, x) => conjugateGradients(operator, rhs, preconditioner, work, aim, x),
        solveProduct(matrix, x, extra, out) {
          matrix.multiply(x, b);
          for (let i = 0; i < b.length; i++) b[i]! += extra[i]!;
          return conjugateGradients(operator, b, preconditioner, work, aim, out);
        },
        release: nothing,
      };
    },
    matrix() {
      const own = new Float64Array(inner.source.length);
      return {
        refresh: (values) => own.set(values),
        multiply: (x, out) => multiply(inner.pattern, own, x, out),
        release: nothing,
      };
    },
    release: nothing,
  };
}

/** Plain arrays need no giving back: the garbage collector takes them. */
const nothing = () => undefined;

/**
 * Analyse a pattern for solving. Coordinates (2 per unknown) are used for ordering only; without them the graph
 * alone decides.
 */
export function makeSolver(
  pattern: SparsityPattern,
  coordinates: Float64Array | undefined,
  options: SolverOptions = {},
): SparseSolver {
  const kind = options.kind ?? (kernelsAvailable() ? "cholesky" : "conjugate-gradients");
  if (kind === "conjugate-gradients") return conjugateGradientsSolver(pattern, options);
  return choleskySolver(pattern, coordinates ?? graphCoordinates(pattern));
}

/** Memory of released solvers that is worth keeping warm between runs [bytes]: a preview's, not a large run's. */
const WARM_MEMORY = 64 * 1024 * 1024;

/** Between runs: memory of released solvers goes back to the machine, but for small ones that keep the next run quick. */
export function giveBackMemory(): void {
  forgetIdleInstances(WARM_MEMORY);
}

/**
 * Solve A x = b once, everything in the outer numbering: for steady states and the like.
 *
 * @throws NotPositiveDefiniteError when A is singular (say every side insulated) or indefinite
 */
export function solveOnce(
  pattern: SparsityPattern,
  coordinates: Float64Array | undefined,
  values: Float64Array,
  b: Float64Array,
  out: Float64Array,
  options: SolverOptions = {},
): Float64Array {
  const solver = makeSolver(pattern, coordinates, options);
  try {
    const factor = solver.factor();
    factor.refresh(gatherValues(solver.inner.source, values, new Float64Array(values.length)));
    const innerB = toInner(solver.numbering, b, new Float64Array(b.length));
    const innerX = new Float64Array(b.length);
    factor.solve(innerB, innerX);
    return toOuter(solver.numbering, innerX, out);
  } finally {
    solver.release();
  }
}

/** Errors name unknowns as the caller numbers them. */
function withOuterNumber({ outerOf }: Numbering, action: () => void): void {
  try {
    action();
  } catch (error) {
    if (!(error instanceof NotPositiveDefiniteError) || error.unknown < 0) throw error;
    throw new NotPositiveDefiniteError(outerOf[error.unknown]!, error.pivot, error.diagonal);
  }
}
