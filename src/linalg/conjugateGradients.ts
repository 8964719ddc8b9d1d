/** Conjugate gradients for symmetric positive definite systems, with any symmetric preconditioner. */
import { ITERATIONS_PER_ROOT_SIZE, LEAST_ITERATION_LIMIT, RELATIVE_RESIDUAL } from "./defaults.ts";
import { NotConvergedError, NotPositiveDefiniteError } from "./errors.ts";
import { multiply, type SparsityPattern } from "./pattern.ts";
import { addScaled, dot } from "./vectors.ts";

/** out = A x; `out` is not `x`. */
export interface LinearOperator {
  multiply(x: Float64Array, out: Float64Array): unknown;
}

/** out = P r, where P is symmetric positive definite and near the inverse of the matrix. */
export interface Preconditioner {
  apply(residual: Float64Array, out: Float64Array): void;
}

export interface ConjugateGradientsOptions {
  /** stop when |b - A x| <= relativeResidual |b| */
  readonly relativeResidual?: number;
  readonly iterationLimit?: number;
}

/** Work vectors, so that repeated solves of one size allocate nothing. */
export interface ConjugateGradientsWork {
  readonly residual: Float64Array;
  readonly preconditioned: Float64Array;
  readonly direction: Float64Array;
  readonly image: Float64Array;
}

export function conjugateGradientsWork(size: number): ConjugateGradientsWork {
  return {
    residual: new Float64Array(size),
    preconditioned: new Float64Array(size),
    direction: new Float64Array(size),
    image: new Float64Array(size),
  };
}

/** A matrix by its pattern and values, as an operator. */
export const sparseOperator = (pattern: SparsityPattern, values: Float64Array): LinearOperator => ({
  multiply: (x, out) => multiply(pattern, values, x, out),
});

/** Preconditioner that divides by the diagonal. */
export function diagonalPreconditioner(pattern: SparsityPattern, values: Float64Array): Preconditioner {
  const inverse = Float64Array.from(pattern.diagonal, (place) => 1 / values[place]!);
  return {
    apply(residual, out) {
      for (let i = 0; i < inverse.length; i++) out[i] = inverse[i]! * residual[i]!;
    },
  };
}

/**
 * Solve A x = b. `x` holds the first guess on entry (a warm start saves most of the work of a small time step) and
 * the solution afterwards.
 *
 * @returns the number of iterations; 0 when the guess was good enough
 * @throws NotPositiveDefiniteError when a search direction has no positive curvature
 * @throws NotConvergedError at the iteration limit
 */
export function conjugateGradients(
  matrix: LinearOperator,
  b: Float64Array,
  preconditioner: Preconditioner,
  work: ConjugateGradientsWork,
  options: ConjugateGradientsOptions,
  x: Float64Array,
): number {
  const aim = options.relativeResidual ?? RELATIVE_RESIDUAL;
  const limit =
    options.iterationLimit ??
    Math.max(LEAST_ITERATION_LIMIT, ITERATIONS_PER_ROOT_SIZE * Math.ceil(Math.sqrt(b.length)));
  const { residual, preconditioned, direction, image } = work;
  matrix.multiply(x, image);
  for (let i = 0; i < b.length; i++) residual[i] = b[i]! - image[i]!;
  const bSquare = dot(b, b);
  const goal = aim * aim * bSquare;
  if (dot(residual, residual) <= goal) return 0;
  preconditioner.apply(residual, preconditioned);
  direction.set(preconditioned);
  let product = dot(residual, preconditioned);
  for (let iteration = 1; iteration <= limit; iteration++) {
    matrix.multiply(direction, image);
    const curvature = dot(direction, image);
    if (!(curvature > 0)) throw new NotPositiveDefiniteError(-1, curvature, 0);
    const length = product / curvature;
    addScaled(length, direction, x);
    addScaled(-length, image, residual);
    if (dot(residual, residual) <= goal) return iteration;
    preconditioner.apply(residual, preconditioned);
    const next = dot(residual, preconditioned);
    const turn = next / product;
    product = next;
    for (let i = 0; i < direction.length; i++) direction[i] = preconditioned[i]! + turn * direction[i]!;
  }
  throw new NotConvergedError(limit, Math.sqrt(dot(residual, residual) / bSquare), aim);
}
